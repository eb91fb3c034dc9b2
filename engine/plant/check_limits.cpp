// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/checks.h"
#include "plant/rows.h"

#include <algorithm>

namespace headroom::plant {

namespace {

std::string className(int index) {
    return std::string(rows::loadClassKeys()[static_cast<std::size_t>(index)]);
}

bool anyValue(const ClassValues& values) {
    return std::any_of(values.begin(), values.end(),
                       [](const auto& value) { return value.has_value(); });
}

/// A rarer class allows at least as much as a milder one.
void checkOrder(const Limit& limit, const ClassValues& values, bool upper, const Path& at,
                Report& report) {
    const Quantity quantity = info(limit.measure).quantity;
    int milder = -1;
    for (int i = 0; i < loadClassCount; ++i) {
        const auto& value = values[static_cast<std::size_t>(i)];
        if (!value) {
            continue;
        }
        if (milder >= 0) {
            const double other = *values[static_cast<std::size_t>(milder)];
            if (upper ? *value < other : *value > other) {
                report.add(say::classOrder, at,
                           {{"class", className(i)},
                            {"value", amount(quantity, *value)},
                            {"milder", className(milder)},
                            {"other", amount(quantity, other)}});
            }
        }
        milder = i;
    }
}

void checkSides(const Limit& limit, const Path& at, Report& report) {
    const Quantity quantity = info(limit.measure).quantity;
    for (int i = 0; i < loadClassCount; ++i) {
        const auto& least = limit.least[static_cast<std::size_t>(i)];
        const auto& greatest = limit.greatest[static_cast<std::size_t>(i)];
        if (least && greatest && *least > *greatest) {
            report.add(say::leastAboveGreatest, at,
                       {{"class", className(i)},
                        {"least", amount(quantity, *least)},
                        {"greatest", amount(quantity, *greatest)}});
        }
    }
}

void checkPlace(const Plant& plant, const Limit& limit, const Path& at, Report& report) {
    if (!limit.at.alongConduit || !limit.at.thing.resolved()) {
        return;
    }
    const auto axis = axisOf(plant, plant.conduits[limit.at.thing.index]);
    if (axis.empty()
        || (limit.at.chainage_m >= axis.front().first
            && limit.at.chainage_m <= axis.back().first)) {
        return;
    }
    Path path = at;
    path.insert(path.end(), {std::string(info(limit.measure).key), "at", "chainage_m"});
    report.add(say::placeOutside, path,
               {{"value", amount(Quantity::chainage, limit.at.chainage_m)},
                {"name", limit.at.thing.name},
                {"from", amount(Quantity::chainage, axis.front().first)},
                {"to", amount(Quantity::chainage, axis.back().first)}});
}

} // namespace

void checkLimits(const Plant& plant, const Keyed<Limit>& limits, Report& report) {
    for (int i = 0; i < limits.size(); ++i) {
        const auto& limit = limits[i];
        const Path at{"limits", limits.name(i)};
        if (!anyValue(limit.least) && !anyValue(limit.greatest)) {
            report.add(say::limitWithoutValue, at);
        }
        checkSides(limit, at, report);
        checkOrder(limit, limit.least, false, at, report);
        checkOrder(limit, limit.greatest, true, at, report);
        checkPlace(plant, limit, at, report);
        if (limit.source.document.empty() || limit.source.author.empty()) {
            report.add(say::unsignedLimit, at);
        }
    }
}

} // namespace headroom::plant
