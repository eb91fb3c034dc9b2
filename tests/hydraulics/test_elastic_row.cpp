// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "hydraulics/elastic_row.h"
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <cstring>
#include <random>

#include "row_support.h"

using namespace headroom::hydraulics;
using namespace headroom::hydraulics::rows;

namespace {

/// A steel conduit of two bores with a bend and a cell that spans the change of bore, in
/// 12 · refinement cells of equal travel time; about 600 m.
ElasticConduit mixedConduit(int refinement) {
    const double upper = 1150.0 / (g * circle(4.2).area_m2);
    const double lower = 1200.0 / (g * circle(3.4).area_m2);
    const FrictionLaw wide = colebrook(4.2, 3e-3), narrow = colebrook(3.4, 1e-4);
    const double length = 50.0 / refinement;
    ElasticConduit conduit;
    for (int i = 0; i < 12 * refinement; ++i) {
        const bool first = i < 5 * refinement, second = i >= 6 * refinement;
        ElasticCell cell;
        cell.impedance_sm2 = first ? upper : second ? lower : 0.5 * (upper + lower);
        if (!second) {
            cell.friction.push_back({wide, first ? length : 0.4 * length});
        }
        if (!first) {
            cell.friction.push_back({narrow, second ? length : 0.6 * length});
        }
        if (i == 2 * refinement) {
            cell.forwardLoss_s2m5 = 2e-4;
            cell.reverseLoss_s2m5 = 3e-4;
        }
        conduit.cells.push_back(cell);
    }
    return conduit;
}

double steelLoss(double flow) { // of mixedConduit, from the laws alone
    const double bend = flow < 0 ? 3e-4 : 2e-4;
    return colebrook(4.2, 3e-3).lossPerMetre(flow) * (250.0 + 20.0)
           + colebrook(3.4, 1e-4).lossPerMetre(flow) * (30.0 + 300.0)
           + bend * flow * std::fabs(flow);
}

} // namespace

TEST_CASE("Row: rest has the loss of its laws, whatever the cells", "[waves][invariant]") {
    for (const double flow : {60.0, 3.0, 1e-3, 0.0, -25.0}) {
        for (const int refinement : {1, 3, 10}) {
            const ElasticRows rows({mixedConduit(refinement)}, 0.05 / refinement);
            ElasticState state = rows.state();
            const double end = rows.setRest(state, 0, 500.0, flow);
            CAPTURE(flow, refinement);
            CHECK_THAT(500.0 - end, WithinAbs(steelLoss(flow), 1e-12 * 500.0));
            CHECK_THAT(rows.restLoss_m(0, flow), WithinRel(steelLoss(flow), 1e-13));
            const double small = 1e-5 + 1e-5 * std::fabs(flow);
            CHECK_THAT(
                rows.restLossSlope_sm2(0, flow),
                WithinAbs((steelLoss(flow + small) - steelLoss(flow - small)) / (2 * small), 1e-7));
        }
    }
}

TEST_CASE("Row: rest with Colebrook–White friction stands still", "[waves][invariant]") {
    const ElasticRows rows(
        {mixedConduit(1), uniformConduit(40, {48.0, {{colebrook(2.0, 1e-4), 12.0}}})}, 0.05);
    ElasticState state = rows.state();
    const double first = rows.setRest(state, 0, 500.0, 60.0);
    const double second = rows.setRest(state, 1, 200.0, -9.0);
    const std::vector<double> head(state.head_m().begin(), state.head_m().end());
    const int steps = testCount(100000, 1000000);
    double worstHead = 0.0, worstFlow = 0.0;
    for (int n = 0; n < steps; ++n) {
        rows.sweep(state, bestInstructionSet());
        startAtHead(rows, state, 0, 500.0);
        endAtFlow(rows, state, 0, 60.0);
        startAtHead(rows, state, 1, 200.0);
        endAtHead(rows, state, 1, second);
        rows.advance(state);
    }
    for (std::size_t i = 1; i + 1 < rows.nodes(); ++i) {
        worstHead = std::max(worstHead, std::fabs(state.head_m()[i] / head[i] - 1.0));
        const double rest = i < rows.firstNode(1) ? 60.0 : -9.0;
        worstFlow = std::max(worstFlow, std::fabs(state.flow_m3s()[i] / rest - 1.0));
    }
    CAPTURE(worstHead, worstFlow, first);
    CHECK(worstHead < 1e-12);
    CHECK(worstFlow < 1e-12);
}

