// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/advance.h"

#include "simulation/messages.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

constexpr double sliver = 1e-6;  // of a step: the time a jump takes
constexpr double mostJump = 1e4; // of the plant's head; more means that nothing can give way

Schedule nothing(const Model& model) {
    Schedule out;
    out.openings.resize(model.units.size());
    out.flows.resize(model.units.size());
    out.levels.resize(model.reservoirLevel_m.size());
    return out;
}

numerics::Table constantTable(double value) {
    const std::vector<std::pair<double, double>> rows{{0.0, value}, {1.0, value}};
    return *numerics::Table::make(rows, numerics::Outside::hold);
}

} // namespace

Advance::Advance(const Model& model, bool undisturbed)
    : model_(model), undisturbed_(undisturbed), water_(model), gates_(model) {}

std::optional<Finding> Advance::begin() {
    const auto rest = solveRest(model_, askedAtStart(model_));
    if (!rest) {
        return rest.findings().front();
    }
    rest_ = *rest;
    state_.time_s = -model_.grid.step_s;
    placeWater();
    if (auto finding = placeChambers()) {
        return finding;
    }
    placeMachines();
    placeSchedule();
    gates_.begin(state_, rest_);
    unitSteps_.resize(model_.units.size());
    return std::nullopt;
}

void Advance::placeWater() {
    state_.head_m = state_.headBefore_m = rest_.head_m;
    state_.storageFlow_m3s.assign(model_.nodes.size(), 0.0);
    state_.branches.resize(model_.branches.size());
    state_.elastic = model_.rows.state();
    const std::size_t count = model_.conduits.size();
    state_.startHead_m.resize(count);
    state_.endHead_m.resize(count);
    state_.startFlow_m3s.resize(count);
    state_.endFlow_m3s.resize(count);
    for (std::size_t i = 0; i < count; ++i) {
        const ConduitRow& conduit = model_.conduits[i];
        const double flow = rest_.conduitFlow_m3s[i];
        const double square = flow * std::fabs(flow);
        const EndLoss& from = conduit.geometry.from;
        const EndLoss& to = conduit.geometry.to;
        state_.startFlow_m3s[i] = state_.endFlow_m3s[i] = flow;
        state_.startHead_m[i] = rest_.head_m[at(conduit.from)]
                                - (flow >= 0.0 ? from.leaving_s2m5 : from.arriving_s2m5) * square;
        state_.endHead_m[i] = rest_.head_m[at(conduit.to)]
                              + (flow >= 0.0 ? to.arriving_s2m5 : to.leaving_s2m5) * square;
        for (const int branch : {model_.startBranch[i], model_.endBranch[i]}) {
            BranchState& state = state_.branches[at(branch)];
            state.flow_m3s = state.now_m3s = state.before_m3s = flow;
        }
        if (conduit.row >= 0) {
            model_.rows.setRest(state_.elastic, at(conduit.row), state_.startHead_m[i], flow);
        }
    }
}

std::optional<Finding> Advance::placeChambers() {
    state_.chambers.resize(model_.chambers.size());
    for (std::size_t i = 0; i < model_.chambers.size(); ++i) {
        const ChamberRow& row = model_.chambers[i];
        double level = rest_.head_m[at(row.node)];
        if (row.tunnelEnd >= 0) {
            const double flow = rest_.conduitFlow_m3s[at(row.tunnelEnd / 2)];
            level -= row.velocityShare_s2m5 * flow * flow;
        }
        if (level < row.table.floor_m() || level > row.table.rim_m()) {
            return Finding{
                .message = &chamberRestOutside,
                .subject = model_.chamberPath[i],
                .arguments = {{"level", amount(Quantity::elevation, level)},
                              {"floor", amount(Quantity::elevation, row.table.floor_m())},
                              {"rim", amount(Quantity::elevation, row.table.rim_m())}}};
        }
        state_.chambers[i].volume_m3 = row.table.volume_m3(level);
        state_.chambers[i].level_m = level;
    }
    return std::nullopt;
}

void Advance::placeMachines() {
    state_.machines.resize(model_.units.size());
    state_.work.resize(model_.units.size());
    state_.controls.resize(model_.units.size());
    state_.frequency_Hz = state_.frequencyBefore_Hz = model_.nominal_Hz;
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const UnitRow& unit = model_.units[i];
        MachineState& machine = state_.machines[i];
        const double flow = rest_.unitFlow_m3s[i];
        machine.flow_m3s = machine.flowBefore_m3s = flow;
        const double tau = unit.relativeOpening(rest_.opening[i]);
        if (tau > machines::FrancisChart::shutOpening) {
            machine.x = machine.xBefore = flow / (unit.flowScale_m3s * tau);
        }
        machine.torque = machine.electrical = rest_.torque_pu[i];
        machine.rotor =
            grid::rotorAtRest(unit.rotor, machine.electrical / unit.electricalScale, 1.0);
        machine.shaftPower_W = rest_.torque_pu[i] * unit.powerScale_W;
        machine.terminalPower_W = restOutput_W(model_, rest_, static_cast<int>(i));
    }
    state_.ownPowerAtRest_W = state_.ownPower_W = gridPower_W();
}

