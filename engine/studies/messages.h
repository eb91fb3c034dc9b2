// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::studies {

inline constexpr Message stopped{
    "studies.stopped", Severity::note, "The run was stopped at {reached} of {wanted}.",
    "Run what is due to have it whole."};
inline constexpr Message repeatStopped{
    "studies.repeat-stopped", Severity::note,
    "The run is whole, but its repeat with divided cells was stopped, so nothing can be decided.",
    "Run what is due to have the repeat."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::studies
