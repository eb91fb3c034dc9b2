// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace headroom::batch {

/// Characters of a UTF-8 text, each counted as one place.
std::size_t displayWidth(std::string_view text);

/// Rows of cells set in columns with two blanks between; the first row is a heading, underlined.
/// Columns listed in `right` are set to the right (numbers).
std::string textTable(const std::vector<std::vector<std::string>>& rows,
                      const std::vector<std::size_t>& right = {});

} // namespace headroom::batch
