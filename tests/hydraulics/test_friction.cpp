// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/friction.h"
#include "hydraulics/friction_factor.h"
#include "hydraulics/messages.h"
#include "hydraulics/sections.h"
#include "support/catch.h"
#include "units/text.h"

#include <array>
#include <cmath>
#include <limits>

using namespace headroom;
using namespace headroom::hydraulics;

namespace {

constexpr double g = 9.81;

Bore boreOf(const Section& section) {
    return {section.area_m2, section.hydraulicRadius_m()};
}
FrictionLaw colebrook(double diameter, double roughness, double viscosity) {
    return FrictionLaw::make(boreOf(circle(diameter)),
                             FrictionLaw::ColebrookWhite{roughness, viscosity, g})
        .value();
}
double relativeDifference(double a, double b) {
    return std::fabs(a / b - 1.0);
}

} // namespace

TEST_CASE("Friction law: the look-up agrees with the law to 2e-8", "[hydraulics][reference]") {
    // Tolerance asked of it: 1e-7 relative. Flows are stepped by an irrational ratio so that all
    // places between the samples are met.
    constexpr double diameter = 2.0, viscosity = 1.3e-6;
    const Bore bore = boreOf(circle(diameter));
    for (const double relative : {0.0, 1e-6, 1e-4, 1e-2, 5e-2}) {
        const FrictionLaw law = colebrook(diameter, relative * diameter, viscosity);
        double worst = 0.0;
        for (double reynolds = 1.0; reynolds < 1e9; reynolds *= 1.0013179) {
            const double flow = reynolds * bore.area_m2 * viscosity / diameter;
            const double velocity = flow / bore.area_m2;
            const double exact =
                darcyFactor(reynolds, relative) * velocity * velocity / (2.0 * g * diameter);
            worst = std::max(worst, relativeDifference(law.lossPerMetre(flow), exact));
        }
        CAPTURE(relative, worst);
        CHECK(worst < 2e-8);
    }
}

TEST_CASE("Friction law: the loss is odd, increasing, with its own derivative",
          "[hydraulics][invariant]") {
    const FrictionLaw law = colebrook(1.0, 1e-4, 1e-6);
    double last = 0.0;
    for (double flow = 1e-7; flow < 1e6; flow *= 1.0171) {
        const double loss = law.lossPerMetre(flow);
        REQUIRE(loss > last);
        REQUIRE(law.lossPerMetre(-flow) == -loss);
        last = loss;
        const double small = 1e-6 * flow;
        const double slope =
            (law.lossPerMetre(flow + small) - law.lossPerMetre(flow - small)) / (2.0 * small);
        CAPTURE(flow);
        // The slope jumps at both ends of the blend; a difference across them lies between.
        if (const double x = flow * law.perFlow_sm3();
            std::fabs(x - 1) > 1e-3 && std::fabs(x - 2) > 3e-3) {
            REQUIRE_THAT(law.slope_sm3(flow), WithinRel(slope, 1e-7));
        }
    }
    CHECK(law.lossPerMetre(0.0) == 0.0);
    CHECK(law.slope_sm3(0.0) == law.linear_sm3());
    CHECK(law.quadratic_s2m6(std::nan("")) == 0.0); // inside the table, never beyond it
    CHECK(law.quadratic_s2m6(std::numeric_limits<double>::infinity()) > 0.0);
}

TEST_CASE("Friction law: head loss in a D-shaped rock tunnel", "[hydraulics][reference]") {
    // Constructed case, recomputed: width 6 m, walls 4 m, roof r = 3 m; L 5000 m, Q 60 m³/s.
    const Section section = dShape(6.0, 7.0);
    CHECK_THAT(section.area_m2, WithinRel(38.137166941, 1e-9));
    CHECK_THAT(section.perimeter_m, WithinRel(23.424777961, 1e-9));
    CHECK_THAT(section.hydraulicRadius_m(), WithinRel(1.628069517, 1e-9));
    CHECK_THAT(section.hydraulicDiameter_m(), WithinRel(6.512278068, 1e-9));
    CHECK_THAT(section.hydraulicRadius_m() / std::sqrt(section.area_m2), WithinAbs(0.26363, 5e-6));
    struct Row {
        double strickler, loss, k, factor;
    };
    const std::array<Row, 5> rows{{{30, 7.179637986, 2.900660505, 0.074123998},
                                   {35, 5.274836071, 2.131097514, 0.054458448},
                                   {40, 4.038546367, 1.631621534, 0.041694749},
                                   {60, 1.794909496, 0.725165126, 0.018531000},
                                   {80, 1.009636592, 0.407905383, 0.010423687}}};
    for (const Row& row : rows) {
        const auto law = FrictionLaw::make(boreOf(section), FrictionLaw::Strickler{row.strickler});
        const double loss = 5000.0 * law->lossPerMetre(60.0);
        const double velocity = 60.0 / section.area_m2;
        CHECK_THAT(loss, WithinRel(row.loss, 1e-9));
        CHECK_THAT(loss / (velocity * velocity), WithinRel(row.k, 2e-9));
        CHECK_THAT(factorOfStrickler(row.strickler, section.hydraulicRadius_m(), g),
                   WithinRel(row.factor, 1e-7));
        // The same section with the equivalent Darcy factor has the same loss.
        const auto same = FrictionLaw::make(
            boreOf(section),
            FrictionLaw::DarcyFactor{
                factorOfStrickler(row.strickler, section.hydraulicRadius_m(), g), g});
        CHECK_THAT(same->lossPerMetre(60.0), WithinRel(law->lossPerMetre(60.0), 1e-13));
    }
}

