// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/state.h"
#include "simulation/unit_branch.h"

#include <optional>
#include <string>
#include <utility>
#include <vector>

/// One step of the water: branch constants, clusters, and what they hand back to conduits and
/// chambers (steps 4 to 7 of the list at `Advance::step`).
namespace headroom::simulation {

/// Why a cluster could not be solved: the largest residuals by name.
struct ClusterFailure {
    int cluster = -1;
    std::string where;
    std::vector<std::pair<std::string, double>> residuals; ///< path, m³/s; largest first
};

class WaterStep {
public:
    explicit WaterStep(const Model& model);

    enum class Mode {
        smooth, ///< rigid inertia by the two-step formula
        kink,   ///< rigid inertia by backward Euler
        jump,   ///< at one instant: a step that takes next to no time
    };
    /// Known heads at the new time are already in `state.head_m`. `step_s` is the model's step, or
    /// a sliver of it for a jump.
    /// @return false where a cluster has no solution; see `failure`.
    bool solve(State& state, const std::vector<UnitStep>& units, double step_s, Mode mode);
    /// Volumes, levels, discharges and heads of the new time become the state's.
    void accept(State& state, const std::vector<UnitStep>& units, double step_s);
    /// The same at one instant: discharges and heads jump, volumes and inertias do not move.
    void acceptJump(State& state, const std::vector<UnitStep>& units);

    const ClusterFailure& failure() const { return failure_; }

private:
    void prepareRigid(BranchState& branch, const ConduitRow& conduit) const;
    void prepareEnd(State& state, const BranchRow& row, BranchState& branch) const;
    void prepareUnits(State& state, const std::vector<UnitStep>& units);
    void guessHeads(State& state, const Cluster& cluster);
    bool solveCluster(State& state, const Cluster& cluster);
    bool solveRobustly(State& state, const Cluster& cluster);
    bool evaluate(State& state, const Cluster& cluster, bool alone);
    bool correctHeads(State& state, const Cluster& cluster);
    double totalResidual() const;
    std::optional<double> tryMove(State& state, const Cluster& cluster, double share);
    void setFailure(State& state, std::size_t cluster);
    double addBranch(State& state, int branch);
    double addChamber(State& state, int chamber);
    void addFlow(int fromSlot, int toSlot, double flow, double slope);
    double drop(const State& state, const UnitRow& unit) const;
    void closeBalance(State& state, const Cluster& cluster);
    void handBack(State& state);
    void handBackRigid(State& state, std::size_t conduit);
    void handBackElastic(State& state, std::size_t conduit);

    const Model& model_;
    double step_ = 0.0;
    Mode mode_ = Mode::smooth;
    std::vector<double> residual_, matrix_, change_, trial_; // of the cluster being solved
    std::size_t size_ = 0;
    double worstChange_ = 0.0, worstMove_ = 0.0;
    ClusterFailure failure_;
};

} // namespace headroom::simulation
