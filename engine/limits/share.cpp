// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/share.h"

#include "limits/bounds.h"
#include "limits/static_head.h"

#include <algorithm>
#include <cmath>

namespace headroom::limits {

namespace {

/// Below this part of the span the distance from rest says nothing about size.
constexpr double leastShareOfSpan = 0.02;

bool isHeight(Measure measure) {
    return measure == Measure::level || measure == Measure::head ||
           measure == Measure::pressureHead || measure == Measure::draftPressureHead;
}

} // namespace

double spanOf(const plant::Limit& limit, const plant::Plant& plant, const plant::Study& study,
              const results::Place& place, double bound) {
    const auto lower = boundFor(limit.least, study.loadClass);
    const auto upper = boundFor(limit.greatest, study.loadClass);
    if (lower && upper) {
        return std::abs(upper->value - lower->value);
    }
    if (place.thing == results::Thing::chamber) {
        const auto& shape = plant.chambers[place.index].shape;
        return shape.rim_m() - shape.floor_m();
    }
    if (isHeight(limit.measure)) {
        if (const auto head_m = staticHead_m(plant, study, place)) {
            return std::abs(*head_m);
        }
    }
    return std::abs(bound);
}

double marginShare(double margin, double bound, double rest, double span) {
    const double size = std::max(std::abs(bound - rest), leastShareOfSpan * span);
    // Bound, rest and span all zero: the margin is its own measure.
    return size > 0.0 ? margin / size : (margin > 0.0) - (margin < 0.0);
}

} // namespace headroom::limits
