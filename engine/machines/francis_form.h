// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

namespace headroom::machines {

/// Head and torque of a runner at one point, with slopes. All per unit of the rated point
/// (flow q, speed n, head h, shaft torque m; turbine direction positive) and c = 1/τ, the inverse
/// of the relative opening.
struct ChartPoint {
    double h = 0.0, m = 0.0;
    double dh_dq = 0.0, dh_dn = 0.0;
    double dm_dq = 0.0, dm_dn = 0.0;
    double dh_dc = 0.0, dm_dc = 0.0;
};

/// The closed form of a reaction runner in all four quadrants: swirl offered by the guide vanes,
/// Euler head, shock, friction and exit losses, blended between turbine and pump flow.
/// Derivation: resources/theory/turbine_chart.md.
///
/// Whatever the parameters (loss coefficients ≥ 0), q·h − η_r·m·n ≥ 0 everywhere, and h and m
/// are homogeneous of degree two in (q, n).
struct FrancisForm {
    double ratedEfficiency = 0.0;                 ///< η_r
    double u1 = 0.0, u2 = 0.0;                    ///< U₁, U₂: squared rim speeds over g·H_r
    double phi = 1.0;                             ///< swirl-free runner outlet at q = φ n
    double e1 = 0.0, e2 = 0.0;                    ///< guide-vane swirl, runner inlet angle
    double shockTurbine = 0.0, exitTurbine = 0.0; ///< ζ_i, ζ_s
    double shockPump = 0.0, exitPump = 0.0;       ///< ζ_v, ζ_2
    double phiPump = 1.0;                         ///< φ₂
    double slip = 0.0;                            ///< s
    double frictionTurbine = 0.0, frictionPump = 0.0; ///< k_f, k_p
    double gate = 0.0;                                ///< k_g
    double disc = 0.0, recirculation = 0.0;           ///< κ, κ_r
    double recirculationFlow = 1.0;                   ///< q_c
    double blendWidth = 1.0, blendRound = 1.0;        ///< δ, ε
    double blendShift = 0.0;                          ///< ξ₀

    /// Head, torque and slopes at flow `q`, speed `n`, inverse opening `c` (finite, > 0).
    /// Regular everywhere; at q = n = 0 everything is 0. About 75 ns.
    ChartPoint at(double q, double n, double c) const;
    /// Shut gate: no flow; head and torque of the runner turning in still water. Its slopes with
    /// respect to q and c are 0 by convention (the flow is not free).
    ChartPoint shut(double n) const;

    /// A, B, C of h = A q² + B q n + C n² on the turbine side, away from the blend.
    double flowTerm(double c) const;
    double mixedTerm(double c) const; ///< ≥ 0 exactly where the curve has no S
    double speedTerm() const;
};

} // namespace headroom::machines
