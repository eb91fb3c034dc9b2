// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"

#include <span>
#include <string>
#include <variant>

/// Wave speed from water, wall and free gas. Derivation: resources/theory/waterway.md, section
/// "Wave speed".
namespace headroom::hydraulics {

/// How a steel pipe is held along its axis.
enum class AxialRestraint {
    upstreamOnly, ///< anchored at its upper end only
    throughout,   ///< no strain along the axis
    joints,       ///< expansion joints throughout, no stress along the axis
};
/// Thin-wall theory, or with the terms of the order thickness by diameter.
enum class WallTheory { thin, thick };

struct RigidWall {};
struct SteelWall {
    double diameter_m = 0.0; ///< inner
    double thickness_m = 0.0;
    double modulus_Pa = 206e9;
    double poisson = 0.3;
    AxialRestraint restraint = AxialRestraint::throughout;
    WallTheory theory = WallTheory::thin;
};
struct RockWall { ///< unlined
    double modulus_Pa = 0.0;
    double poisson = 0.2;
};
struct LinedRockWall { ///< steel lining backed by rock without a gap, plane strain
    double diameter_m = 0.0;
    double thickness_m = 0.0;
    double modulus_Pa = 206e9;
    double poisson = 0.3;
    double rockModulus_Pa = 0.0;
    double rockPoisson = 0.2;
};
using Wall = std::variant<RigidWall, SteelWall, RockWall, LinedRockWall>;

struct WaveMedium {
    double density_kgm3 = 1000.0;
    double bulkModulus_Pa = 2.19e9; ///< isentropic
    double gasShare = 0.0;          ///< free gas by volume at `pressure_Pa`, 0 ≤ share < 1
    double pressure_Pa = 101325.0;  ///< absolute; the gas is isothermal
    double temperature_K = 283.15;
};

/// A wave speed with what it is made of: a = 1/√(ρ(water + wall + gas)).
struct WaveSpeed {
    double speed_mps = 0.0;
    double density_kgm3 = 0.0;    ///< of water and gas together
    double water_1Pa = 0.0;       ///< compliance of the water, 1/K
    double wall_1Pa = 0.0;        ///< area strain of the wall per pressure
    double gas_1Pa = 0.0;         ///< what the gas adds
    double restraintFactor = 0.0; ///< c₁ of a steel wall, else 0
    double rockShare = 0.0;       ///< of the pressure carried by the rock, 0 … 1
};

/// Refuses, all at once, dimensions and moduli that are not positive, Poisson's ratios outside
/// 0 … 0.5 and gas shares outside 0 … 1.
/// Sources: steel walls Korteweg 1878, Wylie & Streeter 1993 ch. 1 (thick: from memory); rock
/// Halliwell 1963 (from memory); lined rock derived here; gas Wylie & Streeter (from memory).
Result<WaveSpeed> waveSpeed(const Wall& wall, const WaveMedium& medium,
                            const std::string& subject = {});

/// Reach of a composite conduit.
struct WaveReach {
    double length_m = 0.0;
    double speed_mps = 0.0;
};
/// Σ L/a [s].
double travelTime_s(std::span<const WaveReach> reaches);
/// ΣL by travel time: the speed of the uniform conduit with the same travel time.
double meanWaveSpeed_mps(std::span<const WaveReach> reaches);

} // namespace headroom::hydraulics
