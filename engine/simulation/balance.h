// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/state.h"

#include <vector>

/// Bookkeeping of water and of the rotating train, with the scheme's own products. An identity of
/// the scheme; never quoted as accuracy.
namespace headroom::simulation {

class BalanceKeeper {
public:
    explicit BalanceKeeper(const Model& model);

    void begin(const State& state);
    /// After each step; `jumped`: discharges were settled at this instant, which moves the half
    /// cells at the ends of rows without taking time.
    void take(const State& state, bool jumped);
    /// At recorded instants.
    void compare(const State& state);
    const results::Balance& balance() const { return balance_; }

private:
    double stored(const State& state) const;
    double inflow(const State& state, double& entering) const;
    void takeEnergy(const State& state);

    const Model& model_;
    results::Balance balance_;
    double base_m3_ = 0.0, first_m3_ = 0.0, net_m3_ = 0.0;
    double flow_m3s_ = 0.0, entering_m3s_ = 0.0;
    std::vector<double> speed_, torque_, electrical_, kinetic_, work_, moved_; // by unit
    std::vector<bool> onGrid_;
};

} // namespace headroom::simulation
