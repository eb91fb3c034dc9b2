// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::grid {

inline constexpr Message areaNotPositive{
    "grid.area-not-positive", Severity::error,
    "The area's {name} is {value}; it must be above zero.",
    "Give the {name} of the area without this plant's own units."};
inline constexpr Message areaNegative{"grid.area-negative", Severity::error,
                                      "The area's {name} is {value}; it cannot be negative.",
                                      "Give zero or a positive value."};
inline constexpr Message reserveLimits{
    "grid.reserve-limits", Severity::error,
    "The other reserve may move from {least} to {most}; the range must hold zero.",
    "Give a largest decrease not above zero and a largest increase not below zero."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::grid
