// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/static_head.h"

#include <algorithm>
#include <vector>

namespace headroom::limits {

namespace {

using results::Place;
using results::Thing;

/// Level of a reservoir when the study starts.
double startLevel_m(const plant::Plant& plant, const plant::Study& study, int reservoir) {
    for (const auto& [reference, level] : study.start.level_m) {
        if (reference.index == reservoir) {
            return level;
        }
    }
    return plant.reservoirs[reservoir].level_m;
}

/// Which points conduits connect to `start`, itself included.
std::vector<bool> connected(const plant::Plant& plant, int start) {
    std::vector<bool> reached(static_cast<std::size_t>(plant.points.size()), false);
    const auto at = [&](int point) { return reached[static_cast<std::size_t>(point)]; };
    reached[static_cast<std::size_t>(start)] = true;
    for (bool grew = true; grew;) {
        grew = false;
        for (const auto& [name, conduit] : plant.conduits) {
            if (!conduit.from.resolved() || !conduit.to.resolved()) {
                continue;
            }
            if (at(conduit.from.index) != at(conduit.to.index)) {
                reached[static_cast<std::size_t>(conduit.from.index)] = true;
                reached[static_cast<std::size_t>(conduit.to.index)] = true;
                grew = true;
            }
        }
    }
    return reached;
}

std::optional<double> highestReservoir_m(const plant::Plant& plant, const plant::Study& study,
                                         int point) {
    if (point < 0) {
        return std::nullopt;
    }
    const auto reached = connected(plant, point);
    std::optional<double> highest;
    for (int i = 0; i < plant.reservoirs.size(); ++i) {
        const auto& at = plant.reservoirs[i].at;
        if (at.resolved() && reached[static_cast<std::size_t>(at.index)]) {
            highest = std::max(highest.value_or(startLevel_m(plant, study, i)),
                               startLevel_m(plant, study, i));
        }
    }
    return highest;
}

std::optional<double> tailwater_m(const plant::Plant& plant, const plant::Study& study,
                                  const plant::Unit& unit) {
    if (unit.to.collection == plant::Collection::reservoirs) {
        return unit.to.resolved() ? std::optional(startLevel_m(plant, study, unit.to.index))
                                  : std::nullopt;
    }
    return highestReservoir_m(plant, study, unit.to.index);
}

std::optional<double> unitStaticHead_m(const plant::Plant& plant, const plant::Study& study,
                                       const plant::Unit& unit) {
    const auto upstream = highestReservoir_m(plant, study, unit.from.index);
    const auto downstream = tailwater_m(plant, study, unit);
    if (!upstream || !downstream) {
        return std::nullopt;
    }
    return *upstream - *downstream;
}

std::optional<double> over(std::optional<double> level_m, double elevation_m) {
    return level_m ? std::optional(*level_m - elevation_m) : std::nullopt;
}

} // namespace

double axisElevation_m(const plant::Plant& plant, int conduit, double chainage_m) {
    const auto& line = plant.conduits[conduit];
    const auto& from = plant.points[line.from.index];
    const auto& to = plant.points[line.to.index];
    std::pair<double, double> before{from.chainage_m, from.elevation_m};
    auto corners = line.axis;
    corners.emplace_back(to.chainage_m, to.elevation_m);
    for (const auto& corner : corners) {
        if (chainage_m <= corner.first) {
            const double span_m = corner.first - before.first;
            const double share = span_m > 0.0 ? (chainage_m - before.first) / span_m : 1.0;
            return before.second + std::max(share, 0.0) * (corner.second - before.second);
        }
        before = corner;
    }
    return to.elevation_m;
}

std::optional<double> staticHead_m(const plant::Plant& plant, const plant::Study& study,
                                   const Place& place) {
    switch (place.thing) {
    case Thing::unit:
        return unitStaticHead_m(plant, study, plant.units[place.index]);
    case Thing::point:
        for (const auto& [name, unit] : plant.units) {
            if (unit.from.index == place.index) {
                return unitStaticHead_m(plant, study, unit);
            }
        }
        return over(highestReservoir_m(plant, study, place.index),
                    plant.points[place.index].elevation_m);
    case Thing::conduit:
        return over(highestReservoir_m(plant, study, plant.conduits[place.index].from.index),
                    axisElevation_m(plant, place.index, place.chainage_m));
    case Thing::chamber:
        return over(highestReservoir_m(plant, study, plant.chambers[place.index].at.index),
                    plant.chambers[place.index].shape.floor_m());
    default:
        return std::nullopt;
    }
}

} // namespace headroom::limits
