// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/uncertainty.h"

#include "hand_made.h"
#include "support/catch.h"

using namespace headroom;
using headroom::limits::modelUncertainty;
using headroom::limits::numericalUncertainty;
using headroom::limits::Uncertainty;
using headroom::plant::Collection;
using headroom::results::Thing;

TEST_CASE("U: root of the sum of the squares of its parts", "[limits][analytic]") {
    CHECK_THAT((Uncertainty{2.0, 3.0, 6.0}.total()), WithinAbs(7.0, 1e-12));
    CHECK(Uncertainty{}.total() == 0.0);
}

TEST_CASE("U_num: the change at halving plus the largest step near the extreme",
          "[limits][analytic]") {
    CHECK_THAT(numericalUncertainty(456.2, 456.1, 0.03), WithinAbs(0.13, 1e-12));
    CHECK_THAT(numericalUncertainty(456.0, 456.1, 0.03), WithinAbs(0.13, 1e-12));
}

TEST_CASE("S: a jump that both runs resolve is no error, a slope is", "[limits][limit]") {
    results::Extreme coarse, fine;
    coarse.around = {115.2, 115.3, 115.4, 0.0, 0.0}; // the breaker opens
    fine.around = {115.30, 115.35, 115.40, 0.0, 0.0};
    coarse.largestStep = fine.largestStep = 115.4;
    using limits::stepNear;
    CHECK_THAT(stepNear(Measure::terminalPower, coarse, fine), WithinAbs(0.05, 1e-9));
    // A head does not jump by its nature: what looks like it stays in.
    CHECK(stepNear(Measure::head, coarse, fine) == 115.4);
    // A steep slope halves with the step and stays in.
    coarse.around = {0.0, 0.0, 2.0, 0.0, 0.0};
    fine.around = {0.0, 0.0, 1.0, 0.0, 0.0};
    CHECK(stepNear(Measure::openingRate, coarse, fine) == 1.0);
    // Not more than two are taken for jumps.
    fine.around = coarse.around = {0.0, 3.0, 0.0, 3.0, 0.0};
    CHECK(stepNear(Measure::openingRate, coarse, fine) == 3.0);
    // At rest nothing changes.
    fine.around = coarse.around = {1.0, 1.0, 1.0, 1.0, 1.0};
    CHECK(stepNear(Measure::gridPower, coarse, fine) == 0.0);
}

TEST_CASE("U_mod: never zero beside a chart made from rated data", "[limits][limit]") {
    // Default ±0.007 of speed and ±0.4 m: spread over the chart's free shape parameters,
    // derived here (recipes of the synthetic chart).
    const auto plant = hand_made::plantA();
    const auto unit = hand_made::reference("U1", Collection::units, 0);
    const auto speed = hand_made::limit(Measure::speed, unit);
    CHECK(modelUncertainty(speed, plant, {Thing::unit, 0}) == 0.007);
    const auto head = hand_made::limit(Measure::head, unit);
    CHECK(modelUncertainty(head, plant, {Thing::point, 2}) == 0.4);
    CHECK(modelUncertainty(head, plant, {Thing::conduit, 1, 5250.0}) == 0.4);
    CHECK(modelUncertainty(head, plant, {Thing::conduit, 0, 100.0}) == 0.0);
    CHECK(modelUncertainty(hand_made::shaftLevel(), plant, hand_made::shaftPlace) == 0.0);
}

TEST_CASE("U_mod: what is declared counts where it is larger, and the project may name its own",
          "[limits][limit]") {
    auto plant = hand_made::plantA();
    auto speed = hand_made::limit(Measure::speed, hand_made::reference("U1", Collection::units, 0));
    speed.modelUncertainty = 0.002;
    CHECK(modelUncertainty(speed, plant, {Thing::unit, 0}) == 0.007);
    speed.modelUncertainty = 0.02;
    CHECK(modelUncertainty(speed, plant, {Thing::unit, 0}) == 0.02);
    auto level = hand_made::shaftLevel();
    level.modelUncertainty = 0.5;
    CHECK(modelUncertainty(level, plant, hand_made::shaftPlace) == 0.5);

    std::get<plant::FrancisTurbine>(plant.units[0].turbine).speedUncertainty_pu = 0.03;
    CHECK(modelUncertainty(speed, plant, {Thing::unit, 0}) == 0.03);
    plant.units[0].turbine = plant::OrificeUnit{};
    speed.modelUncertainty = 0.0;
    CHECK(modelUncertainty(speed, plant, {Thing::unit, 0}) == 0.0);
}
