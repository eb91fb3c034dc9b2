// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "machines/factors.h"
#include "machines/ideal_units.h"
#include "machines/shaft.h"
#include "support/catch.h"

#include <array>
#include <cmath>

using namespace headroom;
using namespace headroom::machines;

TEST_CASE("Orifice unit: odd in head, resistance is its inverse", "[ideal][analytic]") {
    const OrificeUnit unit{.ratedHead_m = 250.0, .ratedFlow_m3s = 30.0, .efficiency = 0.92};
    CHECK_THAT(unit.flow_m3s(250.0, 1.0), WithinAbs(30.0, 1e-12));
    CHECK_THAT(unit.flow_m3s(-250.0, 0.5), WithinAbs(-15.0, 1e-12));
    CHECK(unit.flow_m3s(250.0, 0.0) == 0.0);
    CHECK_THAT(unit.head_m(unit.flow_m3s(180.0, 0.4), 0.4), WithinRel(180.0, 1e-13));
    // 67.689 MW at 250 m, 30 m³/s and 0.92 (IEC 60193 factors' worked point; recomputed).
    CHECK_THAT(unit.power_W(30.0, 250.0, 1000.0, 9.81), WithinRel(67.689e6, 1e-12));
    CHECK(unit.power_W(-30.0, -250.0, 1000.0, 9.81) == 0.0);
}

TEST_CASE("Flow unit: the table, held outside", "[ideal][limit]") {
    const FlowUnit unit{
        numerics::Table::make({0.0, 10.0}, {30.0, 0.0}, numerics::Outside::hold).value()};
    CHECK(unit.at(-5.0) == 30.0);
    CHECK_THAT(unit.at(4.0), WithinAbs(18.0, 1e-12));
    CHECK(unit.at(99.0) == 0.0);
}

TEST_CASE("Power unit: constant ρgQH down to its lowest head", "[ideal][limit]") {
    const PowerUnit unit{
        .power_W = 50e6, .density_kgm3 = 1000.0, .gravity_mps2 = 9.81, .lowestHead_m = 20.0};
    for (double head : {400.0, 100.0, 20.001}) {
        const auto flow = unit.at(head);
        CHECK_THAT(9810.0 * flow.flow_m3s * head, WithinRel(50e6, 1e-13));
        const double delta = 1e-5 * head;
        const double difference = (unit.at(head + delta).flow_m3s - flow.flow_m3s) / delta;
        CHECK_THAT(flow.slope_m2s, WithinRel(difference, 2e-5));
    }
    CHECK(unit.at(-3.0).belowLowest);
    CHECK(unit.at(-3.0).flow_m3s == unit.at(20.0).flow_m3s);
    CHECK(unit.at(-3.0).slope_m2s == 0.0);
}

TEST_CASE("Ideal turbine below a rigid column: gate step and ramp", "[ideal][analytic]") {
    // Source: ideal lossless turbine, (1 − T_w s)/(1 + ½T_w s) (Kundur 1994 ch. 9, from memory;
    // numbers recomputed). State form from the unit's own linear coefficients:
    // T_w dq/dt = −h, q = q_h h + q_y y, p = m_h h + m_y y at constant speed.
    const LinearTurbine unit = idealTurbine();
    const auto run = [&](double tw, auto gate, double until) {
        double q = 0.0;
        const int steps = 4000;
        const double dt = until / steps;
        for (int i = 0; i < steps; ++i) {
            // h = (q − q_y y)/q_h, trapezoid.
            const double a = (q - unit.qY * gate(i * dt)) / unit.qH;
            const double share = 0.5 * dt / tw;
            q = (q - share * (a - unit.qY * gate((i + 1) * dt) / unit.qH))
                / (1.0 + share / unit.qH);
        }
        const double h = (q - unit.qY * gate(until)) / unit.qH;
        return unit.mH * h + unit.mY * gate(until);
    };
    const auto step = [](double) { return 1.0; };
    CHECK_THAT(run(1.5, step, 0.75), WithinAbs(-0.103638324, 1e-6));
    CHECK_THAT(run(1.5, step, 1.5), WithinAbs(0.593994150, 1e-6));
    CHECK_THAT(run(1.5, step, 3.0), WithinAbs(0.945053083, 1e-6));
    // Just after the step the flow has not moved: h = −q_y/q_h, p = −2.
    CHECK_THAT(unit.mY - unit.mH * unit.qY / unit.qH, WithinAbs(-2.0, 1e-12));
    CHECK_THAT(run(2.0, step, 0.549306 * 2.0), WithinAbs(0.0, 2e-6));

    const auto ramp = [](double t) { return t < 5.0 ? t / 5.0 : 1.0; };
    CHECK_THAT(run(1.0, ramp, 0.549306), WithinAbs(-0.0901388, 1e-6));
    CHECK_THAT(run(1.0, ramp, 1.410720), WithinAbs(0.0, 1e-6));
    CHECK_THAT(run(1.0, ramp, 5.0), WithinAbs(0.700014, 1e-6));
    CHECK_THAT(run(2.0, ramp, 1.098612), WithinAbs(-0.1802775, 1e-6));
    CHECK_THAT(run(2.0, ramp, 2.821439), WithinAbs(0.0, 1e-6));
    CHECK_THAT(run(2.0, ramp, 5.0), WithinAbs(0.404043, 1e-6));
}

