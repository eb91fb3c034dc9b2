// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/constants.h"

namespace headroom::grid {

/// A synchronous generator against the area: a spring and a damper between rotor and grid.
/// Torques per unit of rated apparent power over synchronous speed, positive = taken from the
/// shaft; speeds per unit of synchronous.
struct RotorSpec {
    double synchronising_pu = 1.5; ///< K_S, torque per electrical rad
    double damping_pu = 20.0;      ///< K_D, torque per unit of slip
    double nominal_Hz = 50.0;
    bool locked = false; ///< speed is the grid's frequency; no angle

    double baseSpeed_rads() const { return 2.0 * constants::pi * nominal_Hz; }
};

struct RotorState {
    double angle_rad = 0.0; ///< electrical, ahead of the grid; K_S·angle is the spring's torque
    double speed_pu = 1.0;
    double frequency_pu = 1.0;
    bool onGrid = true;
};

/// The state that carries `torque_pu` for ever at speed = frequency.
RotorState rotorAtRest(const RotorSpec& spec, double torque_pu, double frequency_pu);
/// The state at the instant the breaker closes: angle 0 (ideal synchronising).
RotorState rotorAtClosing(double speed_pu, double frequency_pu);

/// Electrical torque at the new time as a straight function of the new speed n':
/// m_g' = constant + slope·n'. Angle by the trapezoid; off the grid both are 0.
struct ElectricalTorque {
    double constant_pu = 0.0;
    double slope_pu = 0.0;
    double at(double speed_pu) const { return constant_pu + slope_pu * speed_pu; }
};
ElectricalTorque torqueAfter(const RotorSpec& spec, const RotorState& state, double frequency_pu,
                             double step_s);
/// The state after the step, once n' is known.
RotorState rotorAfter(const RotorSpec& spec, const RotorState& state, double speed_pu,
                      double frequency_pu, double step_s);
/// Electrical torque of a state.
double torque_pu(const RotorSpec& spec, const RotorState& state);

/// Of a unit locked to the frequency: turbine torque minus what accelerates its own mass,
/// T_g = T − J·dω/dt.
inline double lockedTorque_Nm(double turbineTorque_Nm, double inertia_kgm2,
                              double speedRate_rads2) {
    return turbineTorque_Nm - inertia_kgm2 * speedRate_rads2;
}

/// Undamped swing [rad/s] and damping ratio of the linear machine, T_a = 2H on the same base.
struct Swing {
    double frequency_rads = 0.0, dampingRatio = 0.0;
};
Swing swing(const RotorSpec& spec, double accelerationTime_s);

} // namespace headroom::grid
