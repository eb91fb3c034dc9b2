// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/servo.h"
#include "support/catch.h"
#include "units/text.h"

#include <cmath>
#include <limits>

using namespace headroom;
using namespace headroom::control;

namespace {

/// A servo without lag and dead time.
ServoSpec bare() {
    return {.opening_s = 10.0, .closing = {{0.0, 6.0}}, .lag_s = 0.0};
}

/// Time at which a full closing order, given at t = 0, has reached stroke `to`, located inside its
/// step; the step must not matter.
double closingTime_s(const ServoSpec& spec, double from, double step_s, double to = 0.0) {
    ServoState state = servoAtRest(spec, from, step_s);
    for (int n = 0; n < 1000000; ++n) {
        const double before = state.opening_pu;
        advance(spec, state, {0.0, 0.0}, n * step_s, step_s);
        if (state.opening_pu <= to) {
            const double rate = spec.closingRate(std::nextafter(to, 1.0), false).rate_1s;
            return n * step_s + (before - to) / rate;
        }
    }
    return std::numeric_limits<double>::infinity();
}

} // namespace

TEST_CASE("Servo: two-stage closing takes exactly its time", "[servo][analytic]") {
    // Source: T₁(1 − y_c) + T₂·y_c with 6 s, 0.3, 20 s → 10.2 s; from 0.8: 9.0 s (derived;
    // recomputed).
    ServoSpec spec = bare();
    spec.closing = {{0.3, 6.0}, {0.0, 20.0}};
    CHECK_THAT(spec.closingTime_s(1.0, 0.0), WithinAbs(10.2, 1e-12));
    CHECK_THAT(spec.closingTime_s(0.8, 0.0), WithinAbs(9.0, 1e-12));
    for (double step : {0.001, 0.01, 0.037, 0.7}) {
        CAPTURE(step);
        CHECK_THAT(closingTime_s(spec, 1.0, step), WithinAbs(10.2, 1e-9));
        CHECK_THAT(closingTime_s(spec, 0.8, step), WithinAbs(9.0, 1e-9));
    }
}

TEST_CASE("Servo: the lag neither shortens nor lengthens a full closing", "[servo][analytic]") {
    // A full order presses the gate against its end, so the limiting rates hold to the last.
    ServoSpec spec = bare();
    spec.closing = {{0.3, 6.0}, {0.0, 20.0}};
    spec.lag_s = 0.15;
    CHECK_THAT(closingTime_s(spec, 1.0, 0.01), WithinAbs(10.2, 1e-9));
    spec.deadTime_s = 0.2;
    CHECK_THAT(closingTime_s(spec, 1.0, 0.01), WithinAbs(10.4, 1e-9));
}

TEST_CASE("Servo: cushion before the closed end", "[servo][analytic]") {
    // The demo plant: 9 s full rate, below 12 % in 3 s: 0.88·9 + 3 s (derived here).
    ServoSpec spec = bare();
    spec.closing = {{0.0, 9.0}};
    spec.cushionBelow_pu = 0.12;
    spec.cushion_s = 3.0;
    CHECK_THAT(spec.closingTime_s(1.0, 0.0), WithinAbs(0.88 * 9.0 + 3.0, 1e-12));
    CHECK_THAT(closingTime_s(spec, 1.0, 0.013), WithinAbs(0.88 * 9.0 + 3.0, 1e-9));
    CHECK_THAT(closingTime_s(spec, 0.05, 0.013), WithinAbs(3.0 * 0.05 / 0.12, 1e-9));
    // A cushion faster than the stage does not speed it up.
    spec.cushion_s = 0.1;
    CHECK_THAT(spec.closingTime_s(1.0, 0.0), WithinAbs(9.0, 1e-12));
}

TEST_CASE("Servo: rates, position limits and travel", "[servo][limit]") {
    // ẏ = sat((u − y)/T_y, −1/T_c, 1/T_o), y within its limits (IEC 61362 form, from memory).
    ServoSpec spec = bare();
    spec.lowest_pu = 0.05;
    spec.highest_pu = 0.9;
    ServoState state = servoAtRest(spec, 0.4, 0.1);
    advance(spec, state, {2.0, 2.0}, 0.0, 1.0);
    CHECK_THAT(state.opening_pu, WithinAbs(0.5, 1e-15));
    CHECK_THAT(state.rate_1s, WithinAbs(0.1, 1e-15));
    for (int n = 1; n < 20; ++n) {
        advance(spec, state, {2.0, 2.0}, n, 1.0);
    }
    CHECK(state.opening_pu == 0.9);
    for (int n = 20; n < 40; ++n) {
        advance(spec, state, {-1.0, -1.0}, n, 1.0);
    }
    CHECK(state.opening_pu == 0.05);
    CHECK_THAT(state.travel_pu, WithinAbs(0.5 + 0.85, 1e-12));
    // Leaves the limit in the same step in which the order turns: nothing has wound up.
    advance(spec, state, {0.3, 0.3}, 40.0, 1.0);
    CHECK_THAT(state.opening_pu, WithinAbs(0.15, 1e-12));
}

