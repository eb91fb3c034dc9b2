// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/rest_solver.h"
#include "simulation/state.h"

/// Governors, load references, servos and breakers of all units over one step.
namespace headroom::simulation {

class GateControl {
public:
    explicit GateControl(const Model& model) : model_(model) {}

    /// Servos standing, governors at rest, load orders translated into openings.
    void begin(State& state, const RestPoint& rest);
    /// Moves every gate to the new time; sets each unit's trip fraction and joining flag.
    void advance(State& state, double start_s, double step_s);
    /// Breakers that close, overspeed, chattering: what follows from the new instant.
    void afterWater(State& state);
    /// Openings that jump at this instant.
    void afterJump(State& state);

private:
    control::Measured measured(const State& state, int unit, double time_s, double step_s) const;
    void advanceUnit(State& state, int unit, double start_s, double step_s);
    void moveGate(State& state, int unit, double start_s, double step_s);
    double governed(State& state, int unit, double time_s, double step_s);
    double wanted(State& state, int unit, double time_s, double step_s);
    void trip(State& state, int unit, double time_s);
    void protect(State& state, int unit);
    void countChanges(State& state, int unit);
    std::vector<control::LoadOrder> loadOrders(State& state, const RestPoint& rest, int unit);

    const Model& model_;
};

} // namespace headroom::simulation
