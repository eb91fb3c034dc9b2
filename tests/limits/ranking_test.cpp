// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/judge.h"

#include "base/ensure.h"
#include "support/catch.h"

#include <algorithm>
#include <limits>
#include <random>

using namespace headroom;
using headroom::limits::mark;
using headroom::limits::worse;
using headroom::limits::worst;
using headroom::results::Mark;
using headroom::results::Verdict;

namespace {

Verdict verdict(Mark given, double share, bool atRest = false) {
    Verdict made;
    made.mark = given;
    made.share = share;
    made.alreadyBrokenAtRest = atRest;
    return made;
}

} // namespace

TEST_CASE("mark: the bound itself is allowed, and each threshold falls to its side",
          "[limits][limit]") {
    CHECK(mark(0.0, 0.0, 0.0) == Mark::held);
    CHECK(mark(-1e-12, 0.0, 0.0) == Mark::broken);
    CHECK(mark(-1.0, 1.0, 0.0) == Mark::undecided); // M + U = 0
    CHECK(mark(1.0, 1.0, 0.5) == Mark::tight);      // M − U = 0
    CHECK(mark(1.5, 1.0, 0.5) == Mark::held);       // M − U = R
    CHECK(mark(1.0, 1.5, 0.5) == Mark::undecided);
    CHECK(mark(-2.0, 1.5, 0.5) == Mark::broken);
}

TEST_CASE("mark: exactly one for any margin, uncertainty and reserve", "[limits][invariant]") {
    // The four conditions as the trade writes them, evaluated apart from the program's own order.
    std::mt19937_64 random(20240607);
    std::uniform_real_distribution<double> margin(-5.0, 5.0);
    std::uniform_real_distribution<double> positive(0.0, 3.0);
    for (int i = 0; i < 10000; ++i) {
        const double m = margin(random);
        const double u = i % 10 == 0 ? 0.0 : positive(random);
        const double r = i % 7 == 0 ? 0.0 : positive(random);
        const bool broken = m + u < 0.0;
        const bool undecided = m - u < 0.0 && 0.0 <= m + u;
        const bool tight = 0.0 <= m - u && m - u < r;
        const bool held = r <= m - u && 0.0 <= m - u;
        CAPTURE(m, u, r);
        REQUIRE(broken + undecided + tight + held == 1);
        const Mark expected = broken      ? Mark::broken
                              : undecided ? Mark::undecided
                              : tight     ? Mark::tight
                                          : Mark::held;
        REQUIRE(mark(m, u, r) == expected);
    }
}

TEST_CASE("mark: a smaller uncertainty never leads from held to broken or back",
          "[limits][invariant]") {
    std::mt19937_64 random(17);
    std::uniform_real_distribution<double> margin(-5.0, 5.0);
    std::uniform_real_distribution<double> positive(0.0, 3.0);
    std::uniform_real_distribution<double> share(0.0, 1.0);
    for (int i = 0; i < 10000; ++i) {
        const double m = margin(random);
        const double u = positive(random);
        const double r = positive(random);
        const double smaller = u * share(random);
        const Mark before = mark(m, u, r);
        const Mark after = mark(m, smaller, r);
        CAPTURE(m, u, smaller, r);
        if (before == Mark::held || before == Mark::tight) {
            REQUIRE((after == Mark::held || after == Mark::tight));
        }
        if (before == Mark::held) {
            REQUIRE(after == Mark::held);
        }
        if (before == Mark::broken) {
            REQUIRE(after == Mark::broken);
        }
    }
}

TEST_CASE("mark: what is not a number is a fault of ours, never held", "[limits][invariant]") {
    CHECK_THROWS_AS(mark(std::numeric_limits<double>::quiet_NaN(), 0.0, 0.0), Bug);
    CHECK_THROWS_AS(mark(1.0, std::numeric_limits<double>::quiet_NaN(), 0.0), Bug);
    CHECK_THROWS_AS(mark(1.0, -1.0, 0.0), Bug);
}

TEST_CASE("worse: broken at rest, broken, not valid, undecided, tight, held, then the rest",
          "[limits][invariant]") {
    std::vector<Verdict> order{
        verdict(Mark::broken, 0.5, true), verdict(Mark::broken, -0.4),
        verdict(Mark::broken, -0.1),      verdict(Mark::notValid, 0.9),
        verdict(Mark::undecided, -0.01),  verdict(Mark::undecided, 0.02),
        verdict(Mark::tight, 0.1),        verdict(Mark::held, 0.05),
        verdict(Mark::held, 0.7),         verdict(Mark::notRun, 0.0),
        verdict(Mark::notApplicable, 0.0)};
    const auto sameOrder = [&](const std::vector<Verdict>& sorted) {
        return std::equal(sorted.begin(), sorted.end(), order.begin(),
                          [](const Verdict& a, const Verdict& b) {
                              return a.mark == b.mark && a.share == b.share;
                          });
    };
    auto shuffled = order;
    std::mt19937 random(3);
    for (int i = 0; i < 20; ++i) {
        std::shuffle(shuffled.begin(), shuffled.end(), random);
        CHECK(worst(shuffled)->share == 0.5);
        std::sort(shuffled.begin(), shuffled.end(), worse);
        REQUIRE(sameOrder(shuffled));
    }
    CHECK(worst({}) == nullptr);
}
