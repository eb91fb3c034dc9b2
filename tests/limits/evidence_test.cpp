// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/evidence.h"

#include "hand_made.h"
#include "support/catch.h"

#include <limits>

using namespace headroom;
using headroom::limits::evidence;
using headroom::limits::recorded;
using headroom::limits::Side;
using headroom::plant::Collection;
using headroom::results::Place;
using headroom::results::Thing;

namespace {

constexpr double whole_s = std::numeric_limits<double>::infinity();
const Place inlet{Thing::point, 2};
const Place bend{Thing::conduit, 1, 5140.0};

plant::Limit pointLimit(Measure measure) {
    return hand_made::limit(measure, hand_made::reference("Inlet", Collection::points, 2));
}
plant::Limit conduitLimit(Measure measure) {
    return hand_made::limit(measure, hand_made::reference("Penstock", Collection::conduits, 1));
}

/// The penstock with stations at its ends only: least heads 470 and 440 m.
results::Run withEnvelope() {
    auto run = hand_made::run({}, 10.0);
    results::Envelope line;
    line.conduit = 1;
    line.chainage_m = {5000.0, 5600.0};
    line.elevation_m = {452.0, 262.0};
    line.rest_m = {500.0, 497.0};
    line.least_m = {470.0, 440.0};
    line.greatest_m = {520.0, 560.0};
    line.leastTime_s = {3.0, 4.0};
    line.greatestTime_s = {5.0, 6.0};
    line.largestStep_m = {0.01, 0.02};
    run.envelopes.push_back(line);
    return run;
}

} // namespace

TEST_CASE("evidence: extreme, time and step of the channel", "[limits][run]") {
    auto run = hand_made::shaftRun({10.0, 12.0, 9.0, 10.0});
    run.channels[0].greatest.largestStep = 2.5;
    const auto plant = hand_made::plantA();
    const auto up = evidence(hand_made::shaftLevel(), hand_made::shaftPlace, Side::upper, run,
                             plant, whole_s);
    REQUIRE(up);
    CHECK(up->extreme == 12.0);
    CHECK(up->time_s == 1.0);
    CHECK(up->rest == 10.0);
    CHECK(up->largestStep == 2.5);
    CHECK(up->trace == &run.channels[0].trace);
    const auto down = evidence(hand_made::shaftLevel(), hand_made::shaftPlace, Side::lower, run,
                               plant, whole_s);
    CHECK(down->extreme == 9.0);
}

TEST_CASE("evidence: of the time before, from the trace, and nothing without one",
          "[limits][run]") {
    auto run = hand_made::shaftRun({10.0, 11.0, 10.5, 9.0, 20.0});
    const auto plant = hand_made::plantA();
    const auto before = evidence(hand_made::shaftLevel(), hand_made::shaftPlace, Side::upper, run,
                                 plant, 3.0);
    REQUIRE(before);
    CHECK(before->extreme == 11.0);
    CHECK(before->time_s == 1.0);
    CHECK(before->largestStep == 1.5); // 10.5 → 9 within two instants of it
    run.channels[0].trace = {};
    CHECK_FALSE(evidence(hand_made::shaftLevel(), hand_made::shaftPlace, Side::upper, run, plant,
                         3.0));
    CHECK(evidence(hand_made::shaftLevel(), hand_made::shaftPlace, Side::lower, run, plant, 3.0)
              ->extreme == 9.0); // the lower extreme lies before the cut
}

TEST_CASE("evidence: a pressure head at a point from its head", "[limits][analytic]") {
    const auto run = hand_made::run(
        {hand_made::channel(Measure::head, inlet, {500.0, 560.0, 480.0}, 1.0)}, 2.0);
    const auto plant = hand_made::plantA();
    const auto found =
        evidence(pointLimit(Measure::pressureHead), inlet, Side::upper, run, plant, whole_s);
    REQUIRE(found);
    CHECK(found->extreme == 560.0 - 262.0);
    CHECK(found->rest == 500.0 - 262.0);
    CHECK(found->offset == -262.0);
}

