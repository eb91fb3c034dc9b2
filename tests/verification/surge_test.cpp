// SPDX-License-Identifier: GPL-3.0-or-later
// Surge chambers against exact extremes. Base data: L 5000 m, A 25 m², F 100 m², 50 m³/s, g 9.81,
// reservoir at 0, velocity heads off, tunnel rigid, step 0.05 s. Tolerance of the list where it
// gives one: 0.05 % of the frictionless amplitude. Times of crests: two steps.
#include "support/catch.h"

#include <algorithm>
#include <cmath>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using tests::chamberPlace;
using tests::channel;
using tests::pointPlace;
using tests::valueAt;

namespace {

constexpr double tolerance_m = 5e-4 * swing_m;
constexpr double timeTolerance_s = 0.1;
const results::Place tunnel{results::Thing::conduit, 0, 0.0};

const results::Channel& level(const results::Run& run) {
    return channel(run, Measure::level, chamberPlace());
}
Crest levelCrest(const results::Run& run, double from_s, double to_s, int sign) {
    return crest(run, Measure::level, chamberPlace(), from_s, to_s, sign);
}
double headUnderThrottle(const results::Run& run) {
    return valueAt(run, Measure::head, pointPlace(1), 0.0);
}

/// ½(L/(gA))Q² + ½F z² [m⁴].
double energy(double flow_m3s, double level_m) {
    return 0.5 * 5000.0 / (9.81 * 25.0) * flow_m3s * flow_m3s + 0.5 * 100.0 * level_m * level_m;
}

/// Height of the crest nearest to a time, by the parabola through three instants.
double crestNear(const Course& course, std::size_t channel, double time_s) {
    auto i = static_cast<std::size_t>(std::lround(time_s / course.step_s));
    const auto value = [&](std::size_t k) { return course.rows[k][channel]; };
    while (value(i + 1) > value(i)) {
        ++i;
    }
    while (value(i - 1) > value(i)) {
        --i;
    }
    const double slope = 0.5 * (value(i + 1) - value(i - 1));
    const double bend = value(i + 1) - 2.0 * value(i) + value(i - 1);
    return value(i) - 0.5 * slope * slope / bend;
}

} // namespace

TEST_CASE("Surge: without friction amplitude and period stay", "[verification][analytic]") {
    // v0 sqrt(LA/(gF)) and 2 pi sqrt(LF/(gA)): Massoud, Engineering Thermofluids, ch. IIIb.6;
    // recomputed. Tolerance of the list 0.01 %.
    Case made = surge(0.0, 50.0, 0.0);
    made.study.until_s = 11.0 * swingPeriod_s;
    const auto run = made.run();
    hold("H32 amplitude, share", level(run).greatest.value / swing_m, 1.0, 1e-4);
    hold("H32 amplitude, share", level(run).least.value / swing_m, -1.0, 1e-4);
    const auto first = levelCrest(run, 0.0, 0.5 * swingPeriod_s, 1);
    const auto last = levelCrest(run, 10.0 * swingPeriod_s, 10.5 * swingPeriod_s, 1);
    hold("H32 first crest, s", first.time_s, 70.925167672, timeTolerance_s);
    hold("H32 period, share", (last.time_s - first.time_s) / (10.0 * swingPeriod_s), 1.0, 1e-4);
    // Numerical damping of the scheme is ¼ pi (omega dt)³ a period, below: 1e-8 in ten periods.
    // What is seen is the rounding of the traces.
    hold("H32 amplitude after ten periods, share", last.value / first.value, 1.0, 3e-7);
}

