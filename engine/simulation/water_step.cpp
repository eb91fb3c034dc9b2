// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/water_step.h"

#include "hydraulics/branch.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

constexpr int mostIterations = 12;
constexpr int mostRobust = 200, mostHalvings = 12;
constexpr double headTolerance = 1e-12; // of the plant's head
// Where laws are gently curved the next error is the square of a move times the curvature over the
// slope: below 1e-4 1/m for ends of conduits and rigid water, of the order of 1 for a runner.
constexpr double smoothTolerance = 1e-6; // of the plant's head
constexpr double unitTolerance = 3e-6;   // per unit

/// Solves the symmetric positive definite system in place (lower triangle of `matrix`, row by
/// row); false if a pivot is not positive.
bool choleskySolve(std::vector<double>& matrix, std::vector<double>& right, std::size_t n) {
    for (std::size_t j = 0; j < n; ++j) {
        double pivot = matrix[j * n + j];
        for (std::size_t k = 0; k < j; ++k) {
            pivot -= matrix[j * n + k] * matrix[j * n + k];
        }
        if (!(pivot > 0.0)) {
            return false;
        }
        const double root = std::sqrt(pivot);
        matrix[j * n + j] = root;
        for (std::size_t i = j + 1; i < n; ++i) {
            double sum = matrix[i * n + j];
            for (std::size_t k = 0; k < j; ++k) {
                sum -= matrix[i * n + k] * matrix[j * n + k];
            }
            matrix[i * n + j] = sum / root;
        }
    }
    for (std::size_t i = 0; i < n; ++i) {
        for (std::size_t k = 0; k < i; ++k) {
            right[i] -= matrix[i * n + k] * right[k];
        }
        right[i] /= matrix[i * n + i];
    }
    for (std::size_t i = n; i-- > 0;) {
        for (std::size_t k = i + 1; k < n; ++k) {
            right[i] -= matrix[k * n + i] * right[k];
        }
        right[i] /= matrix[i * n + i];
    }
    return true;
}

} // namespace

WaterStep::WaterStep(const Model& model) : model_(model) {
    std::size_t most = 1;
    for (const Cluster& cluster : model.clusters) {
        most = std::max(most, cluster.nodes.size());
    }
    residual_.resize(most);
    change_.resize(most);
    trial_.resize(most);
    matrix_.resize(most * most);
}

double WaterStep::drop(const State& state, const UnitRow& unit) const {
    return state.head_m[at(unit.inlet)] - state.head_m[at(unit.outlet)];
}

void WaterStep::prepareRigid(BranchState& branch, const ConduitRow& conduit) const {
    const EndLoss& from = conduit.geometry.from;
    const EndLoss& to = conduit.geometry.to;
    const double inertia = conduit.inertia_s2m2 / step_;
    const bool smooth = mode_ == Mode::smooth;
    const double expected = smooth ? 2.0 * branch.now_m3s - branch.before_m3s : branch.now_m3s;
    const double friction = conduit.quadratic_s2m5(expected);
    branch.w0_m = smooth ? inertia * (2.0 * branch.now_m3s - 0.5 * branch.before_m3s)
                         : inertia * branch.now_m3s;
    branch.linear_sm2 = (smooth ? 1.5 : 1.0) * inertia + conduit.linear_sm2;
    branch.forward_s2m5 = friction + conduit.forward_s2m5 + from.leaving_s2m5 + to.arriving_s2m5;
    branch.reverse_s2m5 = friction + conduit.reverse_s2m5 + from.arriving_s2m5 + to.leaving_s2m5;
}

void WaterStep::prepareEnd(State& state, const BranchRow& row, BranchState& branch) const {
    const ConduitRow& conduit = model_.conduits[at(row.conduit)];
    const auto elastic = at(conduit.row);
    const bool start = row.kind == BranchKind::elasticStart;
    const EndLoss& loss = start ? conduit.geometry.from : conduit.geometry.to;
    hydraulics::EndLaw law;
    if (mode_ == Mode::jump) { // the wave that arrives at this very instant
        const auto i = at(row.conduit);
        law.linear_sm2 =
            start ? model_.rows.startImpedance_sm2(elastic) : model_.rows.endImpedance_sm2(elastic);
        law.arriving_m = start ? state.startHead_m[i] - law.linear_sm2 * state.startFlow_m3s[i]
                               : state.endHead_m[i] + law.linear_sm2 * state.endFlow_m3s[i];
    } else {
        law = start ? model_.rows.startLaw(state.elastic, elastic)
                    : model_.rows.endLaw(state.elastic, elastic);
    }
    branch.w0_m = start ? -law.arriving_m : law.arriving_m;
    branch.linear_sm2 = law.linear_sm2;
    branch.forward_s2m5 = law.forward_s2m5 + (start ? loss.leaving_s2m5 : loss.arriving_s2m5);
    branch.reverse_s2m5 = law.reverse_s2m5 + (start ? loss.arriving_s2m5 : loss.leaving_s2m5);
}

