// SPDX-License-Identifier: GPL-3.0-or-later
// Stability of a chamber below a unit of constant hydraulic power. Base data: L 5000 m, A 25 m²,
// 50 m³/s, k 1.25 s²/m (5 m), gross head 150 m, penstock loss 1.5 m; the level at rest is 0.
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <vector>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using plant::Collection;

namespace {

constexpr double criticalArea_m2 = 36.276440991; // LA/(2 g k H1), H1 = 150 - 5 - 3·1.5 m

/// The penstock is a spur whose inertia is a millionth of the tunnel's.
Case constantPower(double area_m2, plant::ConduitModel model) {
    Case made;
    const auto intake = made.point("Intake", 0.0, -40.0);
    const auto tee = made.point("Tee", 5000.0, -40.0);
    const auto inlet = made.point("Inlet", 5001.0, -40.0);
    made.reservoir("Upper", intake, 5.0);
    const auto tail = made.reservoir("Tail", {}, -145.0);
    auto& tunnel = made.conduit("Tunnel", intake, tee, 5000.0, 25.0, 1300.0, model);
    // f = h · 2 g · 4 R / (L v²), spread over the length.
    tunnel.reaches[0].friction = plant::DarcyFactor{
        5.0 * 2.0 * 9.81 * 4.0 * tunnel.reaches[0].hydraulicRadius_m / (5000.0 * 4.0)};
    made.conduit("Spur", tee, inlet, 1e-3, 7.0, 1200.0, plant::ConduitModel::rigid);
    tests::addLoss(made, "Spur", 1.5, 50.0);
    made.chamber("Chamber", tee, area_m2, -30.0, 30.0);
    made.unit("Unit", inlet, tail, plant::PowerUnit{1000.0 * 9.81 * 50.0 * 143.5});
    made.study.start.chamberLevel_m = {{made.ref(Collection::chambers, "Chamber"), 0.01}};
    return made;
}

/// Heights of the swings, crest less the trough that follows, one a cycle.
std::vector<double> swings(const Case& made, double period_s, int cycles) {
    const auto run = course(made);
    const auto z = run.find(Measure::level, tests::chamberPlace());
    const auto extreme = [&](double from_s, double to_s, int sign) {
        const auto first = static_cast<std::size_t>(std::max(1.0, from_s / run.step_s));
        const auto last = static_cast<std::size_t>(to_s / run.step_s);
        std::size_t best = first;
        for (std::size_t i = first; i <= last; ++i) {
            best = sign * (run.rows[i][z] - run.rows[best][z]) > 0.0 ? i : best;
        }
        const double before = run.rows[best - 1][z], here = run.rows[best][z];
        const double after = run.rows[best + 1][z];
        const double slope = 0.5 * (after - before), bend = after - 2.0 * here + before;
        return here - 0.5 * slope * slope / bend; // parabola through three instants
    };
    std::vector<double> out;
    for (int k = 1; k <= cycles; ++k) { // the first crest is the start itself
        out.push_back(extreme((k - 0.25) * period_s, (k + 0.25) * period_s, 1)
                      - extreme((k + 0.25) * period_s, (k + 0.75) * period_s, -1));
    }
    return out;
}

} // namespace

TEST_CASE("Thoma: amplitude ratio a cycle around the critical area", "[verification][analytic]") {
    // Thoma 1910, from memory; roots of s² + s[2 k v0 g/L - Q0/(F H1)] + ... recomputed, and the
    // non-linear system gives the same ratios to 1e-4. Tolerance of the list 0.3 %.
    const double rows[][3] = {
        {0.8, 158.6568, 1.214768},  {0.9, 168.2182, 1.096013}, {1.0, 177.2987, 1.000000},
        {1.1, 185.9687, 0.920420},  {1.2, 194.2831, 0.853144}, {1.5, 217.4932, 0.700752},
        {1.65, 228.3050, 0.643298}, {1.8, 238.6855, 0.594322}, {2.0, 251.9478, 0.539074}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        Case made = constantPower(row[0] * criticalArea_m2, plant::ConduitModel::rigid);
        made.settings.longestStep_s = 0.1;
        made.study.until_s = 4.0 * row[1];
        const auto heights = swings(made, row[1], 3);
        hold("H50 ratio, share", heights[1] / heights[0] / row[2], 1.0, 0.003);
        hold("H50 ratio, share", heights[2] / heights[1] / row[2], 1.0, 0.003);
    }
}

TEST_CASE("Thoma: at the critical area the swing neither grows nor dies",
          "[verification][analytic]") {
    // Thoma 1910, from memory: F = LA/(2 g k H1). Step 0.5 s, offset 0.01 m: 1.0000 ± 0.0002.
    Case made = constantPower(criticalArea_m2, plant::ConduitModel::rigid);
    made.settings.longestStep_s = 0.5;
    made.study.until_s = 12.0 * 177.2987;
    const auto heights = swings(made, 177.2987, 11);
    for (std::size_t k = 1; k < heights.size(); ++k) {
        hold("H49 ratio at the critical area", heights[k] / heights[k - 1], 1.0, 2e-4);
    }
}

TEST_CASE("Thoma: an elastic tunnel damps a little", "[verification][analytic]") {
    // The water stored in an elastic tunnel (a 1300 m/s) adds to the chamber. Root of
    // F s - Q0/H1 + 1/(Z tanh(gamma L)) = 0 with Z, gamma of the damped line, found by Newton:
    // s = -3.256587e-5 + 0.03532071i, so 0.994224 a cycle and 0.943715 over ten; derived here.
    // The ten cycles are counted from the second on; tolerance 0.002.
    Case made = constantPower(criticalArea_m2, plant::ConduitModel::elastic);
    made.settings.longestStep_s = 0.05;
    const double period_s = 2.0 * std::acos(-1.0) / 0.03532071;
    made.study.until_s = 14.0 * period_s;
    const auto heights = swings(made, period_s, 12);
    hold("H49 elastic tunnel, ten cycles", heights[11] / heights[1], 0.943715, 0.002);
}
