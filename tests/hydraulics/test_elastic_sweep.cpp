// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/elastic_row.h"
#include "hydraulics/elastic_sweep.h"
#include "support/catch.h"

#include <array>
#include <cmath>
#include <cstring>
#include <random>
#include <vector>

using namespace headroom::hydraulics;

namespace {

constexpr std::array allSets{InstructionSet::baseline, InstructionSet::avx2,
                             InstructionSet::avx512};

struct Arrays {
    std::vector<double> right, left, curvature, share, conductance, nextRight, nextLeft, head, flow;

    explicit Arrays(std::size_t count)
        : right(count), left(count), curvature(count), share(count), conductance(count),
          nextRight(count), nextLeft(count), head(count), flow(count) {}
    SweepArrays view() {
        return {right.data(),    left.data(),        curvature.data(),
                share.data(),    conductance.data(), nextRight.data(),
                nextLeft.data(), head.data(),        flow.data()};
    }
    bool sameBits(const Arrays& other) const {
        const auto equal = [](const std::vector<double>& a, const std::vector<double>& b) {
            return std::memcmp(a.data(), b.data(), a.size() * sizeof(double)) == 0;
        };
        return equal(nextRight, other.nextRight) && equal(nextLeft, other.nextLeft)
               && equal(head, other.head) && equal(flow, other.flow);
    }
};

Arrays randomArrays(std::size_t count, std::mt19937_64& random) {
    std::uniform_real_distribution<double> heads(-800.0, 800.0), unit(0.0, 1.0);
    Arrays made(count);
    for (std::size_t i = 0; i < count; ++i) {
        made.right[i] = heads(random);
        made.left[i] = heads(random);
        // From no friction to far beyond the series.
        made.curvature[i] = unit(random) < 0.3 ? 0.0 : std::pow(10.0, -9.0 + 10.0 * unit(random));
        made.share[i] = unit(random) < 0.5 ? 0.0 : 0.1 * unit(random);
        made.conductance[i] = 0.001 + unit(random);
    }
    return made;
}

} // namespace

TEST_CASE("Sweep: every build of the loops gives the same bits", "[waves][invariant]") {
    std::mt19937_64 random(20260101);
    int compared = 0;
    for (const std::size_t count : {3u, 4u, 9u, 10u, 17u, 33u, 513u, 514u, 1000u, 2051u}) {
        for (int repeat = 0; repeat < 20; ++repeat) {
            const Arrays start = randomArrays(count, random);
            Arrays reference = start;
            sweepLoops(InstructionSet::baseline).sweep(reference.view(), 1, count - 1);
            for (const InstructionSet set : allSets) {
                if (available(set)) {
                    Arrays other = start;
                    sweepLoops(set).sweep(other.view(), 1, count - 1);
                    CAPTURE(count, nameOf(set));
                    REQUIRE(other.sameBits(reference));
                    ++compared;
                }
            }
        }
    }
    CHECK(compared >= 200);
    CHECK(available(bestInstructionSet()));
}

TEST_CASE("Sweep: the node equation is solved to rounding", "[waves][invariant]") {
    // bQ + rQ|Q| = w and loss = kQ + rQ|Q|, on both sides of the series' limit.
    std::mt19937_64 random(11);
    Arrays a = randomArrays(4000, random);
    sweepLoops(bestInstructionSet()).sweep(a.view(), 1, 3999);
    for (std::size_t i = 1; i < 3999; ++i) {
        const double twoB = 1.0 / a.conductance[i];
        const double b = twoB / (1.0 - a.share[i]);
        const double w = a.right[i - 1] - a.left[i + 1], q = a.flow[i];
        const double loss = (b - twoB) * q + a.curvature[i] * b * b * q * std::fabs(q);
        REQUIRE_THAT(twoB * q + loss, WithinAbs(w, 2e-13 * 1600.0));
        REQUIRE_THAT(a.nextRight[i], WithinAbs(a.right[i - 1] - loss, 2e-13 * 1600.0));
        REQUIRE_THAT(a.nextLeft[i], WithinAbs(a.left[i + 1] + loss, 2e-13 * 1600.0));
    }
}

TEST_CASE("Sweep: envelopes widen alike in every build", "[waves][invariant]") {
    std::mt19937_64 random(3);
    std::uniform_real_distribution<double> heads(0.0, 100.0);
    std::vector<double> value(777), low(777, 50.0), high(777, 50.0);
    for (double& v : value) {
        v = heads(random);
    }
    value[5] = std::nan(""); // must not enter an envelope
    for (const InstructionSet set : allSets) {
        if (available(set)) {
            auto l = low, h = high;
            sweepLoops(set).widen(value.data(), l.data(), h.data(), value.size());
            for (std::size_t i = 0; i < value.size(); ++i) {
                REQUIRE(l[i] == std::fmin(value[i], 50.0));
                REQUIRE(h[i] == std::fmax(value[i], 50.0));
            }
        }
    }
}

TEST_CASE("Sweep: tracked extremes keep their first instant in every build", "[waves][invariant]") {
    std::mt19937_64 random(9);
    std::uniform_int_distribution<int> heads(0, 40); // whole numbers, so that ties occur
    const std::size_t count = 101;
    std::vector<std::vector<double>> history(60, std::vector<double>(count));
    for (auto& instant : history) {
        for (double& v : instant) {
            v = heads(random);
        }
    }
    for (const InstructionSet set : allSets) {
        if (!available(set)) {
            continue;
        }
        std::vector<double> high(count, -1e300), highAt(count, -9.0), low(count, 1e300),
            lowAt(count, -9.0);
        for (std::size_t n = 0; n < history.size(); ++n) {
            const bool settled =
                sweepLoops(set).track(history[n].data(), high.data(), highAt.data(), low.data(),
                                      lowAt.data(), static_cast<double>(n), count);
            bool expected = false;
            for (std::size_t i = 0; i < count; ++i) {
                std::size_t top = 0, bottom = 0;
                for (std::size_t m = 1; m <= n; ++m) {
                    top = history[m][i] > history[top][i] ? m : top;
                    bottom = history[m][i] < history[bottom][i] ? m : bottom;
                }
                REQUIRE(high[i] == history[top][i]);
                REQUIRE(highAt[i] == static_cast<double>(top));
                REQUIRE(low[i] == history[bottom][i]);
                REQUIRE(lowAt[i] == static_cast<double>(bottom));
                expected = expected || top + 2 == n || bottom + 2 == n;
            }
            REQUIRE(settled == expected);
        }
    }
}
