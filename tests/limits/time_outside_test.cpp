// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/time_outside.h"

#include "hand_made.h"
#include "support/catch.h"

#include <cmath>

using namespace headroom;
using headroom::limits::Evidence;
using headroom::limits::Side;
using headroom::limits::timeOutside;
using headroom::limits::valueExceededFor;
using headroom::plant::TimeRule;

namespace {

Evidence evidenceOf(const results::Channel& channel, double interval_s, Side side) {
    Evidence made;
    made.rest = channel.atRest;
    made.extreme = side == Side::upper ? channel.greatest.value : channel.least.value;
    made.trace = &channel.trace;
    made.interval_s = interval_s;
    return made;
}

constexpr double whole_s = 1e9;

} // namespace

TEST_CASE("time outside: crossings are found within the interval", "[limits][analytic]") {
    // Derived here: a triangle 0 → 4 → 0 over 8 s is above 1 for 6 s and above 3 for 2 s.
    const auto channel = hand_made::channel(Measure::level, hand_made::shaftPlace,
                                            {0.0, 4.0, 0.0}, 4.0);
    const auto evidence = evidenceOf(channel, 4.0, Side::upper);
    CHECK_THAT(timeOutside(evidence, Side::upper, 1.0, whole_s).total_s, WithinAbs(6.0, 1e-6));
    CHECK_THAT(timeOutside(evidence, Side::upper, 3.0, whole_s).longest_s, WithinAbs(2.0, 1e-6));
    CHECK(timeOutside(evidence, Side::upper, 4.0, whole_s).total_s == 0.0); // the bound is allowed
    CHECK_THAT(timeOutside(evidence, Side::lower, 1.0, whole_s).total_s, WithinAbs(2.0, 1e-6));
    CHECK_THAT(timeOutside(evidence, Side::upper, 1.0, 4.0).total_s, WithinAbs(3.0, 1e-6));
}

TEST_CASE("time outside: the longest and the sum are told apart", "[limits][analytic]") {
    const auto channel = hand_made::channel(Measure::level, hand_made::shaftPlace,
                                            {0.0, 2.0, 0.0, 2.0, 2.0, 0.0}, 1.0);
    const auto outside = timeOutside(evidenceOf(channel, 1.0, Side::upper), Side::upper, 1.0, whole_s);
    CHECK_THAT(outside.total_s, WithinAbs(3.0, 1e-6));
    CHECK_THAT(outside.longest_s, WithinAbs(2.0, 1e-6));
    CHECK(outside.counted_s(TimeRule::continuous) == outside.longest_s);
    CHECK(outside.counted_s(TimeRule::cumulative) == outside.total_s);
    CHECK(outside.counted_s(TimeRule::momentary) == outside.total_s);
}

TEST_CASE("time outside: a peak between two instants counts", "[limits][limit]") {
    auto channel = hand_made::channel(Measure::level, hand_made::shaftPlace, {0.0, 0.0, 0.0}, 1.0);
    channel.trace.high[1] = 2.0F;
    const auto evidence = evidenceOf(channel, 1.0, Side::upper);
    // Up to 2 in the middle of the interval and back: above 1 for half of it.
    CHECK_THAT(timeOutside(evidence, Side::upper, 1.0, whole_s).total_s, WithinAbs(0.5, 1e-6));
}

TEST_CASE("value exceeded for a time: inverse of the time outside", "[limits][invariant]") {
    std::vector<double> values;
    for (int i = 0; i <= 400; ++i) {
        values.push_back(std::sin(0.05 * i) * std::exp(-0.002 * i));
    }
    const auto channel = hand_made::channel(Measure::level, hand_made::shaftPlace, values, 0.5);
    for (const Side side : {Side::upper, Side::lower}) {
        for (const TimeRule rule : {TimeRule::continuous, TimeRule::cumulative}) {
            const auto evidence = evidenceOf(channel, 0.5, side);
            for (const double allowed_s : {0.5, 5.0, 20.0, 40.0}) {
                const double value = valueExceededFor(evidence, side, rule, allowed_s, whole_s);
                CAPTURE(allowed_s, value);
                CHECK_THAT(timeOutside(evidence, side, value, whole_s).counted_s(rule),
                           WithinAbs(allowed_s, 1e-4)); // trace is in single precision
            }
            CHECK_THAT(valueExceededFor(evidence, side, rule, 0.0, whole_s),
                       WithinAbs(evidence.extreme, 1e-6));
        }
    }
}
