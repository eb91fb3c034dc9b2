// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "plant/tree.h"

#include <functional>
#include <span>
#include <string>

namespace headroom::files {

/// The format this program writes; raised by one with each step added to `migrations()`.
inline constexpr int newestFormat = 1;

/// One step from format `from` to `from + 1`, done in memory.
struct Migration {
    int from = 0;
    std::string what; ///< for the note: what the step changed, a whole sentence
    std::function<plant::Tree(const plant::Tree&)> step;
};

/// The chain of this program, oldest first; empty while there is one format only.
std::span<const Migration> migrations();

struct Migrated {
    plant::Tree tree;
    Findings findings; ///< a note for each step; an error if the file is newer than `newest`
    bool usable = true;
};

/// Leads a project through the chain to format `newest`. A project without a format number is
/// handed on as it is; what is missing is then said by its reader.
Migrated migrate(const plant::Tree& project, std::span<const Migration> chain, int newest);

} // namespace headroom::files
