// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "control/order_memory.h"

#include <optional>
#include <string>
#include <vector>

/// The gate servomotor: stroke y follows the order within rates that depend on position.
namespace headroom::control {

/// Closing at one rate from wherever the gate is down to a stroke.
struct ClosingStage {
    double downTo_pu = 0.0;    ///< stroke where the stage ends; the last stage's is 0
    double fullStroke_s = 0.0; ///< time a full stroke would take at this rate
};

struct ServoSpec {
    double opening_s = 10.0;           ///< full stroke
    std::vector<ClosingStage> closing; ///< from the open end down; at least one
    double cushionBelow_pu = 0.0;      ///< stroke below which the cushion acts; 0: none
    double cushion_s = 0.0;            ///< time from `cushionBelow_pu` to the closed end
    double deadTime_s = 0.0;
    double lag_s = 0.1; ///< T_y of ẏ = (order − y)/T_y; 0: follows at once
    double lowest_pu = 0.0, highest_pu = 1.0;
    std::optional<double> emergencyClosing_s =
        {}; ///< full stroke on the emergency path; else as closing
    double emergencyDeadTime_s = 0.0;

    /// Closing rate [1/s], ≥ 0, just below stroke `y`, and the stroke where it next changes.
    struct Rate {
        double rate_1s = 0.0;
        double until_pu = 0.0;
    };
    Rate closingRate(double opening_pu, bool emergency) const;
    /// Time to close from one stroke to a lower one at the limiting rates, without dead time.
    double closingTime_s(double from_pu, double to_pu) const;
};

/// All faults of a servo's data; empty when it can run.
Findings check(const ServoSpec& spec, const std::string& subject = {});

struct ServoState {
    double opening_pu = 0.0;
    double rate_1s = 0.0;                   ///< mean over the last step, opening positive
    double travel_pu = 0.0;                 ///< accumulated |movement|
    std::optional<double> emergency_s = {}; ///< when the emergency path was tripped
    bool stuck = false;                     ///< stays where it is whatever is ordered
    OrderMemory orders;
};

/// A servo standing at `opening_pu` with that order since ever; `step_s` is the run's step.
ServoState servoAtRest(const ServoSpec& spec, double opening_pu, double step_s);

/// The order over one step: just after its beginning and at its end, straight between.
struct ServoOrder {
    double atStart_pu = 0.0;
    double atEnd_pu = 0.0;
};

/// Advances from `time_s` to `time_s + step_s`. The lag is exact for a straight order; rate and
/// position limits act on the increment, stage boundaries are found inside the step. An order at
/// an end of the stroke presses the gate against it, so a full closing takes exactly the time of
/// its rates, whatever the lag.
void advance(const ServoSpec& spec, ServoState& state, const ServoOrder& order, double time_s,
             double step_s);

} // namespace headroom::control