TEST_CASE("Surge: numerical damping is the documented one", "[verification][order]") {
    // Two-step backward formula for the tunnel, trapezoid for the chamber: with x = s dt the roots
    // obey (x - x³/3 + x⁴/4)(x - x³/12) = -w² + ..., w = omega dt, so the damping is w⁴/8 a step,
    // ¼ pi w³ a period; derived here. Steps of 2 and 4 s make it visible.
    for (const double step_s : {2.0, 4.0}) {
        Case made = surge(0.0, 50.0, 0.0);
        made.settings.longestStep_s = step_s;
        made.study.until_s = 11.0 * swingPeriod_s;
        const auto swinging = course(made);
        REQUIRE_THAT(swinging.step_s, WithinAbs(step_s, 1e-12));
        const auto z = swinging.find(Measure::level, chamberPlace());
        const double w = 2.0 * std::acos(-1.0) / swingPeriod_s * step_s;
        const double lost = -std::log(crestNear(swinging, z, 10.25 * swingPeriod_s)
                                      / crestNear(swinging, z, 0.25 * swingPeriod_s));
        const double documented = 10.0 * 0.25 * std::acos(-1.0) * w * w * w;
        hold("H32 numerical damping, share of the documented", lost / documented, 1.0, 0.05);
    }
}

TEST_CASE("Surge: energy stays without friction and falls with it", "[verification][invariant]") {
    // ½(L/(gA))Q² + ½F z² = 25484.199796 m⁴ at the start; derived here. The scheme moves it by
    // (omega dt)² ~ 1.2e-6 within a period.
    const auto free = course(surge(0.0, 50.0, 0.0), 10);
    const auto q = free.find(Measure::discharge, tunnel);
    const auto z = free.find(Measure::level, chamberPlace());
    for (const auto& row : free.rows) {
        hold("H104 energy without friction, share", energy(row[q], row[z]) / 25484.199796, 1.0,
             2e-6);
    }
    const auto damped = course(surge(5.0, 50.0, 0.0), 10);
    double last = 1e9;
    for (const auto& row : damped.rows) {
        const double now = energy(row[q], row[z]);
        CHECK(now < last);
        last = now;
    }
}

TEST_CASE("Surge: total rejection with quadratic friction", "[verification][analytic]") {
    // First integral: Forchheimer 1913, Prášil 1908; Jaeger 1977, Fluid Transients; from memory.
    // Recomputed; the implicit equation and an integration agree to 9 digits.
    struct Row {
        double loss_m, z[4], t[4];
    };
    const Row rows[] = {{2.0,
                         {21.263005113, -19.132211915, 17.389901076, -15.938639620},
                         {73.68711, 215.68578, 357.65740, 499.60875}},
                        {5.0,
                         {19.373329386, -15.440548944, 12.838782510, -10.988934720},
                         {78.21141, 220.74752, 363.05116, 505.22365}},
                        {10.0,
                         {16.461977931, -11.461730432, 8.803716986, -7.149934644},
                         {86.89986, 230.50059, 373.27870, 515.70557}},
                        {15.0,
                         {13.886592830, -8.927713430, 6.595922238, -5.234007313},
                         {97.22328, 241.68518, 384.75765, 527.32051}}};
    for (const Row& row : rows) {
        CAPTURE(row.loss_m);
        Case made = surge(row.loss_m, 50.0, 0.0);
        made.study.until_s = 600.0;
        const auto run = made.run();
        hold("H33 level at rest, m", level(run).atRest, -row.loss_m, 1e-9);
        for (int i = 0; i < 4; ++i) {
            const auto seen =
                levelCrest(run, row.t[i] - 30.0, row.t[i] + 30.0, i % 2 == 0 ? 1 : -1);
            hold("H33 extremes, m", seen.value, row.z[i], tolerance_m);
            hold("H33 times, s", seen.time_s, row.t[i], timeTolerance_s);
        }
        // Water: what the tunnel brought less what the unit took stands in the chamber.
        const double stored_m3 = 100.0 * (level(run).atEnd - level(run).atRest);
        hold("H103 volume, share of throughput",
             (run.balance.inflow_m3 - run.balance.outflow_m3 - stored_m3)
                 / run.balance.throughput_m3,
             0.0, 1e-6);
        CHECK(run.balance.worstResidual_share < 1e-10);
    }
}