TEST_CASE("evidence: along a conduit, straight between stations", "[limits][analytic]") {
    const auto run = withEnvelope();
    const auto plant = hand_made::plantA();
    const auto head = evidence(conduitLimit(Measure::head), bend, Side::lower, run, plant, whole_s);
    REQUIRE(head);
    CHECK_THAT(head->extreme, WithinAbs(470.0 - 30.0 * 140.0 / 600.0, 1e-9));
    CHECK(head->time_s == 3.0);
    CHECK(head->largestStep == 0.02);
    const auto pressure =
        evidence(conduitLimit(Measure::pressureHead), bend, Side::lower, run, plant, whole_s);
    CHECK_THAT(pressure->extreme, WithinAbs(463.0 - 357.0, 1e-9));
    CHECK_FALSE(evidence(conduitLimit(Measure::head), bend, Side::lower, run, plant, 2.0));
}

TEST_CASE("evidence: the worst chainage of a whole conduit lies at a corner of its axis",
          "[limits][limit]") {
    const auto run = withEnvelope();
    const auto plant = hand_made::plantA();
    auto whole = conduitLimit(Measure::pressureHead);
    whole.wholeConduit = true;
    const auto least =
        evidence(whole, {Thing::conduit, 1}, Side::lower, run, plant, whole_s);
    REQUIRE(least);
    // The axis stays at 452 m to chainage 5030 while the grade line already falls.
    CHECK(least->place == Place{Thing::conduit, 1, 5030.0});
    CHECK_THAT(least->extreme, WithinAbs(470.0 - 30.0 * 30.0 / 600.0 - 452.0, 1e-9));
    const auto most = evidence(whole, {Thing::conduit, 1}, Side::upper, run, plant, whole_s);
    CHECK(most->place.chainage_m == 5600.0);
    CHECK_THAT(most->extreme, WithinAbs(298.0, 1e-9));
}

TEST_CASE("evidence: a flow along a conduit from the nearest channel", "[limits][limit]") {
    const auto run = hand_made::run(
        {hand_made::channel(Measure::discharge, {Thing::conduit, 1, 5000.0}, {60.0, 50.0}, 1.0),
         hand_made::channel(Measure::discharge, {Thing::conduit, 1, 5600.0}, {60.0, 40.0}, 1.0)},
        1.0);
    const auto plant = hand_made::plantA();
    const auto found =
        evidence(conduitLimit(Measure::discharge), bend, Side::lower, run, plant, whole_s);
    REQUIRE(found);
    CHECK(found->extreme == 50.0);
    CHECK(found->place.chainage_m == 5000.0);
}

TEST_CASE("evidence: a velocity from the discharge and the bore", "[limits][analytic]") {
    const auto run = hand_made::run(
        {hand_made::channel(Measure::discharge, {Thing::conduit, 1, 5000.0}, {60.0, 50.0}, 1.0)},
        1.0);
    auto plant = hand_made::plantA();
    plant::Reach wide, narrow;
    wide.area_m2 = 20.0;
    wide.to_m = 5100.0;
    narrow.area_m2 = 10.0;
    plant.conduits[1].reaches.add("wide", wide);
    plant.conduits[1].reaches.add("narrow", narrow);
    const auto found =
        evidence(conduitLimit(Measure::velocity), bend, Side::upper, run, plant, whole_s);
    REQUIRE(found);
    CHECK(found->extreme == 6.0);
    CHECK(found->rest == 6.0);
    const auto upper = evidence(conduitLimit(Measure::velocity), {Thing::conduit, 1, 5050.0},
                                Side::lower, run, plant, whole_s);
    CHECK(upper->extreme == 2.5);
}

TEST_CASE("evidence: what a run does not compute is said", "[limits][limit]") {
    const auto run = withEnvelope();
    const auto plant = hand_made::plantA();
    CHECK(recorded(conduitLimit(Measure::head), bend, run, plant));
    CHECK_FALSE(recorded(conduitLimit(Measure::velocity), bend, run, plant));
    CHECK_FALSE(recorded(pointLimit(Measure::head), inlet, run, plant));
    CHECK_FALSE(recorded(hand_made::shaftLevel(), hand_made::shaftPlace, run, plant));
}
