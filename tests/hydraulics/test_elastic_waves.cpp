// SPDX-License-Identifier: GPL-3.0-or-later
// Rows against closed solutions of water hammer.
#include "base/constants.h"
#include "hydraulics/elastic_row.h"
#include "hydraulics/hammer_formulas.h"
#include "support/catch.h"

#include <array>
#include <cmath>
#include <vector>

#include "row_support.h"

using namespace headroom::hydraulics;
using namespace headroom::hydraulics::rows;

namespace {

constexpr double pi = headroom::constants::pi;

double headAt(const ElasticRows& rows, const ElasticState& state, std::size_t j, std::size_t node) {
    return state.head_m()[rows.firstNode(j) + node];
}
double flowAt(const ElasticRows& rows, const ElasticState& state, std::size_t j, std::size_t node) {
    return state.flow_m3s()[rows.firstNode(j) + node];
}

} // namespace

TEST_CASE("Waves: instantaneous closure without friction is exact", "[waves][analytic]") {
    // Source: Joukowsky; derived here: L 1200 m, a 1200 m/s, H₀ 600 m, V₀ 1 m/s, period 4L/a.
    const double area = 3.0;
    for (const int cells : {2, 4, 100}) {
        const ElasticRows rows({uniformConduit(cells, {1200.0 / (g * area), {}})}, 1.0 / cells);
        ElasticState state = rows.state();
        rows.setRest(state, 0, 600.0, area * 1.0);
        const auto last = static_cast<std::size_t>(cells);
        const double rise = joukowskyRise_m(1200.0, -1.0, g);
        for (int n = 1; n <= 40 * cells; ++n) {
            rows.sweep(state, bestInstructionSet());
            startAtHead(rows, state, 0, 600.0);
            endAtFlow(rows, state, 0, 0.0);
            rows.advance(state);
            // Phase in units of Δt, read just after each instant, as the closure is at n = 0⁺.
            const int phase = (n - 1) % (4 * cells);
            const double valve = phase < 2 * cells ? 600.0 + rise : 600.0 - rise;
            REQUIRE_THAT(headAt(rows, state, 0, last), WithinAbs(valve, 1e-9));
            const double middle = phase < cells / 2               ? 0.0
                                  : phase < cells + cells / 2     ? rise
                                  : phase < 2 * cells + cells / 2 ? 0.0
                                  : phase < 3 * cells + cells / 2 ? -rise
                                                                  : 0.0;
            REQUIRE_THAT(headAt(rows, state, 0, last / 2), WithinAbs(600.0 + middle, 1e-9));
            const double speed = phase < cells || phase >= 3 * cells ? 1.0 : -1.0;
            REQUIRE_THAT(flowAt(rows, state, 0, 0), WithinAbs(area * speed, 1e-11));
        }
    }
    CHECK_THAT(600.0 + joukowskyRise_m(1200.0, -1.0, g), WithinAbs(722.324159, 1e-6));
    CHECK_THAT(600.0 - joukowskyRise_m(1200.0, -1.0, g), WithinAbs(477.675841, 1e-6));
}

TEST_CASE("Waves: a step passes and returns at a change of bore", "[waves][reference]") {
    // Source: Wylie & Streeter 1993, from memory; recomputed: D 4.2 → 3.4 m, a 1150 → 1200 m/s:
    // s = 1.228483547, r = 0.228483547.
    ElasticConduit conduit = uniformConduit(10, {1150.0 / (g * circle(4.2).area_m2), {}});
    for (std::size_t i = 5; i < 10; ++i) {
        conduit.cells[i].impedance_sm2 = 1200.0 / (g * circle(3.4).area_m2);
    }
    const ElasticRows rows({conduit}, 0.01);
    ElasticState state = rows.state();
    rows.setRest(state, 0, 0.0, 0.0);
    for (int n = 1; n <= 9; ++n) {
        rows.sweep(state, bestInstructionSet());
        startAtHead(rows, state, 0, 1.0);
        endAtHead(rows, state, 0, 0.0);
        rows.advance(state);
    }
    CHECK_THAT(headAt(rows, state, 0, 7), WithinRel(1.228483547, 1e-9)); // passed
    CHECK_THAT(headAt(rows, state, 0, 5), WithinRel(1.228483547, 1e-9));
    CHECK_THAT(headAt(rows, state, 0, 3), WithinRel(1.0 + 0.228483547, 1e-9)); // returned
    CHECK_THAT(headAt(rows, state, 0, 1), WithinRel(1.0, 1e-12));              // not there yet
    CHECK_THAT(headAt(rows, state, 0, 8), WithinRel(1.228483547, 1e-9));       // the front itself
    CHECK(headAt(rows, state, 0, 9) == 0.0);
}

