// SPDX-License-Identifier: GPL-3.0-or-later
// What must hold without any reference: rest, symmetry, the same plant described otherwise.
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <string>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using plant::Collection;
using tests::chamberPlace;
using tests::channel;
using tests::pointPlace;
using tests::unitPlace;

namespace {

/// Rows of a rest by measure and place, compared with another rest of the same plant.
void holdSameRest(const std::string& check, const simulation::Rest& a, const simulation::Rest& b) {
    REQUIRE(a.rows.size() == b.rows.size());
    for (std::size_t i = 0; i < a.rows.size(); ++i) {
        const double scale = 1.0 + std::fabs(a.rows[i].value);
        hold(check, (a.rows[i].value - b.rows[i].value) / scale, 0.0, 1e-9);
    }
}

/// Reservoir, rock tunnel, chamber on the piezometric line, two penstock reaches, 60 m³/s: the
/// chain of the check list with all its losses (constructed there).
Case gradeLine() {
    Case made;
    made.site.velocityHeads = true;
    const auto intake = made.point("Intake", 0.0, 440.0);
    const auto tee = made.point("Tee", 5000.0, 430.0);
    const auto change = made.point("Change", 5300.0, 350.0);
    const auto inlet = made.point("Inlet", 5600.0, 255.0);
    made.reservoir("Upper", intake, 500.0);
    const auto tail = made.reservoir("Tail", {}, 250.0);
    auto& tunnel = made.conduit("Tunnel", intake, tee, 5000.0, 38.137166941, 1300.0,
                                plant::ConduitModel::elastic);
    tunnel.reaches[0].hydraulicRadius_m = 1.628069517;
    tunnel.reaches[0].friction = plant::Strickler{35.0};
    tunnel.enteringLoss = 0.30;
    const double pi = std::acos(-1.0);
    for (const auto& [name, from, to, bore_m] : {std::tuple{"Penstock 1", tee, change, 4.2},
                                                 std::tuple{"Penstock 2", change, inlet, 3.4}}) {
        auto& pipe = made.conduit(name, from, to, 300.0, 0.25 * pi * bore_m * bore_m, 1200.0,
                                  plant::ConduitModel::elastic);
        pipe.reaches[0].hydraulicRadius_m = 0.25 * bore_m;
        pipe.reaches[0].friction = plant::Roughness{1e-4};
    }
    made.chamber("Chamber", tee, 100.0, 435.0, 560.0);
    made.unit("Unit", inlet, tail, plant::FlowUnit{60.0});
    made.settings.longestStep_s = 0.02;
    return made;
}

} // namespace

TEST_CASE("Invariants: a standing plant stands for 1000 s", "[verification][invariant]") {
    // Tolerance of the list 1e-6 m: the same friction law in rest and run.
    for (Case made : {gradeLine(), tests::dorvane(512.0, 100e6), tests::dorvane(490.0, 0.0)}) {
        made.study.until_s = 1000.0;
        made.settings.keepTraces = made.settings.keepLines = false;
        const auto run = made.run();
        for (const auto& item : run.channels) {
            if (item.measure == Measure::head || item.measure == Measure::level) {
                hold("H102 heads over 1000 s, m", item.greatest.value, item.atRest, 1e-6);
                hold("H102 heads over 1000 s, m", item.least.value, item.atRest, 1e-6);
            }
        }
        CHECK(run.balance.worstResidual_share < 1e-10);
    }
}

TEST_CASE("Invariants: the rest does not depend on the step", "[verification][invariant]") {
    for (const double output_W : {0.0, 40e6, 110e6}) {
        Case made = tests::dorvane(505.0, output_W);
        made.settings.longestStep_s = 0.01;
        const auto first = made.rest();
        made.settings.longestStep_s = 0.0037;
        holdSameRest("rest by step", first, made.rest());
        made.settings.refinement = 3;
        holdSameRest("rest by refinement", first, made.rest());
    }
}

TEST_CASE("Invariants: reversed flow and mirrored levels mirror the swing",
          "[verification][invariant]") {
    const auto up = course(surge(5.0, 50.0, 0.0), 20);
    const auto down = course(surge(5.0, -50.0, 0.0), 20);
    const auto z = up.find(Measure::level, chamberPlace());
    for (std::size_t i = 0; i < up.rows.size(); ++i) {
        hold("H106 mirrored swing, m", up.rows[i][z] + down.rows[i][z], 0.0, 1e-9);
    }
}

TEST_CASE("Invariants: the same pipe described otherwise", "[verification][invariant]") {
    // A pipe cut in two, and two of half the area side by side, are the same pipe (frictionless);
    // on the same grid nothing but rounding may differ.
    const auto closing = [](const std::string& kind) {
        const Pipe pipe{1200.0, 4.0, 1200.0, 600.0, 4.0};
        Case made = orificePipe(pipe, 0.01);
        if (kind == "cut") {
            cutPipe(made, 0.5);
        } else if (kind == "pair") {
            plant::Conduit half = made.plant.conduits[0];
            half.reaches[0].area_m2 *= 0.5;
            made.plant.conduits[0] = half;
            made.plant.conduits.add("Second", half);
        }
        openings(made, {{0.0, 1.0}, {1.7, 0.1}, {9.0, 0.1}, {12.0, 0.0}});
        made.study.until_s = 20.0;
        return course(made);
    };
    const auto one = closing("one"), cut = closing("cut"), pair = closing("pair");
    const auto head = [](const Course& run) { return run.find(Measure::head, pointPlace(1)); };
    for (std::size_t i = 0; i < one.rows.size(); ++i) {
        const double expected_m = one.rows[i][head(one)];
        hold("H106 cut pipe, m", cut.rows[i][head(cut)], expected_m, 1e-8);
        hold("H106 pair of halves, m", pair.rows[i][head(pair)], expected_m, 1e-8);
    }
}