TEST_CASE("Row: water in less water out is water stored", "[waves][invariant]") {
    // Identity of the scheme, to rounding, with anything at the ends.
    const ElasticRows rows({mixedConduit(2)}, 0.025);
    ElasticState state = rows.state();
    rows.setRest(state, 0, 400.0, 30.0);
    std::mt19937_64 random(5);
    std::uniform_real_distribution<double> head(100.0, 700.0), flow(-40.0, 60.0);
    const double before = rows.storedVolume_m3(state, 0);
    double through = 0.0, moved = 0.0;
    std::size_t last = rows.firstNode(0) + rows.cells(0);
    for (int n = 0; n < 3000; ++n) {
        const double in = state.flow_m3s()[rows.firstNode(0)], out = state.flow_m3s()[last];
        rows.sweep(state, InstructionSet::baseline);
        startAtHead(rows, state, 0, head(random));
        endAtFlow(rows, state, 0, flow(random));
        rows.advance(state);
        const double more =
            0.5 * rows.step_s()
            * (in + state.flow_m3s()[rows.firstNode(0)] - out - state.flow_m3s()[last]);
        through += more;
        moved += std::fabs(more);
    }
    CHECK_THAT(rows.storedVolume_m3(state, 0) - before, WithinAbs(through, 1e-12 * moved));
    // At rest without flow it is storage times head.
    rows.setRest(state, 0, 123.0, 0.0);
    CHECK_THAT(rows.storedVolume_m3(state, 0), WithinRel(123.0 * rows.storage_m2(0), 1e-13));
}

TEST_CASE("Row: reversed flow and mirrored heads give the mirror image", "[waves][invariant]") {
    const ElasticCell cell{40.0, {{colebrook(2.0, 1e-3), 10.0}}};
    const ElasticRows rows({uniformConduit(30, cell)}, 0.01);
    ElasticState plus = rows.state(), minus = rows.state();
    rows.setRest(plus, 0, 0.0, 8.0);
    rows.setRest(minus, 0, 0.0, -8.0);
    for (int n = 0; n < 500; ++n) {
        for (auto* state : {&plus, &minus}) {
            rows.sweep(*state, InstructionSet::baseline);
            startAtHead(rows, *state, 0, 0.0);
            endAtFlow(rows, *state, 0, 0.0);
            rows.advance(*state);
        }
    }
    for (std::size_t i = 0; i < rows.nodes(); ++i) {
        REQUIRE(plus.head_m()[i] == -minus.head_m()[i]);
        REQUIRE(plus.flow_m3s()[i] == -minus.flow_m3s()[i]);
    }
}

TEST_CASE("Row: one conduit of equal cells or two joined ones are the same", "[waves][invariant]") {
    // The interface formula and the vector loop solve one equation.
    const ElasticCell cell{40.0, {{darcy(2.0, 0.05), 10.0}}};
    ElasticConduit split = uniformConduit(20, cell);
    for (std::size_t i = 8; i < 20; ++i) { // same loss in two pieces: not recognised as equal
        split.cells[i].friction = {{darcy(2.0, 0.05), 5.0}, {darcy(2.0, 0.05), 5.0}};
    }
    split.cells[12].impedance_sm2 = std::nextafter(40.0, 50.0);
    const ElasticRows rows({uniformConduit(20, cell), split}, 0.01);
    ElasticState state = rows.state();
    for (const std::size_t j : {0u, 1u}) {
        rows.setRest(state, j, 100.0, 8.0);
    }
    for (int n = 0; n < 400; ++n) {
        rows.sweep(state, bestInstructionSet());
        for (const std::size_t j : {0u, 1u}) {
            startAtHead(rows, state, j, 100.0);
            endAtFlow(rows, state, j, n < 150 ? 8.0 * (1 - n / 150.0) : 0.0);
        }
        rows.advance(state);
    }
    for (std::size_t i = 0; i <= 20; ++i) {
        CHECK_THAT(state.head_m()[rows.firstNode(1) + i],
                   WithinAbs(state.head_m()[rows.firstNode(0) + i], 1e-10));
    }
}