namespace {

/// Head behind the valve of the telegraph case at the table's instants, shut at t = 0. `share` of
/// the stop is already in the valve's node at t = 0; the rest comes in the first step.
std::vector<double> telegraph(int cells, double share, const std::vector<double>& instants) {
    const double area = 2.0;
    const auto law = FrictionLaw::make({area, 0.4}, FrictionLaw::Linear{0.2, g}).value();
    const ElasticRows rows({uniformConduit(cells, {1200.0 / (g * area), {{law, 600.0 / cells}}})},
                           0.5 / cells);
    const auto last = static_cast<std::size_t>(cells);
    ElasticState state = rows.state();
    CHECK_THAT(rows.setRest(state, 0, 250.0, area), WithinAbs(237.767584, 1e-6));
    std::vector<double> head(last + 1), flow(last + 1, area), found;
    for (std::size_t i = 0; i <= last; ++i) {
        head[i] = headAt(rows, state, 0, i);
    }
    CHECK_THAT(head[last] + joukowskyRise_m(1200.0, -1.0, g), WithinAbs(360.091743, 1e-6));
    head[last] += share * joukowskyRise_m(1200.0, -1.0, g);
    flow[last] *= 1.0 - share;
    rows.setProfile(state, 0, head, flow);
    for (int n = 1; found.size() < instants.size(); ++n) {
        rows.sweep(state, bestInstructionSet());
        startAtHead(rows, state, 0, 250.0);
        endAtFlow(rows, state, 0, 0.0);
        rows.advance(state);
        if (std::fabs(n * rows.step_s() - instants[found.size()]) < 1e-9) {
            found.push_back(headAt(rows, state, 0, last));
        }
    }
    return found;
}

double worstDifference(const std::vector<double>& a, const std::vector<double>& b) {
    double worst = 0.0;
    for (std::size_t i = 0; i < a.size(); ++i) {
        worst = std::max(worst, std::fabs(a[i] - b[i]));
    }
    return worst;
}

} // namespace

TEST_CASE("Waves: linear friction packs the line as in the telegraph equation",
          "[waves][reference]") {
    // Derived here (modal series), checked by a second method to 1e-6 m. L 600 m, a 1200 m/s,
    // V₀ 1 m/s, R 0.2 1/s, H_R 250 m; just after closure 360.091743. Asked tolerance 0.05 m.
    const std::vector<double> instants{0.25, 0.5, 0.75, 1.25, 1.5, 1.75,
                                       2.5,  3.5, 4.5,  5.5,  8.5, 9.5};
    const std::vector<double> expected{363.13089, 366.13275, 369.09824, 147.77998,
                                       144.93223, 142.11723, 345.05674, 164.00069,
                                       327.80467, 179.60935, 302.12364, 202.84382};
    // A jump taken within a step costs half a cell's loss once: first order, 0.119 m at 50 cells.
    CHECK(worstDifference(telegraph(200, 0.0, instants), expected) < 0.05);
    const double coarse = worstDifference(telegraph(100, 0.0, instants), expected);
    const double fine = worstDifference(telegraph(400, 0.0, instants), expected);
    CHECK_THAT(std::log2(coarse / fine) / 2.0, WithinAbs(1.0, 0.05));
    // With the mean of before and after on the jump the second order is kept.
    const double coarseMean = worstDifference(telegraph(20, 0.5, instants), expected);
    const double fineMean = worstDifference(telegraph(80, 0.5, instants), expected);
    CAPTURE(coarseMean, fineMean);
    CHECK(fineMean < 1e-3);
    CHECK_THAT(std::log2(coarseMean / fineMean) / 2.0, WithinAbs(2.0, 0.1));
}

