// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/head_bounds.h"

#include "limits/place.h"

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace {

using results::Thing;

/// What is common to all limits of one call.
struct Context {
    const plant::Variant& variant;
    plant::LoadClass loadClass;
    const std::vector<results::Verdict>& verdicts;
    const plant::Plant& plant() const { return variant.plant; }
};

std::optional<double> boundOf(const plant::Limit& limit, bool upper, plant::LoadClass loadClass) {
    const auto bound = limits::boundFor(upper ? limit.greatest : limit.least, loadClass);
    return bound ? std::optional(bound->value) : std::nullopt;
}

double allowanceOf(const Context& in, int limit, bool upper) {
    for (const auto& verdict : in.verdicts) {
        if (verdict.limit == limit && verdict.upper == upper && std::isfinite(verdict.allowance)) {
            return std::abs(verdict.allowance);
        }
    }
    return 0.0;
}

bool isHead(Measure measure) {
    return measure == Measure::head || measure == Measure::pressureHead;
}

/// Chainage rising, whatever way the conduit runs.
void add(BoundLine& line, BoundPlace place) {
    const auto after = [](const BoundPlace& a, const BoundPlace& b) {
        return a.chainage_m < b.chainage_m;
    };
    line.places.insert(std::upper_bound(line.places.begin(), line.places.end(), place, after),
                       place);
}

BoundLine alongWhole(const Context& in, int index, int conduit, const plant::Rows& axis, bool upper,
                     double bound) {
    BoundLine line{conduit, upper, true, {}};
    const double allowance = allowanceOf(in, index, upper);
    for (const auto& [chainage, elevation] : axis) {
        add(line, {index, chainage, elevation + bound, allowance});
    }
    return line;
}

/// Place of one limit on one conduit, as a head; nothing if it does not lie on it.
std::optional<BoundPlace> placeOn(const Context& in, int index, int conduit,
                                  const plant::Rows& axis, bool upper) {
    const auto& limit = in.variant.limits[index];
    const auto& the = in.plant().conduits[conduit];
    const auto bound = boundOf(limit, upper, in.loadClass);
    const auto place = limits::placeOf(limit, in.plant());
    if (!bound || !place) {
        return std::nullopt;
    }
    int point = -1;
    double chainage = place->chainage_m;
    if (limit.measure == Measure::level && place->thing == Thing::chamber) {
        point = in.plant().chambers[place->index].at.index;
    } else if (isHead(limit.measure) && place->thing == Thing::point) {
        point = place->index;
    } else if (!isHead(limit.measure) || place->thing != Thing::conduit
               || place->index != conduit) {
        return std::nullopt;
    }
    if (place->thing != Thing::conduit) {
        if (point < 0 || (point != the.from.index && point != the.to.index)) {
            return std::nullopt;
        }
        chainage = in.plant().points[point].chainage_m;
    }
    const double above = limit.measure == Measure::pressureHead ? elevationOn(axis, chainage) : 0.0;
    return BoundPlace{index, chainage, *bound + above, allowanceOf(in, index, upper)};
}

void addLines(HeadBounds& out, const Context& in, int conduit, bool upper) {
    const auto axis = axisOf(in.plant(), in.plant().conduits[conduit]);
    if (axis.size() < 2) {
        return;
    }
    BoundLine between{conduit, upper, false, {}};
    for (int i = 0; i < in.variant.limits.size(); ++i) {
        const auto& limit = in.variant.limits[i];
        const bool here = limit.at.thing.collection == plant::Collection::conduits
                          && limit.at.thing.index == conduit;
        if (limit.wholeConduit && limit.measure == Measure::pressureHead) {
            const auto bound = boundOf(limit, upper, in.loadClass);
            if (here && bound) {
                out.lines.push_back(alongWhole(in, i, conduit, axis, upper, *bound));
            }
        } else if (const auto place = placeOn(in, i, conduit, axis, upper)) {
            add(between, *place);
        }
    }
    if (!between.places.empty()) {
        out.lines.push_back(std::move(between));
    }
}

} // namespace

bool BoundLine::covers(double chainage_m) const {
    return !places.empty() && chainage_m >= places.front().chainage_m
           && chainage_m <= places.back().chainage_m;
}

double BoundLine::effective_m(double chainage_m) const {
    const auto value = [&](const BoundPlace& place) {
        return place.head_m + (upper ? -place.allowance_m : place.allowance_m);
    };
    for (std::size_t i = 1; i < places.size(); ++i) {
        const auto& a = places[i - 1];
        const auto& b = places[i];
        if (chainage_m <= b.chainage_m && b.chainage_m > a.chainage_m) {
            const double share = (chainage_m - a.chainage_m) / (b.chainage_m - a.chainage_m);
            return value(a) + share * (value(b) - value(a));
        }
    }
    return value(places.back());
}

HeadBounds headBounds(const plant::Variant& variant, plant::LoadClass loadClass,
                      const std::vector<results::Verdict>& verdicts) {
    const Context in{variant, loadClass, verdicts};
    HeadBounds out;
    for (int conduit = 0; conduit < variant.plant.conduits.size(); ++conduit) {
        addLines(out, in, conduit, true);
        addLines(out, in, conduit, false);
    }
    for (int i = 0; i < variant.limits.size(); ++i) {
        const auto& limit = variant.limits[i];
        const auto place = limits::placeOf(limit, variant.plant);
        if (limit.measure != Measure::level || !place || place->thing != Thing::chamber) {
            continue;
        }
        for (const bool upper : {true, false}) {
            if (const auto bound = boundOf(limit, upper, loadClass)) {
                out.chambers.push_back({i, place->index, upper, *bound});
            }
        }
    }
    return out;
}

} // namespace headroom::drawing
