// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// Darcy friction factors of steady pipe flow: head loss per length = f V²/(2 g D_h), with the
/// hydraulic diameter D_h = 4 A/P. Derivations: resources/theory/waterway.md, section "Friction".
namespace headroom::hydraulics {

inline constexpr double laminarReynolds = 2000.0;   ///< laminar up to here
inline constexpr double turbulentReynolds = 4000.0; ///< Colebrook–White from here

/// 64/Re, Re > 0 (Hagen–Poiseuille).
double laminarFactor(double reynolds);

/// The turbulent factor of 1/√f = −2 log₁₀(k/(3.7 D) + 2.51/(Re √f)) (Colebrook 1939), solved by
/// Newton's method to a relative change below 1e-14. Re > 0; 0 ≤ k/D.
double colebrookWhiteFactor(double reynolds, double relativeRoughness);

/// The limit for Re → ∞: [2 log₁₀(3.7 D/k)]⁻², 0 < k/D < 3.7.
double fullyRoughFactor(double relativeRoughness);

/// The factor at any Re > 0: laminar up to 2000, Colebrook–White from 4000. Between, where no law
/// is unique, our own blend: the excess over 64/Re grows in a straight line in Re from zero to
/// its value at 4000. So the factor is continuous and the loss increases with the flow.
double darcyFactor(double reynolds, double relativeRoughness);

/// Darcy factor of a Strickler number M [m^(1/3)/s]: f = 8 g/(M² R^(1/3)); both > 0.
double factorOfStrickler(double strickler, double hydraulicRadius_m, double gravity_mps2);
/// Its inverse.
double stricklerOfFactor(double factor, double hydraulicRadius_m, double gravity_mps2);

} // namespace headroom::hydraulics