TEST_CASE("Ideal turbine below a rigid column: frequency response", "[ideal][analytic]") {
    // Source: the same transfer function (Kundur 1994 ch. 9, from memory; recomputed).
    const std::array rows{std::array{0.1, 1.0037337, -8.5730}, std::array{0.5, 1.0846523, -40.6013},
                          std::array{1.0, 1.2649111, -71.5651},
                          std::array{2.0, 1.5811388, -108.4349},
                          std::array{5.0, 1.8937283, -146.8887}};
    for (const auto& [product, size, phase_deg] : rows) {
        const double tw = 1.7;
        const auto value = rigidColumnResponse(idealTurbine(), tw, {0.0, product / tw});
        CAPTURE(product);
        CHECK_THAT(std::abs(value), WithinAbs(size, 1e-7));
        CHECK_THAT(std::arg(value) * 180.0 / constants::pi, WithinAbs(phase_deg, 1e-4));
    }
}

TEST_CASE("Orifice unit on a rigid column: uniform closing and opening", "[ideal][analytic]") {
    // Source: constant head while an orifice moves uniformly on a rigid frictionless column,
    // h = ½K(K ± √(K² + 4)), K = T_w/T_c (Parmakian 1963; Chaudhry 2014; recomputed).
    const std::array rows{
        std::array{0.1, 0.105125, -0.095125}, std::array{0.15, 0.161671, -0.139171},
        std::array{0.2, 0.220998, -0.180998}, std::array{0.3, 0.348356, -0.258356}};
    const OrificeUnit unit{.ratedHead_m = 1.0, .ratedFlow_m3s = 1.0};
    for (const auto& [k, rise, fall] : rows) {
        // T_w dq/dt = 1 − H(q, τ); per unit of closing time, implicit Euler with a fine step: the
        // head is constant in the end, so the order of the method does not matter there.
        for (const bool closing : {true, false}) {
            double q = closing ? 1.0 : 1e-3;
            double head = 1.0;
            const int steps = 20000;
            for (int i = 1; i < steps - 200; ++i) {
                const double share = i / static_cast<double>(steps);
                const double tau = closing ? 1.0 - share : 1e-3 + share;
                const double r = unit.resistance_s2m5(tau);
                const double b = k * steps; // b q + r q² = b q_old + 1
                const double w = b * q + 1.0;
                q = 2.0 * w / (b + std::sqrt(b * b + 4.0 * r * w));
                head = unit.head_m(q, tau);
            }
            CAPTURE(k, closing);
            CHECK_THAT(head - 1.0, WithinAbs(closing ? rise : fall, 2e-4));
        }
    }
}

TEST_CASE("Shaft and orifice unit: speed after rejection", "[shaft][analytic]") {
    // Source: head-driven unit, constant efficiency, T_a 8 s, T_w 1.048492792 s, closing in 8 s:
    // rigid n_end/n0 = 1.480129523 (constructed case, rigid closed form; recomputed).
    const double tw = 1.048492792, closing = 8.0, ta = 8.0;
    const int steps = 40000;
    const double dt = closing / steps;
    const OrificeUnit unit{.ratedHead_m = 1.0, .ratedFlow_m3s = 1.0};
    double q = 1.0, speed = 1.0, torque = 1.0, highest = 1.0;
    for (int i = 1; i <= steps; ++i) {
        const double tau = 1.0 - i / static_cast<double>(steps);
        double head = highest;
        if (tau > 0.0) {
            const double b = tw / dt, w = b * q + 1.0;
            q = 2.0 * w / (b + std::sqrt(b * b + 4.0 * unit.resistance_s2m5(tau) * w));
            head = unit.head_m(q, tau);
        } else {
            q = 0.0;
        }
        highest = std::max(highest, head);
        const double after = q * head / speed; // torque from power at the speed before
        speed = ShaftStep{speed, torque, ta, dt}.speedAfter(after);
        torque = after;
    }
    CHECK_THAT(highest, WithinAbs(1.139931277, 2e-4));
    CHECK_THAT(speed, WithinRel(1.480129523, 2e-4)); // implicit Euler in the flow
}

TEST_CASE("Shaft step: order two and implicit in a torque that depends on speed",
          "[shaft][order]") {
    // dω/dt = −ω·k: exact e^(−k t).
    const auto error = [](int steps) {
        double speed = 1.0;
        const double dt = 1.0 / steps;
        for (int i = 0; i < steps; ++i) {
            speed = ShaftStep{speed, -speed, 1.0, dt}.speedAfter(0.0, -1.0);
        }
        return std::fabs(speed - std::exp(-1.0));
    };
    CHECK_THAT(std::log2(error(20) / error(40)), WithinAbs(2.0, 0.02));
}

TEST_CASE("Shaft: starting time, GD² and energy", "[shaft][analytic]") {
    // Source: T_a = Jω²/P, J 1.0e6 kg m², 333.333 rpm, 100 MW (from memory; recomputed).
    const double speed_rads = 1000.0 / 3.0 * constants::pi / 30.0; // 34.906585040, as the source
    CHECK_THAT(accelerationTime_s(1.0e6, speed_rads, 100e6), WithinRel(12.184696791, 1e-9));
    CHECK_THAT(inertiaConstant_s(12.184696791), WithinRel(6.092348396, 1e-9));
    CHECK_THAT(gd2FromInertia(1.0e6), WithinRel(4000e3, 1e-12));
    CHECK_THAT(inertiaFromGd2(4000e3), WithinRel(1.0e6, 1e-12));
    // T_a = GD²[t m²] n²/(364.756 P[kW])
    CHECK_THAT(4000.0 * 333.333 * 333.333 / (364.756 * 100e3),
               WithinRel(accelerationTime_s(1.0e6, speed_rads, 100e6), 2e-6));
    CHECK_THAT(inertiaFromAccelerationTime(8.0, speed_rads, 67.689e6), WithinRel(444419.758, 1e-8));
    CHECK_THAT(rebase(7.0, 100e6, 90e6), WithinRel(7.777778, 1e-6));
    CHECK_THAT(kineticEnergy_J(709248.29, 31.415927), WithinRel(350e6, 1e-7));
}
