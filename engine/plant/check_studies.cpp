// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/overloaded.h"
#include "plant/checks.h"

#include <algorithm>

namespace headroom::plant {

namespace {

/// Time of each event; nothing while it hangs on an unknown event or on itself.
class EventTimes {
public:
    EventTimes(const Study& study, const Path& at, Report& report)
        : study_(study), at_(at), report_(report) {}

    void check() {
        for (int i = 0; i < study_.events.size(); ++i) {
            const auto time_s = timeOf(i);
            if (time_s && *time_s > study_.until_s && study_.until_s > 0.0) {
                report_.add(say::eventAfterEnd, pathOf(i),
                            {{"value", amount(Quantity::time, *time_s)},
                             {"until", amount(Quantity::time, study_.until_s)}});
            }
        }
    }

private:
    Path pathOf(int index) const {
        Path path = at_;
        path.insert(path.end(), {"events", study_.events.name(index)});
        return path;
    }

    std::optional<double> timeOf(int index) {
        double sum_s = 0.0;
        std::vector<std::string> way;
        for (int steps = 0; steps <= study_.events.size(); ++steps) {
            const auto& time = study_.events[index].time;
            way.push_back(study_.events.name(index));
            if (time.at_s) {
                return sum_s + *time.at_s;
            }
            if (!time.after_s || !time.of.resolved()) {
                return std::nullopt;
            }
            sum_s += *time.after_s;
            index = time.of.index;
        }
        tellCircle(way);
        return std::nullopt;
    }

    void tellCircle(std::vector<std::string> way) {
        const std::string start = way.back();
        way.pop_back();
        std::vector<std::string> circle{start};
        while (!way.empty() && way.back() != start) {
            circle.insert(circle.begin(), way.back());
            way.pop_back();
        }
        std::sort(circle.begin(), circle.end());
        const std::string names = listed(circle);
        if (std::find(told_.begin(), told_.end(), names) == told_.end()) {
            told_.push_back(names);
            report_.add(say::eventCircle, pathOf(study_.events.indexOf(circle.front())),
                        {{"names", names}});
        }
    }

    const Study& study_;
    const Path& at_;
    Report& report_;
    std::vector<std::string> told_;
};

void checkLevels(const Plant& plant, const Study& study, const Path& at, Report& report) {
    const auto level = [](double value_m) { return amount(Quantity::elevation, value_m); };
    for (const auto& [thing, level_m] : study.start.level_m) {
        if (!thing.resolved()) {
            continue;
        }
        const auto& reservoir = plant.reservoirs[thing.index];
        Path path = at;
        path.insert(path.end(), {"start", "levels_m", thing.name});
        if (reservoir.at.resolved() && level_m < plant.points[reservoir.at.index].elevation_m) {
            report.add(say::levelBelowIntake, path,
                       {{"level", level(level_m)},
                        {"axis", level(plant.points[reservoir.at.index].elevation_m)}});
        } else if (level_m < reservoir.lowest_m.value_or(level_m)
                   || level_m > reservoir.highest_m.value_or(level_m)) {
            report.add(say::startOutside, path,
                       {{"name", thing.name},
                        {"level", level(level_m)},
                        {"low", level(reservoir.lowest_m.value_or(level_m))},
                        {"high", level(reservoir.highest_m.value_or(level_m))}});
        }
    }
    for (const auto& [thing, level_m] : study.start.chamberLevel_m) {
        if (!thing.resolved() || plant.chambers[thing.index].shape.areaByLevel.size() < 2) {
            continue;
        }
        const auto& shape = plant.chambers[thing.index].shape;
        if (level_m < shape.floor_m() || level_m > shape.rim_m()) {
            Path path = at;
            path.insert(path.end(), {"start", "chamberLevels_m", thing.name});
            report.add(say::chamberOutside, path,
                       {{"name", thing.name},
                        {"level", level(level_m)},
                        {"low", level(shape.floor_m())},
                        {"high", level(shape.rim_m())}});
        }
    }
}

void checkOutputs(const Study& study, const Path& at, Report& report) {
    for (const auto& [unit, output_W] : study.start.output_W) {
        for (const auto& [other, opening] : study.start.opening) {
            if (unit.name == other.name) {
                Path path = at;
                path.insert(path.end(), {"start", "opening_pct", unit.name});
                report.add(say::outputTwice, path, {{"name", unit.name}});
            }
        }
    }
}

/// Why an event cannot happen to the plant as it is; "" if it can.
std::string unfit(const Plant& plant, const EventKind& kind) {
    const auto turbine = [&](const Reference& unit) -> const Turbine* {
        return unit.resolved() ? &plant.units[unit.index].turbine : nullptr;
    };
    return std::visit(
        overloaded{[&](const LossOfGeneration&) -> std::string {
                       return std::holds_alternative<GridArea>(plant.grid)
                                  ? ""
                                  : "generation can only be lost in a grid area.";
                   },
                   [&](const FlowOrder& order) -> std::string {
                       const auto* kindOf = turbine(order.unit);
                       return kindOf == nullptr || std::holds_alternative<FlowUnit>(*kindOf)
                                  ? ""
                                  : "only an ideal unit of given discharge follows a discharge.";
                   },
                   [&](const OpeningOrder& order) -> std::string {
                       const auto* kindOf = turbine(order.unit);
                       const bool gate = kindOf == nullptr
                                         || std::holds_alternative<FrancisTurbine>(*kindOf)
                                         || std::holds_alternative<OrificeUnit>(*kindOf);
                       return gate ? "" : "this kind of unit has no gate.";
                   },
                   [](const auto&) -> std::string { return ""; }},
        kind);
}

} // namespace

void checkStudies(const Plant& plant, const Keyed<Study>& studies, Report& report) {
    for (int i = 0; i < studies.size(); ++i) {
        const auto& study = studies[i];
        const Path at{"studies", studies.name(i)};
        EventTimes(study, at, report).check();
        checkLevels(plant, study, at, report);
        checkOutputs(study, at, report);
        for (const auto& [name, event] : study.events) {
            if (const auto why = unfit(plant, event.kind); !why.empty()) {
                Path path = at;
                path.insert(path.end(), {"events", name});
                report.add(say::wrongEvent, path, {{"why", why}});
            }
        }
    }
}

} // namespace headroom::plant
