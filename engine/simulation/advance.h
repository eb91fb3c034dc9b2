// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/gate_control.h"
#include "simulation/rest_solver.h"
#include "simulation/state.h"
#include "simulation/water_step.h"

#include <optional>
#include <vector>

/// The state of a run and its way from one instant to the next.
namespace headroom::simulation {

class Advance {
public:
    explicit Advance(const Model& model, bool undisturbed = false);

    /// Solves the rest and stands the plant at it, one step before t = 0. `undisturbed` leaves
    /// every event and offset out.
    std::optional<Finding> begin();

    /// One time step, the twelve steps of resources/theory/time_step.md:
    ///   1 inputs at the new time, 2 controllers and gates, 3 sweep of elastic conduits,
    ///   4 branch constants, 5 clusters, 6 units inside them, 7 continuity to the last digit,
    ///   8 grid, 9 mode flags; then the caller does 10 watch, 11 record, 12 finite and cancel.
    /// @return false where the water has no solution; `failure` says where.
    bool step();

    const State& state() const { return state_; }
    State& state() { return state_; }
    const RestPoint& rest() const { return rest_; }
    Finding failure() const;
    /// Were discharges settled at the present instant because something prescribed jumped?
    bool jumped() const { return jumped_; }
    /// Are all heads, speeds and discharges numbers?
    bool finite() const;

private:
    void placeWater();
    std::optional<Finding> placeChambers();
    void placeMachines();
    void placeSchedule();
    void setKnownHeads(double time_s, bool after);
    bool areaRules(double time_s) const;
    double frequencyAt(double time_s, bool after) const;
    void fillUnitSteps(double time_s, bool after);
    bool modeChanges() const;
    void advanceGrid(double start_s, double end_s);
    void settleJump(double time_s);
    bool jumpAt(double time_s) const;
    double gridPower_W() const;

    const Model& model_;
    bool undisturbed_;
    State state_;
    RestPoint rest_;
    WaterStep water_;
    GateControl gates_;
    std::vector<UnitStep> unitSteps_;
    std::size_t nextJump_ = 0;
    bool jumped_ = false;
};

} // namespace headroom::simulation
