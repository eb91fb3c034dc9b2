// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "studies/board.h"
#include "studies/runner.h"

#include <initializer_list>
#include <string>
#include <utility>
#include <vector>

/// A small project made in memory, and runs that need no simulator.
namespace small {

using namespace headroom;
using plant::Tree;

inline Tree object(std::vector<Tree::Member> members) { return Tree::object(std::move(members)); }
inline Tree number(double value) { return Tree::number(value); }
inline Tree words(std::string value) { return Tree::text(std::move(value)); }

inline Tree study(double until_s) {
    return object({{"class", words("normal")},
                   {"start", object({{"opening_pct", object({{"U1", number(60)}})}})},
                   {"events", object({{"trip", object({{"at_s", number(1)},
                                                       {"rejectLoad",
                                                        object({{"unit", words("U1")}})}})}})},
                   {"until_s", number(until_s)}});
}

inline Tree plantTree() {
    const auto reach = object({{"diameter_m", number(4)}, {"strickler", number(60)},
                               {"waveSpeed_mps", number(1000)}});
    const auto conduit = [&](const char* from, const char* to) {
        return object({{"from", words(from)}, {"to", words(to)},
                       {"reaches", object({{"bore " + std::string(from), reach}})}});
    };
    const auto point = [](double chainage_m, double elevation_m) {
        return object({{"chainage_m", number(chainage_m)}, {"elevation_m", number(elevation_m)}});
    };
    return object(
        {{"points", object({{"Intake", point(0, 80)}, {"Foot", point(1000, 70)},
                            {"Inlet", point(1400, 0)}})},
         {"reservoirs",
          object({{"Upper", object({{"at", words("Intake")}, {"level_m", number(100)}})},
                  {"Tail", object({{"level_m", number(2)}})}})},
         {"conduits", object({{"Tunnel", conduit("Intake", "Foot")},
                              {"Penstock", conduit("Foot", "Inlet")}})},
         {"chambers",
          object({{"Shaft",
                   object({{"at", words("Foot")},
                           {"shape",
                            object({{"open", object({{"diameter_m", number(8)},
                                                     {"floor_m", number(72)},
                                                     {"rim_m", number(130)}})}})}})}})},
         {"units",
          object({{"U1",
                   object({{"from", words("Inlet")}, {"to", words("Tail")},
                           {"turbine", object({{"orifice",
                                                object({{"ratedHead_m", number(95)},
                                                        {"ratedFlow_m3s", number(20)}})}})},
                           {"servo", object({{"opening_s", number(8)},
                                             {"closing_s", number(6)}})}})}})}});
}

inline Tree projectTree() {
    const auto shaftWith = [](double diameter_m) {
        return object({{"plant", object({{"chambers",
            object({{"Shaft", object({{"shape", object({{"open",
                object({{"diameter_m", number(diameter_m)}})}})}})}})}})}});
    };
    const auto limits = object({{"Shaft, highest",
        object({{"level", object({{"at", words("Shaft")},
                                  {"max_m", object({{"normal", number(111)}})}})},
                {"source", object({{"document", words("letter 1")}})}})}});
    return object(
        {{"headroom", number(1)},
         {"title", words("Small")},
         {"site", object({{"datum", words("local")}})},
         {"base", object({{"name", words("As built")}})},
         {"plant", plantTree()},
         {"limits", limits},
         {"options", object({{"Wider", object({{"changes", shaftWith(10)}})},
                             {"Widest", object({{"changes", shaftWith(12)}})}})},
         {"studies", object({{"Trip", study(20)}, {"Long trip", study(40)}})}});
}

inline std::shared_ptr<const studies::Snapshot> snapshot(const Tree& tree,
                                                         const studies::Snapshot* before = nullptr) {
    return studies::makeSnapshot(plant::bind(tree), before);
}

/// A run whose only channel is the shaft's level; its highest value depends on the inputs, so
/// that two different inputs never look alike.
inline results::Run fakeRun(const studies::Job& job, double reached_s) {
    results::Run run;
    run.duration_s = job.study.until_s;
    run.status.reached_s = reached_s;
    run.resolution.refinement = job.refinement;
    if (reached_s < job.study.until_s) {
        run.status.reason = results::EndReason::cancelled;
    }
    results::Channel level;
    level.measure = Measure::level;
    level.place = {results::Thing::chamber, 0};
    level.atRest = 100.0;
    const double area_m2 = job.plant.chambers[0].shape.areaByLevel.front().second;
    level.greatest.value = 100.0 + 600.0 / area_m2 + 0.001 * job.study.until_s +
                           0.001 * job.refinement;
    level.greatest.time_s = 5.0;
    level.least.value = 99.0;
    level.least.time_s = 15.0;
    run.channels.push_back(level);
    return run;
}

inline Result<results::Run> simulateAtOnce(const studies::Job& job, std::stop_token,
                                           const studies::Progress& progress) {
    if (progress) {
        progress(0.5);
    }
    return fakeRun(job, job.study.until_s);
}

inline std::vector<studies::Runner::Wanted> allCells(const studies::Snapshot& of) {
    std::vector<studies::Runner::Wanted> cells;
    for (int option = -1; option < of.options(); ++option) {
        for (int i = 0; i < of.studies(); ++i) {
            cells.push_back({option, i});
        }
    }
    return cells;
}

inline const plant::Path shaftDiameter{"plant", "chambers", "Shaft", "shape", "open", "diameter_m"};
inline const plant::Path shaftBound{"limits", "Shaft, highest", "level", "max_m", "normal"};

} // namespace small
