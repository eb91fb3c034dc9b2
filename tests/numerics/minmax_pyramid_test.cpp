// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "numerics/minmax_pyramid.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <random>
#include <vector>

using headroom::numerics::MinMaxPyramid;

namespace {

MinMaxPyramid::Extent walked(const std::vector<float>& low, const std::vector<float>& high,
                             std::size_t first, std::size_t last) {
    MinMaxPyramid::Extent extent{std::numeric_limits<float>::infinity(),
                                 -std::numeric_limits<float>::infinity()};
    for (std::size_t i = first; i < std::min(last, low.size()); ++i) {
        extent.low = std::isnan(low[i]) ? extent.low : std::min(extent.low, low[i]);
        extent.high = std::isnan(high[i]) ? extent.high : std::max(extent.high, high[i]);
    }
    return extent;
}

} // namespace

TEST_CASE("MinMaxPyramid: every stretch equals a walk over it", "[numerics][invariant]") {
    std::mt19937 random(7);
    std::normal_distribution<float> values(0.0F, 1.0F);
    for (const std::size_t size : {0U, 1U, 3U, 4U, 5U, 16U, 17U, 63U, 257U}) {
        std::vector<float> low(size), high(size);
        for (std::size_t i = 0; i < size; ++i) {
            low[i] = values(random);
            high[i] = low[i] + std::abs(values(random));
        }
        const MinMaxPyramid pyramid(low, high);
        REQUIRE(pyramid.size() == size);
        for (std::size_t first = 0; first <= size; ++first) {
            for (std::size_t last = first; last <= size + 2; ++last) {
                CAPTURE(size, first, last);
                const auto fast = pyramid.over(first, last);
                const auto slow = walked(low, high, first, last);
                REQUIRE(fast.low == slow.low);
                REQUIRE(fast.high == slow.high);
            }
        }
    }
}

TEST_CASE("MinMaxPyramid: a single peak is found in any stretch around it",
          "[numerics][invariant]") {
    std::vector<float> trace(100000, 1.0F);
    trace[70001] = 9.0F;
    const MinMaxPyramid pyramid(trace, trace);
    CHECK(pyramid.over(0, 100000).high == 9.0F);
    CHECK(pyramid.over(70001, 70002).high == 9.0F);
    CHECK(pyramid.over(70002, 100000).high == 1.0F);
    CHECK(pyramid.over(0, 70001).high == 1.0F);
}

TEST_CASE("MinMaxPyramid: nothing to look at is empty, NaN is passed over", "[numerics][limit]") {
    const float nan = std::numeric_limits<float>::quiet_NaN();
    const std::vector<float> trace{nan, nan, 3.0F, nan, nan, nan};
    const MinMaxPyramid pyramid(trace, trace);
    CHECK(pyramid.over(0, 2).empty());
    CHECK(pyramid.over(3, 3).empty());
    CHECK(pyramid.over(9, 12).empty());
    CHECK(pyramid.over(0, 6).low == 3.0F);
    CHECK(pyramid.over(0, 6).high == 3.0F);
    CHECK(MinMaxPyramid().over(0, 5).empty());
}
