// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/messages.h"
#include "numerics/table.h"
#include "support/catch.h"
#include "units/text.h"

#include <limits>

using namespace headroom;
using namespace headroom::numerics;

TEST_CASE("Table: values, slopes and integrals of straight pieces", "[table][analytic]") {
    const Table t = Table::make({0.0, 2.0, 3.0, 7.0}, {1.0, 5.0, 5.0, -3.0}, Outside::hold).value();
    CHECK_THAT(t.value(0.5), WithinAbs(2.0, 1e-15));
    CHECK(t.value(2.0) == 5.0);
    CHECK(t.value(-1.0) == 1.0);
    CHECK(t.value(9.0) == -3.0);
    CHECK(t.slope(1.0) == 2.0);
    CHECK(t.slope(2.0) == 0.0); // right-hand slope at a row
    CHECK(t.slope(6.0) == -2.0);
    CHECK(t.slope(-1.0) == 0.0);
    // Areas by trapezia: 6, 5, 4; held beyond the ends.
    CHECK_THAT(t.integral(0.0, 7.0), WithinAbs(15.0, 1e-12));
    CHECK_THAT(t.integral(7.0, 0.0), WithinAbs(-15.0, 1e-12));
    CHECK_THAT(t.integral(-1.0, 1.0), WithinAbs(1.0 + 2.0, 1e-12));
    CHECK_THAT(t.integral(7.0, 8.0), WithinAbs(-3.0, 1e-12));
    CHECK_FALSE(t.inverse(3.0));
}

TEST_CASE("Table: inverse of rising and falling tables", "[table][analytic]") {
    const Table up = Table::make({0.0, 1.0, 4.0}, {2.0, 3.0, 9.0}, Outside::refuse).value();
    const Table down = Table::make({0.0, 1.0, 4.0}, {9.0, 3.0, 2.0}, Outside::refuse).value();
    for (double x : {0.0, 0.3, 1.0, 2.5, 4.0}) {
        CHECK_THAT(up.inverse(up.value(x)).value(), WithinAbs(x, 1e-14));
        CHECK_THAT(down.inverse(down.value(x)).value(), WithinAbs(x, 1e-14));
    }
    CHECK_FALSE(up.inverse(1.9));
    CHECK_FALSE(up.inverse(std::numeric_limits<double>::quiet_NaN()));
}

TEST_CASE("Table: refuses to be asked outside, if told so", "[table][limit]") {
    const Table t = Table::make({0.0, 1.0}, {0.0, 1.0}, Outside::refuse).value();
    CHECK(t.covers(0.0));
    CHECK(t.covers(1.0));
    CHECK_FALSE(t.covers(1.0000001));
    CHECK_THROWS_AS(t.value(1.5), Bug);
    CHECK_THROWS_AS(t.integral(-0.5, 0.5), Bug);
}

TEST_CASE("Table: faulty tables are refused with their rows", "[table][messages]") {
    const auto said = [](const auto& result) {
        std::string all;
        for (const auto& finding : result.findings()) {
            all += text(finding);
        }
        return all;
    };
    const double nan = std::numeric_limits<double>::quiet_NaN();
    CHECK_THAT(said(Table::make({1.0}, {1.0}, Outside::hold)), ContainsSubstring("at least two"));
    CHECK_THAT(said(Table::make({0.0, 1.0, 1.0}, {0.0, 1.0, 2.0}, Outside::hold)),
               ContainsSubstring("row 3"));
    CHECK_THAT(said(Table::make({0.0, 1.0}, {0.0, nan}, Outside::hold)),
               ContainsSubstring("Row 2") && ContainsSubstring("finite"));
    CHECK_THAT(said(MonotoneCurve::make({0.0, 1.0, 2.0}, {0.0, 1.0, 1.0})),
               ContainsSubstring("row 3") && ContainsSubstring("second column"));
    CHECK(messages().size() == 4);
}

TEST_CASE("Monotone curve: through its rows, rising, with continuous slope", "[table][invariant]") {
    const MonotoneCurve c =
        MonotoneCurve::make({0.0, 0.1, 0.25, 0.5, 0.75, 1.0}, {0.0, 0.3, 0.31, 0.32, 0.9, 1.0})
            .value();
    for (std::size_t i = 0; i < c.x().size(); ++i) {
        CHECK(c.value(c.x()[i]) == c.y()[i]);
    }
    double before = -1.0;
    for (double x = 0.0005; x < 1.0; x += 0.001) {
        CHECK(c.value(x) > before);
        before = c.value(x);
        CHECK_THAT(c.slope(x), WithinAbs((c.value(x + 1e-7) - c.value(x - 1e-7)) / 2e-7, 1e-5));
        CHECK_THAT(c.inverse(c.value(x)), WithinAbs(x, 1e-9));
    }
    for (double x : {0.1, 0.25, 0.5, 0.75}) {
        CHECK_THAT(c.slope(x - 1e-10), WithinAbs(c.slope(x + 1e-10), 1e-7));
    }
    CHECK(c.value(-1.0) == 0.0);
    CHECK(c.value(2.0) == 1.0);
    CHECK(c.inverse(2.0) == 1.0);
}

TEST_CASE("Monotone curve: a straight line stays straight", "[table][limit]") {
    const MonotoneCurve c = MonotoneCurve::make({0.0, 0.1, 0.7, 1.0}, {0.0, 0.2, 1.4, 2.0}).value();
    for (double x : {0.03, 0.2, 0.69, 0.9}) {
        CHECK_THAT(c.value(x), WithinAbs(2.0 * x, 1e-14));
        CHECK_THAT(c.slope(x), WithinAbs(2.0, 1e-12));
    }
}
