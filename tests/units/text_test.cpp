// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/text.h"

#include "base/ensure.h"

#include "support/catch.h"

using namespace headroom;

namespace {

constexpr Message level{"test.level", Severity::warning,
                        "The level fell to {level}, below the floor at {floor}.",
                        "Enlarge the shaft or slow the {count} orders of {who}."};

Finding emptied() {
    Finding finding;
    finding.message = &level;
    finding.subject = "plant/chambers/Surge shaft";
    finding.time_s = 84.2;
    finding.arguments = {{"level", amount(Quantity::elevation, 379.6)},
                         {"floor", amount(Quantity::elevation, 380.0)},
                         {"count", std::int64_t{2}},
                         {"who", std::string("U1")}};
    return finding;
}

} // namespace

TEST_CASE("text: where, when, what, and what to do", "[units][messages]") {
    CHECK(text(emptied()) == "plant/chambers/Surge shaft at t = 84.2\u2009s: The level fell to "
                             "379.6\u2009m, below the floor at 380.0\u2009m. Enlarge the shaft or "
                             "slow the 2 orders of U1.");
}

TEST_CASE("text: another style prints the same numbers otherwise", "[units][messages]") {
    CHECK_THAT(text(emptied(), {.decimalSign = ','}), ContainsSubstring("379,6\u2009m"));
    CHECK(whatText(emptied()) == "The level fell to 379.6\u2009m, below the floor at 380.0\u2009m.");
    CHECK(mendText(emptied()) == "Enlarge the shaft or slow the 2 orders of U1.");
}

TEST_CASE("text: a template that asks for a missing argument is a fault of ours", "[units][messages]") {
    auto finding = emptied();
    finding.arguments.pop_back();
    CHECK_THROWS_AS(text(finding), Bug);
}

TEST_CASE("text: an amount that is not zero does not read as zero", "[units][messages]") {
    using headroom::Quantity;
    static constexpr headroom::Message step{"test.step", headroom::Severity::note, "Step: {step}.", ""};
    const auto said = [&](double si) {
        return headroom::whatText({.message = &step, .arguments = {{"step", headroom::amount(Quantity::time, si)}}});
    };
    CHECK(said(0.01) == "Step: 0.010\u2009s.");
    CHECK(said(-0.0025) == "Step: −0.0025\u2009s.");
    CHECK(said(0.0) == "Step: 0.0\u2009s.");
    CHECK(said(12.0) == "Step: 12.0\u2009s.");
    CHECK(said(1e-13) == "Step: 0.0\u2009s."); // rounding noise stays silent
}
