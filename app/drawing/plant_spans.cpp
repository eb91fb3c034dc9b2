// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/chainage_map.h"
#include "drawing/words.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::drawing {

namespace {

constexpr double tailraceShare = 0.30; ///< where there is one; the others shrink to make room
constexpr double bayLength_m = 100.0;  ///< nominal, where nothing lies beyond the units
constexpr double shortest_m = 1.0;

using Kind = Span::Kind;

struct Marks {
    double start_m = std::numeric_limits<double>::infinity();
    double end_m = -std::numeric_limits<double>::infinity();
    std::optional<double> chamber_m, inlet_m, outlet_m;
};

double chainageOf(const plant::Plant& plant, const plant::Reference& point) {
    const bool known = point.collection == plant::Collection::points && point.resolved()
                       && point.index < plant.points.size();
    return known ? plant.points[point.index].chainage_m : std::nan("");
}

Marks marksOf(const plant::Plant& plant) {
    Marks marks;
    for (const auto& [name, point] : plant.points) {
        marks.start_m = std::min(marks.start_m, point.chainage_m);
        marks.end_m = std::max(marks.end_m, point.chainage_m);
    }
    for (const auto& [name, unit] : plant.units) {
        const double inlet = chainageOf(plant, unit.from);
        if (std::isfinite(inlet)) {
            marks.inlet_m = std::max(inlet, marks.inlet_m.value_or(inlet));
        }
    }
    for (const auto& [name, unit] : plant.units) {
        const double outlet = chainageOf(plant, unit.to);
        if (std::isfinite(outlet) && marks.inlet_m && outlet > *marks.inlet_m) {
            marks.outlet_m = std::min(outlet, marks.outlet_m.value_or(outlet));
        }
    }
    for (const auto& [name, chamber] : plant.chambers) {
        const double at = chainageOf(plant, chamber.at);
        const double before = marks.inlet_m.value_or(marks.end_m);
        if (std::isfinite(at) && at > marks.start_m && at < before) {
            marks.chamber_m = std::max(at, marks.chamber_m.value_or(at));
        }
    }
    return marks;
}

/// Name of the conduit that has most length inside a stretch.
QString longestConduit(const plant::Plant& plant, double from_m, double to_m) {
    QString best;
    double most = 0.0;
    for (const auto& [name, conduit] : plant.conduits) {
        const double a = chainageOf(plant, conduit.from), b = chainageOf(plant, conduit.to);
        const double inside = std::min(std::max(a, b), to_m) - std::max(std::min(a, b), from_m);
        if (inside > most) {
            most = inside;
            best = text(name);
        }
    }
    return best;
}

void addSpan(std::vector<Span>& spans, Kind kind, double to_m, double share, double from_m) {
    const double from = spans.empty() ? from_m : spans.back().to_m;
    if (to_m > from) {
        spans.push_back({kind, from, to_m, share, {}});
    }
}

std::vector<Span> spansOf(const Marks& marks, std::optional<double> lastGround_m) {
    std::vector<Span> spans;
    const double headEnd = marks.inlet_m.value_or(marks.end_m);
    if (marks.chamber_m) {
        addSpan(spans, Kind::headrace, *marks.chamber_m, headraceShare, marks.start_m);
        addSpan(spans, Kind::pressure, headEnd, pressureShare, marks.start_m);
    } else {
        addSpan(spans, Kind::pressure, headEnd, headraceShare + pressureShare, marks.start_m);
    }
    if (!marks.inlet_m) {
        return spans;
    }
    const double inlet = *marks.inlet_m;
    const bool tailrace = marks.outlet_m && marks.end_m > *marks.outlet_m + shortest_m;
    const double bayEnd =
        tailrace ? *marks.outlet_m
                 : std::max({inlet + bayLength_m, marks.end_m, lastGround_m.value_or(inlet)});
    addSpan(spans, Kind::bay, bayEnd, bayShare, inlet);
    if (tailrace) {
        const double room = 0.12 * (marks.end_m - *marks.outlet_m); // for the water it ends in
        addSpan(spans, Kind::tailrace, marks.end_m + room, tailraceShare, inlet);
    }
    return spans;
}

/// One scale for everything but the bay: shares follow the lengths, headrace and pressure side
/// become one span.
void toOneScale(std::vector<Span>& spans) {
    if (spans.size() > 1 && spans[0].kind == Kind::headrace && spans[1].kind == Kind::pressure) {
        spans[1].from_m = spans[0].from_m;
        spans.erase(spans.begin());
    }
    double length_m = 0.0;
    for (const auto& span : spans) {
        length_m += span.kind == Kind::bay ? 0.0 : span.to_m - span.from_m;
    }
    for (auto& span : spans) {
        if (span.kind != Kind::bay && length_m > 0.0) {
            span.share = (1.0 - bayShare) * (span.to_m - span.from_m) / length_m;
        }
    }
}

} // namespace

ChainageMap chainageMap(const plant::Plant& plant, double left_px, double right_px, double lead_px,
                        Scales scales, std::optional<double> lastGround_m) {
    Marks marks = marksOf(plant);
    if (!std::isfinite(marks.start_m) || !std::isfinite(marks.end_m)) {
        marks.start_m = 0.0;
        marks.end_m = 1000.0;
    }
    marks.end_m = std::max(marks.end_m, marks.start_m + shortest_m);
    auto spans = spansOf(marks, lastGround_m);
    if (spans.empty()) {
        spans.push_back({Kind::pressure, marks.start_m, marks.end_m, 1.0, {}});
    }
    if (scales == Scales::one) {
        toOneScale(spans);
    }
    for (auto& span : spans) {
        if (span.kind != Kind::bay) {
            span.name = longestConduit(plant, span.from_m, span.to_m);
        }
    }
    return ChainageMap(std::move(spans), left_px, right_px, lead_px);
}

} // namespace headroom::drawing
