// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/quantity.h"

#include "support/catch.h"

#include <set>
#include <string>

using namespace headroom;

TEST_CASE("Quantity: there and back again for every row", "[units][invariant]") {
    for (const auto& row : quantities()) {
        CAPTURE(row.name);
        CHECK_FALSE(row.name.empty());
        for (const double value : {-3.25, 0.0, 1.0, 486.0}) {
            CHECK_THAT(fromSi(row.quantity, toSi(row.quantity, value)), WithinAbs(value, 1e-12 * 486));
        }
        CHECK(info(row.quantity).name == row.name);
    }
}

TEST_CASE("Quantity: values in SI", "[units][analytic]") {
    // Definitions of the SI and its prefixes; one revolution is 2 pi rad.
    CHECK_THAT(toSi(Quantity::rotation, 333.333333), WithinAbs(34.906585, 1e-6));
    CHECK(toSi(Quantity::power, 121.5) == 121.5e6);
    CHECK(toSi(Quantity::energy, 45) == 45e9);
    CHECK(toSi(Quantity::inertia, 700) == 700e3);
    CHECK_THAT(toSi(Quantity::roughness, 0.1), WithinAbs(1e-4, 1e-18));
    CHECK_THAT(toSi(Quantity::percent, 6), WithinAbs(0.06, 1e-16));
    CHECK_THAT(toSi(Quantity::pressureRate, 10), WithinAbs(10.0 / 60.0, 1e-15));
}

TEST_CASE("Quantity: one unit symbol for one key suffix", "[units][invariant]") {
    std::set<std::pair<std::string, std::string>> seen;
    for (const auto& row : quantities()) {
        for (const auto& [suffix, symbol] : seen) {
            if (suffix == row.suffix && !suffix.empty()) {
                CHECK(symbol == row.symbol);
            }
        }
        seen.emplace(row.suffix, row.symbol);
    }
}

TEST_CASE("Quantity: a printed number keeps its unit, its sign and its zero", "[units][messages]") {
    CHECK(print(Quantity::elevation, 456.13) == "456.1\u2009m");
    CHECK(print(Quantity::head, -1.87) == "−1.9\u2009m");
    CHECK(print(Quantity::head, -0.01) == "0.0\u2009m");
    CHECK(print(Quantity::power, 107e6) == "107.0\u2009MW");
    CHECK(print(Quantity::factor, 0.25) == "0.250");
    CHECK(print(Quantity::head, -1.87, {.decimalSign = ',', .trueMinus = false}) == "-1,9\u2009m");
    CHECK(printNumber(Quantity::speedRatio, 1.4768, {}, 2) == "1.48");
}
