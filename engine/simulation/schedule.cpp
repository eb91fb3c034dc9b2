// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/schedule.h"

#include "base/overloaded.h"
#include "simulation/messages.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

std::string eventPath(const plant::Study& study, int index) {
    return "events/" + study.events.name(index);
}

/// Time of each event, or nothing where its chain ends nowhere or bites its own tail.
std::optional<double> timeOf(const plant::Study& study, int index, int depth = 0) {
    const plant::EventTime& time = study.events[index].time;
    if (time.at_s) {
        return time.at_s;
    }
    if (!time.of.given()) {
        return time.after_s.value_or(0.0);
    }
    const int other = study.events.indexOf(time.of.name);
    if (other < 0 || depth > study.events.size()) {
        return std::nullopt;
    }
    const auto base = timeOf(study, other, depth + 1);
    return base ? std::optional(*base + time.after_s.value_or(0.0)) : std::nullopt;
}

/// Rows of one value are held for ever.
std::optional<numerics::Table> tableOf(plant::Rows rows, const std::string& path,
                                       Findings& findings) {
    if (rows.size() == 1) {
        rows.emplace_back(rows.front().first + 1.0, rows.front().second);
    }
    auto made = numerics::Table::make(rows, numerics::Outside::hold, path);
    findings.insert(findings.end(), made.findings().begin(), made.findings().end());
    return made ? std::optional(*made) : std::nullopt;
}

struct Reader {
    const plant::Plant& plant;
    Schedule& out;
    Findings& findings;
    std::string path;
    double time_s = 0.0;

    void prescribe(Prescription& target, const plant::Rows& rows) {
        if (auto table = tableOf(rows, path, findings)) {
            target.add(time_s, *table);
        }
    }
    void operator()(const plant::RejectLoad& event) {
        if (event.units.empty()) {
            for (int unit = 0; unit < plant.units.size(); ++unit) {
                out.trips.push_back({time_s, unit});
            }
        }
        for (const auto& unit : event.units) {
            out.trips.push_back({time_s, unit.index});
        }
    }
    void operator()(const plant::LoadOrder& event) {
        out.loads.push_back({time_s, event.unit.index, event.to_W, event.over_s});
    }
    void operator()(const plant::GateStuck& event) {
        out.jams.push_back({time_s, event.unit.index});
    }
    void operator()(const plant::LossOfGeneration& event) {
        if (!std::holds_alternative<plant::GridArea>(plant.grid)) {
            findings.push_back({&lossNeedsArea, path, {}, {}, {}, {}, {}});
        }
        out.losses.push_back({time_s, event.power_W});
    }
    void operator()(const plant::ImposedFrequency& event) {
        prescribe(out.frequency_Hz, event.table);
    }
    void operator()(const plant::OpeningOrder& event) {
        prescribe(out.openings[static_cast<std::size_t>(event.unit.index)], event.table);
    }
    void operator()(const plant::FlowOrder& event) {
        const auto& turbine = plant.units[event.unit.index].turbine;
        if (!std::holds_alternative<plant::FlowUnit>(turbine)) {
            findings.push_back({&flowNeedsFlowUnit, path, {}, {}, {}, {}, {}});
        }
        prescribe(out.flows[static_cast<std::size_t>(event.unit.index)], event.table);
    }
    void operator()(const plant::LevelOrder& event) {
        prescribe(out.levels[static_cast<std::size_t>(event.reservoir.index)], event.table);
    }
};

template <class Item>
void sortByTime(std::vector<Item>& items) {
    std::stable_sort(items.begin(), items.end(),
                     [](const Item& a, const Item& b) { return a.time_s < b.time_s; });
}

} // namespace

void Prescription::add(double time_s, numerics::Table rows) {
    const auto after =
        std::upper_bound(parts_.begin(), parts_.end(), time_s,
                         [](double time, const Part& part) { return time < part.time_s; });
    parts_.insert(after, Part{time_s, std::move(rows)});
}

double Prescription::at(double time_s, bool after) const {
    double value = before_;
    for (const Part& part : parts_) {
        if (part.time_s < time_s || (after && part.time_s == time_s)) {
            value = part.rows.value(time_s - part.time_s);
        }
    }
    return value;
}

std::vector<double> Prescription::jumps() const {
    std::vector<double> out;
    for (const Part& part : parts_) {
        if (valueAfter(part.time_s) != value(part.time_s)) {
            out.push_back(part.time_s);
        }
    }
    return out;
}

void Prescription::snapJumps(double step_s) {
    for (const double jump : jumps()) {
        for (Part& part : parts_) {
            if (part.time_s == jump) {
                part.time_s = std::round(jump / step_s) * step_s;
            }
        }
    }
}

Schedule scheduleOf(const plant::Plant& plant, const plant::Study& study, double step_s,
                    Findings& findings) {
    (void)step_s;
    Schedule out;
    out.openings.resize(static_cast<std::size_t>(plant.units.size()));
    out.flows.resize(static_cast<std::size_t>(plant.units.size()));
    out.levels.resize(static_cast<std::size_t>(plant.reservoirs.size()));
    for (int i = 0; i < study.events.size(); ++i) {
        const auto time = timeOf(study, i);
        if (!time) {
            findings.push_back({&eventWithoutTime, eventPath(study, i), {}, {}, {}, {}, {}});
            continue;
        }
        std::visit(Reader{plant, out, findings, eventPath(study, i), *time}, study.events[i].kind);
    }
    sortByTime(out.trips);
    sortByTime(out.loads);
    sortByTime(out.jams);
    sortByTime(out.losses);
    return out;
}

} // namespace headroom::simulation
