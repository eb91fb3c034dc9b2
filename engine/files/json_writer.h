// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/tree.h"

#include <string>
#include <string_view>

namespace headroom::files {

/// The text of a project file. The layout follows from the structure alone, never from the width,
/// so that a changed number changes one line: collections have a line for each thing, objects
/// without objects inside stand on one line, and the changes of an option stand on one line,
/// whatever they are. Numbers are the shortest that read back as the same double.
std::string writeProject(const plant::Tree& project);

/// The same for any value: objects and lists of objects are broken, lists of numbers are not.
std::string writeJson(const plant::Tree& tree);

/// A text in quotes with what JSON must escape escaped; a number as it is written.
std::string quoted(std::string_view text);
std::string shortest(double number);

} // namespace headroom::files
