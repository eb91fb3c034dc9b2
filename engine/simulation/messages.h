// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::simulation {

inline constexpr Message notBuilt{"simulation.not-built", Severity::error,
                                  "The run of the water is not built yet.",
                                  "Build a newer version."};

/// All templates of this floor, for the test that renders them.
std::span<const Message* const> messages();

} // namespace headroom::simulation
