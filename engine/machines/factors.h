// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "machines/francis_form.h"

#include <complex>
#include <span>

/// Numbers by which turbines and waterways are compared. Speeds n in rpm where the trade does so.
namespace headroom::machines {

struct TurbineDuty {
    double speed_rpm = 0.0, flow_m3s = 0.0, head_m = 0.0, diameter_m = 0.0;
    double efficiency = 1.0;
    double gravity_mps2 = 9.81, density_kgm3 = 1000.0;

    double power_W() const;
    double torque_Nm() const;
};

/// n₁₁, Q₁₁, T₁₁, P₁₁ on runner diameter and head in m, speed in rpm.
struct UnitQuantities {
    double n11 = 0.0, q11 = 0.0, t11 = 0.0, p11 = 0.0;
};
UnitQuantities unitQuantities(const TurbineDuty& duty);

/// Dimensionless factors of IEC 60193 (from memory), E = gH, n in 1/s.
struct EnergyFactors {
    double nEd = 0.0, qEd = 0.0, tEd = 0.0, pEd = 0.0;
};
struct SpeedFactors {
    double eNd = 0.0, qNd = 0.0, tNd = 0.0, pNd = 0.0;
};
EnergyFactors energyFactors(const TurbineDuty& duty);
SpeedFactors speedFactors(const TurbineDuty& duty);

struct SpecificSpeeds {
    double nQe = 0.0;         ///< n√Q/E^0.75, n in 1/s
    double nq = 0.0;          ///< n√Q/H^0.75, rpm
    double kilowatt = 0.0;    ///< n√P/H^1.25, P in kW
    double horsepower = 0.0;  ///< the same, P in metric hp
    double speedNumber = 0.0; ///< ω√Q/(2gH)^0.75
};
SpecificSpeeds specificSpeeds(const TurbineDuty& duty);

/// n√P/H^1.25 with the unit of power and head that the caller chooses.
double specificSpeed(double speed, double power, double head);

/// Trial specific speeds of Francis runners over head; spread ±20 %, for defaults only.
double trialSpecificSpeed_mhp(double head_m);   ///< 2334/√H
double trialSpecificSpeed_kW(double head_m);    ///< 3470 H^−0.625
double trialEnergySpecificSpeed(double head_m); ///< N_QE = 1.924/H^0.512
/// Runaway over rated speed at design head, full gate: 0.63 n_s^0.2, n_s in metric hp.
double trialRunaway_pu(double specificSpeed_mhp);
/// Reference runner diameter from speed, head and n_s(kW): u = (0.31 + 2.5e-3 n_s)·√(2gH).
double trialDiameter_m(double speed_rpm, double head_m, double specificSpeed_kW,
                       double gravity_mps2);

struct ConduitPiece {
    double length_m = 0.0, area_m2 = 0.0;
};
/// T_w = Q/(gH)·ΣL/A [s].
double waterStartingTime_s(std::span<const ConduitPiece> pieces, double flow_m3s, double head_m,
                           double gravity_mps2);

/// Numbers of an elastic penstock.
struct PenstockNumbers {
    double reflectionTime_s = 0.0; ///< 2L/a
    double travelTime_s = 0.0;     ///< T_e = L/a
    double impedance_pu = 0.0;     ///< Z_n = aQ/(gAH)
    double waterStartingTime_s = 0.0;
    double allievi = 0.0; ///< ρ_A = Z_n/2
};
PenstockNumbers penstockNumbers(const ConduitPiece& pipe, double waveSpeed_mps, double flow_m3s,
                                double head_m, double gravity_mps2);
/// Head over flow, per unit, of a frictionless elastic pipe below still water: −Z_n tanh(T_e s).
std::complex<double> pipeResponse(const PenstockNumbers& numbers, std::complex<double> s);

/// gH = u₁c_u1 − u₂c_u2 [m].
struct EulerVelocities {
    double u1_mps = 0.0, cu1_mps = 0.0, u2_mps = 0.0, cu2_mps = 0.0;
};
double eulerHead_m(const EulerVelocities& velocities, double gravity_mps2);

/// Small changes about a steady point, per unit of the rated values:
/// q = q_h h + q_x n + q_y y and m = m_h h + m_x n + m_y y, with y the relative opening τ.
struct LinearTurbine {
    double qH = 0.0, qX = 0.0, qY = 0.0;
    double mH = 0.0, mX = 0.0, mY = 0.0;

    /// Self-regulation on torque, e_t = m_x.
    double selfRegulation() const { return mX; }
};
/// From a chart point with its slopes at relative opening τ.
LinearTurbine linearTurbine(const ChartPoint& slopes, double relativeOpening);
/// The ideal unit q = y√h with constant efficiency, at h = n = y = 1.
LinearTurbine idealTurbine();

/// Power over opening of a unit at constant speed below a rigid frictionless column with starting
/// time T_w: (m_y + (m_y q_h − m_h q_y) T_w s)/(1 + q_h T_w s).
std::complex<double> rigidColumnResponse(const LinearTurbine& unit, double waterStartingTime_s,
                                         std::complex<double> s);

} // namespace headroom::machines
