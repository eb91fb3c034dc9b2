// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "control/controller.h"

#include <optional>
#include <vector>

namespace headroom::control {

/// Move the load to `target` over `ramp_s`, from `time_s` on; 0 s is a step.
struct LoadOrder {
    double time_s = 0.0;
    LoadReference target;
    double ramp_s = 0.0;
};

struct LoadControlSpec {
    std::optional<double> reloadNotBefore_s = {}; ///< after a trip; absent: no interlock
    double synchroniseWithin_pu = 0.005;          ///< of rated speed; common practice, no source
    double synchroniseHold_s = 1.0; ///< inside the band for this long; common practice, no source
};

/// The load reference of one unit: ramps, reload interlock, synchronising. A load order that comes
/// too early after a trip is held back and released when the interlock ends and the unit has been
/// synchronised; its ramp keeps its duration. A later order replaces an earlier one not yet done.
class LoadControl {
public:
    /// @param orders in rising time
    LoadControl(const LoadControlSpec& spec, std::vector<LoadOrder> orders, LoadReference atRest,
                bool onGrid);

    /// What the unit's controller and breaker are told at one instant.
    struct Answer {
        LoadReference reference;
        bool closeBreaker = false; ///< at this instant the unit may join the grid
        bool heldBack = false;     ///< a load order waits for the interlock or the speed
    };
    /// The reference at `time_s`, to be asked in rising time, once per step.
    /// @param step_s   since the last question; counts towards the synchronising time
    /// @param speed_pu of the unit
    /// @param grid_pu  frequency of the grid it would join
    Answer at(double time_s, double step_s, double speed_pu, double grid_pu);

    /// Breaker opened at `time_s`: the reference drops to `noLoad`, orders under way are dropped.
    void trip(double time_s, LoadReference noLoad);
    /// Adds an order at run time (a study's event that depends on another).
    void add(const LoadOrder& order);
    bool onGrid() const { return onGrid_; }
    /// Earliest instant a load order may act, −∞ if free.
    double releasedFrom_s() const { return released_s_; }

private:
    struct Ramp {
        double from_s = 0.0, over_s = 0.0;
        LoadReference from, to;
        LoadReference at(double time_s) const;
    };
    bool synchronised(double step_s, double speed_pu, double grid_pu);
    void begin(const LoadOrder& order, double from_s);

    LoadControlSpec spec_;
    std::vector<LoadOrder> waiting_;
    Ramp ramp_;
    bool onGrid_ = true;
    double released_s_;
    double inBand_s_ = 0.0;
};

} // namespace headroom::control
