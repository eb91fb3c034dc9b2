// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"

#include <QPainterPathStroker>

#include <algorithm>

/// The bodies of the Section as items: what they are, where they can be hit, what is said.
namespace headroom::drawing::section {

namespace {

QPainterPath closed(const QPolygonF& polygon) {
    QPainterPath path;
    path.addPolygon(polygon);
    path.closeSubpath();
    return path;
}

QPainterPath along(const QPolygonF& line, double width) {
    QPainterPath path;
    path.addPolygon(line);
    QPainterPathStroker stroker;
    stroker.setWidth(width);
    stroker.setCapStyle(Qt::FlatCap);
    stroker.setJoinStyle(Qt::RoundJoin);
    return stroker.createStroke(path);
}

void add(Making& making, ItemKind kind, plant::Path thing, QPainterPath shape,
         QString description) {
    Item item;
    item.kind = kind;
    item.thing = std::move(thing);
    item.box = shape.boundingRect();
    item.shape = std::move(shape);
    item.description = std::move(description);
    if (selects(making.input.selection.thing, item.thing)) {
        making.scene.highlight.addPath(item.shape);
    }
    making.items.push_back(std::move(item));
}

void addGround(Making& making) {
    const auto& layout = making.scene.layout;
    if (!layout.groundGiven) {
        return;
    }
    QPolygonF body = layout.ground;
    making.placer.avoid(layout.ground, 1.0);
    body << layout.plot.bottomRight() << layout.plot.bottomLeft();
    QPainterPath inside;
    inside.addRect(layout.plot);
    add(making, ItemKind::ground, {"ground"}, closed(body).intersected(inside),
        QStringLiteral("Ground line above the waterway"));
}

void addReservoirs(Making& making) {
    const auto& reservoirs = making.scene.shown.variant->plant.reservoirs;
    for (const auto& drawing : making.scene.layout.reservoirs) {
        const auto& name = reservoirs.name(drawing.reservoir);
        add(making, ItemKind::reservoir, pathOf("reservoirs", name), closed(drawing.water),
            QStringLiteral("%1, water level %2")
                .arg(text(name), numberText(Quantity::elevation, drawing.level_m)));
    }
}

void addConduits(Making& making) {
    const auto& conduits = making.scene.shown.variant->plant.conduits;
    for (const auto& shape : making.scene.layout.conduits) {
        const auto& conduit = conduits[shape.conduit];
        const auto& name = conduits.name(shape.conduit);
        const double reach = std::max(2 * shape.halfWidth(), making.scene.look.width.lining);
        add(making, ItemKind::conduit, pathOf("conduits", name), along(shape.line, reach),
            QStringLiteral("%1, %2 long, from %3 to %4")
                .arg(text(name), wholeAmount(Quantity::length, shape.length_m),
                     text(conduit.from.name), text(conduit.to.name)));
        making.placer.avoid(shape.line, shape.halfWidth() + 1.0);
    }
}

void addPoints(Making& making) {
    const auto& plant = making.scene.shown.variant->plant;
    const double half = making.scene.look.space.unit;
    for (const auto& [name, point] : plant.points) {
        const QPointF at = making.scene.layout.at(point.chainage_m, point.elevation_m);
        QPainterPath shape;
        shape.addEllipse(at, half, half);
        add(making, ItemKind::point, pathOf("points", name), shape,
            QStringLiteral("%1, chainage %2, axis at %3")
                .arg(text(name), wholeAmount(Quantity::chainage, point.chainage_m),
                     numberText(Quantity::elevation, point.elevation_m)));
    }
}

void addChambers(Making& making) {
    const auto& chambers = making.scene.shown.variant->plant.chambers;
    for (const auto& drawing : making.scene.layout.chambers) {
        const auto& chamber = chambers[drawing.chamber];
        const auto& name = chambers.name(drawing.chamber);
        add(making, ItemKind::chamber, pathOf("chambers", name), closed(drawing.outline),
            QStringLiteral("%1, %2chamber, floor %3, rim %4")
                .arg(text(name), chamber.shape.throttled ? QStringLiteral("throttled ") : QString(),
                     numberText(Quantity::elevation, chamber.shape.floor_m()),
                     numberText(Quantity::elevation, chamber.shape.rim_m())));
        making.placer.avoid(drawing.box());
        const auto path = pathOf("chambers", name);
        const auto* channel = making.scene.shown.run == nullptr
                                  ? nullptr
                                  : making.scene.shown.run->find(
                                      Measure::level, {results::Thing::chamber, drawing.chamber});
        if (channel != nullptr) {
            const auto position =
                static_cast<std::size_t>(&drawing - making.scene.layout.chambers.data());
            making.scene.levels.push_back({position, channel, {}});
        }
    }
}

void addUnits(Making& making) {
    const auto& plant = making.scene.shown.variant->plant;
    const auto& units = plant.units;
    for (const auto& drawing : making.scene.layout.units) {
        const auto& unit = units[drawing.unit];
        const auto& name = units.name(drawing.unit);
        // As given: on a shelf it is drawn higher or lower.
        const double centre = unit.centreline_m.value_or(plant.points[unit.from.index].elevation_m);
        QPainterPath shape;
        shape.addEllipse(drawing.centre, drawing.radius_px, drawing.radius_px);
        add(making, ItemKind::unit, pathOf("units", name), shape,
            QStringLiteral("%1, unit, centre line %2")
                .arg(text(name), numberText(Quantity::elevation, centre)));
        making.placer.avoid(drawing.box());
        making.placer.avoid(wayThrough(drawing), making.scene.look.width.lining / 2);
    }
}

} // namespace

void addBodies(Making& making) {
    addGround(making);
    addReservoirs(making);
    addConduits(making);
    addPoints(making);
    addChambers(making);
    addUnits(making);
    for (const auto& drawing : making.scene.layout.reservoirs) {
        const double y = making.scene.layout.scale.y_px(drawing.level_m);
        making.placer.avoid(QPolygonF{{drawing.left_px, y}, {drawing.right_px, y}}, 1.0);
    }
    for (const double x : making.scene.layout.map.breaks_px()) {
        Item item;
        item.kind = ItemKind::breakMark;
        const double y = making.scene.layout.plot.bottom();
        item.box = QRectF(x - 8, y - 12, 16, 12);
        item.shape.addRect(item.box);
        item.description =
            QStringLiteral("Break mark: ")
            + making.scene.layout.map.compressionWords(making.scene.layout.map.spanAt(x));
        making.placer.avoid(item.box);
        making.items.push_back(std::move(item));
    }
}

} // namespace headroom::drawing::section
