// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/load_control.h"

#include "base/ensure.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::control {

LoadControl::LoadControl(const LoadControlSpec& spec, std::vector<LoadOrder> orders,
                         LoadReference atRest, bool onGrid)
    : spec_(spec), ramp_{0.0, 0.0, atRest, atRest}, onGrid_(onGrid),
      released_s_(-std::numeric_limits<double>::infinity()) {
    for (const auto& order : orders) {
        add(order);
    }
}

void LoadControl::add(const LoadOrder& order) {
    const auto later = [](const LoadOrder& a, const LoadOrder& b) { return a.time_s < b.time_s; };
    waiting_.insert(std::upper_bound(waiting_.begin(), waiting_.end(), order, later), order);
}

LoadReference LoadControl::Ramp::at(double time_s) const {
    if (time_s <= from_s) {
        return from;
    }
    if (time_s >= from_s + over_s) {
        return to;
    }
    const double share = (time_s - from_s) / over_s;
    return {from.opening_pu + share * (to.opening_pu - from.opening_pu),
            from.power_pu + share * (to.power_pu - from.power_pu)};
}

void LoadControl::begin(const LoadOrder& order, double from_s) {
    ramp_ = {from_s, order.ramp_s, ramp_.at(from_s), order.target};
}

bool LoadControl::synchronised(double step_s, double speed_pu, double grid_pu) {
    const bool inside = std::fabs(speed_pu - grid_pu) <= spec_.synchroniseWithin_pu;
    inBand_s_ = inside ? inBand_s_ + step_s : 0.0;
    constexpr double rounding_s = 1e-9; // of a sum of counted steps
    return inside && inBand_s_ >= spec_.synchroniseHold_s - rounding_s;
}

LoadControl::Answer LoadControl::at(double time_s, double step_s, double speed_pu, double grid_pu) {
    Answer answer;
    const bool ready = onGrid_ || synchronised(step_s, speed_pu, grid_pu);
    while (!waiting_.empty() && waiting_.front().time_s <= time_s) {
        // Of several orders that are due, the newest is the one that counts.
        const bool replaced = waiting_.size() > 1 && waiting_[1].time_s <= time_s;
        const LoadOrder order = waiting_.front();
        const bool released = released_s_ <= time_s;
        if (!replaced && !(released && ready)) {
            answer.heldBack = true;
            break;
        }
        waiting_.erase(waiting_.begin());
        if (replaced) {
            if (onGrid_ && released) {
                begin(order, std::max(order.time_s, released_s_));
            }
            continue;
        }
        // On the grid the ramp begins at its own instant or that of the release; after
        // synchronising it begins when the breaker closes.
        begin(order, onGrid_ ? std::max(order.time_s, released_s_) : time_s);
        if (!onGrid_) {
            onGrid_ = true;
            answer.closeBreaker = true;
        }
    }
    answer.reference = ramp_.at(time_s);
    return answer;
}

void LoadControl::trip(double time_s, LoadReference noLoad) {
    onGrid_ = false;
    inBand_s_ = 0.0;
    ramp_ = {time_s, 0.0, noLoad, noLoad};
    std::erase_if(waiting_, [&](const LoadOrder& order) { return order.time_s <= time_s; });
    released_s_ = spec_.reloadNotBefore_s ? time_s + *spec_.reloadNotBefore_s : time_s;
}

} // namespace headroom::control
