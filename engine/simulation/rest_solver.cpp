// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/rest_solver.h"

#include "numerics/elementary.h"
#include "simulation/messages.h"
#include "units/text.h"

#include <Eigen/LU>

#include <algorithm>
#include <cmath>
#include <numeric>

namespace headroom::simulation {
namespace {

using numerics::signedSquare;

constexpr int mostIterations = 60;
constexpr double tolerance = 1e-13; // of the plant's head and flow
constexpr double acceptable = 1e-9;
constexpr double firstShare = 0.1, shareStep = 0.1, leastShareStep = 1e-4;
constexpr double leastOpening = 1e-5; // stroke below which a search for an output does not go

/// Newton's method on [heads of unknown nodes, conduit flows, unit flows, searched openings].
class Steady {
public:
    Steady(const Model& model, const RestAsked& asked) : model_(model), asked_(asked) {
        for (int i = 0; i < static_cast<int>(model.nodes.size()); ++i) {
            if (model.nodes[at(i)].cluster >= 0) {
                headColumn_.push_back(size_++);
            } else {
                headColumn_.push_back(-1);
            }
        }
        flowColumn_ = size_;
        size_ += static_cast<int>(model.conduits.size());
        unitColumn_ = size_;
        size_ += static_cast<int>(model.units.size());
        for (std::size_t i = 0; i < model.units.size(); ++i) {
            openingColumn_.push_back(asked.output_W[i] ? size_++ : -1);
        }
    }

    bool solve(RestPoint& point, double share) {
        for (int count = 0; count < mostIterations; ++count) {
            assemble(point, share);
            if (!right_.allFinite() || !matrix_.allFinite()) {
                return false;
            }
            const Eigen::VectorXd move = matrix_.partialPivLu().solve(-right_);
            if (!move.allFinite()) {
                return false;
            }
            const double residual = right_.cwiseAbs().maxCoeff();
            if (residual < tolerance || (residual < 100.0 * tolerance && residual >= last_)) {
                break;
            }
            last_ = residual;
            apply(point, move);
        }
        last_ = INFINITY;
        assemble(point, share);
        point.residual = right_.size() > 0 ? right_.cwiseAbs().maxCoeff() : 0.0;
        return point.residual < acceptable;
    }

private:
    int node(int index) const { return headColumn_[at(index)]; }

    void put(int row, int column, double value) {
        if (column >= 0) {
            matrix_(row, column) += value;
        }
    }

    void assemble(RestPoint& point, double share) {
        matrix_.setZero(size_, size_);
        right_.setZero(size_);
        for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
            conduit(point, static_cast<int>(i));
        }
        for (std::size_t i = 0; i < model_.units.size(); ++i) {
            unit(point, static_cast<int>(i), share);
        }
    }

    /// Continuity of `index`'s two nodes for a flow in column `column`.
    void through(int from, int to, int column, double flow) {
        const double scale = 1.0 / model_.flowScale_m3s;
        if (node(from) >= 0) {
            right_(node(from)) -= scale * flow;
            put(node(from), column, -scale);
        }
        if (node(to) >= 0) {
            right_(node(to)) += scale * flow;
            put(node(to), column, scale);
        }
    }

    void conduit(const RestPoint& point, int index) {
        const ConduitRow& row = model_.conduits[at(index)];
        const int column = flowColumn_ + index;
        const double flow = point.conduitFlow_m3s[at(index)];
        const double scale = 1.0 / model_.headScale_m;
        through(row.from, row.to, column, flow);
        right_(column) =
            scale * (point.head_m[at(row.from)] - point.head_m[at(row.to)] - row.restLoss_m(flow));
        put(column, node(row.from), scale);
        put(column, node(row.to), -scale);
        // A loss without slope (no flow) would leave a loop of conduits without an answer.
        const double least = 1e-9 * model_.headScale_m / model_.flowScale_m3s;
        put(column, column, -scale * std::max(row.restSlope_sm2(flow), least));
    }

