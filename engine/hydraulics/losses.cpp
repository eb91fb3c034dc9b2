// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/losses.h"

#include "base/ensure.h"
#include "hydraulics/sections.h"
#include "numerics/elementary.h"

namespace headroom::hydraulics {

using numerics::square;

double velocityHead_m(double flow_m3s, double area_m2, double gravity_mps2) {
    return square(flow_m3s / area_m2) / (2.0 * gravity_mps2);
}

double perFlowSquared_s2m5(double coefficient, double area_m2, double gravity_mps2) {
    return coefficient / (2.0 * gravity_mps2 * square(area_m2));
}

double coefficientOf(double perFlowSquared_s2m5, double area_m2, double gravity_mps2) {
    return perFlowSquared_s2m5 * 2.0 * gravity_mps2 * square(area_m2);
}

double wideningCoefficient(double areaBefore_m2, double areaAfter_m2) {
    return square(1.0 - areaBefore_m2 / areaAfter_m2);
}

double narrowingCoefficient(double areaBefore_m2, double areaAfter_m2) {
    return 0.5 * (1.0 - areaAfter_m2 / areaBefore_m2);
}

double trashRackCoefficient(const TrashRack& rack) {
    return rack.shape * numerics::pow(rack.barThickness_m / rack.clearance_m, 4.0 / 3.0)
           * numerics::sin(rack.slope_rad);
}

double orificeLoss_s2m5(const Orifice& orifice, double gravity_mps2) {
    ensure(orifice.contraction > 0.0 && orifice.areaBehind_m2 > 0.0, "an orifice has a jet");
    const double jet = orifice.contraction * circle(orifice.diameter_m).area_m2;
    return square(1.0 / jet - 1.0 / orifice.areaBehind_m2) / (2.0 * gravity_mps2);
}

double leavingCoefficient_s2m5(double zeta, double area_m2, double gravity_mps2) {
    return perFlowSquared_s2m5(1.0 + zeta, area_m2, gravity_mps2);
}

double arrivingCoefficient_s2m5(double zeta, double area_m2, double gravity_mps2) {
    return perFlowSquared_s2m5(zeta - 1.0, area_m2, gravity_mps2);
}

double chamberHeadDrop_m(double share, double tunnelFlow_m3s, double tunnelArea_m2,
                         double gravity_mps2) {
    return share * velocityHead_m(tunnelFlow_m3s, tunnelArea_m2, gravity_mps2);
}

} // namespace headroom::hydraulics