TEST_CASE("Surge: rejection without dimensions", "[verification][analytic]") {
    // x = z/Z*, K = h_f0/Z*; derived here, recomputed.
    const double rows[][3] = {{0.05, 0.96694817, -0.90836893}, {0.1, 0.93447442, -0.83081473},
                              {0.2, 0.87135336, -0.70647530},  {0.3, 0.81082410, -0.61105954},
                              {0.4, 0.75307523, -0.53550715},  {0.5, 0.69829044, -0.47423764},
                              {0.6, 0.64664039, -0.42361241},  {0.7, 0.59827285, -0.38115520},
                              {0.8, 0.55330155, -0.34512309},  {1.0, 0.47376545, -0.28761172}};
    for (const auto& row : rows) {
        const auto run = surge(row[0] * swing_m, 50.0, 0.0).run();
        CAPTURE(row[0]);
        hold("H34 x1", level(run).greatest.value / swing_m, row[1], 5e-4);
        hold("H34 x2", levelCrest(run, 150.0, 300.0, -1).value / swing_m, row[2], 5e-4);
    }
}

TEST_CASE("Surge: sudden acceptance", "[verification][analytic]") {
    // Derived here; recomputed by an integration of eighth order. K, least level from 0 with its
    // phase 2 pi t / T*, and from half the discharge.
    const double rows[][5] = {{0.05, -1.00486547, 1.587871, -0.51919562, 1.605183},
                              {0.1, -1.00988104, 1.605810, -0.53866935, 1.641840},
                              {0.2, -1.02040354, 1.644631, -0.57854394, 1.723125},
                              {0.3, -1.03166164, 1.688088, -0.61984207, 1.817574},
                              {0.4, -1.04377342, 1.737304, -0.66285006, 1.929496},
                              {0.5, -1.05689016, 1.793849, -0.70795556, 2.065610},
                              {0.7, -1.08700786, 1.939280, -0.80691641, 2.465181},
                              {1.0, -1.14830819, 2.343606, -1.00229949, 5.017406}};
    const double phase_1s = 2.0 * std::acos(-1.0) / swingPeriod_s;
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        const auto full = surge(row[0] * swing_m, 0.0, 50.0).run();
        const auto half = surge(row[0] * swing_m, 25.0, 50.0).run();
        hold("H36 x from 0", level(full).least.value / swing_m, row[1], 5e-4);
        hold("H36 time from 0, s", level(full).least.time_s, row[2] / phase_1s, timeTolerance_s);
        hold("H36 x from half", level(half).least.value / swing_m, row[3], 5e-4);
        if (row[0] < 1.0) { // the last one is too flat for its time to mean anything
            hold("H36 time from half, s", level(half).least.time_s, row[4] / phase_1s,
                 timeTolerance_s);
        }
    }
    const auto full = surge(5.0, 0.0, 50.0).run();
    hold("H36 least, m", level(full).least.value, -23.089909455, tolerance_m);
    hold("H36 least, s", level(full).least.time_s, 74.66116, timeTolerance_s);
    const auto next = levelCrest(full, 150.0, 300.0, 1);
    hold("H36 next crest, m", next.value, 2.448001726, tolerance_m);
    hold("H36 next crest, s", next.time_s, 222.83075, timeTolerance_s);
    const auto half = surge(5.0, 25.0, 50.0).run();
    hold("H36 least, m", level(half).least.value, -13.258608695, tolerance_m);
    hold("H36 least, s", level(half).least.time_s, 78.66331, timeTolerance_s);
}

TEST_CASE("Surge: finite closing time", "[verification][reference]") {
    // Constructed case, recomputed by an integration of eighth order.
    const double rows[][4] = {{10.0, 19.340010109, 83.23605, -15.419426293},
                              {20.0, 19.240194021, 88.30998, -15.356057608}};
    for (const auto& row : rows) {
        Case made = tests::surgeCase(5.0);
        flows(made, {{0.0, 50.0}, {row[0], 0.0}});
        made.study.until_s = 300.0;
        const auto run = made.run();
        hold("H38 extremes, m", level(run).greatest.value, row[1], tolerance_m);
        hold("H38 time, s", level(run).greatest.time_s, row[2], timeTolerance_s);
        hold("H38 extremes, m", level(run).least.value, row[3], tolerance_m);
    }
}