    void unit(RestPoint& point, int index, double share) {
        const UnitRow& row = model_.units[at(index)];
        const int column = unitColumn_ + index;
        const double flow = point.unitFlow_m3s[at(index)];
        through(row.inlet, row.outlet, column, flow);
        const double drop = point.head_m[at(row.inlet)] - point.head_m[at(row.outlet)];
        const double net = drop - row.exitLoss_s2m5 * signedSquare(flow);
        switch (row.kind) {
        case UnitKind::flow:
            right_(column) = (flow - row.restFlow_m3s) / model_.flowScale_m3s;
            put(column, column, 1.0 / model_.flowScale_m3s);
            return;
        case UnitKind::power:
            power(row, column, flow, drop);
            return;
        case UnitKind::orifice:
            orifice(point, index, share, net);
            return;
        case UnitKind::francis:
            francis(point, index, share, net);
            return;
        }
    }

    void power(const UnitRow& row, int column, double flow, double drop) {
        const double weight = model_.medium.density_kgm3 * model_.medium.gravity_mps2;
        const double scale = 1.0 / (weight * model_.flowScale_m3s * model_.headScale_m);
        right_(column) = scale * (weight * flow * drop - row.power_W);
        put(column, column, scale * weight * drop);
        put(column, node(row.inlet), scale * weight * flow);
        put(column, node(row.outlet), -scale * weight * flow);
    }

    /// Heads of a gated unit: drop − exit − head(q, c) = 0, plus the output's own equation.
    void heads(const UnitRow& row, int column, double flow, double residual, double slope) {
        const double scale = 1.0 / model_.headScale_m;
        right_(column) = scale * residual;
        put(column, node(row.inlet), scale);
        put(column, node(row.outlet), -scale);
        put(column, column, -scale * (slope + 2.0 * row.exitLoss_s2m5 * std::fabs(flow)));
    }

    void orifice(RestPoint& point, int index, double share, double net) {
        const UnitRow& row = model_.units[at(index)];
        const int column = unitColumn_ + index;
        const double flow = point.unitFlow_m3s[at(index)];
        const double tau = point.opening[at(index)];
        const double rated = row.flowScale_m3s;
        // τ²·(net) = H_r (Q/Q_r)², regular at a shut gate.
        const double scale = 1.0 / model_.headScale_m;
        right_(column) = scale * (tau * tau * net - row.headScale_m * signedSquare(flow / rated));
        put(column, node(row.inlet), scale * tau * tau);
        put(column, node(row.outlet), -scale * tau * tau);
        const double slope = tau * tau * 2.0 * row.exitLoss_s2m5 * std::fabs(flow)
                             + 2.0 * row.headScale_m * std::fabs(flow) / (rated * rated);
        put(column, column, -scale * std::max(slope, 1e-9 * row.headScale_m / rated));
        const double power =
            row.orifice.power_W(flow, net, model_.medium.density_kgm3, model_.medium.gravity_mps2);
        point.torque_pu[at(index)] = power / row.powerScale_W;
        if (const int opening = openingColumn_[at(index)]; opening >= 0) {
            put(column, opening, scale * 2.0 * tau * net);
            const double weight = row.orifice.efficiency * model_.medium.density_kgm3
                                  * model_.medium.gravity_mps2 * row.generatorEfficiency
                                  / row.powerScale_W;
            right_(opening) =
                weight * flow * net - share * *asked_.output_W[at(index)] / row.powerScale_W;
            put(opening, column, weight * (net - 2.0 * row.exitLoss_s2m5 * std::fabs(flow) * flow));
            put(opening, node(row.inlet), weight * flow);
            put(opening, node(row.outlet), -weight * flow);
        }
    }

