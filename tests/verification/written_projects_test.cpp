// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/project_file.h"
#include "simulation/run.h"
#include "support/catch.h"
#include "units/text.h"

#include <array>
#include <cmath>
#include <string>

using namespace headroom;

namespace {

/// What a user gets who writes this project and runs its only study.
results::Run runProject(const std::string& name, double longestStep_s) {
    const auto opened =
        files::openProject(std::string(HEADROOM_SOURCE_DIR) + "/tests/verification/projects/" + name
                           + ".headroom.json");
    for (const auto& finding : opened.findings()) {
        UNSCOPED_INFO(text(finding));
    }
    REQUIRE(opened.usable());
    const auto& project = opened.bound.project;
    simulation::Settings settings;
    settings.longestStep_s = longestStep_s;
    const auto model =
        simulation::compile(project.site, project.plant, project.studies[0], settings);
    for (const auto& finding : model.findings()) {
        UNSCOPED_INFO(text(finding));
    }
    REQUIRE(model);
    auto run = simulation::run(**model);
    REQUIRE(run.status.reason == results::EndReason::completed);
    return run;
}

double traceAt(const results::Run& run, Measure measure, const results::Place& place,
               double time_s) {
    const auto* channel = run.find(measure, place);
    REQUIRE(channel != nullptr);
    const double position = time_s / run.recordInterval_s;
    const auto i = static_cast<std::size_t>(std::floor(position));
    const double share = position - std::floor(position);
    const auto& values = channel->trace.last;
    REQUIRE(i + 1 < values.size());
    return (1.0 - share) * static_cast<double>(values[i])
           + share * static_cast<double>(values[i + 1]);
}

const results::Place valve{results::Thing::point, 1, 0.0};

} // namespace

TEST_CASE("A written project: linear friction after a sudden stop", "[verification][analytic]") {
    // Source: closed form of the telegraph equation, derived here; modal series and extrapolated
    // characteristics agree to 1e-6 m in the check list. Tolerance of the list: 0.05 m. The jump
    // itself costs ½ R V0 a dt/g, 0.03 m at this step.
    const auto run = runProject("telegraph", 0.0025);
    const std::array<std::pair<double, double>, 12> expected{{{0.25, 363.13089},
                                                              {0.5, 366.13275},
                                                              {0.75, 369.09824},
                                                              {1.25, 147.77998},
                                                              {1.5, 144.93223},
                                                              {1.75, 142.11723},
                                                              {2.5, 345.05674},
                                                              {3.5, 164.00069},
                                                              {4.5, 327.80467},
                                                              {5.5, 179.60935},
                                                              {8.5, 302.12364},
                                                              {9.5, 202.84382}}};
    for (const auto& [time_s, head_m] : expected) {
        CAPTURE(time_s);
        CHECK_THAT(traceAt(run, Measure::head, valve, time_s), WithinAbs(head_m, 0.05));
    }
    CHECK_THAT(run.find(Measure::head, valve)->atRest, WithinAbs(237.767584, 1e-6));
}

TEST_CASE("A written project: slow closure of an orifice", "[verification][analytic]") {
    // Source: Allievi's chain (Allievi 1903/1913, from memory), recomputed in the check list and
    // by an independent characteristic computation. Tolerance of the list: 0.05 %.
    // The step divides the travel time of 2/3 s, so that no wave speed is stretched.
    const auto run = runProject("slow_closure", 2.0 / 300.0);
    const std::array<double, 9> expected_m{120.68213, 122.65357, 122.55725, 122.57580, 122.56879,
                                           122.57322, 77.42678,  122.57322, 77.42678};
    const double reflection_s = 2.0 * 800.0 / 1200.0;
    for (std::size_t i = 0; i + 1 < expected_m.size(); ++i) {
        const double time_s = reflection_s * static_cast<double>(i + 1);
        CAPTURE(time_s);
        CHECK_THAT(traceAt(run, Measure::head, valve, time_s), WithinRel(expected_m[i], 5e-4));
    }
    // Continuous-time maximum of the same chain: 1.226980 at 2.508 s.
    const auto& greatest = run.find(Measure::head, valve)->greatest;
    CHECK_THAT(greatest.value, WithinRel(122.6980, 5e-4));
}

TEST_CASE("A written project: surge after a sudden stop", "[verification][analytic]") {
    // Source: exact first integral (Forchheimer 1913, Prášil 1908, from memory), X2 in the check
    // list: loss 5 m at 2 m/s, extremes 19.373329386, -15.440548944 m. Tolerance of the list:
    // 0.05 % of the frictionless amplitude 22.576182 m.
    const auto run = runProject("surge", 0.01);
    const results::Place chamber{results::Thing::chamber, 0, 0.0};
    const auto* level = run.find(Measure::level, chamber);
    REQUIRE(level != nullptr);
    const double tolerance_m = 5e-4 * 22.576182;
    CHECK_THAT(level->atRest, WithinAbs(-5.0, 1e-3));
    CHECK_THAT(level->greatest.value, WithinAbs(19.373329386, tolerance_m));
    CHECK_THAT(level->least.value, WithinAbs(-15.440548944, tolerance_m));
    CHECK_THAT(level->greatest.time_s, WithinAbs(78.21141, 0.05));
}