void WaterStep::prepareUnits(State& state, const std::vector<UnitStep>& units) {
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        prepareUnit(model_.units[i], state.machines[i], units[i], state.work[i]);
    }
}

void WaterStep::guessHeads(State& state, const Cluster& cluster) {
    for (const int node : cluster.nodes) {
        const double now = state.head_m[at(node)];
        const double before = state.headBefore_m[at(node)];
        state.head_m[at(node)] = mode_ == Mode::smooth ? 2.0 * now - before : now;
        state.headBefore_m[at(node)] = now;
    }
}

/// Slots are -1 where the node's head is known: its row does not exist.
void WaterStep::addFlow(int fromSlot, int toSlot, double flow, double slope) {
    if (fromSlot >= 0) {
        residual_[at(fromSlot)] -= flow;
        matrix_[at(fromSlot) * size_ + at(fromSlot)] += slope;
    }
    if (toSlot >= 0) {
        residual_[at(toSlot)] += flow;
        matrix_[at(toSlot) * size_ + at(toSlot)] += slope;
        if (fromSlot >= 0) {
            matrix_[at(std::max(fromSlot, toSlot)) * size_ + at(std::min(fromSlot, toSlot))] -=
                slope;
        }
    }
}

double WaterStep::addBranch(State& state, int index) {
    const BranchRow& row = model_.branches[at(index)];
    BranchState& branch = state.branches[at(index)];
    const double from = row.from >= 0 ? state.head_m[at(row.from)] : 0.0;
    const double to = row.to >= 0 ? state.head_m[at(row.to)] : 0.0;
    const double w = branch.w0_m + from - to;
    const double quadratic = w < 0.0 ? branch.reverse_s2m5 : branch.forward_s2m5;
    const auto solved = hydraulics::solveBranch(branch.linear_sm2, quadratic, w);
    branch.flow_m3s = solved.flow_m3s;
    branch.slope_m2s = solved.slope_m2s;
    addFlow(row.fromSlot, row.toSlot, solved.flow_m3s, solved.slope_m2s);
    return solved.flow_m3s;
}

double WaterStep::addChamber(State& state, int index) {
    const ChamberRow& row = model_.chambers[at(index)];
    ChamberState& chamber = state.chambers[at(index)];
    double head = state.head_m[at(row.node)];
    if (row.tunnelEnd >= 0) {
        const int conduit = row.tunnelEnd / 2;
        const int branch = model_.startEnd(row.tunnelEnd) ? model_.startBranch[at(conduit)]
                                                          : model_.endBranch[at(conduit)];
        const double flow = state.branches[at(branch)].flow_m3s;
        head -= row.velocityShare_s2m5 * flow * flow;
    }
    const auto law = hydraulics::chamberBranch(
        row.table, row.throttle, {chamber.volume_m3, chamber.flow_m3s, chamber.next_m3s, step_});
    const auto solved = law.flow(head);
    chamber.next_m3s = solved.flow_m3s;
    chamber.slope_m2s = solved.slope_m2s;
    addFlow(row.slot, -1, solved.flow_m3s, solved.slope_m2s);
    return solved.flow_m3s;
}

/// Residuals and Jacobian of the cluster at the present heads.
bool WaterStep::evaluate(State& state, const Cluster& cluster, bool alone) {
    size_ = cluster.nodes.size();
    std::fill_n(residual_.begin(), size_, 0.0);
    std::fill_n(matrix_.begin(), size_ * size_, 0.0);
    for (const int branch : cluster.branches) {
        addBranch(state, branch);
    }
    for (const int chamber : cluster.chambers) {
        addChamber(state, chamber);
    }
    for (const int node : cluster.nodes) {
        const double storage = model_.nodes[at(node)].storage_m2;
        if (storage > 0.0) { // elastic storage of short elements, trapezoid
            const double slope = 2.0 * storage / step_;
            const double flow = slope * (state.head_m[at(node)] - state.headBefore_m[at(node)])
                                - state.storageFlow_m3s[at(node)];
            addFlow(model_.nodes[at(node)].slot, -1, flow, slope);
        }
    }
    bool answered = true;
    for (const int unit : cluster.units) {
        const UnitRow& row = model_.units[at(unit)];
        MachineWork& work = state.work[at(unit)];
        const double head = drop(state, row);
        answered =
            (alone ? solveAlone(model_, row, head, work) : linearise(model_, row, head, work))
            && answered;
        addFlow(row.inletSlot, row.outletSlot, work.flow_m3s, work.slope_m2s);
    }
    return answered;
}

