// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// Hand formulas of surge chambers, for the plausibility sheet and for tests: one tunnel, one
/// chamber, rigid water. Levels positive up from the reservoir level. Derivations and works cited:
/// resources/theory/surge.md.
namespace headroom::hydraulics {

/// Tunnel between reservoir and chamber.
struct SurgeTunnel {
    double inertia_1m = 0.0; ///< ΣL/A
    double loss_s2m5 = 0.0;  ///< head loss by Q², all of it
    double gravity_mps2 = 0.0;
};

/// Frictionless period 2π √(ΣL/A · F/g) [s].
double surgePeriod_s(const SurgeTunnel& tunnel, double chamberArea_m2);
/// Frictionless amplitude after a sudden stop of the flow: Z* = Q₀ √(ΣL/A/(g F)) [m].
double surgeAmplitude_m(const SurgeTunnel& tunnel, double chamberArea_m2, double flow_m3s);
/// K = h_f0/Z*: the tunnel's loss at Q₀ by the frictionless amplitude.
double relativeLoss(const SurgeTunnel& tunnel, double chamberArea_m2, double flow_m3s);

/// First upsurge after a sudden total stop by Z*, 1 − (2/3)K + (1/9)K² (Calame & Gaden 1926, from
/// memory); within 0.6 % for K ≤ 0.5.
double upsurgeEstimate(double relativeLoss);
/// The downsurge that follows, by Z*, −1/(1 + 7K/3) (Jaeger, from memory); within 4 % for K ≤ 0.7.
double followingDownsurgeEstimate(double relativeLoss);
/// |z_min|/h_f0 after a sudden take-up from share n to full flow (Vogt 1923/Forchheimer, from
/// memory); within 1 % for 0.05 ≤ K ≤ 1, n ≤ 0.5.
double acceptanceDownsurgeEstimate(double relativeLoss, double initialShare);
/// 1 + 0.125 K by Z* for 0 → 100 %; within 2 % for K ≤ 1. Common practice, from memory.
double fullAcceptanceEstimate(double relativeLoss);

/// First upsurge by Z* after a sudden total stop, exact for quadratic losses of tunnel and
/// throttle: first integral of the rigid equations. `throttleLoss` is R₀/Z* at Q₀, ≥ 0.
/// Source: Forchheimer 1913, Prášil 1908, from memory; derived in surge.md.
double upsurge(double relativeLoss, double throttleLoss = 0.0);
/// The downsurge that follows, by Z* (negative), without throttle.
double followingDownsurge(double relativeLoss);

/// Heads for Thoma's criterion, all at the flow Q₀ [m].
struct ThomaHeads {
    double gross_m = 0.0;
    double tunnelLoss_m = 0.0;   ///< h_f0
    double penstockLoss_m = 0.0; ///< h_p0, counted three times
};
/// Critical chamber area [m²]: ΣL/A/(2 g k H₁), loss k Q², H₁ = H_gross − h_f0 − 3 h_p0.
/// Infinite when H₁ ≤ 0 or without loss. Source: Thoma 1910, from memory; derived in surge.md.
double thomaArea_m2(const SurgeTunnel& tunnel, const ThomaHeads& heads);
/// Second condition, for large swings: h_f0 below half of H₁.
bool thomaAmplitudeHolds(const ThomaHeads& heads);

/// Small swings of the chamber with an ideal governor (constant hydraulic power).
struct SurgeMode {
    double growth_1s = 0.0;      ///< σ, negative when damped
    double frequency_rads = 0.0; ///< 0 when it creeps
    double period_s() const;
    double ratioPerCycle() const; ///< e^(σT)
};
SurgeMode governedSurgeMode(const SurgeTunnel& tunnel, const ThomaHeads& heads,
                            double chamberArea_m2, double flow_m3s);

} // namespace headroom::hydraulics
