// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <optional>
#include <span>
#include <string>
#include <string_view>

namespace headroom {

/// The known name nearest to `wanted` by edit distance without regard to case, or nothing if
/// none is near enough to be a likely slip (more than two fifths of the letters differ).
std::optional<std::string> nearMiss(std::string_view wanted, std::span<const std::string> known);

} // namespace headroom
