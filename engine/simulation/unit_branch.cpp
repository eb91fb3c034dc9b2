// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/unit_branch.h"

#include "hydraulics/branch.h"
#include "numerics/elementary.h"
#include "numerics/roots.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

/// Constants of n' − k(m' − m_g') = n + k(m − m_g), m_g' = C + S n', the shaft by the trapezoid.
/// Where the breaker opens after a fraction f of the step the generator's torque acts for f alone.
void prepareShaft(const UnitRow& unit, const MachineState& state, const UnitStep& step,
                  MachineWork& work) {
    work.electricalConstant = work.electricalSlope = 0.0;
    work.speedKnown = !unit.freeShaft() || (state.onGrid && unit.rotor.locked);
    if (work.speedKnown) {
        work.n = state.onGrid ? step.frequency_pu : state.speed;
        return;
    }
    const double k = 0.5 * step.step_s / unit.accelerationTime_s();
    work.speedShare = k;
    const bool opens = step.tripFraction >= 0.0;
    double electrical = opens ? 2.0 * step.tripFraction * state.electrical : state.electrical;
    if (state.onGrid && !opens) {
        const auto torque =
            grid::torqueAfter(unit.rotor, state.rotor, step.frequency_pu, step.step_s);
        work.electricalConstant = torque.constant_pu * unit.electricalScale;
        work.electricalSlope = torque.slope_pu * unit.electricalScale;
    } else if (!opens) {
        electrical = 0.0;
    }
    work.speedConstant = state.speed + k * (state.torque - electrical - work.electricalConstant);
    work.n = step.guess ? 2.0 * state.speed - state.speedBefore : state.speed;
}

void lineariseFrancis(const UnitRow& unit, double drop, MachineWork& work) {
    const auto point = unit.chart->at(work.q, work.n, work.c);
    work.head = point.h;
    work.torque = point.m;
    work.headByFlow = point.dh_dq;
    work.headBySpeed = point.dh_dn;
    work.torqueByFlow = point.dm_dq;
    work.torqueBySpeed = point.dm_dn;
    const double flow = work.q * unit.flowScale_m3s;
    const double exit = unit.exitLoss_s2m5;
    const double gap = work.w0_m + drop - (work.linear_sm2 + exit * std::fabs(flow)) * flow
                       - unit.headScale_m * point.h;
    const double own = (work.linear_sm2 + 2.0 * exit * std::fabs(flow)) * unit.flowScale_m3s
                       + unit.headScale_m * point.dh_dq;
    work.speedGap = work.speedByFlow = 0.0;
    if (!work.speedKnown) {
        const double bySpeed = 1.0 - work.speedShare * (point.dm_dn - work.electricalSlope);
        const double residual = work.n - work.speedShare * (point.m - work.electricalSlope * work.n)
                                - work.speedConstant;
        work.speedGap = -residual / bySpeed;
        work.speedByFlow = work.speedShare * point.dm_dq / bySpeed;
    }
    work.gap_m = gap - unit.headScale_m * point.dh_dn * work.speedGap;
    work.stiffness_m = own + unit.headScale_m * point.dh_dn * work.speedByFlow;
    const double least = 1e-3 * unit.headScale_m; // keeps the branch increasing far from the root
    work.stiffness_m = std::max(work.stiffness_m, least);
    work.flow_m3s = unit.flowScale_m3s * (work.q + work.gap_m / work.stiffness_m);
    work.slope_m2s = unit.flowScale_m3s / work.stiffness_m;
}

/// Speed of a runner at shut gate: its own equation alone.
void solveShutSpeed(const UnitRow& unit, MachineWork& work) {
    for (int count = 0; count < 50; ++count) {
        const auto point = unit.chart->shut(work.n);
        work.torque = point.m;
        work.head = point.h;
        if (work.speedKnown) {
            return;
        }
        const double residual = work.n - work.speedShare * (point.m - work.electricalSlope * work.n)
                                - work.speedConstant;
        const double move =
            residual / (1.0 - work.speedShare * (point.dm_dn - work.electricalSlope));
        work.n -= move;
        if (std::fabs(move) < 1e-15) {
            return;
        }
    }
}