TEST_CASE("Waves: single pipe with friction and a closing valve", "[waves][reference]") {
    // Inputs: single-pipe example of Wylie & Streeter ch. 3, from memory; numbers recomputed with
    // 5000 reaches. Asked tolerance 0.2 % of 150 m. L 600 m, D 0.5 m, f 0.018, g 9.806.
    constexpr double gravity = 9.806, opening = 0.009;
    const int cells = 500;
    const double area = circle(0.5).area_m2;
    const ElasticRows rows({uniformConduit(cells, {1200.0 / (gravity * area),
                                                   {{darcy(0.5, 0.018, gravity), 600.0 / cells}}})},
                           0.5 / cells);
    ElasticState state = rows.state();
    CHECK_THAT(rows.setRest(state, 0, 150.0, 0.4774321635), WithinAbs(143.4882843, 1e-6));
    struct Row {
        double time, valve, flow, inside;
    };
    const std::array<Row, 15> expected{{{0.2, 165.8383, 0.441720, 146.0930},
                                        {0.4, 191.2259, 0.401441, 168.2559},
                                        {0.6, 219.6509, 0.356597, 193.4489},
                                        {0.8, 250.9135, 0.307505, 221.6786},
                                        {1.0, 284.5509, 0.254885, 231.0974},
                                        {1.2, 283.8865, 0.188413, 239.8678},
                                        {1.4, 274.0729, 0.126986, 232.8807},
                                        {1.6, 253.0494, 0.073660, 216.9042},
                                        {1.8, 218.9374, 0.031843, 190.3263},
                                        {2.0, 170.1338, 0.005402, 166.1823},
                                        {2.2, 133.2927, 0, 135.9322},
                                        {2.6, 93.0220, 0, 103.0858},
                                        {3.0, 133.2787, 0, 133.8692},
                                        {3.6, 206.7983, 0, 196.7736},
                                        {4.2, 133.3836, 0, 136.0197}}};
    std::size_t next = 0;
    double highest = 0.0, lowest = 1e9;
    for (int n = 1; next < expected.size(); ++n) {
        const double time = n * rows.step_s();
        const double share = time < 2.1 ? std::pow(1.0 - time / 2.1, 1.5) : 0.0;
        rows.sweep(state, bestInstructionSet());
        startAtHead(rows, state, 0, 150.0);
        const EndLaw& law = rows.endLaw(state, 0);
        double flow = 0.0;
        if (share > 0.0) {
            const double valve = 1.0 / (2.0 * gravity * std::pow(share * opening, 2));
            flow = solveBranch(law.linear_sm2, law.forward_s2m5 + valve, law.arriving_m).flow_m3s;
        }
        endAtFlow(rows, state, 0, flow);
        rows.advance(state);
        highest = std::max(highest, headAt(rows, state, 0, cells));
        lowest = std::min(lowest, headAt(rows, state, 0, cells));
        if (std::fabs(time - expected[next].time) < 1e-9) {
            CAPTURE(time);
            CHECK_THAT(headAt(rows, state, 0, cells), WithinAbs(expected[next].valve, 0.01));
            CHECK_THAT(flow, WithinAbs(expected[next].flow, 2e-5));
            CHECK_THAT(headAt(rows, state, 0, 300), WithinAbs(expected[next].inside, 0.01));
            ++next;
        }
    }
    CHECK_THAT(highest, WithinAbs(285.252, 0.01));
    CHECK_THAT(lowest, WithinAbs(92.843, 0.01));
}

TEST_CASE("Waves: modes of one and two pipes with a closed end", "[waves][reference]") {
    // Source: from memory and derived here. Pipe 1 (reservoir side) L 400 m, a 1000 m/s, A 8 m²;
    // pipe 2 L 300, a 1200, A 4: Z₁ tan(ωL₁/a₁) tan(ωL₂/a₂) = Z₂.
    const double first = waveImpedance_sm2(1000.0, 8.0, g),
                 second = waveImpedance_sm2(1200.0, 4.0, g);
    CHECK_THAT(first, WithinRel(12.742099898, 1e-9));
    CHECK_THAT(second, WithinRel(30.581039755, 1e-9));
    ElasticConduit conduit = uniformConduit(65, {first, {}}); // 0.4 s and 0.25 s in 10 ms
    for (std::size_t i = 40; i < 65; ++i) {
        conduit.cells[i].impedance_sm2 = second;
    }
    const ElasticRows rows({conduit}, 0.01);
    for (const double omega :
         {3.000937974, 6.926178537, 11.944108048, 17.478507515, 21.096762964}) {
        CHECK_THAT(first * std::tan(omega * 0.4) * std::tan(omega * 0.25), WithinRel(second, 1e-7));
        std::vector<double> head, flow(66, 0.0);
        for (int i = 0; i <= 65; ++i) {
            head.push_back(i <= 40 ? std::cos(omega * 0.25) / std::sin(omega * 0.4)
                                         * std::sin(omega * 0.01 * i)
                                   : std::cos(omega * 0.01 * (65 - i)));
        }
        ElasticState state = rows.state();
        rows.setProfile(state, 0, head, flow);
        for (int n = 1; n <= 1000; ++n) {
            rows.sweep(state, bestInstructionSet());
            startAtHead(rows, state, 0, 0.0);
            endAtFlow(rows, state, 0, 0.0);
            rows.advance(state);
            // Courant number 1 carries each mode exactly; ω is given to ten figures.
            REQUIRE_THAT(headAt(rows, state, 0, 65), WithinAbs(std::cos(omega * 0.01 * n), 1e-6));
        }
    }
    // One pipe: quarter waves (2n − 1)a/(4L) = 0.5, 1.5, 2.5 Hz for L 600 m, a 1200 m/s.
    const ElasticRows single({uniformConduit(50, {17.474879860, {}})}, 0.01);
    for (const double hertz : {0.5, 1.5, 2.5}) {
        std::vector<double> head, flow(51, 0.0);
        for (int i = 0; i <= 50; ++i) {
            head.push_back(std::sin(2 * pi * hertz * 0.01 * i));
        }
        ElasticState state = single.state();
        single.setProfile(state, 0, head, flow);
        for (int n = 1; n <= 400; ++n) {
            single.sweep(state, bestInstructionSet());
            startAtHead(single, state, 0, 0.0);
            endAtFlow(single, state, 0, 0.0);
            single.advance(state);
            REQUIRE_THAT(headAt(single, state, 0, 50),
                         WithinAbs(head[50] * std::cos(2 * pi * hertz * 0.01 * n), 1e-11));
        }
    }
}

