// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/checks.h"

#include <algorithm>

namespace headroom::plant {

namespace {

Amount level(double value_m) {
    return amount(Quantity::elevation, value_m);
}

bool onConduit(const Plant& plant, int point) {
    return std::any_of(plant.conduits.begin(), plant.conduits.end(), [&](const auto& item) {
        return item.second.from.index == point || item.second.to.index == point;
    });
}

void checkOnConduit(const Plant& plant, const Reference& at, Path path, Report& report) {
    if (at.resolved() && !onConduit(plant, at.index)) {
        path.emplace_back("at");
        report.add(say::notOnConduit, path, {{"name", at.name}});
    }
}

void checkReservoir(const Plant& plant, int index, Report& report) {
    const auto& reservoir = plant.reservoirs[index];
    const Path at{"plant", "reservoirs", plant.reservoirs.name(index)};
    const auto below = [&](const std::string& key) {
        Path path = at;
        path.push_back(key);
        return path;
    };
    checkOnConduit(plant, reservoir.at, at, report);
    if (reservoir.at.resolved()) {
        const double axis_m = plant.points[reservoir.at.index].elevation_m;
        const std::pair<std::string, double> levels[] = {
            {"level_m", reservoir.level_m}, {"lowest_m", reservoir.lowest_m.value_or(axis_m)}};
        for (const auto& [key, level_m] : levels) {
            if (level_m < axis_m) {
                report.add(say::levelBelowIntake, below(key),
                           {{"level", level(level_m)}, {"axis", level(axis_m)}});
            }
        }
    }
    const double low_m = reservoir.lowest_m.value_or(reservoir.level_m);
    const double high_m = reservoir.highest_m.value_or(reservoir.level_m);
    if (reservoir.level_m < low_m || reservoir.level_m > high_m) {
        report.add(
            say::levelOutside, below("level_m"),
            {{"level", level(reservoir.level_m)}, {"low", level(low_m)}, {"high", level(high_m)}});
    }
}

void checkChamber(const Plant& plant, int index, Report& report) {
    const auto& chamber = plant.chambers[index];
    const Path at{"plant", "chambers", plant.chambers.name(index)};
    checkOnConduit(plant, chamber.at, at, report);
    if (chamber.shape.areaByLevel.size() < 2) {
        return; // already reported as missing
    }
    Path shape = at;
    shape.insert(shape.end(), {"shape", chamber.shape.throttled ? "throttled" : "open"});
    const double floor_m = chamber.shape.floor_m();
    if (!(floor_m < chamber.shape.rim_m())) {
        report.add(say::floorAboveRim, shape,
                   {{"floor", level(floor_m)}, {"rim", level(chamber.shape.rim_m())}});
    }
    if (chamber.at.resolved() && floor_m < plant.points[chamber.at.index].elevation_m) {
        report.add(say::floorBelowAxis, shape,
                   {{"floor", level(floor_m)},
                    {"axis", level(plant.points[chamber.at.index].elevation_m)}});
    }
}

} // namespace

void checkWaters(const Plant& plant, Report& report) {
    for (int i = 0; i < plant.reservoirs.size(); ++i) {
        checkReservoir(plant, i, report);
    }
    for (int i = 0; i < plant.chambers.size(); ++i) {
        checkChamber(plant, i, report);
    }
}

} // namespace headroom::plant