TEST_CASE("Row: friction is of second order", "[waves][order]") {
    // Smooth stop and restart of the flow; long rough pipe, so that friction is half of the head.
    const auto headAfter = [](int cells) {
        const double area = circle(1.0).area_m2, step = 2000.0 / 1000.0 / cells;
        const ElasticRows rows({uniformConduit(cells, {1000.0 / (g * area),
                                                       {{colebrook(1.0, 2e-3), 2000.0 / cells}}})},
                               step);
        ElasticState state = rows.state();
        rows.setRest(state, 0, 150.0, 3.0);
        const int steps = static_cast<int>(std::lround(14.0 / step));
        for (int n = 1; n <= steps; ++n) {
            rows.sweep(state, bestInstructionSet());
            startAtHead(rows, state, 0, 150.0);
            const double s = std::sin(0.11 * n * step);
            endAtFlow(rows, state, 0, 3.0 - 2.2 * s * s * s);
            rows.advance(state);
        }
        return state.head_m()[rows.firstNode(0) + static_cast<std::size_t>(cells)];
    };
    const double exact = headAfter(1280);
    const double coarse = std::fabs(headAfter(20) - exact);
    const double middle = std::fabs(headAfter(40) - exact);
    const double fine = std::fabs(headAfter(80) - exact);
    CAPTURE(exact, coarse, middle, fine);
    CHECK(coarse > 1e-7);
    CHECK_THAT(std::log2(coarse / middle), WithinAbs(2.0, 0.1));
    CHECK_THAT(std::log2(middle / fine), WithinAbs(2.0, 0.1));
}

TEST_CASE("Row: a whole run has the same bits for every instruction set", "[waves][invariant]") {
    const ElasticRows rows({mixedConduit(3), uniformConduit(7, {40.0, {{darcy(2.0, 0.02), 10.0}}}),
                            uniformConduit(200, {40.0, {{colebrook(2.0, 1e-4), 10.0}}})},
                           0.01);
    const auto run = [&rows](InstructionSet set) {
        ElasticState state = rows.state();
        std::vector<double> low(rows.nodes(), 1e9), high(rows.nodes(), -1e9);
        for (const std::size_t j : {0u, 1u, 2u}) {
            rows.setRest(state, j, 100.0, 5.0);
        }
        for (int n = 0; n < 1000; ++n) {
            rows.sweep(state, set);
            for (const std::size_t j : {0u, 1u, 2u}) {
                startAtHead(rows, state, j, 100.0);
                endAtFlow(rows, state, j, n < 99 ? 5.0 - 5.0 * n / 99.0 : 0.0);
            }
            rows.advance(state);
            rows.widen(state, low, high, set);
        }
        std::vector<double> all(state.head_m().begin(), state.head_m().end());
        all.insert(all.end(), state.flow_m3s().begin(), state.flow_m3s().end());
        all.insert(all.end(), low.begin(), low.end());
        all.insert(all.end(), high.begin(), high.end());
        return all;
    };
    const std::vector<double> reference = run(InstructionSet::baseline);
    CHECK(*std::max_element(reference.begin(), reference.end() - 1) > 200.0); // waves did run
    for (const InstructionSet set : {InstructionSet::avx2, InstructionSet::avx512}) {
        if (available(set)) {
            const std::vector<double> other = run(set);
            CHECK(std::memcmp(other.data(), reference.data(), other.size() * sizeof(double)) == 0);
        }
    }
}

TEST_CASE("Row: what cannot be is the caller's fault", "[waves][limit]") {
    const ElasticCell cell{40.0, {}};
    CHECK_THROWS_AS(uniformConduit(1, cell), headroom::Bug);
    CHECK_THROWS_AS(ElasticRows({ElasticConduit{{cell}}}, 0.01), headroom::Bug);
    CHECK_THROWS_AS(ElasticRows({uniformConduit(2, {0.0, {}})}, 0.01), headroom::Bug);
    CHECK_THROWS_AS(ElasticRows({uniformConduit(2, cell)}, 0.0), headroom::Bug);
    CHECK_THROWS_AS(ElasticRows({uniformConduit(2, {1.0, {}, -1.0, 0.0})}, 0.1), headroom::Bug);
    ElasticRows none({}, 0.01);
    ElasticState state = none.state();
    none.sweep(state, bestInstructionSet()); // a plant without elastic conduits
    none.advance(state);
    CHECK(none.conduits() == 0);
}
