// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/plant.h"
#include "results/run.h"

#include <string>

namespace headroom::files {

/// A run's traces as CSV (RFC 4180): first column "time [s]", then one column for each channel,
/// "Surge shaft, Water level [m]". Where a quantity rings within the recording intervals, two
/// more columns give the least and the greatest of each interval, so that no peak is lost.
/// @param plant the one that was run, for the names
std::string writeTraces(const results::Run& run, const plant::Plant& plant);

} // namespace headroom::files
