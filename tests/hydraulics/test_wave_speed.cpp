// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/messages.h"
#include "hydraulics/wave_speed.h"
#include "support/catch.h"
#include "units/text.h"

#include <array>
#include <cmath>

using namespace headroom;
using namespace headroom::hydraulics;

namespace {

const WaveMedium cleanWater{.density_kgm3 = 1000.0, .bulkModulus_Pa = 2.19e9};
constexpr std::array restraints{AxialRestraint::upstreamOnly, AxialRestraint::throughout,
                                AxialRestraint::joints};

SteelWall pipe(double diameter, double thickness, AxialRestraint restraint, WallTheory theory) {
    return {.diameter_m = diameter,
            .thickness_m = thickness,
            .modulus_Pa = 206e9,
            .poisson = 0.3,
            .restraint = restraint,
            .theory = theory};
}

} // namespace

TEST_CASE("Wave speed: thin steel wall by restraint", "[hydraulics][reference]") {
    // Source: Korteweg 1878; Wylie & Streeter 1993, ch. 1 (factors 1 − μ/2, 1 − μ², 1);
    // recomputed: K 2.19 GPa, ρ 1000, E 206 GPa, μ 0.3, D 3 m, e 30 mm.
    CHECK_THAT(waveSpeed(RigidWall{}, cleanWater)->speed_mps, WithinRel(1479.864859, 1e-9));
    const std::array expected{1072.579663, 1055.049227, 1030.294076};
    for (std::size_t i = 0; i < restraints.size(); ++i) {
        const auto speed = waveSpeed(pipe(3.0, 0.03, restraints[i], WallTheory::thin), cleanWater);
        CHECK_THAT(speed->speed_mps, WithinRel(expected[i], 1e-9));
    }
}

TEST_CASE("Wave speed: thick steel wall", "[hydraulics][reference]") {
    // Source: Wylie & Streeter 1993, ch. 1, from memory; recomputed.
    const std::array factors{0.867584158, 0.926990099, 1.016099010};
    const std::array wide{1067.351745, 1050.239294, 1026.046964};
    const std::array narrow{1404.758491, 1401.102809, 1395.672406};
    const std::array narrowThin{1417.216793, 1413.089527, 1406.965684};
    for (std::size_t i = 0; i < restraints.size(); ++i) {
        const auto speed = waveSpeed(pipe(3.0, 0.03, restraints[i], WallTheory::thick), cleanWater);
        CHECK_THAT(speed->restraintFactor, WithinRel(factors[i], 1e-8));
        CHECK_THAT(speed->speed_mps, WithinRel(wide[i], 1e-9));
        CHECK_THAT(
            waveSpeed(pipe(1.0, 0.1, restraints[i], WallTheory::thick), cleanWater)->speed_mps,
            WithinRel(narrow[i], 1e-9));
        CHECK_THAT(
            waveSpeed(pipe(1.0, 0.1, restraints[i], WallTheory::thin), cleanWater)->speed_mps,
            WithinRel(narrowThin[i], 1e-9));
    }
}

TEST_CASE("Wave speed: unlined rock", "[hydraulics][reference]") {
    // Source: Halliwell 1963, from memory; recomputed. μ_R 0.2.
    const std::array<std::pair<double, double>, 4> rows{
        {{10e9, 1198.123861}, {20e9, 1316.905983}, {30e9, 1365.105342}, {50e9, 1407.723427}}};
    for (const auto& [modulus, speed] : rows) {
        CHECK_THAT(waveSpeed(RockWall{modulus, 0.2}, cleanWater)->speed_mps,
                   WithinRel(speed, 1e-9));
    }
}

