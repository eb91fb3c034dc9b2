// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/gate_control.h"

#include "simulation/messages.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

constexpr double chatterWindow_s = 1.0;
constexpr int mostChanges = 20;
constexpr double rounding = 1e-9; // of a step: an instant at a step's end belongs to the next

bool inStep(double time, double start, double step) {
    return time >= start - rounding * step && time < start + (1.0 - rounding) * step;
}

double fraction(double time, double start, double step) {
    return std::clamp((time - start) / step, 0.0, 1.0);
}

Finding incident(const Message& message, const std::string& subject, double time_s) {
    return {.message = &message, .subject = subject, .time_s = time_s};
}

} // namespace

std::vector<control::LoadOrder> GateControl::loadOrders(State& state, const RestPoint& rest,
                                                        int unit) {
    std::vector<control::LoadOrder> orders;
    const UnitRow& row = model_.units[at(unit)];
    for (const LoadMove& move : state.schedule.loads) {
        if (move.unit != unit) {
            continue;
        }
        RestAsked asked = askedAtStart(model_);
        asked.output_W[at(unit)] = move.to_W;
        for (std::size_t i = 0; i < model_.units.size(); ++i) {
            if (static_cast<int>(i) != unit) { // the others as they stand at the start
                asked.output_W[i].reset();
                asked.opening[i] = rest.opening[i];
            }
        }
        const auto target = solveRest(model_, asked);
        if (!target) {
            Finding why = target.findings().front();
            why.time_s = move.time_s;
            state.incidents.push_back(std::move(why));
        }
        orders.push_back(
            {move.time_s,
             {target ? target->opening[at(unit)] : row.openingLimit, move.to_W / row.powerScale_W},
             move.over_s});
    }
    return orders;
}

void GateControl::begin(State& state, const RestPoint& rest) {
    for (int i = 0; i < static_cast<int>(model_.units.size()); ++i) {
        const UnitRow& row = model_.units[at(i)];
        ControlState& control = state.controls[at(i)];
        const double opening = rest.opening[at(i)];
        control.opening = control.openingBefore = control.order = opening;
        if (row.servo) {
            control.servo = control::servoAtRest(*row.servo, opening, model_.grid.step_s);
        }
        const bool gated = row.kind == UnitKind::francis || row.kind == UnitKind::orifice;
        if (!gated || (!row.servo && state.schedule.loads.empty())) {
            continue;
        }
        control.power = control.powerBefore = restOutput_W(model_, rest, i) / row.powerScale_W;
        control::LoadReference reference{opening, control.power};
        if (row.governor != nullptr) {
            control.governor = row.governor->clone();
            control::Measured measured;
            measured.opening_pu = opening;
            measured.power_pu = control.power;
            measured.reference = reference;
            reference = control.governor->rest(measured);
        }
        RestAsked idle = askedAtStart(model_);
        idle.output_W[at(i)] = 0.0;
        const auto noLoad = solveRest(model_, idle);
        control.noLoad = {noLoad ? noLoad->opening[at(i)] : 0.0, 0.0};
        control.load.emplace(row.loadControl, loadOrders(state, rest, i), reference, true);
    }
}

control::Measured GateControl::measured(const State& state, int unit, double time_s,
                                        double step_s) const {
    const MachineState& machine = state.machines[at(unit)];
    const ControlState& control = state.controls[at(unit)];
    const double ahead = std::clamp((time_s - state.time_s) / model_.grid.step_s, 0.0, 1.0);
    control::Measured out;
    out.time_s = time_s;
    out.step_s = step_s;
    out.speed_pu = machine.speed + ahead * (machine.speed - machine.speedBefore);
    out.frequency_pu =
        (state.frequency_Hz + ahead * (state.frequency_Hz - state.frequencyBefore_Hz))
        / model_.nominal_Hz;
    out.opening_pu = control.opening;
    out.power_pu = control.power + ahead * (control.power - control.powerBefore);
    const Node& inlet = model_.nodes[at(model_.units[at(unit)].inlet)];
    out.inletHead_m = inlet.headEnd >= 0 && !model_.startEnd(inlet.headEnd)
                          ? state.endHead_m[at(inlet.headEnd / 2)]
                          : state.head_m[at(model_.units[at(unit)].inlet)];
    out.onGrid = machine.onGrid && control.tripFraction < 0.0;
    out.speedReference_pu = out.onGrid ? 1.0 : out.frequency_pu;
    return out;
}

