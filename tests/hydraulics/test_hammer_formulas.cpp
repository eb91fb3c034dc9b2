// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "hydraulics/hammer_formulas.h"
#include "hydraulics/sections.h"
#include "support/catch.h"

#include <array>

using namespace headroom::hydraulics;

namespace {
constexpr double g = 9.81;
}

TEST_CASE("Water hammer: sudden stop", "[hammer][analytic]") {
    // Source: Joukowsky, seen in several public texts; recomputed.
    CHECK_THAT(joukowskyRise_m(1200.0, -1.0, g), WithinRel(122.324159, 1e-8));
    CHECK_THAT(1000 * g * joukowskyRise_m(1200.0, -1.0, g), WithinRel(1.2e6, 1e-12));
    CHECK_THAT(reflectionTime_s(1200.0, 1200.0), WithinRel(2.0, 1e-14));
}

TEST_CASE("Water hammer: waves at junctions", "[hammer][reference]") {
    // Source: Wylie & Streeter 1993, from memory; derived and recomputed.
    const double wide = waveImpedance_sm2(1150.0, circle(4.2).area_m2, g);
    const double narrow = waveImpedance_sm2(1200.0, circle(3.4).area_m2, g);
    CHECK_THAT(transmittedShare(std::array{wide, narrow}, 0), WithinRel(1.228483547, 1e-9));
    const std::array fork{waveImpedance_sm2(1000, 12, g), waveImpedance_sm2(1000, 6, g),
                          waveImpedance_sm2(1000, 6, g)};
    CHECK_THAT(transmittedShare(fork, 0), WithinRel(1.0, 1e-14));
    CHECK_THAT(transmittedShare(fork, 1), WithinRel(0.5, 1e-14));
    CHECK_THROWS_AS(transmittedShare(fork, 3), headroom::Bug);
    // Orifice end of the pipe below: r = (1 − ρ)/(1 + ρ).
    CHECK_THAT(orificeReflection(1.048492792), WithinRel(-0.023672425, 1e-7));
}

TEST_CASE("Water hammer: straight-line stop of the discharge", "[hammer][analytic]") {
    // Source: Michaud 1878; derived here: L 800 m, V₀ 2 m/s, T 8 s.
    CHECK_THAT(michaudRise_m(800.0, 2.0, 8.0, g), WithinRel(40.774720, 1e-7));
}

TEST_CASE("Water hammer: rigid column behind a straight-line gate", "[hammer][reference]") {
    // Derived here; formula from memory. K = L V₀/(g H₀ T).
    CHECK_THAT(800 * 2.0 / (g * 100 * 8), WithinRel(0.203873598, 1e-8));
    CHECK_THAT(rigidClosingHead(800 * 2.0 / (g * 100 * 8)), WithinRel(1.225712320, 1e-9));
    CHECK_THAT(rigidClosingHead(1200 * 4.0 / (g * 600 * 8)), WithinRel(1.107264673, 1e-9));
    CHECK_THAT(rigidClosingHead(1200 * 4.0 / (g * 600 * 16)), WithinRel(1.052283836, 1e-9));
    CHECK_THAT(rigidOpeningHead(800 * 2.0 / (g * 100 * 4 * 4.0 / 3.0)),
               WithinRel(0.737395333, 1e-8));
    CHECK(rigidClosingHead(0.0) == 1.0);
}

TEST_CASE("Water starting time", "[hammer][reference]") {
    // Source: IEC 61362, IEEE 1207, from memory; recomputed.
    const std::array<ColumnPart, 3> parts{{{400, 7}, {300, 6}, {50, 4.5}}};
    CHECK_THAT(columnInertia_1m(parts), WithinRel(118.253968254, 1e-11));
    CHECK_THAT(waterStartingTime_s(columnInertia_1m(parts), 30.0, 250.0, g),
               WithinRel(1.446531722, 1e-9));
    CHECK_THAT(waterStartingTime_s(5000.0 / 25.0, 50.0, 143.5, g), WithinRel(7.103609699, 1e-9));
}

TEST_CASE("Machine starting time", "[hammer][reference]") {
    // Source: common practice, from memory; recomputed. J 1e6 kg m², 333.333 rpm, 100 MW.
    CHECK_THAT(machineStartingTime_s(1e6, 34.906585040, 100e6), WithinRel(12.184696791, 1e-9));
}

TEST_CASE("Elasticity numbers of a penstock", "[hammer][reference]") {
    // From memory, recomputed: L 600 m, a 1200 m/s, A 7 m², Q₀ 30 m³/s, H₀ 250 m.
    const double impedance = waveImpedance_sm2(1200.0, 7.0, g);
    const double relative = impedance * 30.0 / 250.0;
    CHECK_THAT(reflectionTime_s(600.0, 1200.0), WithinRel(1.0, 1e-14));
    CHECK_THAT(relative, WithinRel(2.096985583, 1e-9));
    CHECK_THAT(waterStartingTime_s(600.0 / 7.0, 30.0, 250.0, g), WithinRel(1.048492792, 1e-9));
    CHECK_THAT(waterStartingTime_s(600.0 / 7.0, 30.0, 250.0, g), WithinRel(relative * 0.5, 1e-13));
    CHECK_THAT(allieviNumber(1200.0, 30.0 / 7.0, 250.0, g), WithinRel(1.048492792, 1e-9));
    CHECK_THAT(impedance, WithinRel(17.474879860, 1e-9));
}
