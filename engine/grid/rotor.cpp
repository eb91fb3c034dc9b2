// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/rotor.h"

#include "numerics/elementary.h"

namespace headroom::grid {

RotorState rotorAtRest(const RotorSpec& spec, double torque, double frequency_pu) {
    return {torque / spec.synchronising_pu, frequency_pu, frequency_pu, true};
}

RotorState rotorAtClosing(double speed_pu, double frequency_pu) {
    return {0.0, speed_pu, frequency_pu, true};
}

ElectricalTorque torqueAfter(const RotorSpec& spec, const RotorState& state, double frequency_pu,
                             double step_s) {
    if (!state.onGrid) {
        return {};
    }
    // δ' = δ + ½Δt·ω_b·[(n − f) + (n' − f')]; m_g' = K_S·δ' + K_D·(n' − f')
    const double turn = 0.5 * step_s * spec.baseSpeed_rads();
    const double slip = state.speed_pu - state.frequency_pu;
    const double stiffness = spec.synchronising_pu * turn + spec.damping_pu;
    return {spec.synchronising_pu * (state.angle_rad + turn * slip) - stiffness * frequency_pu,
            stiffness};
}

RotorState rotorAfter(const RotorSpec& spec, const RotorState& state, double speed_pu,
                      double frequency_pu, double step_s) {
    RotorState next{0.0, speed_pu, frequency_pu, state.onGrid};
    if (state.onGrid) {
        const double turn = 0.5 * step_s * spec.baseSpeed_rads();
        next.angle_rad = state.angle_rad + turn * (state.speed_pu - state.frequency_pu)
                         + turn * (speed_pu - frequency_pu);
    }
    return next;
}

double torque_pu(const RotorSpec& spec, const RotorState& state) {
    const double slip = state.speed_pu - state.frequency_pu;
    return state.onGrid ? spec.synchronising_pu * state.angle_rad + spec.damping_pu * slip : 0.0;
}

Swing swing(const RotorSpec& spec, double accelerationTime_s) {
    const double stiffness = spec.synchronising_pu * spec.baseSpeed_rads();
    return {numerics::sqrt(stiffness / accelerationTime_s),
            0.5 * spec.damping_pu / numerics::sqrt(stiffness * accelerationTime_s)};
}

} // namespace headroom::grid
