// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/messages.h"
#include "support/catch.h"
#include "units/text.h"

#include <limits>

#include "plant_a.h"

using namespace headroom;
using namespace headroom::machines;
using headroom::tests::plantA;

namespace {

std::string refusal(const FrancisRating& rating) {
    const auto chart = FrancisChart::calibrate(rating, "plant/units/Unit 1/turbine");
    REQUIRE_FALSE(chart);
    std::string all;
    for (const auto& finding : chart.findings()) {
        CHECK(finding.subject == "plant/units/Unit 1/turbine");
        all += text(finding) + "\n";
    }
    return all;
}

} // namespace

TEST_CASE("Francis rating: all missing values are named at once", "[chart][messages]") {
    FrancisRating r = plantA();
    r.ratedHead_m = 0.0;
    r.ratedFlow_m3s = -60.0;
    r.ratedSpeed_rads = std::numeric_limits<double>::quiet_NaN();
    const std::string said = refusal(r);
    CHECK_THAT(said, ContainsSubstring("rated head") && ContainsSubstring("rated flow")
                         && ContainsSubstring("rated speed") && ContainsSubstring("above zero"));
}

TEST_CASE("Francis rating: an impossible efficiency is refused", "[chart][messages]") {
    FrancisRating r = plantA();
    r.ratedPower_W = 140e6;
    CHECK_THAT(refusal(r), ContainsSubstring("efficiency of 1.07")
                               && ContainsSubstring("Check rated head, flow and shaft power"));
    r.ratedPower_W = 40e6;
    CHECK_THAT(refusal(r), ContainsSubstring("efficiency of 0.306"));
}

TEST_CASE("Francis rating: speed or diameter of another kind of machine", "[chart][messages]") {
    FrancisRating r = plantA();
    r.runnerDiameter_m = 8.0;
    CHECK_THAT(refusal(r),
               ContainsSubstring("Squared rim speed") && ContainsSubstring("runner diameter"));
}

TEST_CASE("Francis rating: targets out of range", "[chart][messages]") {
    FrancisRating r = plantA();
    r.runaway_pu = 0.9;
    r.noLoadFlow_pu = 0.6;
    r.bestEfficiency_pu = 0.90; // below the rated efficiency
    const std::string said = refusal(r);
    CHECK_THAT(said, ContainsSubstring("runaway speed") && ContainsSubstring("no-load flow")
                         && ContainsSubstring("best efficiency"));
}

TEST_CASE("Francis rating: data that no chart meets name the residual", "[chart][messages]") {
    FrancisRating r = plantA();
    r.runaway_pu = 1.3; // far below what the standstill flow allows
    const std::string said = refusal(r);
    CHECK_THAT(said, ContainsSubstring("standstill flow comes out at 1.31")
                         && ContainsSubstring("where 1.150")
                         && ContainsSubstring("Move the standstill flow"));
}

TEST_CASE("Francis rating: flow over stroke must rise from nothing to full", "[chart][messages]") {
    FrancisRating r = plantA();
    r.flowByStroke = {{0.0, 0.0}, {0.5, 0.6}, {0.4, 0.7}, {1.0, 1.0}};
    CHECK_THAT(refusal(r), ContainsSubstring("Row 3") && ContainsSubstring("0.400"));
    r.flowByStroke = {{0.0, 0.0}, {0.5, 0.6}};
    CHECK_THAT(refusal(r), ContainsSubstring("full stroke of 1"));
    r.flowByStroke = {{0.0, 0.1}, {1.0, 1.0}};
    CHECK_THAT(refusal(r), ContainsSubstring("from (0, 0)"));
    r.flowByStroke = {{0.0, 0.0}, {1.0, 3.0}};
    CHECK_THAT(refusal(r), ContainsSubstring("beyond what"));
    // A table that begins above zero is completed to (0, 0).
    r.flowByStroke = {{0.2, 0.25}, {1.0, 1.0}};
    CHECK(FrancisChart::calibrate(r));
}

TEST_CASE("Francis rating: low specific speed is refused, not bent", "[chart][messages]") {
    // n_s about 66 in kW: with the usual runaway speed the form would turn back.
    FrancisRating r;
    r.ratedHead_m = 400.0;
    r.ratedFlow_m3s = 40.0;
    r.ratedPower_W = 0.92 * 9810.0 * 400.0 * 40.0;
    r.ratedSpeed_rads = 310.0 * constants::pi / 30.0;
    r.runnerDiameter_m = 4.0;
    CHECK_THAT(refusal(r),
               ContainsSubstring("falls with rising flow") && ContainsSubstring("runaway speed"));
}
