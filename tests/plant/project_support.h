// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "files/project_file.h"
#include "plant/fields.h"
#include "plant/project.h"

#include <string>
#include <string_view>
#include <vector>

/// What the tests of projects share.
namespace support {

/// The demo Dorvane as it stands in `studies/`.
const headroom::plant::Tree& dorvane();
/// A small plant: reservoir, tunnel, chamber, pipe and an ideal unit.
const headroom::plant::Tree& smallPlant();
/// A tree from JSON text; the test fails if it is none.
headroom::plant::Tree json(std::string_view text);

/// Findings of a tree with this code and subject; "" matches any subject.
std::vector<headroom::Finding> found(const headroom::Findings& findings, std::string_view code,
                                     std::string_view subject = "");
bool has(const headroom::Findings& findings, std::string_view code, std::string_view subject = "");
/// All texts, one a line, for INFO.
std::string texts(const headroom::Findings& findings);
/// Findings of the tree with `value` (JSON) at `path` (joined).
headroom::Findings findingsWith(const headroom::plant::Tree& tree, std::string_view path,
                                std::string_view value);
headroom::Findings findingsWithout(const headroom::plant::Tree& tree, std::string_view path);

} // namespace support
