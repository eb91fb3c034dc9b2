// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/elastic_row.h"

#include "base/ensure.h"
#include "hydraulics/branch.h"

#include <algorithm>
#include <cmath>
#include <utility>

namespace headroom::hydraulics {

ElasticConduit uniformConduit(int count, const ElasticCell& cell) {
    ensure(count >= 2, "a row has at least two cells");
    return {std::vector<ElasticCell>(static_cast<std::size_t>(count), cell)};
}

// --- one cell -----------------------------------------------------------------------------------

double ElasticRows::Cell::quadraticAt(double flow_m3s) const {
    double sum = quadratic;
    for (const VariableLoss& part : variable) {
        sum += part.law.quadratic_s2m6(flow_m3s) * part.length_m;
    }
    return sum;
}

double ElasticRows::Cell::loss(double flow_m3s) const {
    const double local = flow_m3s < 0.0 ? reverse : forward;
    return (linear + (quadraticAt(flow_m3s) + local) * std::fabs(flow_m3s)) * flow_m3s;
}

double ElasticRows::Cell::lossSlope(double flow_m3s) const {
    const double local = flow_m3s < 0.0 ? reverse : forward;
    double slope = linear + 2.0 * (quadratic + local) * std::fabs(flow_m3s);
    for (const VariableLoss& part : variable) {
        // The law's own linear part already stands in `linear`.
        slope += (part.law.slope_sm3(flow_m3s) - part.law.linear_sm3()) * part.length_m;
    }
    return slope;
}

bool ElasticRows::Cell::sameAs(const Cell& other) const {
    const auto equal = [](const VariableLoss& a, const VariableLoss& b) {
        return a.law.excess() == b.law.excess() && a.length_m == b.length_m
               && a.law.scale_s2m6() == b.law.scale_s2m6()
               && a.law.perFlow_sm3() == b.law.perFlow_sm3();
    };
    return impedance == other.impedance && linear == other.linear && quadratic == other.quadratic
           && forward == other.forward && reverse == other.reverse
           && std::equal(variable.begin(), variable.end(), other.variable.begin(),
                         other.variable.end(), equal);
}

// --- making -------------------------------------------------------------------------------------

ElasticRows::ElasticRows(const std::vector<ElasticConduit>& conduits, double step_s)
    : step_(step_s) {
    ensure(step_s > 0.0, "a step takes time");
    nodes_ = 1; // one entry before the first node, as the loops read a neighbour there
    for (const ElasticConduit& conduit : conduits) {
        addRow(conduit);
    }
    nodes_ += 1;
    share_.resize(nodes_, 0.0);
    conductance_.resize(nodes_, 0.0);
    curvature_.resize(nodes_, 0.0);
}

std::size_t ElasticRows::addCell(const ElasticCell& cell) {
    ensure(cell.impedance_sm2 > 0.0, "a cell has an impedance");
    ensure(cell.forwardLoss_s2m5 >= 0.0 && cell.reverseLoss_s2m5 >= 0.0, "a loss takes head");
    Cell made{cell.impedance_sm2, 0.0, 0.0, cell.forwardLoss_s2m5, cell.reverseLoss_s2m5, {}};
    for (const CellFriction& part : cell.friction) {
        ensure(part.length_m > 0.0, "friction acts over a length");
        made.linear += part.law.linear_sm3() * part.length_m;
        if (part.law.variable()) {
            made.variable.push_back({part.law, part.length_m});
        } else {
            made.quadratic += part.law.quadratic_s2m6(0.0) * part.length_m;
        }
    }
    if (cells_.empty() || !cells_.back().sameAs(made)) {
        cells_.push_back(std::move(made));
    }
    return cells_.size() - 1;
}

void ElasticRows::addRow(const ElasticConduit& conduit) {
    ensure(conduit.cells.size() >= 2, "a row has at least two cells");
    Row row{nodes_, conduit.cells.size(), {}};
    for (const ElasticCell& cell : conduit.cells) {
        row.cell.push_back(addCell(cell));
    }
    nodes_ += row.cells + 1;
    share_.resize(nodes_, 0.0);
    conductance_.resize(nodes_, 0.0);
    curvature_.resize(nodes_, 0.0);
    for (std::size_t i = 1; i < row.cells; ++i) {
        const std::size_t node = row.firstNode + i;
        const Cell& cell = cells_[row.cell[i]];
        if (row.cell[i] != row.cell[i - 1] || cell.forward > 0.0 || cell.reverse > 0.0
            || cell.variable.size() > 1) {
            interfaces_.push_back({node, row.cell[i - 1], row.cell[i]});
            continue;
        }
        const double b = 2.0 * cell.impedance + cell.linear;
        share_[node] = cell.linear / b;
        conductance_[node] = 0.5 / cell.impedance;
        curvature_[node] = cell.quadratic / (b * b);
        if (!cell.variable.empty()) {
            addRun(node, row.cell[i]);
        }
    }
    rows_.push_back(std::move(row));
}

void ElasticRows::addRun(std::size_t node, std::size_t cell) {
    if (!runs_.empty() && runs_.back().end == node && runs_.back().cell == cell) {
        runs_.back().end = node + 1;
        return;
    }
    const double b = 2.0 * cells_[cell].impedance + cells_[cell].linear;
    runs_.push_back({node, node + 1, cell, 1.0 / (b * b)});
}

ElasticState ElasticRows::state() const {
    ElasticState made;
    for (auto* array : {&made.right_, &made.left_, &made.nextRight_, &made.nextLeft_, &made.head_,
                        &made.flow_, &made.lastFlow_}) {
        array->assign(nodes_, 0.0);
    }
    made.curvature_ = curvature_;
    made.ends_.assign(2 * rows_.size(), {});
    made.solved_.assign(interfaces_.size(), {});
    return made;
}

// --- rest ---------------------------------------------------------------------------------------

void ElasticRows::setProfile(ElasticState& state, std::size_t conduit,
                             std::span<const double> head_m,
                             std::span<const double> flow_m3s) const {
    const Row& row = rows_[conduit];
    ensure(head_m.size() == row.cells + 1 && flow_m3s.size() == row.cells + 1, "a value a node");
    for (std::size_t i = 0; i <= row.cells; ++i) {
        const std::size_t node = row.firstNode + i;
        const double head = head_m[i];
        const double flow = flow_m3s[i];
        state.head_[node] = head;
        state.flow_[node] = flow;
        state.lastFlow_[node] = flow;
        state.right_[node] = state.left_[node] = head; // of a cell that is not there: never read
        if (i > 0) {
            const Cell& cell = cells_[row.cell[i - 1]];
            state.left_[node] = head - cell.impedance * flow + 0.5 * cell.loss(flow);
        }
        if (i < row.cells) {
            const Cell& cell = cells_[row.cell[i]];
            state.right_[node] = head + cell.impedance * flow - 0.5 * cell.loss(flow);
        }
    }
}

double ElasticRows::setRest(ElasticState& state, std::size_t conduit, double startHead_m,
                            double flow_m3s) const {
    const Row& row = rows_[conduit];
    std::vector<double> head{startHead_m};
    for (const std::size_t cell : row.cell) {
        head.push_back(head.back() - cells_[cell].loss(flow_m3s));
    }
    setProfile(state, conduit, head, std::vector<double>(row.cells + 1, flow_m3s));
    return head.back();
}

double ElasticRows::restLoss_m(std::size_t conduit, double flow_m3s) const {
    double sum = 0.0;
    for (const std::size_t cell : rows_[conduit].cell) {
        sum += cells_[cell].loss(flow_m3s);
    }
    return sum;
}

double ElasticRows::restLossSlope_sm2(std::size_t conduit, double flow_m3s) const {
    double sum = 0.0;
    for (const std::size_t cell : rows_[conduit].cell) {
        sum += cells_[cell].lossSlope(flow_m3s);
    }
    return sum;
}

// --- one step -----------------------------------------------------------------------------------

const ElasticRows::Cell& ElasticRows::firstCell(std::size_t conduit) const {
    return cells_[rows_[conduit].cell.front()];
}

const ElasticRows::Cell& ElasticRows::lastCell(std::size_t conduit) const {
    return cells_[rows_[conduit].cell.back()];
}

// Friction coefficients that depend on the flow are taken at the flow expected at the new time,
// 2Q − Q₋: exact at rest and of second order in a smooth run.
void ElasticRows::refreshFriction(ElasticState& state) const {
    for (const VariableRun& run : runs_) {
        const Cell& cell = cells_[run.cell];
        const VariableLoss& part = cell.variable.front();
        const ExcessFactor& excess = *part.law.excess();
        const double factor = part.law.scale_s2m6() * part.length_m * run.scale;
        const double constant = cell.quadratic * run.scale;
        const double perFlow = part.law.perFlow_sm3();
        const double* flow = state.flow_.data();
        const double* last = state.lastFlow_.data();
        double* curvature = state.curvature_.data();
        for (std::size_t i = run.begin; i < run.end; ++i) {
            const double expected = std::fabs(2.0 * flow[i] - last[i]);
            curvature[i] = constant + factor * excess.value(expected * perFlow);
        }
    }
}

EndLaw ElasticRows::lawAt(double arriving_m, const Cell& cell, double expected_m3s) {
    const double quadratic = cell.quadraticAt(expected_m3s);
    return {arriving_m, cell.impedance + 0.5 * cell.linear, 0.5 * (quadratic + cell.forward),
            0.5 * (quadratic + cell.reverse)};
}

void ElasticRows::findEndLaws(ElasticState& state) const {
    for (std::size_t j = 0; j < rows_.size(); ++j) {
        const std::size_t first = rows_[j].firstNode;
        const std::size_t last = first + rows_[j].cells;
        state.ends_[2 * j] = lawAt(state.left_[first + 1], firstCell(j), state.expectedFlow(first));
        state.ends_[2 * j + 1] =
            lawAt(state.right_[last - 1], lastCell(j), state.expectedFlow(last));
    }
}

void ElasticRows::sweep(ElasticState& state, InstructionSet set) const {
    if (rows_.empty()) {
        return;
    }
    // What expects flows comes before the loop, which overwrites those of one step ago.
    refreshFriction(state);
    findEndLaws(state);
    solveInterfaces(state);
    const SweepArrays arrays{state.right_.data(),    state.left_.data(),  state.curvature_.data(),
                             share_.data(),          conductance_.data(), state.nextRight_.data(),
                             state.nextLeft_.data(), state.head_.data(),  state.lastFlow_.data()};
    sweepLoops(set).sweep(arrays, 1, nodes_ - 1);
    storeInterfaces(state);
}

void ElasticRows::solveInterfaces(ElasticState& state) const {
    for (std::size_t k = 0; k < interfaces_.size(); ++k) {
        const Interface& at = interfaces_[k];
        const Cell& left = cells_[at.leftCell];
        const Cell& right = cells_[at.rightCell];
        const double fromLeft = state.right_[at.node - 1];
        const double fromRight = state.left_[at.node + 1];
        const double expected = state.expectedFlow(at.node);
        const double w = fromLeft - fromRight;
        const double localLeft = w < 0.0 ? left.reverse : left.forward;
        const double localRight = w < 0.0 ? right.reverse : right.forward;
        const double halfLeft = 0.5 * (left.quadraticAt(expected) + localLeft);
        const double halfRight = 0.5 * (right.quadraticAt(expected) + localRight);
        const double linear = left.impedance + right.impedance + 0.5 * (left.linear + right.linear);
        const double flow = solveBranch(linear, halfLeft + halfRight, w).flow_m3s;
        const double lossLeft = (0.5 * left.linear + halfLeft * std::fabs(flow)) * flow;
        const double lossRight = (0.5 * right.linear + halfRight * std::fabs(flow)) * flow;
        const double fromBoth = fromLeft - left.impedance * flow - lossLeft;
        state.solved_[k] = {fromBoth, flow, fromBoth + right.impedance * flow - lossRight,
                            fromBoth - left.impedance * flow + lossLeft};
    }
}

void ElasticRows::storeInterfaces(ElasticState& state) const {
    for (std::size_t k = 0; k < interfaces_.size(); ++k) {
        const std::size_t node = interfaces_[k].node;
        const ElasticState::Solved& solved = state.solved_[k];
        state.head_[node] = solved.head;
        state.lastFlow_[node] = solved.flow;
        state.nextRight_[node] = solved.right;
        state.nextLeft_[node] = solved.left;
    }
}

const EndLaw& ElasticRows::startLaw(const ElasticState& state, std::size_t conduit) const {
    return state.ends_[2 * conduit];
}

const EndLaw& ElasticRows::endLaw(const ElasticState& state, std::size_t conduit) const {
    return state.ends_[2 * conduit + 1];
}

void ElasticRows::setStart(ElasticState& state, std::size_t conduit, double head_m,
                           double flow_m3s) const {
    const std::size_t node = rows_[conduit].firstNode;
    const Cell& cell = firstCell(conduit);
    // F' = H' + BQ' − φ'/2 with H' = c₋ + BQ' + φ'/2: so the volume balance holds to rounding.
    state.nextRight_[node] = state.ends_[2 * conduit].arriving_m + 2.0 * cell.impedance * flow_m3s;
    state.nextLeft_[node] = head_m;
    state.head_[node] = head_m;
    state.lastFlow_[node] = flow_m3s;
}

void ElasticRows::setEnd(ElasticState& state, std::size_t conduit, double head_m,
                         double flow_m3s) const {
    const std::size_t node = rows_[conduit].firstNode + rows_[conduit].cells;
    const Cell& cell = lastCell(conduit);
    state.nextLeft_[node] =
        state.ends_[2 * conduit + 1].arriving_m - 2.0 * cell.impedance * flow_m3s;
    state.nextRight_[node] = head_m;
    state.head_[node] = head_m;
    state.lastFlow_[node] = flow_m3s;
}

void ElasticRows::jumpStart(ElasticState& state, std::size_t conduit, double head_m,
                            double flow_m3s) const {
    const std::size_t node = rows_[conduit].firstNode;
    const Cell& cell = firstCell(conduit);
    state.nextRight_[node] = head_m + cell.impedance * flow_m3s - 0.5 * cell.loss(flow_m3s);
    state.nextLeft_[node] = head_m;
    state.head_[node] = head_m;
    state.lastFlow_[node] = flow_m3s;
}

void ElasticRows::jumpEnd(ElasticState& state, std::size_t conduit, double head_m,
                          double flow_m3s) const {
    const std::size_t node = rows_[conduit].firstNode + rows_[conduit].cells;
    const Cell& cell = lastCell(conduit);
    state.nextLeft_[node] = head_m - cell.impedance * flow_m3s + 0.5 * cell.loss(flow_m3s);
    state.nextRight_[node] = head_m;
    state.head_[node] = head_m;
    state.lastFlow_[node] = flow_m3s;
}

void ElasticRows::advance(ElasticState& state) const {
    std::swap(state.right_, state.nextRight_);
    std::swap(state.left_, state.nextLeft_);
    std::swap(state.flow_, state.lastFlow_);
}

// --- balances and envelopes ---------------------------------------------------------------------

double ElasticRows::storedVolume_m3(const ElasticState& state, std::size_t conduit) const {
    const Row& row = rows_[conduit];
    const double* const right = state.right_.data() + row.firstNode;
    const double* const left = state.left_.data() + row.firstNode + 1;
    double sum = 0.0;
    for (std::size_t i = 0; i < row.cells;) {
        const std::size_t cell = row.cell[i];
        std::size_t end = i;
        while (end < row.cells && row.cell[end] == cell) {
            ++end;
        }
        // Four sums side by side, in a fixed order: the same bits whatever the machine.
        double a = 0.0, b = 0.0, c = 0.0, d = 0.0;
        for (; i + 4 <= end; i += 4) {
            a += right[i] + left[i];
            b += right[i + 1] + left[i + 1];
            c += right[i + 2] + left[i + 2];
            d += right[i + 3] + left[i + 3];
        }
        for (; i < end; ++i) {
            a += right[i] + left[i];
        }
        sum += ((a + b) + (c + d)) / cells_[cell].impedance;
    }
    const double through = state.flow_[row.firstNode] - state.flow_[row.firstNode + row.cells];
    return 0.5 * step_ * (sum - through);
}

double ElasticRows::storage_m2(std::size_t conduit) const {
    double sum = 0.0;
    for (const std::size_t cell : rows_[conduit].cell) {
        sum += step_ / cells_[cell].impedance;
    }
    return sum;
}

void ElasticRows::widen(const ElasticState& state, std::span<double> lowest_m,
                        std::span<double> highest_m, InstructionSet set) const {
    ensure(lowest_m.size() == nodes_ && highest_m.size() == nodes_, "an envelope of all nodes");
    sweepLoops(set).widen(state.head_.data(), lowest_m.data(), highest_m.data(), nodes_);
}

} // namespace headroom::hydraulics
