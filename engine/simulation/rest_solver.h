// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/model.h"

#include <optional>
#include <vector>

/// The steady state of the run's own discrete equations: heads of the unknown nodes, discharges of
/// conduits and units, and the openings that give the outputs asked for.
/// Derivation: resources/theory/rest_state.md.
namespace headroom::simulation {

struct RestAsked {
    std::vector<std::optional<double>> output_W; ///< by unit: find the opening
    std::vector<double> opening;                 ///< by unit, where no output is asked
};

struct RestPoint {
    std::vector<double> head_m; ///< by node
    std::vector<double> conduitFlow_m3s;
    std::vector<double> unitFlow_m3s;
    std::vector<double> opening;   ///< servo stroke by unit
    std::vector<double> torque_pu; ///< turbine, of rated
    double residual = 0.0;         ///< largest, scaled
};

/// What the study's start asks, unit by unit.
RestAsked askedAtStart(const Model& model);

/// Newton with continuation from 10 % of the outputs. Finding: what can be reached and what stops
/// it, or that there is no steady state.
Result<RestPoint> solveRest(const Model& model, const RestAsked& asked);

/// Grid power of a unit at rest [W].
double restOutput_W(const Model& model, const RestPoint& rest, int unit);

} // namespace headroom::simulation
