// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/model.h"

#include <limits>
#include <memory>
#include <optional>
#include <vector>

/// Everything that moves in a run. Sized once from the model; nothing is allocated in a step.
namespace headroom::simulation {

/// Constants of a branch for one step and what was solved: b Q + r Q|Q| = w₀ + H_from − H_to.
struct BranchState {
    double w0_m = 0.0;
    double linear_sm2 = 1.0;
    double forward_s2m5 = 0.0, reverse_s2m5 = 0.0;
    double flow_m3s = 0.0, slope_m2s = 0.0;
    double now_m3s = 0.0, before_m3s = 0.0; ///< rigid: flow at this and the last instant
};

struct ChamberState {
    double volume_m3 = 0.0;
    double flow_m3s = 0.0; ///< into the chamber, at this instant
    double next_m3s = 0.0; ///< being solved
    double slope_m2s = 0.0;
    double level_m = 0.0;
};

/// Turbine, shaft and generator of one unit. Speeds, torques in shares of the rated ones.
struct MachineState {
    double flow_m3s = 0.0, flowBefore_m3s = 0.0;
    double x = 0.0, xBefore = 0.0; ///< flow over relative opening, for the first guess
    double speed = 1.0, speedBefore = 1.0;
    double torque = 0.0;     ///< turbine, at this instant
    double electrical = 0.0; ///< taken from the shaft, at this instant
    double runnerHead_m = 0.0;
    double shaftPower_W = 0.0, terminalPower_W = 0.0;
    grid::RotorState rotor;
    bool onGrid = true;
};

/// What a unit's branch needs in one step and the iterate of its own unknowns.
struct MachineWork {
    double tau = 0.0, c = 0.0; ///< relative opening and its inverse
    bool shut = false;
    double w0_m = 0.0, linear_sm2 = 0.0; ///< inertia
    double prescribed = 0.0;             ///< of an ideal unit, see `UnitStep`
    double q = 0.0, n = 1.0;             ///< iterate
    bool speedKnown = false;
    double speedShare = 0.0;    ///< Δt/(2T_a)
    double speedConstant = 0.0; ///< n' − share·(m − S·n') = constant
    double electricalSlope = 0.0, electricalConstant = 0.0;
    // linearised response: q + (gap + dw)/stiffness
    double gap_m = 0.0, stiffness_m = 1.0;
    double speedGap = 0.0, speedByFlow = 0.0;
    double head = 0.0, torque = 0.0; ///< per unit at the iterate
    double headByFlow = 0.0, headBySpeed = 0.0, torqueByFlow = 0.0, torqueBySpeed = 0.0;
    double flow_m3s = 0.0, slope_m2s = 0.0; ///< predicted at the present node heads
    double moved = 0.0;                     ///< size of the last correction, per unit
};

/// Gate, governor and switching of one unit.
struct ControlState {
    control::ServoState servo;
    std::unique_ptr<control::Controller> governor;
    std::optional<control::LoadControl> load;
    control::LoadReference noLoad;
    double opening = 0.0, openingBefore = 0.0, rate_1s = 0.0, travel = 0.0;
    double order = 0.0;
    double powerBefore = 0.0, power = 0.0; ///< grid power, of rated shaft power
    double lastSample_s = -std::numeric_limits<double>::infinity();
    bool lockedOut = false; ///< shut down by its protection
    bool joining = false;   ///< the breaker closes at the end of this step
    bool heldBack = false;
    bool stuck = false;
    double overspeedSince_s = std::numeric_limits<double>::infinity();
    double tripFraction = -1.0; ///< of the present step at which the breaker opens; < 0: not
    int modeChanges = 0;        ///< within the second that began at `changesSince_s`
    double changesSince_s = 0.0;
    bool chattered = false;
};

struct State {
    std::int64_t step = -1;
    double time_s = 0.0;
    bool restart = true;                      ///< backward Euler in the next step
    std::vector<double> head_m, headBefore_m; ///< by node
    std::vector<double> storageFlow_m3s;      ///< by node, into the node's elastic storage
    std::vector<BranchState> branches;
    std::vector<ChamberState> chambers;
    std::vector<MachineState> machines;
    std::vector<MachineWork> work;
    std::vector<ControlState> controls;
    std::vector<double> startHead_m, endHead_m; ///< piezometric heads at the ends of conduits
    std::vector<double> startFlow_m3s, endFlow_m3s;
    hydraulics::ElasticState elastic;
    grid::AreaState area;
    double frequency_Hz = 50.0, frequencyBefore_Hz = 50.0, frequencyRate_Hzs = 0.0;
    double ownPowerAtRest_W = 0.0, ownPower_W = 0.0, lost_W = 0.0;
    Schedule schedule; ///< with the values before each prescription filled in
    Findings incidents;
};

} // namespace headroom::simulation
