// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "numerics/elementary.h"

#include <string>

namespace headroom::hydraulics {

inline constexpr double coldestWater_degC = 0.0;
inline constexpr double warmestWater_degC = 30.0;
inline constexpr double lowestAltitude_m = -500.0;
inline constexpr double highestAltitude_m = 6000.0;

/// Pure water at 101 325 Pa. Pressure raises the wave speed by 0.55 % at 5 MPa; left out.
struct Water {
    double density_kgm3 = 0.0;
    double bulkModulus_Pa = 0.0;    ///< isentropic, the one that waves feel
    double viscosity_m2s = 0.0;     ///< kinematic
    double vapourPressure_Pa = 0.0; ///< absolute

    double soundSpeed_mps() const { return numerics::sqrt(bulkModulus_Pa / density_kgm3); }
};

/// Water between 0 and 30 °C; outside, or not a number, a finding.
/// Source: table of IAPWS-95 values in water.cpp, joined by one polynomial through all rows
/// (logarithms for viscosity and vapour pressure): exact at the rows, ρ within 2e-6, sound
/// speed within 5e-5, vapour pressure within 1e-4, viscosity within 5e-3 between them.
Result<Water> waterAt(double temperature_degC, const std::string& subject = {});

/// Gravity [m/s²] at a latitude [rad] and altitude [m]: 9.7803(1 + 0.0053 sin²φ) − 3e-6 z.
/// Source: IEC 60041:1991, from memory. Outside −90…90° or −500…6000 m a finding.
Result<double> gravityAt(double latitude_rad, double altitude_m, const std::string& subject = {});

/// Air pressure [Pa] at an altitude: 101325 (1 − 2.25577e-5 z)^5.25588.
/// Source: ICAO standard atmosphere, from memory. Outside −500…6000 m a finding.
Result<double> airPressureAt(double altitude_m, const std::string& subject = {});

/// Head of the vapour limit against the air [m], negative: (p_v − p_air)/(ρ g).
double vapourHead_m(const Water& water, double airPressure_Pa, double gravity_mps2);

} // namespace headroom::hydraulics
