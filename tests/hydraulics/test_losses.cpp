// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "base/ensure.h"
#include "hydraulics/losses.h"
#include "hydraulics/sections.h"
#include "support/catch.h"

#include <limits>

using namespace headroom::hydraulics;

namespace {
constexpr double g = 9.81;
}

TEST_CASE("Local losses: sudden widening", "[hydraulics][analytic]") {
    // Source: Borda–Carnot, from memory; numbers recomputed. D 1 → 2 m, Q = 4 m³/s.
    const double before = circle(1.0).area_m2;
    const double coefficient = wideningCoefficient(before, circle(2.0).area_m2);
    CHECK_THAT(4.0 / before, WithinRel(5.092958179, 1e-9));
    CHECK_THAT(coefficient, WithinRel(0.5625, 1e-14));
    CHECK_THAT(coefficient * velocityHead_m(4.0, before, g), WithinRel(0.743641715, 1e-8));
    CHECK_THAT(perFlowSquared_s2m5(coefficient, before, g) * 16.0, WithinRel(0.743641715, 1e-8));
    CHECK(wideningCoefficient(2.0, 2.0) == 0.0);
    CHECK(narrowingCoefficient(2.0, 2.0) == 0.0);
    CHECK_THAT(narrowingCoefficient(4.0, 1.0), WithinRel(0.375, 1e-14)); // ½(1 − ¼), from memory
}

TEST_CASE("Local losses: trash rack", "[hydraulics][analytic]") {
    // Source: Kirschmer 1926, from memory: s 10 mm, b 50 mm, α 75°, rectangular bars.
    const TrashRack rack{2.42, 0.010, 0.050, 75.0 / 180.0 * headroom::constants::pi};
    CHECK_THAT(trashRackCoefficient(rack), WithinRel(0.27340040, 1e-7));
}

TEST_CASE("Local losses: coefficients convert both ways", "[hydraulics][invariant]") {
    CHECK_THAT(coefficientOf(perFlowSquared_s2m5(0.37, 12.0, g), 12.0, g), WithinRel(0.37, 1e-14));
}

TEST_CASE("Local losses: orifice between its two limits", "[hydraulics][limit]") {
    // Derived here: into an endless space the whole jet head is lost; an uncontracted opening as
    // wide as the space behind loses nothing.
    const double area = circle(2.0).area_m2;
    const double endless = std::numeric_limits<double>::infinity();
    CHECK_THAT(orificeLoss_s2m5({2.0, 0.6, endless}, g),
               WithinRel(1.0 / (2 * g * 0.36 * area * area), 1e-13));
    CHECK_THAT(orificeLoss_s2m5({2.0, 1.0, area}, g), WithinAbs(0.0, 1e-18));
    // Without contraction it is the sudden widening.
    CHECK_THAT(orificeLoss_s2m5({2.0, 1.0, 3 * area}, g),
               WithinRel(perFlowSquared_s2m5(wideningCoefficient(area, 3 * area), area, g), 1e-13));
    CHECK_THROWS_AS(orificeLoss_s2m5({2.0, 0.0, 1.0}, g), headroom::Bug);
}

TEST_CASE("Local losses: velocity heads at a node's conduit ends", "[hydraulics][analytic]") {
    // Node head is an energy level. Leaving costs (1 + ζ)v²/2g, arriving in still water (ζ = 1)
    // leaves h = H, straight through (ζ = 0) h = H − v²/2g. Derived here.
    const double head = velocityHead_m(10.0, 4.0, g);
    CHECK_THAT(leavingCoefficient_s2m5(0.25, 4.0, g) * 100.0, WithinRel(1.25 * head, 1e-14));
    CHECK(arrivingCoefficient_s2m5(1.0, 4.0, g) == 0.0);
    CHECK_THAT(arrivingCoefficient_s2m5(0.0, 4.0, g) * 100.0, WithinRel(-head, 1e-14));
    // Through a node without loss between equal conduits the piezometric head is unchanged.
    CHECK_THAT(arrivingCoefficient_s2m5(0.0, 4.0, g) + leavingCoefficient_s2m5(0.0, 4.0, g),
               WithinAbs(0.0, 1e-18));
    CHECK(chamberHeadDrop_m(0.0, 10.0, 4.0, g) == 0.0);
}

TEST_CASE("Sections: simple shapes", "[hydraulics][analytic]") {
    CHECK_THAT(circle(3.0).hydraulicRadius_m(), WithinRel(0.75, 1e-14));
    CHECK_THAT(circle(3.0).equalAreaDiameter_m(), WithinRel(3.0, 1e-14));
    CHECK_THAT(rectangle(5.2, 6.0).area_m2, WithinRel(31.2, 1e-14));
    CHECK_THAT(rectangle(5.2, 6.0).perimeter_m, WithinRel(22.4, 1e-14));
    // Without walls a D-shape is a half circle on its floor.
    CHECK_THAT(dShape(4.0, 2.0).area_m2, WithinRel(0.5 * circle(4.0).area_m2, 1e-14));
    CHECK_THROWS_AS(dShape(4.0, 1.9), headroom::Bug);
    CHECK_THROWS_AS(circle(0.0), headroom::Bug);
}