/// Speed of an ideal unit with known shaft power P: n' − k(P/n' − S n') = constant.
void solvePowerSpeed(const UnitRow& unit, double power, MachineWork& work) {
    if (!unit.turns()) {
        work.torque = 0.0;
        return;
    }
    for (int count = 0; count < 50 && !work.speedKnown; ++count) {
        const double n = work.n;
        const double residual =
            n - work.speedShare * (power / n - work.electricalSlope * n) - work.speedConstant;
        const double move =
            residual / (1.0 + work.speedShare * (power / (n * n) + work.electricalSlope));
        work.n = std::max(n - move, 0.5 * n);
        if (std::fabs(move) < 1e-15) {
            break;
        }
    }
    work.torque = work.n > 0.0 ? power / work.n : 0.0;
}

/// Head on the runner, torque and shaft power at the solved point.
void acceptTurbine(const Model& model, const UnitRow& unit, double drop, MachineWork& work,
                   MachineState& state) {
    const double flow = work.flow_m3s;
    if (unit.kind == UnitKind::francis) {
        if (work.shut) {
            solveShutSpeed(unit, work);
        } else {
            state.x = work.q * work.c;
        }
        state.runnerHead_m = unit.headScale_m * work.head;
        state.shaftPower_W = work.torque * work.n * unit.powerScale_W;
        return;
    }
    const bool orifice = unit.kind == UnitKind::orifice;
    const double inertial = orifice ? work.w0_m - work.linear_sm2 * flow : 0.0;
    state.runnerHead_m = drop - unit.exitLoss_s2m5 * numerics::signedSquare(flow) + inertial;
    const double water =
        model.medium.density_kgm3 * model.medium.gravity_mps2 * flow * state.runnerHead_m;
    state.shaftPower_W = flow > 0.0 ? (orifice ? unit.orifice.efficiency : 1.0) * water : 0.0;
    solvePowerSpeed(unit, state.shaftPower_W / unit.powerScale_W, work);
}

/// What the generator takes from the shaft and gives to the grid.
void acceptGenerator(const UnitRow& unit, const UnitStep& step, double speedBefore,
                     const MachineWork& work, MachineState& state) {
    if (step.tripFraction >= 0.0) {
        state.onGrid = false;
        state.rotor.onGrid = false;
    }
    if (!state.onGrid) {
        state.electrical = 0.0;
        state.terminalPower_W = 0.0;
        return;
    }
    double power = state.shaftPower_W;
    if (unit.freeShaft() && unit.rotor.locked) {
        state.electrical =
            work.torque - (work.n - speedBefore) / step.step_s * unit.accelerationTime_s();
        power = state.electrical * work.n * unit.powerScale_W;
    } else if (unit.freeShaft()) {
        state.electrical = work.electricalConstant + work.electricalSlope * work.n;
        state.rotor =
            grid::rotorAfter(unit.rotor, state.rotor, work.n, step.frequency_pu, step.step_s);
        power = state.electrical * work.n * unit.powerScale_W;
    }
    const double efficiency = unit.generatorEfficiency;
    state.terminalPower_W = power * (power >= 0.0 ? efficiency : 1.0 / efficiency);
}

} // namespace

void prepareUnit(const UnitRow& unit, const MachineState& state, const UnitStep& step,
                 MachineWork& work) {
    const double inertia = unit.inertia_s2m2;
    if (step.backwardEuler) {
        work.linear_sm2 = inertia / step.step_s;
        work.w0_m = work.linear_sm2 * state.flow_m3s;
    } else {
        work.linear_sm2 = 1.5 * inertia / step.step_s;
        work.w0_m = inertia / step.step_s * (2.0 * state.flow_m3s - 0.5 * state.flowBefore_m3s);
    }
    work.prescribed = step.prescribed;
    work.tau = unit.relativeOpening(step.stroke);
    work.shut = !(work.tau > machines::FrancisChart::shutOpening);
    work.c = work.shut ? 0.0 : 1.0 / work.tau;
    prepareShaft(unit, state, step, work);
    work.q = work.shut ? 0.0 : work.tau * (step.guess ? 2.0 * state.x - state.xBefore : state.x);
    work.moved = 0.0;
}

