// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"

#include <algorithm>
#include <cmath>

/// Names and values in the Section: placed by importance, left out rather than laid over others.
namespace headroom::drawing::section {

namespace {

/// A label and the item that stands for it.
void put(Making& making, Label label, plant::Path thing, const QString& description,
         int limit = -1) {
    Item item;
    item.kind = ItemKind::label;
    item.thing = std::move(thing);
    item.limit = limit;
    item.box = label.box;
    item.shape.addRect(item.box);
    item.label = label.text;
    item.description = description;
    making.items.push_back(std::move(item));
    making.scene.labels.push_back(std::move(label));
}

struct Wish {
    QString text;
    TextWeight weight = TextWeight::normal;
    bool quiet = false;
    plant::Path thing;
    QString description;
    int limit = -1;
    std::optional<QPointF> belongsTo = {}; ///< a leader leads here from a box that stands off
};

/// Places one line of text; counts it if there is no room.
bool putAt(Making& making, const Wish& wish, const std::vector<QRectF>& candidates) {
    const auto box = making.placer.place(candidates);
    if (!box) {
        ++making.leftOut;
        return false;
    }
    std::optional<QPointF> leader;
    if (wish.belongsTo) {
        const double far = 6 * making.scene.look.space.unit;
        const bool apart = !box->adjusted(-far, -far, far, far).contains(*wish.belongsTo);
        leader = apart ? wish.belongsTo : std::nullopt;
    }
    put(making, {wish.text, *box, TextSize::small, wish.weight, wish.quiet, false, leader},
        wish.thing, wish.description, wish.limit);
    return true;
}

QSizeF sizeOf(const Making& making, const QString& words, TextWeight weight = TextWeight::normal) {
    return textSize(words, making.scene.look.font(TextSize::small, weight));
}

// --- the lozenge that leads ---------------------------------------------------------------------

/// Boxes around a point at growing distances: near ones first.
std::vector<QRectF> ringsAround(QPointF at, QSizeF size, double step) {
    std::vector<QRectF> out;
    for (const double distance : {2.2, 4.0, 7.0, 11.0, 16.0}) {
        const double d = distance * step;
        for (const auto& [sx, sy] :
             {std::pair(-1, 1), {1, 1}, {-1, -1}, {1, -1}, {0, 1}, {0, -1}}) {
            const double x = at.x()
                             + (sx < 0   ? -d - size.width()
                                : sx > 0 ? d
                                         : -size.width() / 2.0);
            const double y = sy > 0 ? at.y() + d : at.y() - d - size.height();
            out.push_back(QRectF(QPointF(x, y), size));
        }
    }
    return out;
}

void labelLozenge(Making& making) {
    const auto& scene = making.scene;
    if (scene.lozenges.empty() || !scene.lozenges.back().leading) {
        return;
    }
    const auto& lozenge = scene.lozenges.back();
    const auto& limit = scene.shown.variant->limits[lozenge.limit];
    const auto& verdict = *scene.shown.verdict(lozenge.limit);
    const QString words = lozengeWords(limit, verdict);
    const QSizeF size = sizeOf(making, words, TextWeight::strong);
    const double pad = 2 * scene.look.space.unit;
    // The frame around the text takes room too.
    auto candidates =
        ringsAround(lozenge.at, size + QSizeF(2 * pad, pad), 1.5 * scene.look.space.unit);
    const auto box = making.placer.place(candidates);
    if (!box) {
        ++making.leftOut;
        return;
    }
    const auto& name = scene.shown.variant->limits.name(lozenge.limit);
    Label label{words,           box->adjusted(pad, pad / 2, -pad, -pad / 2),
                TextSize::small, TextWeight::strong,
                false,           true,
                lozenge.at};
    put(making, label, {"limits", name}, spokenVerdict(text(name), limit, verdict), lozenge.limit);
    making.items.back().kind = ItemKind::lozenge;
    making.items.back().time_s = verdict.time_s;
}

// --- names --------------------------------------------------------------------------------------

void labelReservoirs(Making& making) {
    const auto& scene = making.scene;
    const auto& reservoirs = scene.shown.variant->plant.reservoirs;
    const double gap = scene.look.space.unit;
    for (const auto& drawing : scene.layout.reservoirs) {
        const auto& name = reservoirs.name(drawing.reservoir);
        const QString level = numberText(Quantity::elevation, drawing.level_m);
        const QSizeF first = sizeOf(making, text(name)), second = sizeOf(making, level);
        const double wide = std::max(first.width(), second.width());
        const double y = scene.layout.scale.y_px(drawing.level_m);
        const auto at = [&](double x, double top) {
            return QRectF(x, top, wide, first.height() + second.height());
        };
        const double above = y - gap - first.height() - second.height();
        const double right = drawing.right_px - wide;
        const auto box = making.placer.place(
            {at(drawing.left_px + gap, above), at(right - gap, above),
             at(drawing.right_px + gap, above), at(drawing.left_px - wide - gap, above),
             at(drawing.left_px + gap, above - 4 * gap), at(right - gap, above - 4 * gap),
             at(right - gap, above - 8 * gap)});
        if (!box) {
            ++making.leftOut;
            continue;
        }
        const plant::Path path = pathOf("reservoirs", name);
        const QString said = QStringLiteral("%1, water level %2").arg(text(name), level);
        put(making, {text(name), QRectF(box->topLeft(), first)}, path, said);
        put(making,
            quietLabel(level, QRectF(QPointF(box->left(), box->top() + first.height()), second)),
            path, said);
    }
}

MovingLevel* movingOf(Scene& scene, std::size_t chamber) {
    for (auto& level : scene.levels) {
        if (level.chamber == chamber) {
            return &level;
        }
    }
    return nullptr;
}

/// Right of a shaft, then left of it, from its rim downward; then above and below.
std::vector<QRectF> besideShaft(const QRectF& shaft, QSizeF size, double gap) {
    std::vector<QRectF> out;
    for (const double x : {shaft.right() + 2 * gap, shaft.left() - 2 * gap - size.width()}) {
        for (const double share : {0.12, 0.3, 0.5, 0.7, 0.9}) {
            out.push_back(QRectF(QPointF(x, shaft.top() + share * shaft.height()), size));
        }
    }
    const auto outside = around(shaft, size, gap);
    out.insert(out.end(), outside.begin(), outside.end());
    return out;
}

void labelChambers(Making& making) {
    auto& scene = making.scene;
    const auto& chambers = scene.shown.variant->plant.chambers;
    const double gap = 2 * scene.look.space.unit;
    for (std::size_t i = 0; i < scene.layout.chambers.size(); ++i) {
        const auto& drawing = scene.layout.chambers[i];
        const auto& name = chambers.name(drawing.chamber);
        auto* moving = movingOf(scene, i);
        const QSizeF first = sizeOf(making, text(name));
        const QSizeF second =
            moving != nullptr ? sizeOf(making, QStringLiteral("−8888.8 m")) : QSizeF();
        const QSizeF both(std::max(first.width(), second.width()),
                          first.height() + std::max(0.0, second.height()));
        const auto candidates = besideShaft(drawing.box(), both, gap);
        const auto box = making.placer.place(candidates);
        if (!box) {
            ++making.leftOut;
            continue;
        }
        put(making, {text(name), QRectF(box->topLeft(), first)}, pathOf("chambers", name),
            QStringLiteral("%1, chamber").arg(text(name)));
        if (moving != nullptr) {
            moving->labelBox = QRectF(QPointF(box->left(), box->top() + first.height()), second);
        }
    }
}

void labelUnits(Making& making) {
    const auto& scene = making.scene;
    const auto& units = scene.shown.variant->plant.units;
    for (const auto& drawing : scene.layout.units) {
        const auto& name = units.name(drawing.unit);
        const QSizeF size = sizeOf(making, text(name));
        const double gap = 0.5 * scene.look.space.unit;
        auto candidates = around(drawing.box(), size, gap);
        std::swap(candidates[0], candidates[1]); // below first
        putAt(making,
              {text(name),
               {},
               false,
               pathOf("units", name),
               QStringLiteral("%1, unit").arg(text(name))},
              candidates);
    }
}

/// The longest straight stretches of a line in pixels, longest first.
std::vector<QLineF> longestStretches(const QPolygonF& line) {
    constexpr std::size_t most = 3;
    std::vector<QLineF> out;
    for (qsizetype i = 1; i < line.size(); ++i) {
        out.push_back(QLineF(line[i - 1], line[i]));
    }
    std::stable_sort(out.begin(), out.end(),
                     [](const QLineF& a, const QLineF& b) { return a.length() > b.length(); });
    out.resize(std::min(out.size(), most));
    return out;
}

/// Boxes along a stretch: below or right of it, or (`first` false) on its other side.
void addBeside(std::vector<QRectF>& out, const QLineF& stretch, QSizeF size, double off,
               bool first) {
    const double w = size.width(), h = size.height();
    const double slope = std::abs(stretch.dy()) / std::max(1.0, std::abs(stretch.dx()));
    const bool steep = slope >= 0.5;
    // So far that the corner of the box stays clear of a sloping line.
    const double down = off + 0.5 * slope * w;
    const double beside = steep ? (off + 0.5 * h) / slope + off : 0.0;
    for (const double share : {0.5, 0.38, 0.62, 0.25, 0.75, 0.12, 0.88}) {
        const QPointF at = stretch.pointAt(share);
        const double x = steep ? (first ? at.x() + beside : at.x() - beside - w) : at.x() - w / 2;
        const double y = steep ? at.y() - h / 2 : (first ? at.y() + down : at.y() - down - h);
        out.push_back(QRectF(x, y, w, h));
    }
}

std::vector<QRectF> besideLine(const QPolygonF& line, QSizeF size, double off) {
    std::vector<QRectF> out;
    for (const bool first : {true, false}) {
        for (const auto& stretch : longestStretches(line)) {
            addBeside(out, stretch, size, off, first);
        }
    }
    return out;
}

void labelConduits(Making& making) {
    const auto& scene = making.scene;
    const auto& conduits = scene.shown.variant->plant.conduits;
    for (const auto& shape : scene.layout.conduits) {
        const auto& name = conduits.name(shape.conduit);
        const QString words =
            text(name) + QLatin1Char(' ') + wholeAmount(Quantity::length, shape.length_m);
        const double off = shape.halfWidth() + 1.5 * scene.look.space.unit;
        putAt(
            making,
            {words, {}, false, pathOf("conduits", name), QStringLiteral("%1, conduit").arg(words)},
            besideLine(shape.line, sizeOf(making, words), off));
    }
}

void labelBounds(Making& making) {
    const auto& scene = making.scene;
    const auto& limits = scene.shown.variant->limits;
    for (const auto& drawing : scene.bounds) {
        if (drawing.guide || drawing.line.isEmpty()) {
            continue;
        }
        const double value = scene.layout.scale.elevation_m(drawing.line.back().y());
        const QString words = numberText(Quantity::elevation, value);
        const QRectF zone = drawing.zone.boundingRect();
        const QSizeF size = sizeOf(making, words);
        auto candidates = around(zone, size, scene.look.space.unit);
        std::rotate(candidates.begin(), candidates.begin() + 2, candidates.begin() + 4);
        const auto further = ringsAround(zone.center(), size, 2 * scene.look.space.unit);
        candidates.insert(candidates.end(), further.begin(), further.end());
        putAt(making,
              {words,
               {},
               true,
               {"limits", limits.name(drawing.limit)},
               QStringLiteral("%1: limit %2").arg(text(limits.name(drawing.limit)), words),
               drawing.limit,
               zone.center()},
              candidates);
    }
}

// --- what is missing ----------------------------------------------------------------------------

QString hintWords(const plant::Variant& variant) {
    const auto& plant = variant.plant;
    const bool level = !plant.reservoirs.empty(), way = !plant.conduits.empty();
    const bool unit = !plant.units.empty();
    if (level && way && unit && !variant.limits.empty()) {
        return {};
    }
    const QString dot = QStringLiteral(" · ");
    return (level ? QStringLiteral("Level known") : QStringLiteral("no level yet")) + dot
           + (way ? QStringLiteral("waterway drawn") : QStringLiteral("no waterway yet")) + dot
           + (unit ? QStringLiteral("units %1").arg(plant.units.size())
                   : QStringLiteral("no unit yet"))
           + dot + QStringLiteral("limits %1").arg(variant.limits.size());
}

std::vector<QRectF> corners(const QRectF& plot, QSizeF size) {
    const double gap = 4.0;
    const double right = plot.right() - gap - size.width(), left = plot.left() + gap;
    const double top = plot.top() + gap, bottom = plot.bottom() - gap - size.height();
    return {QRectF(QPointF(right, top), size), QRectF(QPointF(left, bottom), size),
            QRectF(QPointF(left, top), size), QRectF(QPointF(right, bottom), size)};
}

void reserveClock(Making& making) {
    if (making.scene.headLines.empty()) {
        return;
    }
    const QSizeF size = sizeOf(making, QStringLiteral("head line at 88 888.8 s"));
    making.scene.clockBox =
        making.placer.place(corners(making.scene.layout.plot, size)).value_or(QRectF());
}

void putCorner(Making& making, const QString& words) {
    if (words.isEmpty()) {
        return;
    }
    auto places = corners(making.scene.layout.plot, sizeOf(making, words));
    std::swap(places[0], places[1]);
    if (const auto box = making.placer.place(places)) {
        put(making, quietLabel(words, *box), {}, words);
    }
}

} // namespace

void addLabels(Making& making, const HeadBounds&) {
    labelLozenge(making);
    reserveClock(making);
    labelReservoirs(making);
    labelChambers(making);
    labelUnits(making);
    labelConduits(making);
    labelBounds(making);
    putCorner(making, hintWords(*making.scene.shown.variant));
    if (making.leftOut > 0) {
        putCorner(making,
                  making.leftOut == 1
                      ? QStringLiteral("1 label left out for want of room")
                      : QStringLiteral("%1 labels left out for want of room").arg(making.leftOut));
    }
}

} // namespace headroom::drawing::section
