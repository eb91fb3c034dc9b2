// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "base/constants.h"
#include "units/expression.h"
#include "units/text.h"

using headroom::Quantity;
using headroom::expression::entered;
using headroom::expression::evaluate;

namespace {

double valueOf(std::string_view text, Quantity quantity) {
    const auto result = evaluate(text, quantity);
    INFO(text);
    REQUIRE(result);
    return *result;
}

std::string codeOf(std::string_view text, Quantity quantity) {
    const auto result = evaluate(text, quantity);
    INFO(text);
    REQUIRE_FALSE(result);
    return std::string(result.findings().front().message->code);
}

} // namespace

// Expected values are worked out by hand from exact unit definitions; tolerance: rounding of a
// few operations on doubles.
constexpr double few = 1e-14;

TEST_CASE("expression: arithmetic in the quantity's own unit", "[units][analytic]") {
    CHECK_THAT(valueOf("10", Quantity::diameter), WithinRel(10.0, few));
    CHECK_THAT(valueOf("8*1.25", Quantity::diameter), WithinRel(10.0, few));
    CHECK_THAT(valueOf("3,9 * 1,05", Quantity::diameter), WithinRel(4.095, few));
    CHECK_THAT(valueOf("2 + 3 * 4 - 6 / 2", Quantity::length), WithinRel(11.0, few));
    CHECK_THAT(valueOf("(2 + 3) × (4 − 6) ÷ 2", Quantity::length), WithinRel(-5.0, few));
    CHECK_THAT(valueOf("--3", Quantity::length), WithinRel(3.0, few));
    CHECK_THAT(valueOf("5 000", Quantity::length), WithinRel(5000.0, few));
    CHECK_THAT(valueOf("1.5e3", Quantity::length), WithinRel(1500.0, few));
    CHECK_THAT(valueOf("10 / 4 / 5", Quantity::length), WithinRel(0.5, few));
    CHECK_THAT(valueOf("28", Quantity::thickness), WithinRel(0.028, few));
    CHECK_THAT(valueOf("120", Quantity::power), WithinRel(120e6, few));
    CHECK_THAT(valueOf("6", Quantity::percent), WithinRel(0.06, few));
}

TEST_CASE("expression: unit words convert", "[units][analytic]") {
    CHECK_THAT(valueOf("12 ft", Quantity::diameter), WithinRel(3.6576, few));
    CHECK_THAT(valueOf("12ft", Quantity::diameter), WithinRel(3.6576, few));
    CHECK_THAT(valueOf("(1 + 2) ft", Quantity::diameter), WithinRel(0.9144, few));
    CHECK_THAT(valueOf("8 + 2 ft", Quantity::diameter), WithinRel(8.6096, few));
    CHECK_THAT(valueOf("2 * 3.1 km", Quantity::length), WithinRel(6200.0, few));
    CHECK_THAT(valueOf("60 m³/s / 2", Quantity::discharge), WithinRel(30.0, few));
    CHECK_THAT(valueOf("500 l/s", Quantity::discharge), WithinRel(0.5, few));
    CHECK_THAT(valueOf("10 m / 2 m", Quantity::length), WithinRel(5.0, few));
    CHECK_THAT(valueOf("28 mm", Quantity::thickness), WithinRel(0.028, few));
    CHECK_THAT(valueOf("333.33 rpm", Quantity::rotation),
               WithinRel(333.33 * headroom::constants::pi / 30, few));
    CHECK_THAT(valueOf("6 %", Quantity::percent), WithinRel(0.06, few));
    CHECK_THAT(valueOf("1 bar", Quantity::pressure), WithinRel(1e5, few));
    CHECK_THAT(valueOf("0.33 1/s", Quantity::rate), WithinRel(0.33, few));
    CHECK_THAT(valueOf("5 min", Quantity::time), WithinRel(300.0, few));
}

TEST_CASE("expression: what a quantity prints it also reads", "[units][invariant]") {
    for (const auto& row : headroom::quantities()) {
        if (row.symbol.empty() || row.quantity == Quantity::strickler) {
            continue; // without a unit that can be typed
        }
        INFO(row.name);
        const double si = headroom::toSi(row.quantity, 12.0);
        CHECK_THAT(valueOf(headroom::print(row.quantity, si), row.quantity), WithinRel(si, 1e-12));
        CHECK(headroom::expression::unitWords(row.quantity).front().word == row.symbol);
    }
}

TEST_CASE("expression: an entry may change the value there", "[units][analytic]") {
    CHECK_THAT(*entered("=3.9*1.05", Quantity::diameter, 8.0), WithinRel(4.095, few));
    CHECK_THAT(*entered(" += 2", Quantity::diameter, 8.0), WithinRel(10.0, few));
    CHECK_THAT(*entered("-=1 ft", Quantity::diameter, 8.0), WithinRel(7.6952, few));
    CHECK_THAT(*entered("*=1.25", Quantity::diameter, 8.0), WithinRel(10.0, few));
    CHECK_THAT(*entered("/=2", Quantity::power, 8e6), WithinRel(4e6, few));
    CHECK_THAT(*entered("-6", Quantity::head, 8.0), WithinRel(-6.0, few));
    CHECK_FALSE(entered("*=2 m", Quantity::diameter, 8.0));
    CHECK_FALSE(entered("/=0", Quantity::diameter, 8.0));
}

TEST_CASE("expression: what cannot be read says so", "[units][messages]") {
    CHECK(codeOf("", Quantity::length) == "units.nothing-typed");
    CHECK(codeOf("  ", Quantity::length) == "units.nothing-typed");
    CHECK(codeOf("8 *", Quantity::length) == "units.nothing-typed");
    CHECK(codeOf("8 MW", Quantity::length) == "units.not-understood");
    CHECK(codeOf("8 mx", Quantity::length) == "units.not-understood");
    CHECK(codeOf("1.2.3", Quantity::length) == "units.not-understood");
    CHECK(codeOf("nan", Quantity::length) == "units.not-understood");
    CHECK(codeOf("inf", Quantity::length) == "units.not-understood");
    CHECK(codeOf("(8", Quantity::length) == "units.open-parenthesis");
    CHECK(codeOf("8)", Quantity::length) == "units.not-understood");
    CHECK(codeOf("8 m * 2 m", Quantity::length) == "units.wrong-units");
    CHECK(codeOf("8 / 2 m", Quantity::length) == "units.wrong-units");
    CHECK(codeOf("(8 m) m", Quantity::length) == "units.wrong-units");
    CHECK(codeOf("1/0", Quantity::length) == "units.not-finite");
    CHECK(codeOf("1e999", Quantity::length) == "units.not-finite");
    CHECK(codeOf(std::string(100000, '('), Quantity::length) == "units.too-deep");
    CHECK(codeOf(std::string(100000, '-'), Quantity::length) == "units.too-deep");
    CHECK(codeOf("12 345 67", Quantity::length) == "units.not-understood");
}

TEST_CASE("expression: every message renders", "[units][messages]") {
    for (const auto* message : headroom::expression::messages()) {
        const headroom::Finding finding{.message = message,
                                        .arguments = {{"part", std::string("8 x")},
                                                      {"units", std::string("m, ft")},
                                                      {"quantity", std::string("length")},
                                                      {"most", std::int64_t{50}}}};
        CHECK_FALSE(headroom::whatText(finding).empty());
        CHECK_FALSE(headroom::mendText(finding).empty());
    }
}
