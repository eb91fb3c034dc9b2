// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/imposed.h"
#include "grid/rotor.h"
#include "support/catch.h"

#include <cmath>

using namespace headroom;
using namespace headroom::grid;

namespace {

/// Speed deviation after `until` of a machine (T_a 6 s) displaced by 0.01 rad, trapezoid.
double swingAfter(const RotorSpec& spec, double ta, double until, int steps, double angle_rad) {
    const double dt = until / steps;
    RotorState state = rotorAtRest(spec, 0.8, 1.0);
    state.angle_rad += angle_rad;
    for (int i = 0; i < steps; ++i) {
        const ElectricalTorque after = torqueAfter(spec, state, 1.0, dt);
        const double share = 0.5 * dt / ta;
        const double net = 0.8 - torque_pu(spec, state) + 0.8 - after.constant_pu;
        const double speed = (state.speed_pu + share * net) / (1.0 + share * after.slope_pu);
        state = rotorAfter(spec, state, speed, 1.0, dt);
    }
    return state.speed_pu - 1.0;
}

} // namespace

TEST_CASE("Rotor: swing of one machine on an infinite bus", "[rotor][analytic]") {
    // Source: ω_n = √(K_S ω₀/2H), ζ = K_D/(2√(K_S 2H ω₀)); H 3, K_S 1.5, K_D 12, 50 Hz:
    // 8.862269 rad/s, 0.112838, roots −1 ± j8.805670 (Kundur 1994 §12.3, from memory; recomputed).
    const RotorSpec spec{.synchronising_pu = 1.5, .damping_pu = 12.0, .nominal_Hz = 50.0};
    const Swing natural = swing(spec, 6.0);
    CHECK_THAT(natural.frequency_rads, WithinAbs(8.862269, 1e-6));
    CHECK_THAT(natural.dampingRatio, WithinAbs(0.112838, 1e-6));
    // 60 Hz: 0.757301, H 3.5, K_D 10 → 6.386321 rad/s, 0.111846.
    const Swing other = swing({0.757301, 10.0, 60.0}, 7.0);
    CHECK_THAT(other.frequency_rads, WithinAbs(6.386321, 2e-6));
    CHECK_THAT(other.dampingRatio, WithinAbs(0.111846, 1e-6));

    // Free swing from a displaced angle at rest: dω/dt = −K_S·δ/T_a at first.
    const double d = 1.0, w = 8.805670, t = 0.7, angle = 0.01;
    const double exact = -1.5 * angle / 6.0 / w * std::exp(-d * t) * std::sin(w * t);
    CHECK_THAT(swingAfter(spec, 6.0, t, 7000, angle), WithinAbs(exact, 1e-8));
    const double coarse = std::fabs(swingAfter(spec, 6.0, t, 70, angle) - exact);
    const double fine = std::fabs(swingAfter(spec, 6.0, t, 140, angle) - exact);
    CHECK_THAT(std::log2(coarse / fine), WithinAbs(2.0, 0.05));
}

TEST_CASE("Rotor: at rest it carries its torque; off the grid it carries none", "[rotor][limit]") {
    const RotorSpec spec;
    RotorState state = rotorAtRest(spec, 0.9, 1.0);
    CHECK_THAT(torque_pu(spec, state), WithinAbs(0.9, 1e-15));
    const auto same = torqueAfter(spec, state, 1.0, 0.01);
    CHECK_THAT(same.at(1.0), WithinAbs(0.9, 1e-12));
    CHECK_THAT(rotorAfter(spec, state, 1.0, 1.0, 0.01).angle_rad, WithinAbs(0.6, 1e-14));
    state.onGrid = false;
    CHECK(torqueAfter(spec, state, 1.0, 0.01).at(1.4) == 0.0);
    CHECK(torque_pu(spec, state) == 0.0);
    CHECK(torque_pu(spec, rotorAtClosing(1.004, 1.0)) > 0.0); // faster than the grid: brakes
    // Locked: what the turbine gives minus what turns its own mass faster.
    CHECK_THAT(lockedTorque_Nm(3.0e6, 7.0e5, 0.1), WithinAbs(2.93e6, 1e-6));
}

TEST_CASE("Imposed frequency: exact functions of time", "[imposed][analytic]") {
    const ImposedFrequency step = FrequencyStep{10.0, 50.0, 49.7};
    CHECK(frequency_Hz(step, 10.0) == 50.0);
    CHECK(frequency_Hz(step, 10.0001) == 49.7);
    CHECK(rate_Hzs(step, 10.0) == 0.0);
    const ImposedFrequency ramp = FrequencyRamp{1.0, 2.0, 50.0, 49.5};
    CHECK(frequency_Hz(ramp, 0.0) == 50.0);
    CHECK_THAT(frequency_Hz(ramp, 2.0), WithinAbs(49.75, 1e-14));
    CHECK(frequency_Hz(ramp, 9.0) == 49.5);
    CHECK_THAT(rate_Hzs(ramp, 1.0), WithinAbs(-0.25, 1e-15));
    CHECK(rate_Hzs(ramp, 3.0) == 0.0);
    const ImposedFrequency sine = FrequencySine{5.0, 50.0, 0.1, 20.0};
    CHECK(frequency_Hz(sine, 4.0) == 50.0);
    CHECK_THAT(frequency_Hz(sine, 10.0), WithinAbs(50.1, 1e-12));
    CHECK_THAT(rate_Hzs(sine, 5.0), WithinAbs(0.1 * 2.0 * constants::pi / 20.0, 1e-12));
    const ImposedFrequency table = FrequencyTable{
        100.0, numerics::Table::make({0.0, 1.0, 4.0}, {50.0, 49.4, 49.7}, numerics::Outside::hold)
                   .value()};
    CHECK(frequency_Hz(table, 0.0) == 50.0);
    CHECK_THAT(frequency_Hz(table, 102.5), WithinAbs(49.55, 1e-12));
    CHECK_THAT(rate_Hzs(table, 102.5), WithinAbs(0.1, 1e-12));
    CHECK(rate_Hzs(table, 104.0) == 0.0);
    CHECK(frequency_Hz(table, 200.0) == 49.7);
}
