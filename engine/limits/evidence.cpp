// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/evidence.h"

#include "limits/static_head.h"

#include <algorithm>
#include <cmath>

namespace headroom::limits {

namespace {

using results::Channel;
using results::Envelope;
using results::Place;
using results::Run;
using results::Thing;
using results::Trace;

bool worseValue(Side side, double a, double b) {
    return side == Side::upper ? a > b : a < b;
}

// --- from a channel -----------------------------------------------------------------------------

/// A channel and how the measure asked for follows from it: times `scale`, plus `offset`.
struct Source {
    const Channel* channel = nullptr;
    double scale = 1.0;
    double offset = 0.0;
};

/// Area of the bore of a conduit at a chainage.
double areaAt_m2(const plant::Conduit& conduit, double chainage_m) {
    for (const auto& [name, reach] : conduit.reaches) {
        if (!reach.to_m || chainage_m <= *reach.to_m) {
            return reach.area_m2;
        }
    }
    return conduit.reaches[conduit.reaches.size() - 1].area_m2;
}

/// The channel of a conduit nearest to a chainage; a head there belongs to the envelope unless
/// the channel lies exactly there.
const Channel* nearestAlong(const Run& run, Measure measure, const Place& place) {
    const Channel* nearest = nullptr;
    const auto distance = [&](const Channel& channel) {
        return std::abs(channel.place.chainage_m - place.chainage_m);
    };
    for (const auto& channel : run.channels) {
        if (channel.measure == measure && channel.place.thing == Thing::conduit &&
            channel.place.index == place.index &&
            (nearest == nullptr || distance(channel) < distance(*nearest))) {
            nearest = &channel;
        }
    }
    return nearest;
}

/// A head at a point less its elevation, or a discharge over its area, where the measure itself
/// has no channel.
Source derived(Measure measure, const Place& place, const Run& run, const plant::Plant& plant) {
    if (measure == Measure::pressureHead && place.thing == Thing::point) {
        return {run.find(Measure::head, place), 1.0, -plant.points[place.index].elevation_m};
    }
    if (measure == Measure::velocity && place.thing == Thing::conduit) {
        const auto& conduit = plant.conduits[place.index];
        if (!conduit.reaches.empty()) {
            return {nearestAlong(run, Measure::discharge, place),
                    1.0 / areaAt_m2(conduit, place.chainage_m), 0.0};
        }
    }
    return {};
}

Source sourceOf(Measure measure, const Place& place, const Run& run, const plant::Plant& plant) {
    if (const auto* channel = run.find(measure, place)) {
        return {channel};
    }
    const bool along = place.thing == Thing::conduit;
    if (along && (measure == Measure::discharge || measure == Measure::velocity)) {
        if (const auto* nearest = nearestAlong(run, measure, place)) {
            return {nearest};
        }
    }
    return derived(measure, place, run, plant);
}

/// Extreme and step of a trace up to an instant.
std::optional<Evidence> untilFromTrace(const Channel& channel, Side side, double interval_s,
                                       double until_s) {
    const Trace& trace = channel.trace;
    const auto& values = side == Side::upper ? trace.high : trace.low;
    if (values.empty() || !(interval_s > 0.0)) {
        return std::nullopt;
    }
    const auto last = std::min(values.size() - 1,
                               static_cast<std::size_t>(std::max(0.0, until_s / interval_s)));
    std::size_t at = 0;
    for (std::size_t i = 1; i <= last; ++i) {
        if (worseValue(side, static_cast<double>(values[i]), static_cast<double>(values[at]))) {
            at = i;
        }
    }
    Evidence found;
    found.extreme = static_cast<double>(values[at]);
    found.time_s = static_cast<double>(at) * interval_s;
    // One recording interval holds at least one step of the run, so its span is never below S.
    const std::size_t from = at >= 2 ? at - 2 : 0;
    const std::size_t to = std::min(last, at + 2);
    for (std::size_t i = from; i <= to; ++i) {
        found.largestStep = std::max(
            found.largestStep, static_cast<double>(trace.high[i]) - static_cast<double>(trace.low[i]));
        if (i > from) {
            found.largestStep = std::max(found.largestStep,
                                         std::abs(static_cast<double>(trace.last[i]) -
                                                  static_cast<double>(trace.last[i - 1])));
        }
    }
    return found;
}

/// Whether an order or a breaker moves the quantity at once, so that a jump beside its extreme is
/// the quantity itself and not something that a finer step would show.
bool switches(Measure measure) {
    return measure == Measure::openingRate || measure == Measure::terminalPower ||
           measure == Measure::gridPower;
}

/// S of an extreme. A quantity that switches jumps on one side of its extreme at most and is
/// steady on the other: there the smaller of the two sides counts.
double stepBeside(const Channel& channel, const results::Extreme& extreme) {
    if (!switches(channel.measure)) {
        return extreme.largestStep;
    }
    const auto& around = extreme.around;
    const auto change = [&](std::size_t i) { return std::abs(around[i + 1] - around[i]); };
    return std::min(std::max(change(0), change(1)), std::max(change(2), change(3)));
}

std::optional<Evidence> fromChannel(const Source& source, Side side, const Run& run,
                                    double until_s) {
    const Channel& channel = *source.channel;
    const auto& extreme = side == Side::upper ? channel.greatest : channel.least;
    Evidence found;
    if (extreme.time_s <= until_s) {
        found.extreme = extreme.value;
        found.time_s = extreme.time_s;
        found.largestStep = stepBeside(channel, extreme);
    } else if (const auto before = untilFromTrace(channel, side, run.recordInterval_s, until_s)) {
        found = *before;
    } else {
        return std::nullopt;
    }
    found.place = channel.place;
    found.rest = source.scale * channel.atRest + source.offset;
    found.extreme = source.scale * found.extreme + source.offset;
    found.largestStep *= source.scale;
    found.trace = channel.trace.last.empty() ? nullptr : &channel.trace;
    found.scale = source.scale;
    found.offset = source.offset;
    found.interval_s = run.recordInterval_s;
    return found;
}

// --- along a conduit ----------------------------------------------------------------------------

bool headAlong(const plant::Limit& limit, const Place& place) {
    return place.thing == Thing::conduit &&
           (limit.measure == Measure::head || limit.measure == Measure::pressureHead);
}

const Envelope* envelopeOf(const Run& run, int conduit) {
    for (const auto& envelope : run.envelopes) {
        if (envelope.conduit == conduit && !envelope.chainage_m.empty()) {
            return &envelope;
        }
    }
    return nullptr;
}

/// The envelope at a chainage, straight between its stations: exact where the column is rigid,
/// and never inside the truth there, because extremes at both ends need not come together.
Evidence atChainage(const Envelope& envelope, Side side, double chainage_m) {
    const auto& stations = envelope.chainage_m;
    const auto after = std::lower_bound(stations.begin(), stations.end(), chainage_m);
    const auto j = std::min(static_cast<std::size_t>(after - stations.begin()), stations.size() - 1);
    const std::size_t i = j == 0 || stations[j] <= chainage_m ? j : j - 1;
    const double span_m = stations[j] - stations[i];
    const double share = span_m > 0.0 ? (chainage_m - stations[i]) / span_m : 0.0;
    const auto between = [&](const std::vector<double>& values) {
        return values[i] + share * (values[j] - values[i]);
    };
    const bool upper = side == Side::upper;
    const auto& times_s = upper ? envelope.greatestTime_s : envelope.leastTime_s;
    Evidence found;
    found.place = {Thing::conduit, envelope.conduit, chainage_m};
    found.rest = between(envelope.rest_m);
    found.extreme = between(upper ? envelope.greatest_m : envelope.least_m);
    found.time_s = times_s[share > 0.5 ? j : i];
    found.largestStep = std::max(envelope.largestStep_m[i], envelope.largestStep_m[j]);
    return found;
}

std::vector<double> candidates(const plant::Limit& limit, const Place& place,
                               const Envelope& envelope, const plant::Plant& plant) {
    if (!limit.wholeConduit) {
        return {place.chainage_m};
    }
    auto chainages_m = envelope.chainage_m;
    for (const auto& corner : plant.conduits[place.index].axis) {
        chainages_m.push_back(corner.first);
    }
    return chainages_m;
}

std::optional<Evidence> fromEnvelope(const plant::Limit& limit, const Place& place, Side side,
                                     const Run& run, const plant::Plant& plant, double until_s) {
    const auto* envelope = envelopeOf(run, place.index);
    if (envelope == nullptr) {
        return std::nullopt;
    }
    std::optional<Evidence> worst;
    for (const double chainage_m : candidates(limit, place, *envelope, plant)) {
        auto here = atChainage(*envelope, side, chainage_m);
        if (limit.measure == Measure::pressureHead) {
            const double axis_m = axisElevation_m(plant, place.index, chainage_m);
            here.rest -= axis_m;
            here.extreme -= axis_m;
        }
        if (here.time_s > until_s) {
            return std::nullopt; // the envelope does not tell what was before
        }
        if (!worst || worseValue(side, here.extreme, worst->extreme)) {
            worst = here;
        }
    }
    return worst;
}

} // namespace

bool recorded(const plant::Limit& limit, const Place& place, const Run& run,
              const plant::Plant& plant) {
    return sourceOf(limit.measure, place, run, plant).channel != nullptr ||
           (headAlong(limit, place) && envelopeOf(run, place.index) != nullptr);
}

std::optional<Evidence> evidence(const plant::Limit& limit, const Place& place, Side side,
                                 const Run& run, const plant::Plant& plant, double until_s) {
    if (!limit.wholeConduit) {
        const auto source = sourceOf(limit.measure, place, run, plant);
        if (source.channel != nullptr) {
            return fromChannel(source, side, run, until_s);
        }
    }
    return headAlong(limit, place) ? fromEnvelope(limit, place, side, run, plant, until_s)
                                   : std::nullopt;
}

} // namespace headroom::limits
