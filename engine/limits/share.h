// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "plant/study.h"
#include "results/run.h"

namespace headroom::limits {

/// Size of the range in which a limited quantity lives [SI of the measure], the floor of a share:
/// the distance of the two bounds where both are given; the height of a chamber or the static
/// head for levels and heads; else the size of the bound.
double spanOf(const plant::Limit& limit, const plant::Plant& plant, const plant::Study& study,
              const results::Place& place, double bound);

/// m = M / max(|bound − rest|, 2 % of the span).
double marginShare(double margin, double bound, double rest, double span);

} // namespace headroom::limits