TEST_CASE("Servo: dead time delays jumps between steps exactly", "[servo][analytic]") {
    ServoSpec spec = bare();
    spec.deadTime_s = 0.25; // two and a half steps
    ServoState state = servoAtRest(spec, 1.0, 0.1);
    for (int n = 0; n < 10; ++n) {
        advance(spec, state, {0.0, 0.0}, n * 0.1, 0.1);
    }
    CHECK_THAT(state.opening_pu, WithinAbs(1.0 - 0.75 / 6.0, 1e-12));
    // A pulse shorter than the dead time passes whole.
    ServoState pulse = servoAtRest(spec, 0.5, 0.1);
    for (int n = 0; n < 30; ++n) {
        const double order = n == 3 ? 0.51 : 0.5;
        advance(spec, pulse, {order, order}, n * 0.1, 0.1);
    }
    CHECK_THAT(pulse.opening_pu, WithinAbs(0.5, 1e-12));
    CHECK_THAT(pulse.travel_pu, WithinAbs(0.02, 1e-9));
}

TEST_CASE("Servo: exact lag for a straight order, order two for a smooth one", "[servo][order]") {
    ServoSpec spec = bare();
    spec.lag_s = 0.3;
    const double slope = 0.02;
    ServoState state = servoAtRest(spec, 0.5, 0.2);
    for (int n = 0; n < 5; ++n) {
        const double t = 0.2 * n;
        advance(spec, state, {0.5 + slope * t, 0.5 + slope * (t + 0.2)}, t, 0.2);
    }
    // Closed form of the lag behind a ramp.
    const double exact = 0.5 + slope * (1.0 - 0.3 * (1.0 - std::exp(-1.0 / 0.3)));
    CHECK_THAT(state.opening_pu, WithinAbs(exact, 1e-14));

    spec.deadTime_s = 0.2;
    const auto error = [&](int steps) {
        const double dt = 4.0 / steps, w = 2.0;
        const auto order = [&](double t) { return 0.5 + 0.01 * std::sin(w * t); };
        ServoState s = servoAtRest(spec, 0.5, dt);
        for (int n = 0; n < steps; ++n) {
            advance(spec, s, {order(n * dt), order((n + 1) * dt)}, n * dt, dt);
        }
        // T·ẏ + y = 0.5 + 0.01·sin(w(t − 0.2)) from t = 0.2 on, y = 0.5 before.
        const double t = 4.0 - 0.2, wt = w * spec.lag_s;
        const double solution =
            0.01 / (1.0 + wt * wt)
            * (std::sin(w * t) - wt * std::cos(w * t) + wt * std::exp(-t / spec.lag_s));
        return std::fabs(s.opening_pu - 0.5 - solution);
    };
    CHECK_THAT(std::log2(error(100) / error(200)), WithinAbs(2.0, 0.05));
    CHECK(error(400) < 1e-6);
}

TEST_CASE("Servo: emergency path and a stuck gate", "[servo][limit]") {
    ServoSpec spec = bare();
    spec.emergencyClosing_s = 5.0;
    spec.emergencyDeadTime_s = 0.35;
    ServoState state = servoAtRest(spec, 1.0, 0.1);
    state.emergency_s = 0.1;
    for (int n = 0; n < 10; ++n) {
        advance(spec, state, {1.0, 1.0}, 0.1 * n, 0.1);
    }
    CHECK_THAT(state.opening_pu, WithinAbs(1.0 - (1.0 - 0.45) / 5.0, 1e-12));
    state.stuck = true;
    const double there = state.opening_pu;
    advance(spec, state, {0.0, 0.0}, 1.0, 0.1);
    CHECK(state.opening_pu == there);
    CHECK(state.rate_1s == 0.0);
}

TEST_CASE("Servo: at rest it stays, bit for bit", "[servo][invariant]") {
    ServoSpec spec = bare();
    spec.lag_s = 0.15;
    spec.deadTime_s = 0.2;
    for (double y : {0.0, 0.2345, 0.934, 1.0}) {
        ServoState state = servoAtRest(spec, y, 0.01);
        for (int n = 0; n < 1000; ++n) {
            advance(spec, state, {y, y}, n * 0.01, 0.01);
        }
        CHECK_THAT(state.opening_pu, WithinAbs(y, 1e-15));
    }
}

TEST_CASE("Servo: faults are named all at once", "[servo][messages]") {
    ServoSpec spec;
    spec.opening_s = 0.0;
    spec.closing = {{0.3, 6.0}, {0.4, -2.0}};
    spec.lag_s = -0.1;
    spec.cushionBelow_pu = 0.1;
    spec.deadTime_s = std::numeric_limits<double>::quiet_NaN();
    spec.highest_pu = 1.2;
    std::string said;
    for (const auto& finding : check(spec, "plant/units/Unit 1/servo")) {
        said += text(finding) + "\n";
    }
    CHECK_THAT(said, ContainsSubstring("opening time is") && ContainsSubstring("closing time is")
                         && ContainsSubstring("stage 2") && ContainsSubstring("lag is")
                         && ContainsSubstring("cushion") && ContainsSubstring("dead time")
                         && ContainsSubstring("strokes run"));
    CHECK_FALSE(check(ServoSpec{}).empty()); // no closing time
    CHECK(check(bare()).empty());
}
