// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/channels.h"

#include "numerics/elementary.h"

#include <algorithm>
#include <cmath>
#include <set>

namespace headroom::simulation {
namespace {

using results::Thing;

constexpr int mostStations = 40;
constexpr double mostWindowRows = 1000.0;

/// Cells at which heads are kept: evenly spread, and those nearest to corners and reach ends.
std::vector<int> stationCells(const ConduitRow& conduit) {
    std::set<int> cells;
    const double length = conduit.geometry.length_m;
    const double time = conduit.geometry.travelTime_s();
    const auto cellAt = [&](double along) {
        const double sum = conduit.geometry.travelTimeTo_s(along);
        return std::clamp(static_cast<int>(std::lround(sum / time * conduit.cells)), 0,
                          conduit.cells);
    };
    std::vector<double> corners = conduit.geometry.along_m;
    for (const ConduitPiece& piece : conduit.geometry.pieces) {
        corners.push_back(piece.from_m);
    }
    for (std::size_t i = 0; i < corners.size() && cells.size() < at(mostStations) / 2; ++i) {
        cells.insert(cellAt(corners[i]));
    }
    cells.insert({0, conduit.cells});
    const int spread = mostStations - static_cast<int>(cells.size());
    for (int i = 1; i <= spread && spread > 0; ++i) {
        cells.insert(cellAt(length * i / (spread + 1)));
    }
    return {cells.begin(), cells.end()};
}

/// Length along the conduit at a node of its row.
double alongCell(const ConduitRow& conduit, int cell) {
    double left = conduit.geometry.travelTime_s() * cell / conduit.cells;
    for (const ConduitPiece& piece : conduit.geometry.pieces) {
        const double time = piece.length_m / piece.waveSpeed_mps;
        if (left <= time) {
            return piece.from_m + left * piece.waveSpeed_mps;
        }
        left -= time;
    }
    return conduit.geometry.length_m;
}

} // namespace

Channels::Channels(const Model& model) : model_(model) {
    for (int i = 0; i < static_cast<int>(model.reservoirLevel_m.size()); ++i) {
        add(Measure::level, Thing::reservoir, i);
    }
    for (int i = 0; i < static_cast<int>(model.chambers.size()); ++i) {
        add(Measure::level, Thing::chamber, i);
        add(Measure::discharge, Thing::chamber, i);
    }
    for (int i = 0; i < static_cast<int>(model.conduits.size()); ++i) {
        const auto& chainage = model.conduits[at(i)].geometry.chainage_m;
        add(Measure::discharge, Thing::conduit, i, chainage.front());
        add(Measure::discharge, Thing::conduit, i, chainage.back());
    }
    for (int i = 0; i < static_cast<int>(model.units.size()); ++i) {
        for (const Measure measure :
             {Measure::discharge, Measure::speed, Measure::opening, Measure::openingRate,
              Measure::openingTravel, Measure::shaftPower, Measure::terminalPower,
              Measure::gridPower, Measure::netHead, Measure::head, Measure::draftPressureHead}) {
            add(measure, Thing::unit, i);
        }
    }
    add(Measure::frequency, Thing::grid, -1);
    add(Measure::frequencyRate, Thing::grid, -1);
    for (int i = 0; i < static_cast<int>(model.pointNode_.size()); ++i) {
        add(Measure::head, Thing::point, i);
        add(Measure::pressureRate, Thing::point, i);
    }
    addStations();
    const double steps = std::max(1.0, std::round(rateWindow_s / model.grid.step_s));
    windowEvery_ = static_cast<std::size_t>(std::ceil(steps / mostWindowRows));
    windowRows_ = std::max<std::size_t>(1, static_cast<std::size_t>(steps) / windowEvery_);
    window_.resize(windowRows_ * model.pointNode_.size());
    rate_.resize(model.pointNode_.size());
}

void Channels::add(Measure measure, Thing thing, int index, double chainage) {
    items_.push_back({measure, {thing, index, chainage}});
}

void Channels::addStations() {
    for (int i = 0; i < static_cast<int>(model_.conduits.size()); ++i) {
        const ConduitRow& conduit = model_.conduits[at(i)];
        if (conduit.kind == ConduitKind::elastic) {
            for (const int cell : stationCells(conduit)) {
                const double along = alongCell(conduit, cell);
                stations_.push_back({i, cell, model_.rows.firstNode(at(conduit.row)) + at(cell),
                                     along / conduit.geometry.length_m, along});
            }
            continue;
        }
        std::vector<double> places = conduit.geometry.along_m;
        for (int k = 1; k < 10; ++k) {
            places.push_back(conduit.geometry.length_m * k / 10.0);
        }
        std::sort(places.begin(), places.end());
        places.erase(std::unique(places.begin(), places.end()), places.end());
        for (const double along : places) {
            stations_.push_back({i, -1, 0, along / conduit.geometry.length_m, along});
        }
    }
}

double Channels::pointHead(const State& state, int index) const {
    const Node& node = model_.nodes[at(index)];
    if (node.headEnd < 0) {
        return state.head_m[at(index)];
    }
    const auto conduit = at(node.headEnd / 2);
    return model_.startEnd(node.headEnd) ? state.startHead_m[conduit] : state.endHead_m[conduit];
}

double* Channels::fillPoints(const State& state, double* out) {
    const std::size_t count = model_.pointNode_.size();
    const double span = static_cast<double>(windowRows_ * windowEvery_) * model_.grid.step_s;
    const bool due = windowCount_ == 0;
    double* const row = window_.data() + windowRow_ * count;
    for (std::size_t i = 0; i < count; ++i) {
        const double head = pointHead(state, model_.pointNode_[i]);
        if (!windowFilled_) { // at rest since ever
            for (std::size_t k = 0; k < windowRows_; ++k) {
                window_[k * count + i] = head;
            }
        }
        if (due) {
            rate_[i] = (head - row[i]) / span;
            row[i] = head;
        }
        *out++ = head;
        *out++ = rate_[i];
    }
    windowFilled_ = true;
    windowCount_ = windowCount_ + 1 == windowEvery_ ? 0 : windowCount_ + 1;
    if (due) {
        windowRow_ = windowRow_ + 1 == windowRows_ ? 0 : windowRow_ + 1;
    }
    return out;
}

double* Channels::fillUnits(const State& state, double* out) const {
    for (std::size_t i = 0; i < model_.units.size(); ++i) {
        const UnitRow& unit = model_.units[i];
        const MachineState& machine = state.machines[i];
        const ControlState& control = state.controls[i];
        const double square = numerics::signedSquare(machine.flow_m3s);
        const double outlet = state.head_m[at(unit.outlet)];
        const double exit = unit.exitLoss_s2m5 * square;
        // Upstream of the draft tube's inertia: what moves the water in it stands there too.
        const double driven = unit.draftInertia_s2m2 * (machine.flow_m3s - machine.flowBefore_m3s)
                              / model_.grid.step_s;
        *out++ = machine.flow_m3s;
        *out++ = machine.speed;
        *out++ = control.opening;
        *out++ = control.rate_1s;
        *out++ = control.travel;
        *out++ = machine.shaftPower_W;
        *out++ = machine.terminalPower_W;
        *out++ = machine.terminalPower_W;
        *out++ = state.head_m[at(unit.inlet)] - outlet - exit;
        *out++ = pointHead(state, unit.inlet);
        *out++ =
            outlet + exit + driven - unit.recovery_s2m5 * std::fabs(square) - unit.centreline_m;
    }
    return out;
}

void Channels::fill(const State& state, double* row) {
    double* out = row;
    for (std::size_t i = 0; i < model_.reservoirLevel_m.size(); ++i) {
        *out++ = state.head_m[at(model_.reservoirNode_[i])];
    }
    for (const ChamberState& chamber : state.chambers) {
        *out++ = chamber.level_m;
        *out++ = chamber.flow_m3s;
    }
    for (std::size_t i = 0; i < model_.conduits.size(); ++i) {
        *out++ = state.startFlow_m3s[i];
        *out++ = state.endFlow_m3s[i];
    }
    out = fillUnits(state, out);
    *out++ = state.frequency_Hz;
    *out++ = state.frequencyRate_Hzs;
    out = fillPoints(state, out);
    const double* head = state.elastic.head_m().data();
    for (const Station& station : stations_) {
        if (station.cell >= 0) {
            *out++ = head[station.node];
        } else {
            const auto conduit = at(station.conduit);
            *out++ = state.startHead_m[conduit]
                     + station.share * (state.endHead_m[conduit] - state.startHead_m[conduit]);
        }
    }
}

} // namespace headroom::simulation
