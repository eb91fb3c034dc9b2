// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/balance.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {} // namespace

BalanceKeeper::BalanceKeeper(const Model& model) : model_(model) {
    const std::size_t units = model.units.size();
    for (auto* values : {&speed_, &torque_, &electrical_, &kinetic_, &work_, &moved_}) {
        values->assign(units, 0.0);
    }
    onGrid_.assign(units, true);
}

double BalanceKeeper::stored(const State& state) const {
    double sum = 0.0;
    for (const ChamberState& chamber : state.chambers) {
        sum += chamber.volume_m3;
    }
    for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
        if (model_.nodes[i].storage_m2 > 0.0 && !model_.nodes[i].known()) {
            sum += model_.nodes[i].storage_m2 * state.head_m[i];
        }
    }
    for (const ConduitRow& conduit : model_.conduits) {
        if (conduit.row >= 0) {
            sum += model_.rows.storedVolume_m3(state.elastic, at(conduit.row));
        }
    }
    return sum;
}

/// Discharge out of all known heads into the plant; `entering` counts what flows in alone.
double BalanceKeeper::inflow(const State& state, double& entering) const {
    double net = 0.0;
    entering = 0.0;
    const auto add = [&](int node, double flow) {
        if (model_.nodes[at(node)].known()) {
            net += flow;
            entering += std::max(flow, 0.0);
        }
    };
    for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
        add(model_.conduits[i].from, state.startFlow_m3s[i]);
        add(model_.conduits[i].to, -state.endFlow_m3s[i]);
    }
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        add(model_.units[i].inlet, state.machines[i].flow_m3s);
        add(model_.units[i].outlet, -state.machines[i].flow_m3s);
    }
    return net;
}

void BalanceKeeper::begin(const State& state) {
    base_m3_ = first_m3_ = stored(state);
    flow_m3s_ = inflow(state, entering_m3s_);
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        speed_[i] = state.machines[i].speed;
        torque_[i] = state.machines[i].torque;
        electrical_[i] = state.machines[i].electrical;
        onGrid_[i] = state.machines[i].onGrid;
    }
}

/// In shares of rated power times seconds: T_a·½(n'² − n²) against ½Δt[(N) + (N')]·½(n + n').
void BalanceKeeper::takeEnergy(const State& state) {
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const UnitRow& unit = model_.units[i];
        const MachineState& machine = state.machines[i];
        if (!unit.freeShaft()) {
            continue;
        }
        const double trip = state.controls[i].tripFraction;
        const double braked = trip >= 0.0 && onGrid_[i] ? 2.0 * trip * electrical_[i]
                                                        : electrical_[i] + machine.electrical;
        const double mean = 0.5 * (speed_[i] + machine.speed);
        const double driven = torque_[i] + machine.torque;
        if (!(unit.rotor.locked && machine.onGrid)) {
            const double share = 0.5 * model_.grid.step_s * mean;
            kinetic_[i] += unit.accelerationTime_s() * mean * (machine.speed - speed_[i]);
            work_[i] += share * (driven - braked);
            moved_[i] += share * std::fabs(driven);
        }
        speed_[i] = machine.speed;
        torque_[i] = machine.torque;
        electrical_[i] = machine.electrical;
        onGrid_[i] = machine.onGrid;
    }
}

void BalanceKeeper::take(const State& state, bool jumped) {
    double entering = 0.0;
    const double flow = inflow(state, entering);
    const double step = model_.grid.step_s;
    net_m3_ += 0.5 * step * (flow_m3s_ + flow);
    balance_.throughput_m3 += 0.5 * step * (entering_m3s_ + entering);
    flow_m3s_ = flow;
    entering_m3s_ = entering;
    if (jumped) {
        base_m3_ = stored(state) - net_m3_;
    }
    takeEnergy(state);
}

void BalanceKeeper::compare(const State& state) {
    const double now = stored(state);
    balance_.stored_m3 = now - first_m3_;
    balance_.inflow_m3 = balance_.throughput_m3;
    balance_.outflow_m3 = balance_.throughput_m3 - net_m3_;
    if (balance_.throughput_m3 > 0.0) {
        const double residual = std::fabs(net_m3_ - (now - base_m3_));
        balance_.worstResidual_share =
            std::max(balance_.worstResidual_share, residual / balance_.throughput_m3);
    }
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const double rotating = 0.5 * model_.units[i].accelerationTime_s();
        if (model_.units[i].freeShaft()) {
            balance_.worstEnergyResidual_share =
                std::max(balance_.worstEnergyResidual_share,
                         std::fabs(kinetic_[i] - work_[i]) / (rotating + moved_[i]));
        }
    }
}

} // namespace headroom::simulation