/// The governor's order at `time_s`, which lies `step_s` after its last decision.
double GateControl::governed(State& state, int unit, double time_s, double step_s) {
    ControlState& control = state.controls[at(unit)];
    const control::Measured seen = measured(state, unit, time_s, step_s);
    const auto answer = control.load->at(time_s, step_s, seen.speed_pu, seen.frequency_pu);
    control.joining = control.joining || answer.closeBreaker;
    if (answer.heldBack != control.heldBack && !control.lockedOut) {
        control.heldBack = answer.heldBack;
        state.incidents.push_back(incident(answer.heldBack ? orderHeldBack : orderReleased,
                                           model_.unitPath[at(unit)], time_s));
    }
    if (control.governor == nullptr) {
        return seen.onGrid || control.joining ? answer.reference.opening_pu : 0.0;
    }
    const double period = control.governor->samplePeriod_s();
    control::Measured input = seen;
    input.reference = answer.reference;
    if (period > 0.0) {
        const double count = std::round(time_s / period);
        if (std::fabs(time_s - count * period) > 1e-6 * period) {
            return control.order;
        }
        input.step_s = std::isfinite(control.lastSample_s) ? time_s - control.lastSample_s : period;
        control.lastSample_s = time_s;
    }
    return control.governor->decide(input).opening_pu;
}

double GateControl::wanted(State& state, int unit, double time_s, double step_s) {
    ControlState& control = state.controls[at(unit)];
    if (control.lockedOut) {
        return 0.0;
    }
    const Prescription& table = state.schedule.openings[at(unit)];
    if (table.givenAt(time_s)) {
        return std::clamp(table.value(time_s), 0.0, 1.0);
    }
    return control.load ? governed(state, unit, time_s, step_s) : control.order;
}

void GateControl::trip(State& state, int unit, double time_s) {
    ControlState& control = state.controls[at(unit)];
    if (control.load) {
        control.load->trip(time_s, control.noLoad);
    }
    state.incidents.push_back(incident(unitTripped, model_.unitPath[at(unit)], time_s));
}

/// Gate and order from `start_s` over `step_s`, without a switching in between.
void GateControl::moveGate(State& state, int unit, double start_s, double step_s) {
    if (step_s <= 0.0) {
        return;
    }
    const UnitRow& row = model_.units[at(unit)];
    ControlState& control = state.controls[at(unit)];
    const double before = control.order;
    control.order = wanted(state, unit, start_s + step_s, step_s);
    if (row.servo) {
        control::advance(*row.servo, control.servo, {before, control.order}, start_s, step_s);
        control.opening = control.servo.opening_pu;
    } else if (!control.stuck) {
        control.opening = control.order;
    }
}

void GateControl::advanceUnit(State& state, int unit, double start_s, double step_s) {
    ControlState& control = state.controls[at(unit)];
    MachineState& machine = state.machines[at(unit)];
    control.openingBefore = control.opening;
    control.tripFraction = -1.0;
    double done = 0.0; // of the step
    for (const Jam& jam : state.schedule.jams) {
        if (jam.unit == unit && inStep(jam.time_s, start_s, step_s)) {
            const double share = fraction(jam.time_s, start_s, step_s);
            moveGate(state, unit, start_s, share * step_s);
            done = share;
            control.stuck = control.servo.stuck = true;
            state.incidents.push_back(incident(gateStuck, model_.unitPath[at(unit)], jam.time_s));
        }
    }
    for (const Trip& event : state.schedule.trips) {
        if (event.unit == unit && machine.onGrid && inStep(event.time_s, start_s, step_s)) {
            const double share = std::max(done, fraction(event.time_s, start_s, step_s));
            moveGate(state, unit, start_s + done * step_s, (share - done) * step_s);
            done = share;
            control.tripFraction = share;
            trip(state, unit, event.time_s);
            if (control.load && !control.lockedOut
                && !state.schedule.openings[at(unit)].givenAt(event.time_s)) {
                control.order = governed(state, unit, event.time_s, 0.0);
            }
        }
    }
    if (control.lockedOut && machine.onGrid) { // shut down by its protection
        control.tripFraction = done;
    }
    moveGate(state, unit, start_s + done * step_s, (1.0 - done) * step_s);
    control.rate_1s = (control.opening - control.openingBefore) / step_s;
    control.travel += std::fabs(control.opening - control.openingBefore);
}

