// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/checks.h"

#include <cmath>

namespace headroom::plant {

namespace {

/// Surveyed and drawn length may differ by this share before it is said; common practice.
constexpr double lengthTolerance = 0.005;

Amount chainage(double value_m) {
    return amount(Quantity::chainage, value_m);
}

struct Ends {
    double from_m, to_m;
};

std::optional<Ends> endsOf(const Plant& plant, const Conduit& conduit) {
    if (!conduit.from.resolved() || !conduit.to.resolved()) {
        return std::nullopt;
    }
    return Ends{plant.points[conduit.from.index].chainage_m,
                plant.points[conduit.to.index].chainage_m};
}

double distance_m(const std::pair<double, double>& a, const std::pair<double, double>& b) {
    const double across_m = b.first - a.first;
    const double up_m = b.second - a.second;
    return std::sqrt(across_m * across_m + up_m * up_m);
}

void checkLength(const Plant& plant, const Conduit& conduit, const Path& at, Report& report) {
    const auto axis = axisOf(plant, conduit);
    if (!conduit.length_m || axis.empty()) {
        return;
    }
    double drawn_m = 0.0;
    for (std::size_t i = 1; i < axis.size(); ++i) {
        drawn_m += distance_m(axis[i - 1], axis[i]);
    }
    const double straight_m = distance_m(axis.front(), axis.back());
    const auto length = [](double value_m) { return amount(Quantity::length, value_m); };
    Path path = at;
    path.emplace_back("length_m");
    if (*conduit.length_m < straight_m * (1.0 - lengthTolerance)) {
        report.add(say::lengthTooShort, path,
                   {{"surveyed", length(*conduit.length_m)}, {"straight", length(straight_m)}});
    } else if (std::abs(*conduit.length_m - drawn_m) > lengthTolerance * drawn_m) {
        report.add(say::lengthDiffers, path,
                   {{"surveyed", length(*conduit.length_m)}, {"drawn", length(drawn_m)}});
    }
}

void checkReaches(const Conduit& conduit, Ends ends, const Path& at, Report& report) {
    double from_m = ends.from_m;
    for (int i = 0; i < conduit.reaches.size(); ++i) {
        const auto& reach = conduit.reaches[i];
        const std::string& name = conduit.reaches.name(i);
        const bool last = i + 1 == conduit.reaches.size();
        Path path = at;
        path.insert(path.end(), {"reaches", name});
        if (!reach.to_m) {
            if (!last) {
                report.add(say::reachOpen, path, {{"name", name}});
                return;
            }
            continue;
        }
        if (!(*reach.to_m > from_m) || *reach.to_m > ends.to_m) {
            report.add(say::reachEnd, path,
                       {{"name", name},
                        {"value", chainage(*reach.to_m)},
                        {"from", chainage(from_m)},
                        {"to", chainage(ends.to_m)}});
            return;
        }
        if (last && *reach.to_m < ends.to_m) {
            report.add(say::reachesShort, path,
                       {{"value", chainage(*reach.to_m)}, {"to", chainage(ends.to_m)}});
        }
        from_m = *reach.to_m;
    }
}

void checkConduit(const Plant& plant, int index, Report& report) {
    const auto& conduit = plant.conduits[index];
    Path at{"plant", "conduits", plant.conduits.name(index)};
    if (conduit.reaches.empty()) {
        report.add(say::noReach, at);
    }
    const auto ends = endsOf(plant, conduit);
    if (!ends) {
        return;
    }
    if (!(ends->to_m > ends->from_m)) {
        report.add(say::noLength, at,
                   {{"from", chainage(ends->from_m)}, {"to", chainage(ends->to_m)}});
        return;
    }
    const auto outside = [&](double value_m) {
        return value_m < ends->from_m || value_m > ends->to_m;
    };
    Path axis = at;
    axis.emplace_back("axis");
    for (const auto& corner : conduit.axis) {
        if (!(corner.first > ends->from_m) || !(corner.first < ends->to_m)) {
            report.add(say::cornerOutside, axis,
                       {{"value", chainage(corner.first)},
                        {"from", chainage(ends->from_m)},
                        {"to", chainage(ends->to_m)}});
        }
    }
    checkLength(plant, conduit, at, report);
    checkReaches(conduit, *ends, at, report);
    for (const auto& [name, loss] : conduit.losses) {
        if (outside(loss.chainage_m)) {
            Path path = at;
            path.insert(path.end(), {"losses", name, "chainage_m"});
            report.add(say::placeOutside, path,
                       {{"value", chainage(loss.chainage_m)},
                        {"name", at.back()},
                        {"from", chainage(ends->from_m)},
                        {"to", chainage(ends->to_m)}});
        }
    }
}

} // namespace

Rows axisOf(const Plant& plant, const Conduit& conduit) {
    if (!conduit.from.resolved() || !conduit.to.resolved()) {
        return {};
    }
    const auto& from = plant.points[conduit.from.index];
    const auto& to = plant.points[conduit.to.index];
    Rows axis{{from.chainage_m, from.elevation_m}};
    axis.insert(axis.end(), conduit.axis.begin(), conduit.axis.end());
    axis.emplace_back(to.chainage_m, to.elevation_m);
    return axis;
}

void checkConduits(const Plant& plant, Report& report) {
    for (int i = 0; i < plant.conduits.size(); ++i) {
        checkConduit(plant, i, report);
    }
}

} // namespace headroom::plant
