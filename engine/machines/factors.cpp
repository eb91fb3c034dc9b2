// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/factors.h"

#include "base/constants.h"
#include "numerics/elementary.h"

#include <cmath>

namespace headroom::machines {

using numerics::pow;
using numerics::sqrt;
using numerics::square;

namespace {

constexpr double secondsPerMinute = 60.0;
/// One metric horsepower [W]: 75 kgf·m/s with standard gravity; definition.
constexpr double metricHorsepower_W = 735.49875;

double cubed(double x) {
    return x * x * x;
}

} // namespace

double TurbineDuty::power_W() const {
    return efficiency * density_kgm3 * gravity_mps2 * flow_m3s * head_m;
}

double TurbineDuty::torque_Nm() const {
    return power_W() / (2.0 * constants::pi * speed_rpm / secondsPerMinute);
}

UnitQuantities unitQuantities(const TurbineDuty& d) {
    const double root = sqrt(d.head_m);
    return {d.speed_rpm * d.diameter_m / root, d.flow_m3s / (square(d.diameter_m) * root),
            d.torque_Nm() / (cubed(d.diameter_m) * d.head_m),
            d.power_W() / (square(d.diameter_m) * d.head_m * root)};
}

EnergyFactors energyFactors(const TurbineDuty& d) {
    const double energy = d.gravity_mps2 * d.head_m;
    const double root = sqrt(energy);
    const double n = d.speed_rpm / secondsPerMinute;
    return {n * d.diameter_m / root, d.flow_m3s / (square(d.diameter_m) * root),
            d.torque_Nm() / (d.density_kgm3 * cubed(d.diameter_m) * energy),
            d.power_W() / (d.density_kgm3 * square(d.diameter_m) * energy * root)};
}

SpeedFactors speedFactors(const TurbineDuty& d) {
    const double n = d.speed_rpm / secondsPerMinute;
    const double nD = n * d.diameter_m;
    const double diameter3 = cubed(d.diameter_m);
    return {d.gravity_mps2 * d.head_m / square(nD), d.flow_m3s / (n * diameter3),
            d.torque_Nm() / (d.density_kgm3 * square(nD) * diameter3),
            d.power_W() / (d.density_kgm3 * square(nD) * n * diameter3)};
}

double specificSpeed(double speed, double power, double head) {
    return speed * sqrt(power) / pow(head, 1.25);
}

SpecificSpeeds specificSpeeds(const TurbineDuty& d) {
    const double root = sqrt(d.flow_m3s);
    const double turns = d.speed_rpm / secondsPerMinute;
    const double energy = d.gravity_mps2 * d.head_m;
    return {turns * root / pow(energy, 0.75), d.speed_rpm * root / pow(d.head_m, 0.75),
            specificSpeed(d.speed_rpm, d.power_W() / 1e3, d.head_m),
            specificSpeed(d.speed_rpm, d.power_W() / metricHorsepower_W, d.head_m),
            2.0 * constants::pi * turns * root / pow(2.0 * energy, 0.75)};
}

// USBR Engineering Monograph 20 (1976), from memory.
double trialSpecificSpeed_mhp(double head_m) {
    return 2334.0 / sqrt(head_m);
}
// De Siervo & de Leva (1976), from memory.
double trialSpecificSpeed_kW(double head_m) {
    return 3470.0 * pow(head_m, -0.625);
}
// ESHA guide (2004), from memory.
double trialEnergySpecificSpeed(double head_m) {
    return 1.924 / pow(head_m, 0.512);
}
// USBR Engineering Monograph 20 (1976), from memory.
double trialRunaway_pu(double specificSpeed_mhp) {
    return 0.63 * pow(specificSpeed_mhp, 0.2);
}

// De Siervo & de Leva (1976), from memory.
double trialDiameter_m(double speed_rpm, double head_m, double specificSpeed_kW,
                       double gravity_mps2) {
    const double rimSpeed_mps =
        (0.31 + 2.5e-3 * specificSpeed_kW) * sqrt(2.0 * gravity_mps2 * head_m);
    return rimSpeed_mps * secondsPerMinute / (constants::pi * speed_rpm);
}

double waterStartingTime_s(std::span<const ConduitPiece> pieces, double flow_m3s, double head_m,
                           double gravity_mps2) {
    double sum = 0.0;
    for (const auto& piece : pieces) {
        sum += piece.length_m / piece.area_m2;
    }
    return flow_m3s / (gravity_mps2 * head_m) * sum;
}

PenstockNumbers penstockNumbers(const ConduitPiece& pipe, double waveSpeed_mps, double flow_m3s,
                                double head_m, double gravity_mps2) {
    const double travel = pipe.length_m / waveSpeed_mps;
    const double impedance = waveSpeed_mps * flow_m3s / (gravity_mps2 * pipe.area_m2 * head_m);
    return {2.0 * travel, travel, impedance, impedance * travel, 0.5 * impedance};
}

std::complex<double> pipeResponse(const PenstockNumbers& numbers, std::complex<double> s) {
    return -numbers.impedance_pu * tanh(numbers.travelTime_s * s);
}

double eulerHead_m(const EulerVelocities& v, double gravity_mps2) {
    return (v.u1_mps * v.cu1_mps - v.u2_mps * v.cu2_mps) / gravity_mps2;
}

LinearTurbine linearTurbine(const ChartPoint& p, double relativeOpening) {
    // From dh = h_q dq + h_n dn + h_c dc with c = 1/τ, solved for dq.
    const double dc_dy = -1.0 / square(relativeOpening);
    LinearTurbine linear;
    linear.qH = 1.0 / p.dh_dq;
    linear.qX = -p.dh_dn / p.dh_dq;
    linear.qY = -p.dh_dc * dc_dy / p.dh_dq;
    linear.mH = p.dm_dq * linear.qH;
    linear.mX = p.dm_dn + p.dm_dq * linear.qX;
    linear.mY = p.dm_dc * dc_dy + p.dm_dq * linear.qY;
    return linear;
}

LinearTurbine idealTurbine() {
    return {0.5, 0.0, 1.0, 1.5, -1.0, 1.0};
}

std::complex<double> rigidColumnResponse(const LinearTurbine& u, double waterStartingTime_s,
                                         std::complex<double> s) {
    const std::complex<double> column = waterStartingTime_s * s;
    return (u.mY + (u.mY * u.qH - u.mH * u.qY) * column) / (1.0 + u.qH * column);
}

} // namespace headroom::machines
