// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "plant/tree.h"

#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

namespace headroom::plant {

/// When an event happens: at a time, or after another event by a delay.
struct EventTime {
    std::optional<double> at_s;
    std::optional<double> after_s;                     ///< delay now used
    std::optional<std::pair<double, double>> search_s; ///< range a search may move it in
    Reference of;                                      ///< event the delay counts from
};

struct RejectLoad {
    std::vector<Reference> units;
}; ///< empty: all units
struct LoadOrder {
    Reference unit;
    double to_W = 0;
    double over_s = 0;
}; ///< accept load or move the set-point; joins the grid first if off it
struct GateStuck {
    Reference unit;
}; ///< the gate stays where it is
struct LossOfGeneration {
    double power_W = 0;
}; ///< in the area, positive = lost
struct ImposedFrequency {
    Rows table;
}; ///< (s after the event, Hz)
struct OpeningOrder {
    Reference unit;
    Rows table;
}; ///< (s after the event, share)
struct FlowOrder {
    Reference unit;
    Rows table;
}; ///< (s after, m³/s); `flow` units
struct LevelOrder {
    Reference reservoir;
    Rows table;
}; ///< (s after the event, m)
using EventKind = std::variant<RejectLoad, LoadOrder, GateStuck, LossOfGeneration, ImposedFrequency,
                               OpeningOrder, FlowOrder, LevelOrder>;

struct Event {
    EventTime time;
    EventKind kind;
};

struct Start {
    std::vector<std::pair<Reference, double>> level_m;        ///< by reservoir; else its `level_m`
    std::vector<std::pair<Reference, double>> chamberLevel_m; ///< offset start for checks
    std::vector<std::pair<Reference, double>> output_W;       ///< by unit; absent: 0, on the grid
    std::vector<std::pair<Reference, double>> opening;        ///< by unit, instead of an output
};

struct Study {
    LoadClass loadClass = LoadClass::normal;
    std::string about;
    Start start;
    Keyed<Event> events;
    double until_s = 0;
};

struct Option {
    std::string about;
    std::optional<double> cost_M;
    Source source;
    Tree changes; ///< merge patch over {site, plant, limits}
};

struct Numerics {
    double longestStep_s = 0.01; ///< cap of the plant's time step
};

/// A project as the user sees it, bound from its value tree.
struct Project {
    std::string title;
    std::string baseName = "Base";
    Site site;
    Plant plant;
    Keyed<Limit> limits;
    Keyed<Option> options;
    Keyed<Study> studies;
    Numerics numerics;
    Rows ground; ///< (chainage, elevation), for the drawing
    Tree tree;   ///< what it was bound from
};

} // namespace headroom::plant
