// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// Physical and mathematical constants, each with unit and source.
namespace headroom::constants {

inline constexpr double pi = 3.14159265358979323846;
/// Gravity when a project gives none [m/s²]; common practice, no source.
inline constexpr double gravity_mps2 = 9.81;
/// Standard atmosphere at sea level [Pa]; ICAO standard atmosphere, from memory.
inline constexpr double standardAir_Pa = 101325.0;
/// Zero of the Celsius scale [K]; definition.
inline constexpr double celsiusZero_K = 273.15;
/// Specific gas constant of dry air [J/(kg K)]; common practice, no source.
inline constexpr double airGas_JkgK = 287.05;

} // namespace headroom::constants
