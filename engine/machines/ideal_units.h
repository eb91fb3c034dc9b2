// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "numerics/elementary.h"
#include "numerics/table.h"

/// Units without a chart, for checks and first sketches. Flow from inlet to outlet is positive.
namespace headroom::machines {

/// The textbook ideal turbine: Q = τ·Q_r·√(H/H_r), odd in H, constant efficiency.
struct OrificeUnit {
    double ratedHead_m = 0.0;   ///< > 0
    double ratedFlow_m3s = 0.0; ///< > 0
    double efficiency = 1.0;    ///< 0…1

    double flow_m3s(double head_m, double relativeOpening) const {
        return relativeOpening * ratedFlow_m3s * numerics::signedRoot(head_m / ratedHead_m);
    }
    /// r of H = r·Q|Q| [s²/m⁵]; infinite at τ = 0.
    double resistance_s2m5(double relativeOpening) const {
        return ratedHead_m / numerics::square(relativeOpening * ratedFlow_m3s);
    }
    double head_m(double flow_m3s, double relativeOpening) const {
        return resistance_s2m5(relativeOpening) * numerics::signedSquare(flow_m3s);
    }
    /// Shaft power [W]; negative flow gives none.
    double power_W(double flow_m3s, double head_m, double density_kgm3, double gravity_mps2) const {
        const double water = density_kgm3 * gravity_mps2 * flow_m3s * head_m;
        return flow_m3s > 0.0 ? efficiency * water : 0.0;
    }
};

/// Discharge over time, whatever the head.
struct FlowUnit {
    numerics::Table flow_m3s; ///< over time [s]; held outside

    double at(double time_s) const { return flow_m3s.value(time_s); }
};

/// Constant hydraulic power ρ g Q H, the ideal governor of Thoma's theory.
struct PowerUnit {
    double power_W = 0.0;
    double density_kgm3 = 1000.0;
    double gravity_mps2 = 9.81;
    double lowestHead_m = 1.0; ///< below this head the flow stays that of this head

    struct Flow {
        double flow_m3s = 0.0;
        double slope_m2s = 0.0; ///< dQ/dH ≤ 0; 0 below `lowestHead_m`
        bool belowLowest = false;
    };
    Flow at(double head_m) const {
        const bool low = !(head_m > lowestHead_m);
        const double head = low ? lowestHead_m : head_m;
        const double flow = power_W / (density_kgm3 * gravity_mps2 * head);
        return {flow, low ? 0.0 : -flow / head, low};
    }
};

} // namespace headroom::machines
