// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"
#include "limits/place.h"

#include <algorithm>
#include <cmath>
#include <numbers>

/// What a run and its limits add to the Section: envelope, zones, lozenges, what moves.
namespace headroom::drawing::section {

namespace {

using results::Thing;

constexpr double placeHalf_px = 16.0; ///< half width of a bound at a single place
constexpr double chamberBeside_px = 12.0;
constexpr double lozengeHalf_px = 5.5;
constexpr double eyeTurns_1s = 0.5; ///< turns a second of the rosette at rated speed

// --- envelope and head line ---------------------------------------------------------------------

/// Stations that matter to the eye: first and last of each pixel column.
std::vector<int> thinned(const results::Envelope& envelope, const ChainageMap& map) {
    std::vector<int> out;
    const int count = static_cast<int>(envelope.chainage_m.size());
    double last = -1e9;
    for (int i = 0; i < count; ++i) {
        const double x = map.x_px(envelope.chainage_m[static_cast<std::size_t>(i)]);
        if (i == 0 || i == count - 1 || std::abs(x - last) >= 1.5) {
            out.push_back(i);
            last = x;
        }
    }
    return out;
}

bool complete(const results::Envelope& envelope) {
    const std::size_t count = envelope.chainage_m.size();
    return count >= 2 && envelope.least_m.size() == count && envelope.greatest_m.size() == count;
}

void addEnvelope(Making& making, const results::Envelope& envelope) {
    auto& scene = making.scene;
    const auto& conduits = scene.shown.variant->plant.conduits;
    if (!complete(envelope) || envelope.conduit < 0 || envelope.conduit >= conduits.size()) {
        return;
    }
    HeadLine line{&envelope, thinned(envelope, scene.layout.map), {}};
    QPolygonF high, low;
    for (const int station : line.stations) {
        const auto i = static_cast<std::size_t>(station);
        const double x = scene.layout.map.x_px(envelope.chainage_m[i]);
        line.x_px.push_back(x);
        high << QPointF(x, scene.layout.scale.y_px(envelope.greatest_m[i]));
        low << QPointF(x, scene.layout.scale.y_px(envelope.least_m[i]));
    }
    Item item;
    item.kind = ItemKind::envelope;
    item.thing = pathOf("conduits", conduits.name(envelope.conduit));
    item.shape.addPolygon(high);
    for (auto corner = low.rbegin(); corner != low.rend(); ++corner) {
        item.shape.lineTo(*corner);
    }
    item.shape.closeSubpath();
    item.box = item.shape.boundingRect();
    const auto most = std::max_element(envelope.greatest_m.begin(), envelope.greatest_m.end());
    const auto least = std::min_element(envelope.least_m.begin(), envelope.least_m.end());
    item.description =
        QStringLiteral("Envelope of heads along %1, %2 to %3")
            .arg(text(conduits.name(envelope.conduit)), numberText(Quantity::elevation, *least),
                 numberText(Quantity::elevation, *most));
    // Behind the bodies: a conduit or chamber inside the band is hit first.
    const auto front =
        std::find_if(making.items.begin(), making.items.end(),
                     [](const Item& other) { return other.kind != ItemKind::ground; });
    making.items.insert(front, std::move(item));
    making.placer.avoid(high, 1.0);
    making.placer.avoid(low, 1.0);
    scene.envelopes.emplace_back(std::move(high), std::move(low));
    scene.headLines.push_back(std::move(line));
}

// --- bounds -------------------------------------------------------------------------------------

Texture textureOf(const plant::Limit& limit) {
    const bool timed = limit.timeRule != plant::TimeRule::momentary && limit.allowed_s > 0.0;
    return timed ? Texture::rules : Texture::hatch;
}

void addBound(Making& making, int limit, const QPolygonF& line, bool upper, bool guide,
              double value, Quantity quantity) {
    auto& scene = making.scene;
    const auto& limits = scene.shown.variant->limits;
    BoundDrawing drawing{limit, line, {}, textureOf(limits[limit]), guide};
    if (!guide) {
        drawing.zone = zoneBeside(line, scene.look.space.textureDepth, upper);
        Item item;
        item.kind = ItemKind::limitZone;
        item.limit = limit;
        item.thing = {"limits", limits.name(limit)};
        item.shape.addPolygon(drawing.zone);
        item.shape.closeSubpath();
        item.box = item.shape.boundingRect();
        item.description = QStringLiteral("%1: limit %2, forbidden %3")
                               .arg(text(limits.name(limit)), numberText(quantity, value),
                                    upper ? QStringLiteral("above") : QStringLiteral("below"));
        making.placer.avoid(item.box.width() < 4 * placeHalf_px ? item.box : QRectF());
        making.items.push_back(std::move(item));
    }
    making.placer.avoid(line, 1.0);
    scene.bounds.push_back(std::move(drawing));
}

bool isChamberLevel(const plant::Limit& limit) {
    return limit.measure == Measure::level;
}

void addBoundLine(Making& making, const BoundLine& line) {
    auto& scene = making.scene;
    const auto& limits = scene.shown.variant->limits;
    QPolygonF whole;
    for (const auto& place : line.places) {
        whole << scene.layout.at(place.chainage_m, place.head_m);
    }
    if (line.wholeConduit) {
        const auto& first = line.places.front();
        addBound(making, first.limit, whole, line.upper, false, first.head_m, Quantity::elevation);
        return;
    }
    if (whole.size() > 1) {
        addBound(making, line.places.back().limit, whole, line.upper, true, 0.0,
                 Quantity::elevation);
    }
    const double half = placeHalf_px * scene.look.scale;
    for (qsizetype i = 0; i < whole.size(); ++i) {
        const auto& place = line.places[static_cast<std::size_t>(i)];
        if (!isChamberLevel(limits[place.limit])) { // chambers draw their own
            const QPolygonF here{whole[i] - QPointF(half, 0), whole[i] + QPointF(half, 0)};
            addBound(making, place.limit, here, line.upper, false, place.head_m,
                     Quantity::elevation);
        }
    }
}

void addChamberBound(Making& making, const ChamberBound& bound) {
    auto& scene = making.scene;
    const double y = scene.layout.scale.y_px(bound.level_m);
    for (const auto& drawing : scene.layout.chambers) {
        if (drawing.chamber == bound.chamber) {
            const double half = drawing.halfWidth_px(y) + chamberBeside_px * scene.look.scale;
            addBound(making, bound.limit, {{drawing.x_px - half, y}, {drawing.x_px + half, y}},
                     bound.upper, false, bound.level_m, Quantity::elevation);
        }
    }
}

// --- lozenges -----------------------------------------------------------------------------------

std::optional<QPointF> bodyPlace(const Scene& scene, const results::Place& place) {
    for (const auto& unit : scene.layout.units) {
        if (place.thing == Thing::unit && unit.unit == place.index) {
            return unit.centre - QPointF(0, unit.radius_px);
        }
    }
    for (const auto& chamber : scene.layout.chambers) {
        if (place.thing == Thing::chamber && chamber.chamber == place.index) {
            return QPointF(chamber.x_px, chamber.axis_y_px);
        }
    }
    for (const auto& conduit : scene.layout.conduits) {
        if (place.thing == Thing::conduit && conduit.conduit == place.index
            && !conduit.line.isEmpty()) {
            return conduit.line[conduit.line.size() / 2];
        }
    }
    return std::nullopt;
}

/// Chainage and axis elevation of a point, chamber or place on a conduit.
std::optional<std::pair<double, double>> stands(const plant::Plant& plant,
                                                const results::Place& place) {
    int point = place.thing == Thing::point ? place.index : -1;
    if (place.thing == Thing::chamber && place.index < plant.chambers.size()) {
        point = plant.chambers[place.index].at.index;
    }
    if (point >= 0 && point < plant.points.size()) {
        return std::pair(plant.points[point].chainage_m, plant.points[point].elevation_m);
    }
    if (place.thing == Thing::conduit && place.index >= 0 && place.index < plant.conduits.size()) {
        const auto axis = axisOf(plant, plant.conduits[place.index]);
        if (!axis.empty()) {
            return std::pair(place.chainage_m, elevationOn(axis, place.chainage_m));
        }
    }
    return std::nullopt;
}

std::optional<LozengeDrawing> lozengeOf(const Scene& scene, const results::Verdict& verdict) {
    LozengeDrawing out{verdict.limit, {}, {}, markOf(verdict.mark), false};
    const auto& plant = scene.shown.variant->plant;
    const bool asHead = verdict.measure == Measure::level || verdict.measure == Measure::head
                        || verdict.measure == Measure::pressureHead;
    const auto where = stands(plant, verdict.place);
    if (asHead && where) {
        const double above = verdict.measure == Measure::pressureHead ? where->second : 0.0;
        out.at = scene.layout.at(where->first, verdict.extreme + above);
        if (std::abs(verdict.allowance) > 0.0) {
            out.computed =
                scene.layout.at(where->first, verdict.extreme - verdict.allowance + above);
        }
        return out;
    }
    if (asHead) {
        return std::nullopt;
    }
    std::optional<QPointF> body = bodyPlace(scene, verdict.place);
    if (!body && where) {
        body = scene.layout.at(where->first, where->second);
    }
    if (!body) {
        return std::nullopt;
    }
    out.at = *body;
    return out;
}

bool worthALozenge(results::Mark mark) {
    return mark == results::Mark::broken || mark == results::Mark::tight
           || mark == results::Mark::undecided;
}

void addLozenges(Making& making) {
    auto& scene = making.scene;
    const auto* leading = scene.shown.leading(making.input.selection.limit);
    const auto& limits = scene.shown.variant->limits;
    for (const auto& verdict : scene.shown.verdicts) {
        const bool leads = &verdict == leading;
        if ((!leads && !worthALozenge(verdict.mark)) || !std::isfinite(verdict.extreme)) {
            continue;
        }
        if (auto drawing = lozengeOf(scene, verdict)) {
            drawing->leading = leads;
            scene.lozenges.push_back(*drawing);
        }
    }
    // The leading one lies on top.
    std::stable_sort(scene.lozenges.begin(), scene.lozenges.end(),
                     [](const auto& a, const auto& b) { return a.leading < b.leading; });
    const double half = lozengeHalf_px * scene.look.scale;
    for (const auto& drawing : scene.lozenges) {
        const auto& verdict = *scene.shown.verdict(drawing.limit);
        Item item;
        item.kind = ItemKind::lozenge;
        item.limit = drawing.limit;
        item.time_s = verdict.time_s;
        item.thing = {"limits", limits.name(drawing.limit)};
        item.box = QRectF(drawing.at.x() - half, drawing.at.y() - half, 2 * half, 2 * half);
        item.shape.addRect(item.box);
        item.description =
            spokenVerdict(text(limits.name(drawing.limit)), limits[drawing.limit], verdict);
        making.placer.avoid(item.box);
        making.items.push_back(std::move(item));
    }
}

// --- what moves ---------------------------------------------------------------------------------

void addTurning(Making& making) {
    const auto& run = *making.scene.shown.run;
    for (std::size_t i = 0; i < making.scene.layout.units.size(); ++i) {
        const auto* speed =
            run.find(Measure::speed, {Thing::unit, making.scene.layout.units[i].unit});
        if (speed == nullptr || speed->trace.last.empty()) {
            continue;
        }
        Turning turning{i, {}};
        double turned = 0.0;
        for (const float value : speed->trace.last) {
            turning.turns.push_back(static_cast<float>(turned));
            turned += static_cast<double>(value) * eyeTurns_1s * run.recordInterval_s;
        }
        making.scene.turning.push_back(std::move(turning));
    }
}

} // namespace

std::vector<double> elevationsOf(const Shown& shown, const HeadBounds& bounds) {
    std::vector<double> out;
    for (const auto& line : bounds.lines) {
        for (const auto& place : line.places) {
            out.push_back(place.head_m);
        }
    }
    for (const auto& bound : bounds.chambers) {
        out.push_back(bound.level_m);
    }
    if (shown.run != nullptr) {
        for (const auto& envelope : shown.run->envelopes) {
            out.insert(out.end(), envelope.least_m.begin(), envelope.least_m.end());
            out.insert(out.end(), envelope.greatest_m.begin(), envelope.greatest_m.end());
        }
    }
    for (const auto& verdict : shown.verdicts) {
        if (verdict.measure == Measure::level || verdict.measure == Measure::head) {
            if (worthALozenge(verdict.mark)) {
                out.push_back(verdict.extreme);
            }
        }
    }
    return out;
}

void addResults(Making& making, const HeadBounds& bounds) {
    for (const auto& line : bounds.lines) {
        addBoundLine(making, line);
    }
    for (const auto& bound : bounds.chambers) {
        addChamberBound(making, bound);
    }
    if (making.scene.shown.run == nullptr) {
        return;
    }
    for (const auto& envelope : making.scene.shown.run->envelopes) {
        addEnvelope(making, envelope);
    }
    addLozenges(making);
    addTurning(making);
}

} // namespace headroom::drawing::section
