// SPDX-License-Identifier: GPL-3.0-or-later
// A head-driven unit of constant efficiency thrown off the grid, gate linear to shut. Penstock L
// 600 m, A 7 m², frictionless, 250 m, 30 m³/s; 333.333 rpm, T_a 8 s.
#include "support/catch.h"

#include <cmath>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using tests::channel;
using tests::pointPlace;
using tests::unitPlace;

namespace {

constexpr double rated_rpm = 333.333;

Case rejection(plant::ConduitModel model, double closing_s) {
    Case made = orificePipe({600.0, 7.0, 1200.0, 250.0, 30.0 / 7.0}, 0.005, 1.0, model);
    auto& unit = made.plant.units[0];
    unit.turbine = plant::OrificeUnit{250.0, 30.0, 0.92, rated_rpm * std::acos(-1.0) / 30.0};
    unit.inertia_kgm2 = 444419.758;
    made.at(0.0, plant::RejectLoad{});
    openings(made, {{0.0, 1.0}, {closing_s, 0.0}});
    made.study.until_s = closing_s + 1.0;
    return made;
}

} // namespace

TEST_CASE("Rejection: ideal unit below a rigid column", "[verification][analytic]") {
    // Rigid closed form, derived here: the head rises to 284.982819205 m, the speed to 1.480129523
    // of rated. Tolerance of the list 0.1 %; asked is what a step of 5 ms gives.
    const auto run = course(rejection(plant::ConduitModel::rigid, 8.0));
    const auto head = run.find(Measure::head, pointPlace(1));
    const auto speed = run.find(Measure::speed, unitPlace());
    hold("H63 rigid, head limit, m", run.at(head, 7.5), 284.982819205, 1e-5);
    hold("H63 rigid, final speed, share", run.at(speed, 8.0) / 1.480129523, 1.0, 1e-5);
    hold("H63 rigid, speed stays, share", run.at(speed, 9.0) / 1.480129523, 1.0, 1e-5);
}

TEST_CASE("Rejection: ideal unit below an elastic column", "[verification][analytic]") {
    // Allievi's chain and quadrature, derived here, recomputed two ways. Tolerance of the list
    // 0.1 %; the grid of Courant number 1 gives the chain exactly and the speed to its order.
    const auto run = course(rejection(plant::ConduitModel::elastic, 8.0));
    const auto head = run.find(Measure::head, pointPlace(1));
    const auto flow = run.find(Measure::discharge, unitPlace());
    const auto speed = run.find(Measure::speed, unitPlace());
    const double rows[][4] = {{1.0, 284.716135909, 28.013369123, 373.883539406},
                              {2.0, 285.004399445, 24.023611487, 409.040513217},
                              {3.0, 284.979295686, 20.018794533, 436.521372301},
                              {4.0, 284.983731925, 16.015160278, 457.786852322},
                              {6.0, 284.982991417, 8.007569735, 484.689991075},
                              {8.0, 284.982920726, 0.0, 493.331821910}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        hold("H63 elastic, head, m", run.at(head, row[0]), row[1], 1e-7);
        hold("H63 elastic, discharge, m3/s", run.at(flow, row[0]), row[2], 1e-8);
        hold("H63 elastic, speed, rpm", run.at(speed, row[0]) * rated_rpm, row[3], 1e-5 * row[3]);
    }
    hold("H63 elastic, final speed, share", run.at(speed, 9.0) / 1.479995466, 1.0, 1e-5);
}

TEST_CASE("Rejection: other closing times", "[verification][analytic]") {
    // As above: greatest head with its time, final speed.
    const double rows[][4] = {{8.0, 285.647800, 1.5617, 493.331821910},
                              {6.0, 299.134731, 1.5281, 464.085235},
                              {12.0, 273.015061, 1.6328, 546.952651}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        const auto run = rejection(plant::ConduitModel::elastic, row[0]).run();
        const auto& head = channel(run, Measure::head, pointPlace(1)).greatest;
        hold("H63 greatest head, m", head.value, row[1], 5e-5);
        hold("H63 time of the greatest head, s", head.time_s, row[2], 0.005);
        hold("H63 final speed, rpm", channel(run, Measure::speed, unitPlace()).atEnd * rated_rpm,
             row[3], 1e-5 * row[3]);
        CHECK(run.balance.worstResidual_share < 1e-10);
        CHECK(run.balance.worstEnergyResidual_share < 1e-10);
    }
}
