// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/branch.h"
#include "support/catch.h"

#include <array>
#include <cmath>
#include <limits>

using namespace headroom::hydraulics;

namespace {

// The root of bQ + rQ² = w, w > 0, by bisection in extended precision.
long double bisected(double b, double r, double w) {
    long double low = 0.0L, high = 1.0L;
    const auto above = [&](long double q) {
        return static_cast<long double>(b) * q + static_cast<long double>(r) * q * q
               > static_cast<long double>(w);
    };
    while (!above(high)) {
        high *= 2.0L;
    }
    for (int i = 0; i < 2000 && low < high; ++i) {
        const long double middle = 0.5L * (low + high);
        if (middle == low || middle == high) {
            break;
        }
        (above(middle) ? high : low) = middle;
    }
    return 0.5L * (low + high);
}

} // namespace

TEST_CASE("Branch: flow to the last digits over all sizes of its constants",
          "[hydraulics][reference]") {
    const std::array sizes{1e-200, 1e-160, 1e-30, 1e-9, 1e-3, 1.0, 47.0, 1e6, 1e150};
    for (const double b : sizes) {
        for (const double r : sizes) {
            for (const double w : {1e-100, 1e-12, 3.7, 1e5}) {
                const long double expected = bisected(b, r, w);
                if (expected > 1e290L || expected < 1e-290L) {
                    continue;
                }
                CAPTURE(b, r, w);
                const auto flow = solveBranch(b, r, w);
                REQUIRE_THAT(flow.flow_m3s, WithinRel(static_cast<double>(expected), 4e-16));
                REQUIRE(solveBranch(b, r, -w).flow_m3s == -flow.flow_m3s);
                const long double slope = 1.0L / (b + 2.0L * r * expected);
                if (slope < 1e290L && slope > 1e-290L) {
                    REQUIRE_THAT(flow.slope_m2s, WithinRel(static_cast<double>(slope), 1e-15));
                }
            }
        }
    }
}

TEST_CASE("Branch: the limits of a pure resistance and a pure inertia", "[hydraulics][limit]") {
    CHECK(solveBranch(2.0, 0.0, 3.0).flow_m3s == 1.5);
    CHECK(solveBranch(2.0, 0.0, 3.0).slope_m2s == 0.5);
    CHECK_THAT(solveBranch(0.0, 4.0, 9.0).flow_m3s, WithinRel(1.5, 1e-15));
    CHECK_THAT(solveBranch(0.0, 4.0, -9.0).flow_m3s, WithinRel(-1.5, 1e-15));
    CHECK(solveBranch(0.0, 4.0, 0.0).flow_m3s == 0.0);
    CHECK(std::isinf(solveBranch(0.0, 4.0, 0.0).slope_m2s));
    CHECK(solveBranch(2.0, 4.0, 0.0).flow_m3s == 0.0);
    CHECK(solveBranch(2.0, 4.0, 0.0).slope_m2s == 0.5);
    CHECK(std::isnan(solveBranch(2.0, 4.0, std::nan("")).flow_m3s));
}

TEST_CASE("Branch: a gained velocity head keeps the law increasing", "[hydraulics][invariant]") {
    // Arriving straight through: r = −1/(2gA²), b = a/(gA). Below V = a/2 the law is exact.
    const double b = 1200.0 / (9.81 * 12.0), r = -1.0 / (2 * 9.81 * 144.0);
    double last = -std::numeric_limits<double>::infinity();
    for (double w = -4.0 * b * b / std::fabs(r); w < 4.0 * b * b / std::fabs(r); w += b * 37.0) {
        const auto flow = solveBranch(b, r, w);
        REQUIRE(flow.flow_m3s > last);
        last = flow.flow_m3s;
        const double q = flow.flow_m3s;
        if (lawHolds({b, r}, w)) {
            REQUIRE_THAT(b * q + r * q * std::fabs(q), WithinAbs(w, 1e-9 * std::fabs(w) + 1e-12));
        } else {
            REQUIRE(std::fabs(q) / 12.0 >= 0.4999 * 1200.0);
        }
        const double small = 1e-3 * b;
        const double slope =
            (solveBranch(b, r, w + small).flow_m3s - solveBranch(b, r, w - small).flow_m3s)
            / (2 * small);
        REQUIRE_THAT(flow.slope_m2s, WithinRel(slope, 1e-5));
    }
    CHECK(lawHolds({b, r}, 5.0 * b * 12.0)); // 5 m/s
    CHECK(lawHolds({b, 3.0}, 1e9));
}
