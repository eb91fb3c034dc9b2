// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <span>

/// Hand formulas of water hammer and of the water's and the machine's inertia, for the
/// plausibility sheet and for tests. Derivations: resources/theory/waterway.md, section "Waves".
namespace headroom::hydraulics {

/// ΔH = −(a/g) ΔV [m] (Joukowsky 1898): a stop completed within `reflectionTime_s`.
double joukowskyRise_m(double waveSpeed_mps, double velocityChange_mps, double gravity_mps2);
/// 2L/a [s].
double reflectionTime_s(double length_m, double waveSpeed_mps);
/// B = a/(g A) [s/m²], head per discharge of a wave.
double waveImpedance_sm2(double waveSpeed_mps, double area_m2, double gravity_mps2);
/// 2 L V₀/(g T) [m]: discharge stopped in a straight line over T ≥ 2L/a (Michaud 1878).
double michaudRise_m(double length_m, double velocity_mps, double closing_s, double gravity_mps2);

/// Largest relative head ζ = H/H₀ of a rigid column when an orifice closes in a straight line,
/// √ζ = K/2 + √(1 + K²/4), K = L V₀/(g H₀ T); and the smallest when it opens (−K/2).
/// From memory; derived in waterway.md.
double rigidClosingHead(double columnNumber);
double rigidOpeningHead(double columnNumber);

/// Share of a head wave that passes a junction, arriving in the conduit of `impedances[arriving]`:
/// s = 2Y₁/ΣY with Y = 1/B; the reflected share is s − 1.
double transmittedShare(std::span<const double> impedances_sm2, std::size_t arriving);
/// Share of a small head wave reflected by an orifice at steady head H₀ and flow Q₀ at the end of
/// a conduit: (1 − ρ)/(1 + ρ) with Allievi's number.
double orificeReflection(double allieviNumber);

struct ColumnPart {
    double length_m = 0.0;
    double area_m2 = 0.0;
};
/// ΣL/A [1/m].
double columnInertia_1m(std::span<const ColumnPart> parts);
/// Water starting time T_w = Q₀ ΣL/A/(g H₀) [s]; IEC 61362, IEEE 1207, from memory.
double waterStartingTime_s(double inertia_1m, double flow_m3s, double head_m, double gravity_mps2);
/// Machine starting time T_a = J ω₀²/P [s]; twice the inertia constant.
double machineStartingTime_s(double inertia_kgm2, double speed_rads, double power_W);
/// Allievi's ρ = a V₀/(2 g H₀).
double allieviNumber(double waveSpeed_mps, double velocity_mps, double head_m, double gravity_mps2);

} // namespace headroom::hydraulics