void Advance::placeSchedule() {
    state_.schedule = undisturbed_ ? nothing(model_) : model_.schedule;
    Schedule& schedule = state_.schedule;
    schedule.frequency_Hz.setBefore(model_.nominal_Hz);
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const bool flow = model_.units[i].kind == UnitKind::flow;
        const bool power = model_.units[i].kind == UnitKind::power;
        schedule.openings[i].setBefore(rest_.opening[i]);
        schedule.flows[i].setBefore(power ? 1.0 : model_.units[i].restFlow_m3s);
        for (const Trip& trip : schedule.trips) { // an ideal unit without gate stops at once
            if (trip.unit == static_cast<int>(i) && (flow || power)) {
                schedule.flows[i].add(trip.time_s, constantTable(0.0));
            }
        }
    }
    for (std::size_t i = 0; i < model_.reservoirLevel_m.size(); ++i) {
        schedule.levels[i].setBefore(model_.reservoirLevel_m[i]);
    }
    for (auto* group : {&schedule.openings, &schedule.flows, &schedule.levels}) {
        for (Prescription& item : *group) {
            item.snapJumps(model_.grid.step_s);
            const auto jumps = item.jumps();
            schedule.jumps_s.insert(schedule.jumps_s.end(), jumps.begin(), jumps.end());
        }
    }
    const bool offset = !undisturbed_
                        && std::any_of(model_.chamberStart_m.begin(), model_.chamberStart_m.end(),
                                       [](const auto& v) { return v.has_value(); });
    if (offset) {
        schedule.jumps_s.push_back(0.0);
    }
    std::sort(schedule.jumps_s.begin(), schedule.jumps_s.end());
}

void Advance::setKnownHeads(double time_s, bool after) {
    for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
        const int reservoir = model_.nodes[i].reservoir;
        if (reservoir >= 0 && state_.schedule.levels[at(reservoir)].given()) {
            const Prescription& level = state_.schedule.levels[at(reservoir)];
            state_.head_m[i] = after ? level.valueAfter(time_s) : level.value(time_s);
        }
    }
}

/// Imposed, or imposed on the area by the study: exact at the new time. Else that of the area:
/// straight on from the last two instants, because it follows from the powers of this step.
double Advance::frequencyAt(double time_s, bool after) const {
    if (areaRules(time_s)) {
        return after ? state_.frequency_Hz : 2.0 * state_.frequency_Hz - state_.frequencyBefore_Hz;
    }
    const Prescription& imposed = state_.schedule.frequency_Hz;
    return after ? imposed.valueAfter(time_s) : imposed.value(time_s);
}

bool Advance::areaRules(double time_s) const {
    return model_.area && !state_.schedule.frequency_Hz.givenAt(time_s);
}

void Advance::fillUnitSteps(double time_s, bool after) {
    const double frequency = frequencyAt(time_s, after) / model_.nominal_Hz;
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        UnitStep& step = unitSteps_[i];
        const ControlState& control = state_.controls[i];
        const Prescription& flow = state_.schedule.flows[i];
        step.step_s = model_.grid.step_s * (after ? sliver : 1.0);
        step.stroke = control.opening;
        step.prescribed = after ? flow.valueAfter(time_s) : flow.value(time_s);
        step.frequency_pu = frequency;
        step.tripFraction = after ? -1.0 : control.tripFraction;
        step.guess = !after && !state_.restart;
    }
}

/// A gate seats or leaves its seat, or a breaker opens.
bool Advance::modeChanges() const {
    for (const ControlState& control : state_.controls) {
        const bool seats = (control.opening > 0.0) != (control.openingBefore > 0.0);
        if (seats || control.tripFraction >= 0.0) {
            return true;
        }
    }
    return false;
}

double Advance::gridPower_W() const {
    double sum = 0.0;
    for (const MachineState& machine : state_.machines) {
        sum += machine.terminalPower_W;
    }
    return sum;
}