TEST_CASE("Friction law: steel penstock", "[hydraulics][reference]") {
    // Constructed case, recomputed: D 2.5 m, L 600 m, k 0.1 mm, ν 1.307e-6 m²/s, Q 20 m³/s.
    const FrictionLaw law = colebrook(2.5, 1e-4, 1.307e-6);
    const Bore bore = boreOf(circle(2.5));
    CHECK_THAT(reynoldsNumber(bore, 20.0, 1.307e-6), WithinRel(7.793356e6, 1e-6));
    CHECK_THAT(darcyFactor(7.793356e6, 4e-5), WithinRel(0.010602832, 1e-7));
    CHECK_THAT(600.0 * law.lossPerMetre(20.0), WithinAbs(2.153051002, 1e-7));
}

TEST_CASE("Friction law: discharge for a given head", "[hydraulics][reference]") {
    // Constructed case, recomputed: L 1000 m, D 1 m, k 0.5 mm, ν 1e-6, ΣK 1.5, ΔH 20 m.
    const FrictionLaw law = colebrook(1.0, 5e-4, 1e-6);
    const double area = circle(1.0).area_m2;
    double flow = 1.0;
    for (int step = 0; step < 30; ++step) { // Newton on the laws' own slopes
        const double excess =
            1000.0 * law.lossPerMetre(flow) + 1.5 * flow * flow / (2 * g * area * area) - 20.0;
        flow -= excess / (1000.0 * law.slope_sm3(flow) + 3.0 * flow / (2 * g * area * area));
    }
    CHECK_THAT(flow, WithinRel(3.635504601, 1e-8));
    CHECK_THAT(flow / area, WithinRel(4.628868223, 1e-8));
    CHECK_THAT(darcyFactor(flow / area * 1e6, 5e-4), WithinRel(0.016813838, 1e-7));
}

TEST_CASE("Friction law: linear law is −R V in the momentum equation", "[hydraulics][analytic]") {
    // dV/dt = −R V means a loss of R V/g per metre; derived here.
    const auto law = FrictionLaw::make({4.0, 0.5}, FrictionLaw::Linear{0.2, g});
    CHECK_THAT(law->lossPerMetre(8.0), WithinRel(0.2 * 2.0 / g, 1e-14));
    CHECK_THAT(law->lossPerMetre(-8.0), WithinRel(-0.2 * 2.0 / g, 1e-14));
    CHECK(law->quadratic_s2m6(8.0) == 0.0);
    CHECK_FALSE(law->variable());
}

TEST_CASE("Friction law: bad input is refused with all its faults", "[hydraulics][messages]") {
    const double nan = std::nan("");
    const auto both = FrictionLaw::make({0.0, -1.0}, FrictionLaw::Strickler{0.0}, "plant/x");
    REQUIRE_FALSE(both);
    REQUIRE(both.findings().size() == 2);
    CHECK(both.findings()[0].message == &boreNotPositive);
    CHECK(both.findings()[1].message == &stricklerNotPositive);
    CHECK(both.findings()[1].subject == "plant/x");
    CHECK_THAT(text(both.findings()[0]), ContainsSubstring("above zero"));
    CHECK_FALSE(FrictionLaw::make({nan, 1.0}, FrictionLaw::Strickler{30.0}));
    CHECK_FALSE(FrictionLaw::make({1.0, 1.0}, FrictionLaw::Strickler{nan}));
    CHECK_FALSE(FrictionLaw::make({1.0, 1.0}, FrictionLaw::DarcyFactor{-0.01, g}));
    CHECK_FALSE(FrictionLaw::make({1.0, 1.0}, FrictionLaw::Linear{nan, g}));
    CHECK_FALSE(FrictionLaw::make({1.0, 0.25}, FrictionLaw::ColebrookWhite{-1e-4, 1e-6, g}));
    const auto huge = FrictionLaw::make({1.0, 0.25}, FrictionLaw::ColebrookWhite{1.0, 1e-6, g});
    REQUIRE_FALSE(huge);
    CHECK_THAT(text(huge.findings()[0]), ContainsSubstring("1000") && ContainsSubstring("1."));
    const auto rough = FrictionLaw::make({1.0, 0.25}, FrictionLaw::ColebrookWhite{0.1, 1e-6, g});
    REQUIRE(rough);
    REQUIRE(rough.findings().size() == 1);
    CHECK(rough.findings()[0].severity() == Severity::warning);
}
