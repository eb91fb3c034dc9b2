// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/assemble.h"

#include <algorithm>
#include <utility>

namespace headroom::simulation {
namespace {

/// Value → scale·value + shift with scale > 0, which keeps extremes extremes.
results::Channel derived(const results::Channel& from, Measure measure, double scale,
                         double shift) {
    results::Channel out = from;
    out.measure = measure;
    const auto value = [&](double& v) { v = scale * v + shift; };
    value(out.atRest);
    value(out.atEnd);
    for (results::Extreme* extreme : {&out.least, &out.greatest}) {
        value(extreme->value);
        extreme->largestStep *= scale;
        for (double& around : extreme->around) {
            value(around);
        }
    }
    for (auto* part : {&out.trace.low, &out.trace.high, &out.trace.last}) {
        for (float& v : *part) {
            v = static_cast<float>(scale * static_cast<double>(v) + shift);
        }
    }
    return out;
}

double endArea(const Model& model, const results::Place& place) {
    const ConduitRow& conduit = model.conduits[at(place.index)];
    return place.chainage_m == conduit.geometry.chainage_m.front() ? conduit.fromArea_m2
                                                                   : conduit.toArea_m2;
}

} // namespace

std::vector<results::Channel> assembleChannels(const Model& model, const Channels& channels,
                                               const Watch& watch, Record& record,
                                               const std::vector<double>& atRest,
                                               const double* atEnd) {
    std::vector<results::Channel> out;
    const double step = model.grid.step_s;
    for (std::size_t i = 0; i < channels.items().size(); ++i) {
        const auto& item = channels.items()[i];
        results::Channel channel{item.measure,   item.place,           atRest[i],
                                 atEnd[i],       watch.least(i, step), watch.greatest(i, step),
                                 record.trace(i)};
        const bool head =
            item.measure == Measure::head && item.place.thing == results::Thing::point;
        const bool flow =
            item.measure == Measure::discharge && item.place.thing == results::Thing::conduit;
        if (head) {
            const double elevation = model.nodes[at(model.pointNode(item.place.index))].elevation_m;
            out.push_back(derived(channel, Measure::pressureHead, 1.0, -elevation));
        } else if (flow) {
            out.push_back(
                derived(channel, Measure::velocity, 1.0 / endArea(model, item.place), 0.0));
        }
        out.push_back(std::move(channel));
    }
    return out;
}

std::vector<results::Envelope> assembleEnvelopes(const Model& model, const Channels& channels,
                                                 const Watch& watch, const Record& record,
                                                 const std::vector<double>& atRest) {
    std::vector<results::Envelope> out;
    const auto& stations = channels.stations();
    const std::size_t first = channels.items().size();
    for (std::size_t i = 0; i < stations.size();) {
        results::Envelope envelope;
        envelope.conduit = stations[i].conduit;
        const ConduitGeometry& geometry = model.conduits[at(envelope.conduit)].geometry;
        const std::size_t begin = i;
        for (; i < stations.size() && stations[i].conduit == envelope.conduit; ++i) {
            const auto least = watch.least(first + i, model.grid.step_s);
            const auto greatest = watch.greatest(first + i, model.grid.step_s);
            envelope.chainage_m.push_back(geometry.chainageAt(stations[i].along_m));
            envelope.elevation_m.push_back(geometry.elevationAt(stations[i].along_m));
            envelope.rest_m.push_back(atRest[first + i]);
            envelope.least_m.push_back(least.value);
            envelope.greatest_m.push_back(greatest.value);
            envelope.leastTime_s.push_back(least.time_s);
            envelope.greatestTime_s.push_back(greatest.time_s);
            envelope.largestStep_m.push_back(std::max(least.largestStep, greatest.largestStep));
        }
        envelope.line_m = record.line(begin, i - begin);
        out.push_back(std::move(envelope));
    }
    return out;
}

} // namespace headroom::simulation