    void francis(RestPoint& point, int index, double share, double net) {
        const UnitRow& row = model_.units[at(index)];
        const int column = unitColumn_ + index;
        const double stroke = point.opening[at(index)];
        const double tau = row.relativeOpening(stroke);
        if (!(tau > machines::FrancisChart::shutOpening)) {
            right_(column) = point.unitFlow_m3s[at(index)] / model_.flowScale_m3s;
            put(column, column, 1.0 / model_.flowScale_m3s);
            point.torque_pu[at(index)] = row.chart->shut(1.0).m;
            return;
        }
        const double c = 1.0 / tau;
        const double flow = point.unitFlow_m3s[at(index)];
        const auto chart = row.chart->at(flow / row.flowScale_m3s, 1.0, c);
        const double byOpening = -row.chart->gate().slope(stroke) * c * c; // dc/dstroke
        heads(row, column, flow, net - row.headScale_m * chart.h,
              row.headScale_m * chart.dh_dq / row.flowScale_m3s);
        point.torque_pu[at(index)] = chart.m;
        if (const int opening = openingColumn_[at(index)]; opening >= 0) {
            put(column, opening, -row.headScale_m * chart.dh_dc * byOpening / model_.headScale_m);
            const double asked = share * *asked_.output_W[at(index)];
            const double efficiency =
                asked >= 0.0 ? row.generatorEfficiency : 1.0 / row.generatorEfficiency;
            right_(opening) = chart.m - asked / (efficiency * row.powerScale_W);
            put(opening, column, chart.dm_dq / row.flowScale_m3s);
            put(opening, opening, chart.dm_dc * byOpening);
        }
    }

    /// Takes the correction; openings move at most by a part of themselves and stay open.
    void apply(RestPoint& point, const Eigen::VectorXd& move) {
        double share = 1.0;
        for (std::size_t i = 0; i < model_.units.size(); ++i) {
            if (const int column = openingColumn_[i]; column >= 0) {
                const double most = 0.5 * std::max(point.opening[i], 0.02);
                share = std::min(share, most / std::max(std::fabs(move(column)), most));
            }
        }
        for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
            if (headColumn_[i] >= 0) {
                point.head_m[i] += share * move(headColumn_[i]);
            }
        }
        for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
            point.conduitFlow_m3s[i] += share * move(flowColumn_ + static_cast<int>(i));
        }
        for (std::size_t i = 0; i < model_.units.size(); ++i) {
            point.unitFlow_m3s[i] += share * move(unitColumn_ + static_cast<int>(i));
            if (openingColumn_[i] >= 0) {
                point.opening[i] =
                    std::max(point.opening[i] + share * move(openingColumn_[i]), leastOpening);
            }
        }
    }

    const Model& model_;
    const RestAsked& asked_;
    std::vector<int> headColumn_, openingColumn_;
    int flowColumn_ = 0, unitColumn_ = 0, size_ = 0;
    double last_ = INFINITY;
    Eigen::MatrixXd matrix_;
    Eigen::VectorXd right_;
};

double largest(const std::vector<double>& values) {
    return values.empty() ? 0.0 : *std::max_element(values.begin(), values.end());
}

/// Opening and flow of a unit that stands alone under a head, at a share of its output.
void guessUnit(const Model& model, const RestAsked& asked, double share, std::size_t i, double head,
               RestPoint& point) {
    const UnitRow& unit = model.units[i];
    const double h = head / unit.headScale_m;
    const double power = share * asked.output_W[i].value_or(0.0) / unit.powerScale_W;
    double& opening = point.opening[i];
    double& flow = point.unitFlow_m3s[i];
    switch (unit.kind) {
    case UnitKind::flow:
        flow = unit.restFlow_m3s;
        return;
    case UnitKind::power:
        flow = unit.power_W / (model.medium.density_kgm3 * model.medium.gravity_mps2 * head);
        return;
    case UnitKind::orifice:
        opening = asked.output_W[i] ? std::max(power / (h * std::sqrt(h)), 0.01) : opening;
        flow = unit.orifice.flow_m3s(head, opening);
        return;
    case UnitKind::francis:
        if (asked.output_W[i]) {
            double low = unit.chart->noLoadOpening(h, 1.0);
            double top = unit.chart->gate().largestOpening();
            for (int k = 0; k < 30 && top - low > 1e-4; ++k) {
                const double middle = 0.5 * (low + top);
                (unit.chart->netPower(h, 1.0, middle) < power ? low : top) = middle;
            }
            opening = unit.chart->gate().stroke(0.5 * (low + top));
        }
        flow = unit.flowScale_m3s * unit.chart->flow(h, 1.0, unit.relativeOpening(opening));
        return;
    }
}