TEST_CASE("Wave speed: steel lining in rock without a gap", "[hydraulics][reference]") {
    // Derived here (plane strain in the steel); recomputed. D 3 m, E 206 GPa, μ 0.3, μ_R 0.2.
    struct Row {
        double rock, thickness, speed, share;
    };
    const std::array<Row, 4> rows{{{5e9, 0.020, 1166.440030, 0.579913332},
                                   {5e9, 0.030, 1206.781933, 0.479250053},
                                   {20e9, 0.020, 1338.433497, 0.846669148},
                                   {20e9, 0.030, 1347.191817, 0.786380919}}};
    for (const Row& row : rows) {
        const auto speed =
            waveSpeed(LinedRockWall{3.0, row.thickness, 206e9, 0.3, row.rock, 0.2}, cleanWater);
        CHECK_THAT(speed->speed_mps, WithinRel(row.speed, 1e-9));
        CHECK_THAT(speed->rockShare, WithinRel(row.share, 1e-8));
    }
    // Limits: a lining of no thickness is bare rock; soft rock leaves the anchored pipe.
    CHECK_THAT(waveSpeed(LinedRockWall{3.0, 1e-12, 206e9, 0.3, 20e9, 0.2}, cleanWater)->speed_mps,
               WithinRel(1316.905983, 1e-8));
    CHECK_THAT(waveSpeed(LinedRockWall{3.0, 0.03, 206e9, 0.3, 1.0, 0.2}, cleanWater)->speed_mps,
               WithinRel(1055.049227, 1e-8));
}

TEST_CASE("Wave speed: free gas", "[hydraulics][reference]") {
    // Source: Wylie & Streeter, from memory; recomputed. Anchored pipe of 3 m and 30 mm.
    const SteelWall wall = pipe(3.0, 0.03, AxialRestraint::throughout, WallTheory::thin);
    const std::array shares{1e-5, 1e-4, 1e-3, 1e-2};
    const std::array atAir{1001.480, 728.346, 304.907, 100.712};
    const std::array atMega{1049.234, 1000.889, 726.234, 304.485};
    for (std::size_t i = 0; i < shares.size(); ++i) {
        WaveMedium medium = cleanWater;
        medium.gasShare = shares[i];
        CHECK_THAT(waveSpeed(wall, medium)->speed_mps, WithinAbs(atAir[i], 6e-4));
        medium.pressure_Pa = 1e6;
        CHECK_THAT(waveSpeed(wall, medium)->speed_mps, WithinAbs(atMega[i], 6e-4));
    }
}

TEST_CASE("Wave speed: the terms make the speed", "[hydraulics][invariant]") {
    WaveMedium medium = cleanWater;
    medium.gasShare = 2e-4;
    const auto speed =
        waveSpeed(pipe(3.0, 0.03, AxialRestraint::joints, WallTheory::thick), medium);
    const double sum = speed->water_1Pa + speed->wall_1Pa + speed->gas_1Pa;
    CHECK_THAT(speed->speed_mps, WithinRel(1.0 / std::sqrt(speed->density_kgm3 * sum), 1e-14));
    CHECK(speed->gas_1Pa > 0.0);
}

TEST_CASE("Wave speed: composite conduit", "[hydraulics][reference]") {
    // Derived here, recomputed: travel time ΣL/a.
    const std::array<WaveReach, 3> reaches{{{400, 1150}, {300, 1200}, {200, 1250}}};
    CHECK_THAT(travelTime_s(reaches), WithinRel(0.757826087, 1e-9));
    CHECK_THAT(meanWaveSpeed_mps(reaches), WithinRel(1187.607573, 1e-9));
}

TEST_CASE("Wave speed: bad walls are refused with all their faults", "[hydraulics][messages]") {
    WaveMedium medium = cleanWater;
    medium.gasShare = 1.0;
    const auto bad = waveSpeed(LinedRockWall{0.0, -1.0, 0.0, 0.6, std::nan(""), -0.1}, medium, "w");
    REQUIRE_FALSE(bad);
    CHECK(bad.findings().size() == 6);
    for (const Finding& finding : bad.findings()) {
        CHECK(finding.subject == "w");
        CHECK_FALSE(text(finding).empty());
    }
    CHECK(bad.findings().front().message == &wallDimension);
    CHECK(bad.findings().back().message == &gasOutOfRange);
}