/// One Newton correction of heads, branch flows and units; false if the system is not solvable.
bool WaterStep::correctHeads(State& state, const Cluster& cluster) {
    if (size_ == 1) {
        if (!(matrix_[0] > 0.0)) {
            return false;
        }
        change_[0] = residual_[0] / matrix_[0];
    } else {
        std::copy_n(residual_.begin(), size_, change_.begin());
    }
    if (size_ > 1 && !choleskySolve(matrix_, change_, size_)) {
        return false;
    }
    worstChange_ = worstMove_ = 0.0;
    for (std::size_t i = 0; i < size_; ++i) {
        if (!std::isfinite(change_[i])) {
            return false;
        }
        worstChange_ = std::max(worstChange_, std::fabs(change_[i]));
        state.head_m[at(cluster.nodes[i])] += change_[i];
    }
    const auto moved = [&](int slot) { return slot >= 0 ? change_[at(slot)] : 0.0; };
    for (const int index : cluster.branches) {
        const BranchRow& row = model_.branches[at(index)];
        BranchState& branch = state.branches[at(index)];
        branch.flow_m3s += branch.slope_m2s * (moved(row.fromSlot) - moved(row.toSlot));
    }
    for (const int index : cluster.chambers) {
        ChamberState& chamber = state.chambers[at(index)];
        chamber.next_m3s += chamber.slope_m2s * moved(model_.chambers[at(index)].slot);
    }
    for (const int index : cluster.units) {
        const UnitRow& row = model_.units[at(index)];
        MachineWork& work = state.work[at(index)];
        correct(row, moved(row.inletSlot) - moved(row.outletSlot), work);
        worstMove_ = std::max(worstMove_, work.moved);
    }
    return true;
}

bool WaterStep::solveCluster(State& state, const Cluster& cluster) {
    // A throttle is sharply bent at rest; elsewhere the next Newton error is the square of a move.
    const double tolerance =
        (cluster.chambers.empty() ? smoothTolerance : headTolerance) * model_.headScale_m;
    for (int count = 0; count < mostIterations; ++count) {
        if (!evaluate(state, cluster, false) || !correctHeads(state, cluster)) {
            return false;
        }
        if (worstChange_ <= tolerance && worstMove_ <= unitTolerance) {
            return std::isfinite(worstMove_);
        }
    }
    return false;
}

double WaterStep::totalResidual() const {
    double sum = 0.0;
    for (std::size_t i = 0; i < size_; ++i) {
        sum += std::fabs(residual_[i]);
    }
    return sum;
}

/// Moves the heads by a share of `trial_` and evaluates there; the largest move, or nothing.
std::optional<double> WaterStep::tryMove(State& state, const Cluster& cluster, double share) {
    double worst = 0.0;
    for (std::size_t i = 0; i < cluster.nodes.size(); ++i) {
        state.head_m[at(cluster.nodes[i])] += share * trial_[i];
        worst = std::max(worst, std::fabs(share * trial_[i]));
    }
    return evaluate(state, cluster, true) ? std::optional(worst) : std::nullopt;
}

/// Newton with step halving on the sum of residuals, each unit solved alone for every trial.
bool WaterStep::solveRobustly(State& state, const Cluster& cluster) {
    for (const int node : cluster.nodes) {
        state.head_m[at(node)] = state.headBefore_m[at(node)];
    }
    if (!evaluate(state, cluster, true)) {
        return false;
    }
    const double tolerance = headTolerance * model_.headScale_m;
    for (int count = 0; count < mostRobust; ++count) {
        const double before = totalResidual();
        std::copy_n(residual_.begin(), size_, trial_.begin());
        if (size_ > 0 && !choleskySolve(matrix_, trial_, size_)) {
            return false;
        }
        std::optional<double> worst;
        double share = 1.0;
        for (int halving = 0; halving < mostHalvings; ++halving, share *= 0.5) {
            worst = tryMove(state, cluster, share);
            if (!worst || !std::isfinite(totalResidual())) {
                return false;
            }
            if (totalResidual() <= before || *worst <= tolerance) {
                break;
            }
            if (halving + 1 < mostHalvings) {
                tryMove(state, cluster, -share);
            }
        }
        if (*worst <= 10.0 * tolerance) {
            return true;
        }
    }
    return false;
}

