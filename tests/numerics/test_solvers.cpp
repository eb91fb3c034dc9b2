// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/elementary.h"
#include "numerics/least_squares.h"
#include "numerics/roots.h"
#include "numerics/time_grid.h"
#include "support/catch.h"

#include <cmath>
#include <limits>

using namespace headroom::numerics;

TEST_CASE("Bracketed Newton: roots to the last digits, few evaluations", "[roots][analytic]") {
    int count = 0;
    const auto cubic = [&](double x) {
        ++count;
        return ValueAndSlope{x * x * x - 2.0, 3.0 * x * x};
    };
    const auto root = bracketedNewton(cubic, 0.0, 2.0, 1.0);
    REQUIRE(root);
    CHECK_THAT(*root, WithinAbs(std::cbrt(2.0), 1e-15));
    CHECK(count < 15);
}

TEST_CASE("Bracketed Newton: bisects where Newton fails", "[roots][limit]") {
    // Newton runs away on atan from 2, has no slope on the sign function, and misleads on x^(1/3).
    const auto arctan = [](double x) { return ValueAndSlope{std::atan(x), 1.0 / (1.0 + x * x)}; };
    CHECK_THAT(bracketedNewton(arctan, -10.0, 50.0, 40.0).value(), WithinAbs(0.0, 1e-13));
    const auto jump = [](double x) { return ValueAndSlope{x < 0.3 ? -1.0 : 1.0, 0.0}; };
    CHECK_THAT(bracketedNewton(jump, -1.0, 1.0, 0.0).value(), WithinAbs(0.3, 1e-13));
    const auto flat = [](double x) {
        return ValueAndSlope{std::cbrt(x - 0.1), 1.0 / (3.0 * std::pow(std::cbrt(x - 0.1), 2))};
    };
    CHECK_THAT(bracketedNewton(flat, -1.0, 1.0, 0.9).value(), WithinAbs(0.1, 1e-13));
    const auto falling = [](double x) { return ValueAndSlope{1.0 - x, -1.0}; };
    CHECK_THAT(bracketedNewton(falling, 0.0, 3.0, 0.5).value(), WithinAbs(1.0, 1e-14));
}

TEST_CASE("Bracketed Newton: no bracket, no root", "[roots][limit]") {
    const auto square = [](double x) { return ValueAndSlope{x * x + 1.0, 2.0 * x}; };
    CHECK_FALSE(bracketedNewton(square, -1.0, 1.0, 0.0));
    const double nan = std::numeric_limits<double>::quiet_NaN();
    CHECK_FALSE(bracketedNewton([=](double) { return ValueAndSlope{nan, nan}; }, 0.0, 1.0, 0.5));
    const auto line = [](double x) { return ValueAndSlope{x, 1.0}; };
    CHECK(bracketedNewton(line, 0.0, 1.0, 0.5).value() == 0.0);
}

TEST_CASE("Least squares: an exponential is found again", "[leastSquares][analytic]") {
    // Data made from a·e^(−b t) without noise: the sum of squares is 0 at the true a, b.
    LeastSquaresProblem problem;
    problem.residualCount = 8;
    problem.start = {1.0, 0.1};
    problem.lower = {0.0, 0.0};
    problem.upper = {10.0, 5.0};
    problem.residuals = [](std::span<const double> x, std::span<double> r) {
        for (std::size_t i = 0; i < r.size(); ++i) {
            const double t = 0.3 * static_cast<double>(i);
            r[i] = x[0] * std::exp(-x[1] * t) - 2.5 * std::exp(-1.3 * t);
        }
        return true;
    };
    const auto fit = fitBounded(problem);
    CHECK(fit.converged);
    CHECK_THAT(fit.unknowns[0], WithinAbs(2.5, 1e-8));
    CHECK_THAT(fit.unknowns[1], WithinAbs(1.3, 1e-8));
    CHECK(fit.sumOfSquares < 1e-16);
}

TEST_CASE("Least squares: stays at a wall and minimises along it", "[leastSquares][limit]") {
    // (x − 3)² + (x + y − 1)² + (y − 2)² with x ≤ 1: at x = 1 the best y is 1 (derived here).
    LeastSquaresProblem problem;
    problem.residualCount = 3;
    problem.start = {0.0, 0.0};
    problem.lower = {-5.0, -5.0};
    problem.upper = {1.0, 5.0};
    problem.residuals = [](std::span<const double> x, std::span<double> r) {
        r[0] = x[0] - 3.0;
        r[1] = x[0] + x[1] - 1.0;
        r[2] = x[1] - 2.0;
        return true;
    };
    const auto fit = fitBounded(problem);
    CHECK(fit.unknowns[0] == 1.0);
    CHECK_THAT(fit.unknowns[1], WithinAbs(1.0, 1e-7)); // a sum flat to 1e-14 leaves 1e-7
    CHECK_THAT(fit.sumOfSquares, WithinAbs(6.0, 1e-9));
}

TEST_CASE("Least squares: residuals that cannot be formed", "[leastSquares][limit]") {
    LeastSquaresProblem problem;
    problem.residualCount = 1;
    problem.start = {0.5};
    problem.lower = {0.0};
    problem.upper = {4.0};
    problem.residuals = [](std::span<const double>, std::span<double>) { return false; };
    CHECK_FALSE(fitBounded(problem).converged);
    // A hole right of 1.2 is stepped around: the minimum at 1 is found from the left.
    problem.residuals = [](std::span<const double> x, std::span<double> r) {
        r[0] = x[0] * x[0] - 1.0;
        return x[0] < 1.2;
    };
    CHECK_THAT(fitBounded(problem).unknowns[0], WithinAbs(1.0, 1e-7));
}

TEST_CASE("Counted time: no drift, and each instant in its own step", "[timeGrid][invariant]") {
    const TimeGrid grid = TimeGrid::over(0.0, 36000.0, 0.01);
    CHECK(grid.steps == 3600000);
    CHECK(grid.at(grid.steps) == 36000.0);
    CHECK(grid.at(1234567) == 1234567 * 0.01);
    CHECK(TimeGrid::over(0.0, 1.005, 0.01).steps == 101);
    CHECK(TimeGrid::over(5.0, 0.0, 0.01).steps == 0);
    CHECK(grid.stepOf(0.0) == -1);
    CHECK(grid.stepOf(1e-12) == 0);
    for (std::int64_t n : {0, 7, 29, 1000, 3599999}) {
        CHECK(grid.stepOf(grid.at(n + 1)) == n); // the end belongs to the step
        CHECK(grid.stepOf(std::nextafter(grid.at(n + 1), 1e9)) == n + 1);
    }
    CHECK_THAT(grid.fraction(100, 1.0025), WithinAbs(0.25, 1e-12));
}

TEST_CASE("Elementary functions: odd squares and roots", "[elementary][analytic]") {
    for (double x : {-3.0, -0.1, 0.0, 1e-200, 2.5}) {
        CHECK_THAT(signedRoot(signedSquare(x)), WithinRel(x, 1e-15) || WithinAbs(x, 1e-199));
    }
    CHECK(square(-3.0) == 9.0);
    CHECK_THAT(headroom::numerics::tanh(artanh(0.7)), WithinAbs(0.7, 1e-15));
}
