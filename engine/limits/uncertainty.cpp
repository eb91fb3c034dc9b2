// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/uncertainty.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <functional>

namespace headroom::limits {

namespace {

using results::Place;
using results::Thing;

/// Whether a place is the unit, its inlet or outlet, or a conduit that ends at one of these.
bool beside(const plant::Plant& plant, int unitIndex, const Place& place) {
    const auto& unit = plant.units[unitIndex];
    const bool outletIsPoint = unit.to.collection == plant::Collection::points;
    const auto touches = [&](int point) {
        return point >= 0 &&
               (point == unit.from.index || (outletIsPoint && point == unit.to.index));
    };
    switch (place.thing) {
    case Thing::unit:
        return place.index == unitIndex;
    case Thing::point:
        return touches(place.index);
    case Thing::conduit: {
        const auto& conduit = plant.conduits[place.index];
        return touches(conduit.from.index) || touches(conduit.to.index);
    }
    default:
        return false;
    }
}

double chartUncertainty(Measure measure, const plant::FrancisTurbine& turbine) {
    switch (measure) {
    case Measure::speed:
        return turbine.speedUncertainty_pu.value_or(chartSpeedUncertainty_pu);
    case Measure::head:
    case Measure::pressureHead:
    case Measure::netHead:
    case Measure::draftPressureHead:
        return turbine.headUncertainty_m.value_or(chartHeadUncertainty_m);
    default:
        return 0.0;
    }
}

bool mayJump(Measure measure) {
    switch (measure) {
    case Measure::terminalPower:
    case Measure::gridPower:
    case Measure::openingRate:
    case Measure::frequencyRate:
        return true;
    default:
        return false;
    }
}

/// Changes from step to step around an extreme, the largest first.
std::array<double, 4> changes(const results::Extreme& extreme) {
    std::array<double, 4> sorted{};
    for (std::size_t i = 0; i < sorted.size(); ++i) {
        sorted[i] = std::abs(extreme.around[i + 1] - extreme.around[i]);
    }
    std::sort(sorted.begin(), sorted.end(), std::greater<>());
    return sorted;
}

} // namespace

double stepNear(Measure measure, const results::Extreme& coarse, const results::Extreme& fine) {
    if (!mayJump(measure)) {
        return fine.largestStep;
    }
    // At half the step a slope changes by half, a jump by all of itself; between them lies 3/4.
    constexpr double shrinks = 0.75;
    constexpr std::size_t mostJumps = 2; // up and down again
    const auto before = changes(coarse);
    const auto now = changes(fine);
    std::size_t i = 0;
    while (i < mostJumps && now[i] > shrinks * before[i]) {
        ++i;
    }
    return now[i];
}

double Uncertainty::total() const {
    return std::sqrt(numerical * numerical + parameters * parameters + model * model);
}

double numericalUncertainty(double coarse, double fine, double largestStep) {
    return std::abs(coarse - fine) + largestStep;
}

double modelUncertainty(const plant::Limit& limit, const plant::Plant& plant,
                        const results::Place& place) {
    double largest = limit.modelUncertainty;
    for (int i = 0; i < plant.units.size(); ++i) {
        const auto* turbine = std::get_if<plant::FrancisTurbine>(&plant.units[i].turbine);
        if (turbine != nullptr && beside(plant, i, place)) {
            largest = std::max(largest, chartUncertainty(limit.measure, *turbine));
        }
    }
    return largest;
}

} // namespace headroom::limits
