// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/state.h"

/// A unit as a branch of its cluster: discharge and speed are its own unknowns, eliminated in
/// place, so that the cluster sees an increasing discharge over the head difference.
namespace headroom::simulation {

struct UnitStep {
    double step_s = 0.0;
    bool backwardEuler = false;
    double stroke = 0.0;        ///< servo stroke at the new time
    double prescribed = 0.0;    ///< `flow` unit: discharge; `power` unit: share of its power
    double frequency_pu = 1.0;  ///< of the grid at the new time
    double tripFraction = -1.0; ///< of the step; < 0: the breaker does not move
    bool guess = true;          ///< extrapolate the first iterate
};

/// Constants of the step and the first guess of flow and speed.
void prepareUnit(const UnitRow& unit, const MachineState& state, const UnitStep& step,
                 MachineWork& work);

/// Linearises the unit about its iterate at this head difference: fills flow, slope.
/// False: the unit has no answer here (`power` unit without head).
bool linearise(const Model& model, const UnitRow& unit, double drop_m, MachineWork& work);

/// Takes the correction that belongs to a change of the head difference.
void correct(const UnitRow& unit, double change_m, MachineWork& work);

/// Solves the unit alone at a given head difference by bisection: the last resort. False if no
/// root is bracketed.
bool solveAlone(const Model& model, const UnitRow& unit, double drop_m, MachineWork& work);

/// Puts the solved iterate into the machine's state at the new time.
void acceptUnit(const Model& model, const UnitRow& unit, const UnitStep& step, double drop_m,
                MachineWork& work, MachineState& state);

} // namespace headroom::simulation
