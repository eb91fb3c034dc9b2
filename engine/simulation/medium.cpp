// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "base/overloaded.h"
#include "hydraulics/water.h"
#include "hydraulics/wave_speed.h"
#include "simulation/conduit_geometry.h"

#include <cmath>

namespace headroom::simulation {

Medium mediumOf(const plant::Site& site, Findings& findings) {
    Medium out;
    out.gravity_mps2 = site.gravity_mps2;
    out.airPressure_Pa = site.airPressure_Pa;
    out.temperature_degC = site.waterTemperature_degC;
    out.velocityHeads = site.velocityHeads;
    const auto water = hydraulics::waterAt(site.waterTemperature_degC, "site");
    findings.insert(findings.end(), water.findings().begin(), water.findings().end());
    if (water) {
        out.density_kgm3 = water->density_kgm3;
        out.bulkModulus_Pa = water->bulkModulus_Pa;
        out.viscosity_m2s = water->viscosity_m2s;
        out.vapourPressure_Pa = water->vapourPressure_Pa;
    }
    out.density_kgm3 = site.density_kgm3.value_or(out.density_kgm3);
    return out;
}

double wallSpeed_mps(const plant::Reach& reach, const Medium& medium, const std::string& subject,
                     Findings& findings) {
    if (const auto* given = std::get_if<plant::GivenWaveSpeed>(&reach.wall)) {
        return given->speed_mps;
    }
    // Without a diameter the circle of the same area carries the pressure.
    const double diameter =
        reach.diameter_m.value_or(std::sqrt(4.0 * reach.area_m2 / constants::pi));
    const hydraulics::Wall wall = std::visit(
        overloaded{[](const plant::GivenWaveSpeed&) -> hydraulics::Wall {
                       return hydraulics::RigidWall{};
                   },
                   [&](const plant::SteelWall& w) -> hydraulics::Wall {
                       return hydraulics::SteelWall{
                           diameter,
                           w.thickness_m,
                           w.modulus_Pa,
                           w.poisson,
                           w.restraint == plant::Restraint::upstreamOnly
                               ? hydraulics::AxialRestraint::upstreamOnly
                               : (w.restraint == plant::Restraint::joints
                                      ? hydraulics::AxialRestraint::joints
                                      : hydraulics::AxialRestraint::throughout),
                           hydraulics::WallTheory::thin};
                   },
                   [](const plant::RockWall& w) -> hydraulics::Wall {
                       return hydraulics::RockWall{w.modulus_Pa, w.poisson};
                   },
                   [&](const plant::LinedRockWall& w) -> hydraulics::Wall {
                       return hydraulics::LinedRockWall{diameter,  w.thickness_m,    w.modulus_Pa,
                                                        w.poisson, w.rockModulus_Pa, w.rockPoisson};
                   }},
        reach.wall);
    const auto speed = hydraulics::waveSpeed(wall,
                                             {medium.density_kgm3, medium.bulkModulus_Pa,
                                              reach.gasShare, medium.airPressure_Pa,
                                              medium.temperature_degC + constants::celsiusZero_K},
                                             subject);
    findings.insert(findings.end(), speed.findings().begin(), speed.findings().end());
    return speed ? speed->speed_mps : 1000.0; // any speed: the findings end the compilation
}

} // namespace headroom::simulation