TEST_CASE("Surge: throttled chamber, total rejection", "[verification][analytic]") {
    // Derived here, recomputed two ways. R0, first, second and third extreme, times of the first
    // two; the head under the throttle just after the stop is R0 - 5 m.
    const double rows[][6] = {{0.0, 19.373329386, -15.440548944, 12.838782510, 78.21141, 220.74752},
                              {5.0, 16.764101578, -11.605935581, 8.888225168, 76.50053, 220.15689},
                              {10.0, 14.811730605, -9.293870041, 6.792471174, 75.29564, 220.05483},
                              {15.0, 13.279950065, -7.744601661, 5.492803524, 74.42694, 220.18089},
                              {20.0, 12.037201455, -6.633087019, 4.607825931, 73.79770, 220.42530},
                              {25.0, 11.003415198, -5.796356532, 3.966297062, 73.34786, 220.73511}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        Case made = surge(5.0, 50.0, 0.0, row[0]);
        made.study.until_s = 450.0;
        const auto run = made.run();
        const auto up = levelCrest(run, 0.0, 150.0, 1);
        const auto down = levelCrest(run, 150.0, 300.0, -1);
        hold("H39 extremes, m", up.value, row[1], tolerance_m);
        hold("H39 extremes, m", down.value, row[2], tolerance_m);
        hold("H39 extremes, m", levelCrest(run, 300.0, 450.0, 1).value, row[3], tolerance_m);
        hold("H39 times, s", up.time_s, row[4], timeTolerance_s);
        hold("H39 times, s", down.time_s, row[5], timeTolerance_s);
        hold("H39 head under the throttle, m", headUnderThrottle(run), row[0] - 5.0, 1e-5);
    }
}

TEST_CASE("Surge: the best throttle makes both maxima equal", "[verification][analytic]") {
    // Derived here: without friction R0 = z1 = Z*/sqrt(2), and the head under the throttle stays
    // all the way up. The equation of the scheme moves it by its own order, (omega dt)².
    const auto run = surge(0.0, 50.0, 0.0, 15.963771420).run();
    hold("H40 level, m", level(run).greatest.value, 15.963771420, tolerance_m);
    for (double t = 0.0; t < 62.0; t += 2.0) {
        hold("H40 constant head, m", valueAt(run, Measure::head, pointPlace(1), t), 15.963771420,
             1e-4);
    }
    const double rows[][3] = {{2.0, 16.573270392, 14.573270392},
                              {5.0, 17.602854186, 12.602854186},
                              {10.0, 19.699964254, 9.699964254}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        const auto damped = surge(row[0], 50.0, 0.0, row[1]).run();
        hold("H40 level, m", level(damped).greatest.value, row[2], tolerance_m);
        hold("H40 head under the throttle, m", headUnderThrottle(damped), row[2], 1e-5);
        if (row[0] == 5.0) { // between the two maxima the head sags
            hold("H40 sag, m",
                 crest(damped, Measure::head, pointPlace(1), 0.0, level(damped).greatest.time_s, -1)
                     .value,
                 11.867332, tolerance_m);
        }
    }
}

TEST_CASE("Surge: throttled chamber, acceptance", "[verification][reference]") {
    // Constructed case, recomputed by an integration of eighth order: from, R0, least level, its
    // time, head under the throttle just after the order.
    const double rows[][5] = {{0.0, 10.0, -18.469770990, 71.42549, -10.0},
                              {0.0, 17.602854186, -16.327485754, 70.14575, -17.602854},
                              {25.0, 10.0, -11.967387131, 77.44625, -3.75},
                              {25.0, 17.602854186, -11.224129916, 76.90795, -5.650714}};
    for (const auto& row : rows) {
        const auto run = surge(5.0, row[0], 50.0, row[1]).run();
        hold("H41 least, m", level(run).least.value, row[2], tolerance_m);
        hold("H41 time, s", level(run).least.time_s, row[3], timeTolerance_s);
        hold("H41 head under the throttle, m", headUnderThrottle(run), row[4], 1e-5);
    }
}

