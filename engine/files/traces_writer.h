// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/plant.h"
#include "results/run.h"

#include <string>

namespace headroom::files {

/// A run's traces as CSV (RFC 4180): first column "time [s]", then one column for each channel,
/// "Surge shaft, Water level [m]". Where a quantity rings between two rows, two more columns give
/// the least and the greatest since the row before, so that no peak is lost.
/// @param plant the one that was run, for the names
/// @param mostRows recording intervals are taken together until no more rows are needed
std::string writeTraces(const results::Run& run, const plant::Plant& plant, int mostRows);

} // namespace headroom::files
