// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <vector>

/// One time step for a plant, and which conduits carry waves at that step.
namespace headroom::simulation {

enum class ConduitKind { elastic, rigid, shortElement };

struct StepRequest {
    struct Conduit {
        double travelTime_s = 0.0;
        ConduitKind kind = ConduitKind::elastic; ///< as asked for
        bool automatic = true;                   ///< elastic only if two cells fit
    };
    std::vector<Conduit> conduits;
    double cap_s = 0.01;                 ///< the step is between half of this and this
    std::vector<double> samplePeriods_s; ///< of controllers; the step divides each
};

struct StepChoice {
    double step_s = 0.0;
    std::vector<ConduitKind> kinds;
    std::vector<int> cells;         ///< 0 where not elastic
    std::vector<double> stretch;    ///< relative change of the wave speed, 0 where not elastic
    bool sampleTimesDivided = true; ///< false: no step in the range divides all sample times
};

/// The largest step between half the cap and the cap at which no elastic conduit is stretched by
/// more than 0.5 %; if there is none, the one of smallest worst stretch.
StepChoice chooseStep(const StepRequest& request);

/// Fewest cells of an elastic conduit.
inline constexpr int leastCells = 2;
inline constexpr double stretchAllowed = 0.005;

} // namespace headroom::simulation
