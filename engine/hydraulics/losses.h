// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// Singular losses and velocity heads. Coefficients K refer to V²/(2g) of a stated section;
/// heads in metres of water. Derivations: resources/theory/waterway.md, section "Local losses".
namespace headroom::hydraulics {

/// Velocity head Q²/(2 g A²) [m].
double velocityHead_m(double flow_m3s, double area_m2, double gravity_mps2);
/// K of V²/(2g) as a coefficient of Q|Q| [s²/m⁵]: K/(2 g A²).
double perFlowSquared_s2m5(double coefficient, double area_m2, double gravity_mps2);
/// Its inverse.
double coefficientOf(double perFlowSquared_s2m5, double area_m2, double gravity_mps2);

/// Sudden widening, on the velocity before it: (1 − A₁/A₂)² (Borda–Carnot, from momentum).
double wideningCoefficient(double areaBefore_m2, double areaAfter_m2);
/// Sharp narrowing, on the velocity after it: about ½(1 − A₂/A₁); from memory.
double narrowingCoefficient(double areaBefore_m2, double areaAfter_m2);

struct TrashRack {
    double shape = 2.42; ///< 2.42 rectangular bars, 1.79 round ones
    double barThickness_m = 0.0;
    double clearance_m = 0.0; ///< between bars
    double slope_rad = 0.0;   ///< of the rack against the horizontal
};
/// β (s/b)^(4/3) sin α on the approach velocity (Kirschmer 1926).
double trashRackCoefficient(const TrashRack& rack);

struct Orifice {
    double diameter_m = 0.0;
    double contraction = 0.0;   ///< jet area by opening area, 0.6 … 1
    double areaBehind_m2 = 0.0; ///< where the jet spreads; infinite is allowed
};
/// Loss of an orifice as coefficient of Q|Q| [s²/m⁵]: the jet of area C A_o spreads into the area
/// behind it, (1/(C A_o) − 1/A)²/(2g). Momentum as for the sudden widening; derived here.
double orificeLoss_s2m5(const Orifice& orifice, double gravity_mps2);

/// Between a node's energy level and the piezometric head of a conduit's end, as coefficients of
/// Q² with v in the conduit. Leaving the node: H_node − h = leaving·Q², leaving = (1 + ζ)/(2gA²).
double leavingCoefficient_s2m5(double zeta, double area_m2, double gravity_mps2);
/// Arriving: h − H_node = arriving·Q², arriving = (ζ − 1)/(2gA²): 0 into still water (ζ = 1),
/// negative straight through (ζ = 0), because the node's level includes the velocity head.
double arrivingCoefficient_s2m5(double zeta, double area_m2, double gravity_mps2);
/// What a chamber beside a tunnel sees less than the node's level [m]: χ v²/(2g) of the tunnel.
double chamberHeadDrop_m(double share, double tunnelFlow_m3s, double tunnelArea_m2,
                         double gravity_mps2);

} // namespace headroom::hydraulics