bool linearise(const Model& model, const UnitRow& unit, double drop, MachineWork& work) {
    switch (unit.kind) {
    case UnitKind::flow:
        work.flow_m3s = work.prescribed;
        work.slope_m2s = 0.0;
        return true;
    case UnitKind::power: {
        const machines::PowerUnit law{work.prescribed * unit.power_W, model.medium.density_kgm3,
                                      model.medium.gravity_mps2, 1.0};
        const auto flow = law.at(drop);
        work.flow_m3s = flow.flow_m3s;
        work.slope_m2s = flow.slope_m2s;
        return !flow.belowLowest || work.prescribed * unit.power_W == 0.0;
    }
    case UnitKind::orifice: {
        if (work.shut) {
            work.flow_m3s = work.slope_m2s = 0.0;
            return true;
        }
        const double quadratic = unit.orifice.resistance_s2m5(work.tau) + unit.exitLoss_s2m5;
        const auto solved = hydraulics::solveBranch(work.linear_sm2, quadratic, work.w0_m + drop);
        work.flow_m3s = solved.flow_m3s;
        work.slope_m2s = solved.slope_m2s;
        return true;
    }
    case UnitKind::francis:
        if (work.shut) {
            work.flow_m3s = work.slope_m2s = 0.0;
            return true;
        }
        lineariseFrancis(unit, drop, work);
        return true;
    }
    return false;
}

void correct(const UnitRow& unit, double change, MachineWork& work) {
    if (unit.kind != UnitKind::francis || work.shut) {
        work.flow_m3s += work.slope_m2s * change;
        work.moved = 0.0;
        return;
    }
    const double dq = (work.gap_m + change) / work.stiffness_m;
    const double dn = work.speedGap + work.speedByFlow * dq;
    work.q += dq;
    work.n += dn;
    work.head += work.headByFlow * dq + work.headBySpeed * dn;
    work.torque += work.torqueByFlow * dq + work.torqueBySpeed * dn;
    work.flow_m3s = unit.flowScale_m3s * work.q;
    work.moved = std::max(std::fabs(dq) * std::max(1.0, work.c), std::fabs(dn));
}

bool solveAlone(const Model& model, const UnitRow& unit, double drop, MachineWork& work) {
    if (unit.kind != UnitKind::francis || work.shut) {
        return linearise(model, unit, drop, work);
    }
    // With the speed eliminated for each trial flow the balance of heads falls with the flow.
    const auto balance = [&](double x) {
        work.q = x * work.tau;
        for (int count = 0; count < 30; ++count) {
            lineariseFrancis(unit, drop, work);
            if (work.speedKnown || std::fabs(work.speedGap) < 1e-14) {
                break;
            }
            work.n += work.speedGap;
        }
        return numerics::ValueAndSlope{work.gap_m, -work.stiffness_m * work.tau};
    };
    const double reach =
        3.0 * std::sqrt(std::fabs(drop) / unit.headScale_m + work.n * work.n + 1.0);
    const auto root = numerics::bracketedNewton(balance, -reach, reach, work.q * work.c,
                                                {1e-13 * reach, 0.0, 200});
    if (!root) {
        return false;
    }
    balance(*root);
    return true;
}

void acceptUnit(const Model& model, const UnitRow& unit, const UnitStep& step, double drop,
                MachineWork& work, MachineState& state) {
    state.flowBefore_m3s = state.flow_m3s;
    state.flow_m3s = work.flow_m3s;
    state.xBefore = state.x;
    acceptTurbine(model, unit, drop, work, state);
    state.speedBefore = state.speed;
    state.speed = work.n;
    state.torque = work.torque;
    acceptGenerator(unit, step, state.speedBefore, work, state);
}

} // namespace headroom::simulation