void WaterStep::setFailure(State& state, std::size_t index) {
    const Cluster& cluster = model_.clusters[index];
    failure_.cluster = static_cast<int>(index);
    failure_.residuals.clear();
    evaluate(state, cluster, false);
    for (std::size_t i = 0; i < cluster.nodes.size(); ++i) {
        failure_.residuals.emplace_back(model_.nodePath[at(cluster.nodes[i])], residual_[i]);
    }
    std::sort(
        failure_.residuals.begin(), failure_.residuals.end(),
        [](const auto& a, const auto& b) { return std::fabs(a.second) > std::fabs(b.second); });
    constexpr std::size_t named = 3;
    failure_.residuals.resize(std::min(failure_.residuals.size(), named));
    failure_.where = cluster.nodes.empty() ? std::string("plant/units")
                                           : model_.nodePath[at(cluster.nodes.front())];
}

/// One discharge of each node is set to the sum of the others, so that Newton's remainder ends in
/// a head and never in water.
void WaterStep::closeBalance(State& state, const Cluster& cluster) {
    for (const int node : cluster.nodes) {
        double sum = 0.0; // into the node
        int closing = -1; // an elastic end
        for (const int index : cluster.branches) {
            const BranchRow& row = model_.branches[at(index)];
            const double flow = state.branches[at(index)].flow_m3s;
            if (row.to == node || row.from == node) {
                sum += row.to == node ? flow : 0.0;
                sum -= row.from == node ? flow : 0.0;
                closing = row.kind == BranchKind::rigid ? closing : index;
            }
        }
        for (const int unit : cluster.units) {
            sum += model_.units[at(unit)].outlet == node ? state.work[at(unit)].flow_m3s : 0.0;
            sum -= model_.units[at(unit)].inlet == node ? state.work[at(unit)].flow_m3s : 0.0;
        }
        int chamber = -1;
        for (const int index : cluster.chambers) {
            if (model_.chambers[at(index)].node == node) {
                sum -= state.chambers[at(index)].next_m3s;
                chamber = index;
            }
        }
        const double storage = model_.nodes[at(node)].storage_m2;
        if (storage > 0.0) {
            sum -= 2.0 * storage / step_ * (state.head_m[at(node)] - state.headBefore_m[at(node)])
                   - state.storageFlow_m3s[at(node)];
        }
        if (chamber >= 0) {
            state.chambers[at(chamber)].next_m3s += sum;
        } else if (closing >= 0) {
            const bool into = model_.branches[at(closing)].to == node;
            state.branches[at(closing)].flow_m3s -= into ? sum : -sum;
        }
    }
}

bool WaterStep::solve(State& state, const std::vector<UnitStep>& units, double step_s, Mode mode) {
    step_ = step_s;
    mode_ = mode;
    for (std::size_t i = 0; i < model_.branches.size(); ++i) {
        const BranchRow& row = model_.branches[i];
        if (row.kind == BranchKind::rigid) {
            prepareRigid(state.branches[i], model_.conduits[at(row.conduit)]);
        } else {
            prepareEnd(state, row, state.branches[i]);
        }
    }
    prepareUnits(state, units);
    for (std::size_t i = 0; i < model_.clusters.size(); ++i) {
        const Cluster& cluster = model_.clusters[i];
        guessHeads(state, cluster);
        if (!solveCluster(state, cluster)) {
            prepareUnits(state, units);
            if (!solveRobustly(state, cluster)) {
                setFailure(state, i);
                return false;
            }
        }
        closeBalance(state, cluster);
    }
    return true;
}

void WaterStep::handBackRigid(State& state, std::size_t i) {
    const ConduitRow& conduit = model_.conduits[i];
    const EndLoss& from = conduit.geometry.from;
    const EndLoss& to = conduit.geometry.to;
    const double flow = state.startFlow_m3s[i];
    const double square = flow * std::fabs(flow);
    state.startHead_m[i] = state.head_m[at(conduit.from)]
                           - (flow >= 0.0 ? from.leaving_s2m5 : from.arriving_s2m5) * square;
    state.endHead_m[i] =
        state.head_m[at(conduit.to)] + (flow >= 0.0 ? to.arriving_s2m5 : to.leaving_s2m5) * square;
}

