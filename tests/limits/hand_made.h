// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "limits/evidence.h"
#include "plant/project.h"
#include "results/run.h"

#include <functional>
#include <string>
#include <utility>
#include <vector>

/// A small plant and runs written by hand, so that the judges are tested without a simulator.
namespace hand_made {

using namespace headroom;

inline plant::Reference reference(std::string name, plant::Collection collection, int index) {
    return {std::move(name), collection, index};
}

/// Upper lake – tunnel – shaft – penstock – unit – tailwater.
inline plant::Plant plantA() {
    using plant::Collection;
    plant::Plant made;
    made.points.add("Intake", {0.0, 475.0});
    made.points.add("Foot", {5000.0, 452.0});
    made.points.add("Inlet", {5600.0, 262.0});
    plant::Reservoir upper;
    upper.at = reference("Intake", Collection::points, 0);
    upper.level_m = 512.0;
    made.reservoirs.add("Upper", upper);
    plant::Reservoir tail;
    tail.level_m = 270.0;
    made.reservoirs.add("Tail", tail);
    plant::Conduit tunnel;
    tunnel.from = reference("Intake", Collection::points, 0);
    tunnel.to = reference("Foot", Collection::points, 1);
    made.conduits.add("Tunnel", tunnel);
    plant::Conduit penstock;
    penstock.from = reference("Foot", Collection::points, 1);
    penstock.to = reference("Inlet", Collection::points, 2);
    penstock.axis = {{5030.0, 452.0}, {5250.0, 262.0}};
    made.conduits.add("Penstock", penstock);
    plant::Chamber shaft;
    shaft.at = reference("Foot", Collection::points, 1);
    shaft.shape.areaByLevel = {{455.0, 50.0}, {536.0, 50.0}};
    made.chambers.add("Shaft", shaft);
    plant::Unit unit;
    unit.from = reference("Inlet", Collection::points, 2);
    unit.to = reference("Tail", Collection::reservoirs, 1);
    unit.turbine = plant::FrancisTurbine{};
    made.units.add("U1", unit);
    return made;
}

inline plant::Limit limit(Measure measure, plant::Reference thing) {
    plant::Limit made;
    made.measure = measure;
    made.at.thing = std::move(thing);
    made.source.document = "letter 1";
    return made;
}
inline plant::Limit shaftLevel() {
    return limit(Measure::level, reference("Shaft", plant::Collection::chambers, 0));
}

constexpr results::Place shaftPlace{results::Thing::chamber, 0};

/// A channel whose values are given at each instant: extremes, trace and S from those.
inline results::Channel channel(Measure measure, results::Place place,
                                const std::vector<double>& values, double interval_s) {
    results::Channel made;
    made.measure = measure;
    made.place = place;
    made.atRest = values.front();
    made.atEnd = values.back();
    made.least.value = made.greatest.value = values.front();
    for (std::size_t i = 0; i < values.size(); ++i) {
        const double time_s = static_cast<double>(i) * interval_s;
        if (values[i] < made.least.value) {
            made.least.value = values[i];
            made.least.time_s = time_s;
        }
        if (values[i] > made.greatest.value) {
            made.greatest.value = values[i];
            made.greatest.time_s = time_s;
        }
        const auto value = static_cast<float>(values[i]);
        const auto before = static_cast<float>(values[i == 0 ? 0 : i - 1]);
        made.trace.last.push_back(value);
        made.trace.low.push_back(std::min(value, before));
        made.trace.high.push_back(std::max(value, before));
    }
    return made;
}

inline results::Run run(std::vector<results::Channel> channels, double duration_s,
                        double interval_s = 1.0) {
    results::Run made;
    made.status.reached_s = duration_s;
    made.duration_s = duration_s;
    made.recordInterval_s = interval_s;
    made.channels = std::move(channels);
    return made;
}

inline results::Run shaftRun(const std::vector<double>& levels_m, double interval_s = 1.0) {
    return run({channel(Measure::level, shaftPlace, levels_m, interval_s)},
               static_cast<double>(levels_m.size() - 1) * interval_s, interval_s);
}

inline plant::Variant variant(std::vector<std::pair<std::string, plant::Limit>> limits) {
    plant::Variant made;
    made.name = "As built";
    made.plant = plantA();
    for (auto& [name, value] : limits) {
        made.limits.add(name, std::move(value));
    }
    return made;
}

inline plant::Study study(plant::LoadClass loadClass = plant::LoadClass::normal) {
    plant::Study made;
    made.loadClass = loadClass;
    made.until_s = 10.0;
    return made;
}

} // namespace hand_made
