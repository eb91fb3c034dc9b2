// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// The rotating mass. Turbine torque positive in the turbine's direction of turning.
namespace headroom::machines {

/// J from GD² (mass times diameter squared, the same unit): J = GD²/4.
inline double inertiaFromGd2(double gd2_kgm2) {
    return gd2_kgm2 / 4.0;
}
inline double gd2FromInertia(double inertia_kgm2) {
    return 4.0 * inertia_kgm2;
}

/// Acceleration time T_a = J·ω²/P [s] on the power base given.
inline double accelerationTime_s(double inertia_kgm2, double speed_rads, double basePower_W) {
    return inertia_kgm2 * speed_rads * speed_rads / basePower_W;
}
inline double inertiaFromAccelerationTime(double time_s, double speed_rads, double basePower_W) {
    return time_s * basePower_W / (speed_rads * speed_rads);
}
/// The same time on another power base: T_a·P_old/P_new.
inline double rebase(double time_s, double oldBase_W, double newBase_W) {
    return time_s * oldBase_W / newBase_W;
}
/// Inertia constant H = T_a/2 [s] on the same base.
inline double inertiaConstant_s(double accelerationTime) {
    return 0.5 * accelerationTime;
}

/// ½Jω² [J].
inline double kineticEnergy_J(double inertia_kgm2, double speed_rads) {
    return 0.5 * inertia_kgm2 * speed_rads * speed_rads;
}

/// J·dω/dt = T − T_g by the trapezoid, for a torque T' = T'₀ + a·ω' at the new time.
struct ShaftStep {
    double speed_rads = 0.0;   ///< ω at the old time
    double netTorque_Nm = 0.0; ///< T − T_g at the old time
    double inertia_kgm2 = 0.0; ///< > 0
    double step_s = 0.0;

    /// ω' for a net torque at the new time.
    double speedAfter(double netTorqueAfter_Nm) const {
        return speed_rads + 0.5 * step_s / inertia_kgm2 * (netTorque_Nm + netTorqueAfter_Nm);
    }
    /// ω' where the net torque at the new time is `constant_Nm` + `slope`·ω'.
    double speedAfter(double constant_Nm, double slope_Nms) const {
        const double share = 0.5 * step_s / inertia_kgm2;
        return (speed_rads + share * (netTorque_Nm + constant_Nm)) / (1.0 - share * slope_Nms);
    }
};

} // namespace headroom::machines