void WaterStep::handBackElastic(State& state, std::size_t i) {
    const ConduitRow& conduit = model_.conduits[i];
    const auto row = at(conduit.row);
    const double start = state.startFlow_m3s[i];
    const double end = state.endFlow_m3s[i];
    if (mode_ == Mode::jump) {
        const BranchState& a = state.branches[at(model_.startBranch[i])];
        const BranchState& b = state.branches[at(model_.endBranch[i])];
        state.startHead_m[i] = -a.w0_m + a.linear_sm2 * start;
        state.endHead_m[i] = b.w0_m - b.linear_sm2 * end;
        model_.rows.jumpStart(state.elastic, row, state.startHead_m[i], start);
        model_.rows.jumpEnd(state.elastic, row, state.endHead_m[i], end);
        return;
    }
    const auto& a = model_.rows.startLaw(state.elastic, row);
    const auto& b = model_.rows.endLaw(state.elastic, row);
    const double aQuadratic = start >= 0.0 ? a.forward_s2m5 : a.reverse_s2m5;
    const double bQuadratic = end >= 0.0 ? b.forward_s2m5 : b.reverse_s2m5;
    state.startHead_m[i] = a.arriving_m + (a.linear_sm2 + aQuadratic * std::fabs(start)) * start;
    state.endHead_m[i] = b.arriving_m - (b.linear_sm2 + bQuadratic * std::fabs(end)) * end;
    model_.rows.setStart(state.elastic, row, state.startHead_m[i], start);
    model_.rows.setEnd(state.elastic, row, state.endHead_m[i], end);
}

/// Heads at the ends follow from the discharges by the conduits' own laws.
void WaterStep::handBack(State& state) {
    for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
        state.startFlow_m3s[i] = state.branches[at(model_.startBranch[i])].flow_m3s;
        state.endFlow_m3s[i] = state.branches[at(model_.endBranch[i])].flow_m3s;
        if (model_.conduits[i].kind == ConduitKind::elastic) {
            handBackElastic(state, i);
        } else {
            handBackRigid(state, i);
        }
    }
}

void WaterStep::accept(State& state, const std::vector<UnitStep>& units, double step_s) {
    for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
        const double storage = model_.nodes[i].storage_m2;
        if (storage > 0.0 && !model_.nodes[i].known()) {
            state.storageFlow_m3s[i] =
                2.0 * storage / step_s * (state.head_m[i] - state.headBefore_m[i])
                - state.storageFlow_m3s[i];
        }
    }
    for (BranchState& branch : state.branches) {
        branch.before_m3s = branch.now_m3s;
        branch.now_m3s = branch.flow_m3s;
    }
    for (std::size_t i = 0; i < model_.chambers.size(); ++i) {
        ChamberState& chamber = state.chambers[i];
        chamber.volume_m3 += 0.5 * step_s * (chamber.flow_m3s + chamber.next_m3s);
        chamber.flow_m3s = chamber.next_m3s;
        chamber.level_m = model_.chambers[i].table.level_m(chamber.volume_m3);
    }
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        acceptUnit(model_, model_.units[i], units[i], drop(state, model_.units[i]), state.work[i],
                   state.machines[i]);
    }
    handBack(state);
}

void WaterStep::acceptJump(State& state, const std::vector<UnitStep>& units) {
    for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
        if (model_.nodes[i].storage_m2 > 0.0 && !model_.nodes[i].known()) {
            state.storageFlow_m3s[i] =
                2.0 * model_.nodes[i].storage_m2 / step_ * (state.head_m[i] - state.headBefore_m[i])
                - state.storageFlow_m3s[i];
        }
        state.headBefore_m[i] = state.head_m[i];
    }
    for (BranchState& branch : state.branches) {
        branch.before_m3s = branch.now_m3s = branch.flow_m3s;
    }
    for (ChamberState& chamber : state.chambers) {
        chamber.flow_m3s = chamber.next_m3s;
    }
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        MachineState& machine = state.machines[i];
        const double speedBefore = machine.speedBefore;
        acceptUnit(model_, model_.units[i], units[i], drop(state, model_.units[i]), state.work[i],
                   machine);
        machine.flowBefore_m3s = machine.flow_m3s;
        machine.xBefore = machine.x;
        machine.speedBefore = speedBefore;
    }
    handBack(state);
}

} // namespace headroom::simulation
