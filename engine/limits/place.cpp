// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/place.h"

#include "units/quantity.h"

#include <fmt/format.h>

namespace headroom::limits {

namespace {

using plant::Collection;
using results::Place;
using results::Thing;

bool ofTheGrid(Measure measure) {
    return measure == Measure::frequency || measure == Measure::frequencyRate;
}

bool isHead(Measure measure) {
    return measure == Measure::head || measure == Measure::pressureHead ||
           measure == Measure::pressureRate;
}

} // namespace

std::optional<Place> placeOf(const plant::Limit& limit, const plant::Plant& plant) {
    const auto& thing = limit.at.thing;
    if (!thing.given()) {
        return ofTheGrid(limit.measure) ? std::optional(Place{}) : std::nullopt;
    }
    if (!thing.resolved()) {
        return std::nullopt;
    }
    switch (thing.collection) {
    case Collection::points: return Place{Thing::point, thing.index};
    case Collection::reservoirs: return Place{Thing::reservoir, thing.index};
    case Collection::conduits:
        return Place{Thing::conduit, thing.index, limit.at.alongConduit ? limit.at.chainage_m : 0.0};
    case Collection::chambers:
        return isHead(limit.measure) ? Place{Thing::point, plant.chambers[thing.index].at.index}
                                     : Place{Thing::chamber, thing.index};
    case Collection::units:
        return isHead(limit.measure) ? Place{Thing::point, plant.units[thing.index].from.index}
                                     : Place{Thing::unit, thing.index};
    default: return std::nullopt;
    }
}

std::string nameOf(const Place& place, const plant::Plant& plant) {
    switch (place.thing) {
    case Thing::grid: return "grid";
    case Thing::point: return plant.points.name(place.index);
    case Thing::reservoir: return plant.reservoirs.name(place.index);
    case Thing::chamber: return plant.chambers.name(place.index);
    case Thing::unit: return plant.units.name(place.index);
    case Thing::conduit:
        return fmt::format("{} at {}\u2009m", plant.conduits.name(place.index),
                           printNumber(Quantity::chainage, place.chainage_m, {}, 0));
    }
    return {};
}

} // namespace headroom::limits
