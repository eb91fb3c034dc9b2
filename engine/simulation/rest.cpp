// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/advance.h"
#include "simulation/channels.h"
#include "simulation/messages.h"
#include "simulation/run.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::simulation {
namespace {

constexpr double watched_s = 100.0;
constexpr double mayMove = 1e-6; // m, and of rated flow

/// What moves furthest from the rest in an undisturbed run, in shares of what may move.
struct Drift {
    double share = 0.0;
    std::size_t index = 0;
};

double allowed(const Model& model, Measure measure) {
    switch (measure) {
    case Measure::discharge:
        return mayMove * model.flowScale_m3s;
    case Measure::level:
    case Measure::head:
        return mayMove;
    case Measure::speed:
        return mayMove;
    default:
        return std::numeric_limits<double>::infinity(); // follows from the others
    }
}

Drift drift(const Model& model, Channels& channels, const std::vector<double>& rest) {
    Drift worst;
    Advance advance(model, true);
    if (advance.begin()) {
        return worst;
    }
    std::vector<double> row(channels.width());
    const auto steps = static_cast<std::int64_t>(watched_s / model.grid.step_s);
    for (std::int64_t n = 0; n <= steps; ++n) {
        if (!advance.step()) {
            worst.share = std::numeric_limits<double>::infinity();
            return worst;
        }
        if (n % 16 != 0 && n != steps) {
            continue;
        }
        channels.fill(advance.state(), row.data());
        for (std::size_t i = 0; i < channels.items().size(); ++i) {
            const double share =
                std::fabs(row[i] - rest[i]) / allowed(model, channels.items()[i].measure);
            if (!(share <= worst.share)) {
                worst = {share, i};
            }
        }
    }
    return worst;
}

std::string pathOf(const Model& model, const results::Place& place) {
    switch (place.thing) {
    case results::Thing::point:
        return model.nodePath[at(model.pointNode(place.index))];
    case results::Thing::reservoir:
        return model.reservoirPath[at(place.index)];
    case results::Thing::conduit:
        return model.conduitPath[at(place.index)];
    case results::Thing::chamber:
        return model.chamberPath[at(place.index)];
    case results::Thing::unit:
        return model.unitPath[at(place.index)];
    case results::Thing::grid:
        break;
    }
    return "plant/grid";
}

} // namespace

Result<Rest> rest(const Model& model) {
    Advance advance(model, true);
    if (auto finding = advance.begin()) {
        return *finding;
    }
    Rest out;
    out.residual = advance.rest().residual;
    Channels channels(model);
    std::vector<double> row(channels.width());
    channels.fill(advance.state(), row.data());
    for (std::size_t i = 0; i < channels.items().size(); ++i) {
        const auto& item = channels.items()[i];
        const bool moving =
            item.measure == Measure::pressureRate || item.measure == Measure::openingRate
            || item.measure == Measure::openingTravel || item.measure == Measure::frequencyRate;
        if (!moving) {
            out.rows.push_back({item.measure, item.place, row[i]});
        }
    }
    const Drift worst = drift(model, channels, row);
    out.standsStill = worst.share <= 1.0;
    if (!out.standsStill) {
        const auto& item = channels.items()[worst.index];
        out.findings.push_back(
            {.message = &restMoves,
             .subject = pathOf(model, item.place),
             .arguments = {{"what", std::string(info(item.measure).label)},
                           {"time", amount(Quantity::time, watched_s)},
                           {"share", amount(Quantity::factor, worst.share * mayMove)}}});
    }
    return Result<Rest>(std::move(out));
}

} // namespace headroom::simulation
