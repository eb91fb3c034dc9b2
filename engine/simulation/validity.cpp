// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/validity.h"

#include "numerics/elementary.h"
#include "simulation/messages.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::simulation {
namespace {

using results::Thing;

constexpr int stepsWatched = 64; // rows are compared with boiling once in so many steps

} // namespace

Validity::Validity(const Model& model) : model_(model) {
    lowest_m_.assign(model.rows.nodes(), std::numeric_limits<double>::infinity());
    highest_m_.assign(model.rows.nodes(), -std::numeric_limits<double>::infinity());
    boiling_m_.assign(model.rows.nodes(), -std::numeric_limits<double>::infinity());
    for (const ConduitRow& conduit : model.conduits) {
        if (conduit.row < 0) {
            continue;
        }
        const std::size_t first = model.rows.firstNode(at(conduit.row));
        for (int cell = 0; cell <= conduit.cells; ++cell) {
            const double along = conduit.geometry.length_m * cell / conduit.cells;
            boiling_m_[first + at(cell)] =
                conduit.geometry.elevationAt(along) + model.medium.vapourHead_m();
        }
    }
    chamberDone_.assign(model.chambers.size(), false);
    runnerDone_.assign(model.units.size(), false);
}

void Validity::add(double from_s, Finding why, std::vector<Thing> stillValid) {
    why.time_s = from_s;
    found_.push_back({from_s, std::move(why), std::move(stillValid)});
}

void Validity::takeChambers(const State& state) {
    for (std::size_t i = 0; i < model_.chambers.size(); ++i) {
        const ChamberState& chamber = state.chambers[i];
        const hydraulics::ChamberTable& table = model_.chambers[i].table;
        const bool empty = table.belowFloor(chamber.volume_m3);
        if (chamberDone_[i] || !(empty || table.aboveRim(chamber.volume_m3))) {
            continue;
        }
        chamberDone_[i] = true;
        const double limit = empty ? table.floor_m() : table.rim_m();
        // Air in the tunnel, or water over the rim: nothing of the water is computed for that.
        add(state.time_s,
            {.message = empty ? &chamberEmpty : &chamberFull,
             .subject = model_.chamberPath[i],
             .arguments = {{"limit", amount(Quantity::elevation, limit)}}},
            {});
    }
}

void Validity::takeRunners(const State& state) {
    const double boiling = model_.medium.vapourHead_m();
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const UnitRow& unit = model_.units[i];
        if (runnerDone_[i] || unit.kind != UnitKind::francis) {
            continue;
        }
        const MachineState& machine = state.machines[i];
        const double square = numerics::signedSquare(machine.flow_m3s);
        const double driven = unit.draftInertia_s2m2 * (machine.flow_m3s - machine.flowBefore_m3s)
                              / model_.grid.step_s;
        const double head = state.head_m[at(unit.outlet)] + unit.exitLoss_s2m5 * square + driven
                            - unit.recovery_s2m5 * std::fabs(square) - unit.centreline_m;
        if (head < boiling) {
            runnerDone_[i] = true;
            add(state.time_s,
                {.message = &boilsAtRunner,
                 .subject = model_.unitPath[i],
                 .arguments = {{"head", amount(Quantity::head, boiling)}}},
                {Thing::chamber, Thing::reservoir, Thing::grid});
        }
    }
}

void Validity::takeRows(const State& state) {
    if (rowsDone_ || boiling_m_.empty()) {
        return;
    }
    model_.rows.widen(state.elastic, lowest_m_, highest_m_, model_.instructions);
    if (++watched_ < stepsWatched && state.step < model_.grid.steps) {
        return;
    }
    for (std::size_t node = 0; node < lowest_m_.size() && !rowsDone_; ++node) {
        if (!(lowest_m_[node] < boiling_m_[node])) {
            continue;
        }
        rowsDone_ = true;
        for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
            const ConduitRow& conduit = model_.conduits[i];
            const std::size_t first =
                conduit.row >= 0 ? model_.rows.firstNode(at(conduit.row)) : lowest_m_.size();
            if (node < first || node > first + at(conduit.cells)) {
                continue;
            }
            const double along =
                conduit.geometry.length_m * static_cast<double>(node - first) / conduit.cells;
            add(watchedSince_s_,
                {.message = &boilsInConduit,
                 .subject = model_.conduitPath[i],
                 .arguments = {{"chainage",
                                amount(Quantity::chainage, conduit.geometry.chainageAt(along))},
                               {"head", amount(Quantity::head, model_.medium.vapourHead_m())}}},
                {Thing::chamber, Thing::reservoir, Thing::unit, Thing::grid});
        }
    }
    watched_ = 0;
    watchedSince_s_ = state.time_s;
    std::fill(lowest_m_.begin(), lowest_m_.end(), std::numeric_limits<double>::infinity());
}

void Validity::take(const State& state) {
    takeChambers(state);
    takeRunners(state);
    takeRows(state);
}

} // namespace headroom::simulation