void GateControl::advance(State& state, double start_s, double step_s) {
    for (int i = 0; i < static_cast<int>(model_.units.size()); ++i) {
        advanceUnit(state, i, start_s, step_s);
    }
}

void GateControl::protect(State& state, int unit) {
    const UnitRow& row = model_.units[at(unit)];
    ControlState& control = state.controls[at(unit)];
    const double speed = state.machines[at(unit)].speed;
    if (!row.overspeed_pu || control.lockedOut) {
        return;
    }
    if (speed <= *row.overspeed_pu) {
        control.overspeedSince_s = std::numeric_limits<double>::infinity();
        return;
    }
    control.overspeedSince_s = std::min(control.overspeedSince_s, state.time_s);
    if (state.time_s - control.overspeedSince_s >= row.overspeedDelay_s) {
        control.lockedOut = true;
        control.servo.emergency_s = state.time_s;
        state.incidents.push_back({.message = &overspeedTrip,
                                   .subject = model_.unitPath[at(unit)],
                                   .arguments = {{"speed", amount(Quantity::speedRatio, speed)}},
                                   .time_s = state.time_s});
    }
}

/// A gate that seats and leaves its seat again and again within one second of the plant's time.
void GateControl::countChanges(State& state, int unit) {
    ControlState& control = state.controls[at(unit)];
    if ((control.opening > 0.0) == (control.openingBefore > 0.0) || control.chattered) {
        return;
    }
    if (state.time_s - control.changesSince_s > chatterWindow_s) {
        control.changesSince_s = state.time_s;
        control.modeChanges = 0;
    }
    if (++control.modeChanges > mostChanges) {
        control.chattered = true;
        state.incidents.push_back(incident(chatters, model_.unitPath[at(unit)], state.time_s));
    }
}

void GateControl::afterWater(State& state) {
    for (int i = 0; i < static_cast<int>(model_.units.size()); ++i) {
        ControlState& control = state.controls[at(i)];
        MachineState& machine = state.machines[at(i)];
        const UnitRow& row = model_.units[at(i)];
        control.powerBefore = control.power;
        control.power = machine.terminalPower_W / row.powerScale_W;
        if (control.joining && !machine.onGrid) {
            machine.onGrid = true;
            machine.rotor =
                grid::rotorAtClosing(machine.speed, state.frequency_Hz / model_.nominal_Hz);
            machine.electrical = grid::torque_pu(row.rotor, machine.rotor) * row.electricalScale;
            state.incidents.push_back(incident(unitJoined, model_.unitPath[at(i)], state.time_s));
        }
        control.joining = false;
        protect(state, i);
        countChanges(state, i);
    }
}

void GateControl::afterJump(State& state) {
    for (int i = 0; i < static_cast<int>(model_.units.size()); ++i) {
        const Prescription& table = state.schedule.openings[at(i)];
        ControlState& control = state.controls[at(i)];
        if (table.given() && !model_.units[at(i)].servo && !control.stuck) {
            const double now = std::clamp(table.valueAfter(state.time_s), 0.0, 1.0);
            control.travel += std::fabs(now - control.opening);
            control.opening = control.openingBefore = control.order = now;
        }
    }
}

} // namespace headroom::simulation
