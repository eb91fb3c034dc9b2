// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "plant/project.h"

#include <filesystem>
#include <string>
#include <string_view>

namespace headroom::files {

/// A project file as it was opened.
struct Opened {
    std::filesystem::path path;
    plant::Tree tree;     ///< what the file says, tables beside it attached; null if unreadable
    plant::Bound bound;   ///< its findings hold those of the file as well, in the file's order
    plant::Places places; ///< line and column of each key
    std::string text;     ///< the bytes of the file

    bool usable() const { return tree.isObject() && bound.usable(); }
    const Findings& findings() const { return bound.findings; }
};

/// Reads, migrates, binds and checks a project. Never throws for what a user can mend.
Opened openProject(const std::filesystem::path& path);

/// The same for text that is not in a file; tables are looked for in `folder`.
/// @param name used for the places of findings
Opened openText(std::string text, const std::filesystem::path& folder, const std::string& name);

/// Puts the keys in order and replaces the file in one step. The value is the tree as saved.
Result<plant::Tree> saveProject(const plant::Tree& tree, const std::filesystem::path& path);

/// Binds an edited tree of the same file, whose outer tables are already attached.
plant::Bound rebind(const plant::Tree& tree);

/// The bytes of a file, or a finding.
Result<std::string> readFile(const std::filesystem::path& path);

} // namespace headroom::files
