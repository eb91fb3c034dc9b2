// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/conduit_geometry.h"

#include "support/catch.h"

using namespace headroom;

TEST_CASE("Medium: the water of a site is that of its temperature", "[simulation][reference]") {
    // Source: IAPWS-95 values of the check list, 10 °C: 999.703 kg/m³, K_S 2.09397 GPa,
    // 1.3063e-6 m²/s, 1228.2 Pa; tolerances of that list.
    plant::Site site;
    site.waterTemperature_degC = 10.0;
    Findings findings;
    const auto water = simulation::mediumOf(site, findings);
    CHECK(findings.empty());
    CHECK_THAT(water.density_kgm3, WithinRel(999.703, 5e-4));
    CHECK_THAT(water.bulkModulus_Pa, WithinRel(2.09397e9, 0.01));
    CHECK_THAT(water.viscosity_m2s, WithinRel(1.3063e-6, 0.01));
    CHECK_THAT(water.vapourPressure_Pa, WithinRel(1228.2, 0.01));
    // Gauge head at which it boils under the standard atmosphere, derived here:
    // (1228.2 - 101325)/(999.703 · 9.81) = -10.2064 m.
    CHECK_THAT(water.vapourHead_m(), WithinAbs(-10.2064, 0.02));
}

TEST_CASE("Medium: a temperature that no water table knows is told", "[simulation][limit]") {
    plant::Site site;
    site.waterTemperature_degC = 90.0;
    Findings findings;
    simulation::mediumOf(site, findings);
    CHECK_FALSE(findings.empty());
}

TEST_CASE("Wall: a given wave speed is taken as it is", "[simulation][analytic]") {
    plant::Reach reach;
    reach.wall = plant::GivenWaveSpeed{1200.0};
    simulation::Medium water;
    Findings findings;
    CHECK(simulation::wallSpeed_mps(reach, water, "reach", findings) == 1200.0);
    CHECK(findings.empty());
}
