// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"

#include <cstddef>
#include <memory>
#include <string>
#include <string_view>

namespace headroom::files {

inline constexpr int deepestNesting = 32;
inline constexpr std::size_t largestFile_bytes = 64U * 1024U * 1024U;

/// What a JSON text says, and where it says it.
struct Parsed {
    plant::Tree tree;     ///< null if nothing could be made of the text
    plant::Places places; ///< line and column of keys and of the rows of lists
    Findings findings;
    bool complete = false; ///< the text was read to its end
};

/// Reads JSON text by events, never building more than the limits above allow. Faults end in
/// findings with line and column: no JSON, truncated, too deep, keys twice, numbers outside
/// `double`, lists of more than `plant::longestInlineTable` items.
/// @param file name used in places
Parsed parseJson(std::string_view text, const std::string& file);

} // namespace headroom::files