TEST_CASE("Surge: chamber with upper expansion", "[verification][analytic]") {
    // Energy integral, derived here, recomputed two ways: 50 m² below 10 m, 400 m² above.
    const double rows[][3] = {{0.0, 14.660184139, 84.23359}, {5.0, 13.648197090, 81.50751}};
    for (const auto& row : rows) {
        Case made = surge(row[0], 50.0, 0.0);
        made.plant.chambers[0].shape.areaByLevel = {
            {-39.0, 50.0}, {10.0, 50.0}, {10.0, 400.0}, {60.0, 400.0}};
        made.study.until_s = 100.0;
        const auto run = made.run();
        hold("H43 crest, m", level(run).greatest.value, row[1], tolerance_m);
        hold("H43 time, s", level(run).greatest.time_s, row[2], timeTolerance_s);
    }
    Case made = surge(0.0, 50.0, 0.0);
    made.plant.chambers[0].shape.areaByLevel = {
        {-39.0, 50.0}, {10.0, 50.0}, {10.0, 400.0}, {60.0, 400.0}};
    made.study.until_s = 100.0;
    const auto rising = course(made);
    const auto z = rising.find(Measure::level, chamberPlace());
    const auto q = rising.find(Measure::discharge, tunnel);
    std::size_t i = 0;
    while (rising.rows[i][z] < 10.0) {
        ++i;
    }
    // The area changes within the step that passes 10 m: straight on from the two instants before.
    const auto& before = rising.rows[i - 1];
    const auto& earlier = rising.rows[i - 2];
    const double steps = (10.0 - before[z]) / (before[z] - earlier[z]);
    hold("H43 passing 10 m, s", (static_cast<double>(i) - 1.0 + steps) * rising.step_s, 10.17117,
         1e-3);
    hold("H43 velocity there, m/s", (before[q] + steps * (before[q] - earlier[q])) / 25.0,
         1.89936832, 1e-5);
}

TEST_CASE("Surge: the limits of the chamber", "[verification][invariant]") {
    // No throttle, an endless area, no area at all: the three limits; derived here.
    const auto open = surge(5.0, 50.0, 0.0).run();
    const auto nearlyOpen = surge(5.0, 50.0, 0.0, 1e-9).run();
    hold("H107 no throttle, m", level(nearlyOpen).greatest.value, level(open).greatest.value, 1e-7);
    hold("H107 no throttle, m", level(nearlyOpen).least.value, level(open).least.value, 1e-7);
    Case vast = surge(5.0, 50.0, 0.0);
    vast.plant.chambers[0].shape.areaByLevel = {{-35.0, 1e10}, {60.0, 1e10}};
    const auto still = vast.run();
    hold("H107 endless area, m", level(still).greatest.value, -5.0, 2e-6);
    // With no area the wave of a stop passes through: a chamber of 1e-6 m² between two elastic
    // pipes stores less than a millionth of the wave's water a step.
    const auto hammer = [](double area_m2, double throttle_s2m5) {
        Case made = orificePipe({1200.0, 4.0, 1200.0, 600.0, 4.0}, 0.01);
        cutPipe(made, 0.5);
        if (area_m2 > 0.0) {
            auto& chamber = made.chamber("Chamber", made.ref(plant::Collection::points, "Cut"),
                                         area_m2, 0.0, 5000.0);
            chamber.shape.throttled = throttle_s2m5 > 0.0;
            chamber.shape.lossIn_s2m5 = chamber.shape.lossOut_s2m5 = throttle_s2m5;
        }
        openings(made, {{0.0, 1.0}, {1.7, 0.0}});
        made.study.until_s = 10.0;
        return made.run();
    };
    const auto none = hammer(0.0, 0.0);
    const auto tiny = hammer(1e-9, 0.0);
    const auto closed = hammer(50.0, 1e12);
    const auto great = hammer(1e9, 0.0);
    for (double t = 0.1; t < 10.0; t += 0.31) {
        const double head_m = valueAt(none, Measure::head, pointPlace(1), t);
        hold("H107 no area, m", valueAt(tiny, Measure::head, pointPlace(1), t), head_m, 1e-3);
        hold("H107 shut throttle, m", valueAt(closed, Measure::head, pointPlace(1), t), head_m,
             1e-2);
        hold("H107 endless area holds the head, m", valueAt(great, Measure::head, pointPlace(2), t),
             600.0, 2e-4);
    }
}