void Advance::advanceGrid(double start_s, double end_s) {
    const double before = state_.frequency_Hz;
    state_.frequencyBefore_Hz = before;
    const double own = gridPower_W();
    if (areaRules(end_s)) {
        const double step = end_s - start_s;
        double lostMean = state_.lost_W;
        for (const Loss& loss : state_.schedule.losses) {
            if (loss.time_s >= start_s - 1e-9 * step && loss.time_s < end_s - 1e-9 * step) {
                lostMean += loss.power_W * (1.0 - std::max(0.0, loss.time_s - start_s) / step);
                state_.lost_W += loss.power_W;
            }
        }
        double locked = 0.0;
        for (std::size_t i = 0; i < model_.units.size(); ++i) {
            const UnitRow& unit = model_.units[i];
            if (unit.rotor.locked && unit.inertia_kgm2 > 0.0 && state_.machines[i].onGrid) {
                locked += 0.5 * unit.inertia_kgm2 * unit.speedScale_rads * unit.speedScale_rads;
            }
        }
        state_.area = grid::advance(*model_.area, state_.area,
                                    {state_.ownPower_W - state_.ownPowerAtRest_W,
                                     own - state_.ownPowerAtRest_W, 2.0 * lostMean - state_.lost_W,
                                     state_.lost_W, step, locked});
        state_.frequency_Hz = model_.nominal_Hz + state_.area.deviation_Hz;
    } else {
        state_.frequency_Hz = frequencyAt(end_s, false);
    }
    state_.frequencyRate_Hzs = (state_.frequency_Hz - before) / model_.grid.step_s;
    state_.ownPower_W = own;
}

bool Advance::jumpAt(double time_s) const {
    return nextJump_ < state_.schedule.jumps_s.size()
           && state_.schedule.jumps_s[nextJump_] <= time_s + 1e-9 * model_.grid.step_s;
}

/// What a jump changes at one instant: discharges and heads, found by a step that takes no time.
void Advance::settleJump(double time_s) {
    while (jumpAt(time_s)) {
        ++nextJump_;
    }
    if (time_s == 0.0 && !undisturbed_) {
        for (std::size_t i = 0; i < model_.chambers.size(); ++i) {
            if (model_.chamberStart_m[i]) {
                ChamberState& chamber = state_.chambers[i];
                chamber.level_m = *model_.chamberStart_m[i];
                chamber.volume_m3 = model_.chambers[i].table.volume_m3(chamber.level_m);
            }
        }
    }
    gates_.afterJump(state_);
    setKnownHeads(time_s, true);
    fillUnitSteps(time_s, true);
    const double step = model_.grid.step_s * sliver;
    for (UnitStep& unit : unitSteps_) {
        unit.backwardEuler = true;
    }
    const bool solved = water_.solve(state_, unitSteps_, step, WaterStep::Mode::jump);
    double worst = 0.0;
    for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
        if (!model_.nodes[i].known()) {
            worst = std::max(worst, std::fabs(state_.head_m[i] - state_.headBefore_m[i]));
        }
    }
    if (solved && worst < mostJump * model_.headScale_m) {
        water_.acceptJump(state_, unitSteps_);
    } else { // only inertia could answer: the next step, backward Euler, spreads the jump
        for (std::size_t i = 0; i < model_.nodes.size(); ++i) {
            if (!model_.nodes[i].known()) {
                state_.head_m[i] = state_.headBefore_m[i];
            }
        }
    }
    state_.restart = true;
}

bool Advance::step() {
    const double start = model_.grid.at(state_.step);
    const double end = model_.grid.at(state_.step + 1);
    const double step = model_.grid.step_s;
    setKnownHeads(end, false);                              // 1
    gates_.advance(state_, start, step);                    // 2
    model_.rows.sweep(state_.elastic, model_.instructions); // 3
    const bool changes = modeChanges();
    const bool euler = state_.restart || changes;
    fillUnitSteps(end, false);
    for (UnitStep& unit : unitSteps_) {
        unit.backwardEuler = euler;
    }
    if (!water_.solve(state_, unitSteps_, step, // 4, 5, 6
                      euler ? WaterStep::Mode::kink : WaterStep::Mode::smooth)) {
        return false;
    }
    water_.accept(state_, unitSteps_, step); // 7
    advanceGrid(start, end);                 // 8
    state_.step += 1;
    state_.time_s = end;
    gates_.afterWater(state_); // 9
    state_.restart = changes;
    jumped_ = jumpAt(end);
    if (jumped_) {
        settleJump(end);
    }
    model_.rows.advance(state_.elastic);
    return true;
}

bool Advance::finite() const {
    double sum = 0.0; // one number that is not finite spoils it
    for (const double head : state_.head_m) {
        sum += 0.0 * head;
    }
    for (const MachineState& machine : state_.machines) {
        sum += 0.0 * machine.speed + 0.0 * machine.flow_m3s;
    }
    return sum == 0.0;
}

Finding Advance::failure() const {
    const ClusterFailure& why = water_.failure();
    Finding out{.message = &clusterUnsolved,
                .subject = why.where.empty() ? std::string("plant") : why.where,
                .time_s = std::max(0.0, state_.time_s)};
    std::string names;
    for (const auto& [path, residual] : why.residuals) {
        out.related.push_back(path);
        names += (names.empty() ? "" : ", ") + path + " " + print(Quantity::discharge, residual);
    }
    out.arguments.emplace_back("residuals", names.empty() ? std::string("none") : names);
    return out;
}

} // namespace headroom::simulation
