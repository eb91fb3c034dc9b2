// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/hammer_formulas.h"

#include "base/ensure.h"
#include "numerics/elementary.h"

namespace headroom::hydraulics {

using numerics::sqrt;
using numerics::square;

double joukowskyRise_m(double waveSpeed_mps, double velocityChange_mps, double gravity_mps2) {
    return -waveSpeed_mps / gravity_mps2 * velocityChange_mps;
}

double reflectionTime_s(double length_m, double waveSpeed_mps) {
    return 2.0 * length_m / waveSpeed_mps;
}

double waveImpedance_sm2(double waveSpeed_mps, double area_m2, double gravity_mps2) {
    return waveSpeed_mps / (gravity_mps2 * area_m2);
}

double michaudRise_m(double length_m, double velocity_mps, double closing_s, double gravity_mps2) {
    return 2.0 * length_m * velocity_mps / (gravity_mps2 * closing_s);
}

double rigidClosingHead(double columnNumber) {
    return square(0.5 * columnNumber + sqrt(1.0 + 0.25 * square(columnNumber)));
}

double rigidOpeningHead(double columnNumber) {
    return rigidClosingHead(-columnNumber);
}

double transmittedShare(std::span<const double> impedances_sm2, std::size_t arriving) {
    ensure(arriving < impedances_sm2.size(), "the wave arrives in one of the conduits");
    double sum = 0.0;
    for (const double impedance : impedances_sm2) {
        sum += 1.0 / impedance;
    }
    return 2.0 / (impedances_sm2[arriving] * sum);
}

double orificeReflection(double allieviNumber) {
    return (1.0 - allieviNumber) / (1.0 + allieviNumber);
}

double columnInertia_1m(std::span<const ColumnPart> parts) {
    double sum = 0.0;
    for (const ColumnPart& part : parts) {
        sum += part.length_m / part.area_m2;
    }
    return sum;
}

double waterStartingTime_s(double inertia_1m, double flow_m3s, double head_m, double gravity_mps2) {
    return flow_m3s * inertia_1m / (gravity_mps2 * head_m);
}

double machineStartingTime_s(double inertia_kgm2, double speed_rads, double power_W) {
    return inertia_kgm2 * square(speed_rads) / power_W;
}

double allieviNumber(double waveSpeed_mps, double velocity_mps, double head_m,
                     double gravity_mps2) {
    return waveSpeed_mps * velocity_mps / (2.0 * gravity_mps2 * head_m);
}

} // namespace headroom::hydraulics