/// Heads at the levels; each unit as if it stood alone between the highest and its own tailwater.
RestPoint firstGuess(const Model& model, const RestAsked& asked, double share) {
    RestPoint point;
    const double high = largest(model.reservoirLevel_m);
    point.head_m.assign(model.nodes.size(), high);
    for (std::size_t i = 0; i < model.nodes.size(); ++i) {
        if (model.nodes[i].known()) {
            point.head_m[i] = model.reservoirLevel_m[at(model.nodes[i].reservoir)];
        }
    }
    point.conduitFlow_m3s.assign(model.conduits.size(), 0.0);
    point.unitFlow_m3s.assign(model.units.size(), 0.0);
    point.torque_pu.assign(model.units.size(), 0.0);
    point.opening = asked.opening;
    for (std::size_t i = 0; i < model.units.size(); ++i) {
        const UnitRow& unit = model.units[i];
        const double drop = point.head_m[at(unit.inlet)] - point.head_m[at(unit.outlet)];
        guessUnit(model, asked, share, i, std::max(drop, 0.1 * unit.headScale_m), point);
    }
    return point;
}

/// The unit whose gate is open as far as it may, or -1.
int unitAtLimit(const Model& model, const RestAsked& asked, const RestPoint& point) {
    for (std::size_t i = 0; i < model.units.size(); ++i) {
        if (asked.output_W[i] && point.opening[i] > model.units[i].openingLimit + 1e-12) {
            return static_cast<int>(i);
        }
    }
    return -1;
}

Amount watts(double value) {
    return {static_cast<int>(Quantity::power), value};
}

/// The gate stops it if it is nearly open as far as it may; else power turned over opening.
Finding notReached(const Model& model, const RestAsked& asked, const RestPoint& best) {
    int worst = 0;
    for (std::size_t i = 0; i < model.units.size(); ++i) {
        if (asked.output_W[i] && *asked.output_W[i] > 0.0) {
            worst = best.opening[i] >= best.opening[at(worst)] ? static_cast<int>(i) : worst;
        }
    }
    const double level = largest(model.reservoirLevel_m);
    constexpr double nearly = 0.02; // the last step of the search is shorter than that
    const bool byGate = best.opening[at(worst)] > model.units[at(worst)].openingLimit - nearly;
    return {.message = byGate ? &outputStoppedByGate : &outputPastTurn,
            .subject = model.unitPath[at(worst)],
            .arguments = {{"level", Amount{static_cast<int>(Quantity::elevation), level}},
                          {"asked", watts(asked.output_W[at(worst)].value_or(0.0))},
                          {"reached", watts(restOutput_W(model, best, worst))}}};
}

} // namespace

RestAsked askedAtStart(const Model& model) {
    RestAsked asked;
    for (const UnitRow& unit : model.units) {
        asked.output_W.push_back(unit.output_W);
        asked.opening.push_back(unit.opening.value_or(0.0));
    }
    return asked;
}

double restOutput_W(const Model& model, const RestPoint& rest, int index) {
    const UnitRow& unit = model.units[at(index)];
    const double shaft = rest.torque_pu[at(index)] * unit.powerScale_W;
    return shaft >= 0.0 ? shaft * unit.generatorEfficiency : shaft / unit.generatorEfficiency;
}

Result<RestPoint> solveRest(const Model& model, const RestAsked& asked) {
    RestAsked trial = asked;
    for (std::size_t i = 0; i < model.units.size(); ++i) {
        if (model.units[i].kind == UnitKind::orifice && trial.output_W[i]
            && *trial.output_W[i] == 0.0) { // an ideal unit gives nothing only when shut
            trial.output_W[i].reset();
            trial.opening[i] = 0.0;
        }
    }
    Steady steady(model, trial);
    RestPoint point = firstGuess(model, trial, firstShare);
    if (!steady.solve(point, firstShare)) {
        return Finding{.message = &noRest, .subject = "plant"};
    }
    if (unitAtLimit(model, trial, point) >= 0) {
        return notReached(model, trial, point);
    }
    double share = firstShare, step = shareStep;
    while (share < 1.0) {
        RestPoint next = point;
        const double target = std::min(1.0, share + step);
        const bool solved = steady.solve(next, target);
        const bool within = solved && unitAtLimit(model, trial, next) < 0;
        if (within) {
            point = next;
            share = target;
            continue;
        }
        step *= 0.5;
        if (step < leastShareStep) {
            return notReached(model, trial, point);
        }
    }
    return point;
}

} // namespace headroom::simulation