TEST_CASE("Waves: impedance of a pipe in front of a reservoir", "[waves][reference]") {
    // Source: from memory; recomputed: Z = j Z_c tan(ωL/a), L 600 m, a 1200 m/s, A 7 m². A flow
    // sin ωt leaves the end; the standing wave is H = −|Z| cos ωt there (signed by tan).
    const double impedance = waveImpedance_sm2(1200.0, 7.0, g);
    const std::array<std::pair<double, double>, 4> rowsOfTable{
        {{0.1, 5.677932656}, {0.25, 17.474879860}, {0.45, 110.332049186}, {0.75, -17.474879860}}};
    for (const auto& [hertz, expected] : rowsOfTable) {
        const double omega = 2 * pi * hertz;
        const ElasticRows rows({uniformConduit(50, {impedance, {}})}, 0.01);
        ElasticState state = rows.state();
        std::vector<double> head, flow(51, 0.0);
        for (int i = 0; i <= 50; ++i) { // t = 0 of the standing wave
            head.push_back(-impedance * std::sin(omega * 0.01 * i) / std::cos(omega * 0.5));
        }
        rows.setProfile(state, 0, head, flow);
        for (int n = 1; n <= 300; ++n) {
            rows.sweep(state, bestInstructionSet());
            startAtHead(rows, state, 0, 0.0);
            endAtFlow(rows, state, 0, std::sin(omega * 0.01 * n));
            rows.advance(state);
            REQUIRE_THAT(headAt(rows, state, 0, 50),
                         WithinAbs(-expected * std::cos(omega * 0.01 * n), 2e-8 * 110.0));
        }
    }
}

TEST_CASE("Waves: elastic mass oscillation of tunnel, chamber and penstock", "[waves][reference]") {
    // Derived here, recomputed: tunnel L 5000 m, a 1300, A 25; chamber F 100 m²; penstock L 600,
    // a 1200, A 7, closed: period 284.084250 s (rigid formula 283.700671). The chamber is the
    // trapezoid: its own error over a period is 2π (ωΔt)²/12 = 4e-7.
    const double step = 0.5 / 13.0, omega = 2 * pi / 284.084250, chamber = 100.0;
    const ElasticRows rows({uniformConduit(100, {waveImpedance_sm2(1300.0, 25.0, g), {}}),
                            uniformConduit(13, {waveImpedance_sm2(1200.0, 7.0, g), {}})},
                           step);
    ElasticState state = rows.state();
    std::vector<double> tunnel, penstock;
    for (int i = 0; i <= 100; ++i) {
        tunnel.push_back(std::sin(omega * step * i) / std::sin(omega * step * 100));
    }
    for (int i = 0; i <= 13; ++i) {
        penstock.push_back(std::cos(omega * step * (13 - i)) / std::cos(omega * step * 13));
    }
    rows.setProfile(state, 0, tunnel, std::vector<double>(101, 0.0));
    rows.setProfile(state, 1, penstock, std::vector<double>(14, 0.0));
    double level = 1.0, inflow = 0.0;
    for (int n = 1; n <= 8000; ++n) {
        rows.sweep(state, bestInstructionSet());
        startAtHead(rows, state, 0, 0.0);
        endAtFlow(rows, state, 1, 0.0);
        const EndLaw up = rows.endLaw(state, 0), down = rows.startLaw(state, 1);
        const double storage = 2.0 * chamber / step;
        const double head = (up.arriving_m / up.linear_sm2 + down.arriving_m / down.linear_sm2
                             + storage * level + inflow)
                            / (1 / up.linear_sm2 + 1 / down.linear_sm2 + storage);
        rows.setEnd(state, 0, head, (up.arriving_m - head) / up.linear_sm2);
        rows.setStart(state, 1, head, (head - down.arriving_m) / down.linear_sm2);
        inflow = storage * (head - level) - inflow;
        level = head;
        rows.advance(state);
        REQUIRE_THAT(level, WithinAbs(std::cos(omega * step * n), 1e-6));
    }
}
