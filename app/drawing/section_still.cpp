// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace section {

namespace {

QPainterPath areaOf(const QPolygonF& polygon) {
    QPainterPath path;
    path.addPolygon(polygon);
    path.closeSubpath();
    return path;
}

QPainterPath pathAlong(const QPolygonF& line) {
    QPainterPath path;
    path.addPolygon(line);
    return path;
}

void paintAxis(QPainter& painter, const Scene& scene) {
    const auto& plot = scene.layout.plot;
    painter.setPen(scene.look.hairPen(scene.look.line));
    for (const auto& tick : scene.ticks) {
        painter.drawLine(QPointF(plot.left(), tick.at_px), QPointF(plot.right(), tick.at_px));
    }
    const double height = scene.look.lineHeight(TextSize::small);
    for (const auto& tick : scene.ticks) {
        const Label label =
            quietLabel(tick.label, QRectF(0, tick.at_px - height / 2, plot.left() - 6, height));
        paintPlain(painter, label, scene.look, Qt::AlignRight);
    }
}

/// Rock under the ground line; where no ground is given, a band around the waterway.
void paintRock(QPainter& painter, const Scene& scene) {
    const auto& layout = scene.layout;
    if (layout.groundGiven) {
        QPolygonF body = layout.ground;
        body << QPointF(layout.ground.back().x(), layout.plot.bottom())
             << QPointF(layout.ground.front().x(), layout.plot.bottom());
        painter.fillPath(areaOf(body), scene.look.rock);
        painter.setPen(scene.look.hairPen(scene.look.rockEdge));
        painter.setBrush(Qt::NoBrush);
        painter.drawPolyline(layout.ground);
        return;
    }
    for (const auto& shape : layout.conduits) {
        QPen pen = scene.look.pen(scene.look.rock, 2 * shape.halfWidth() + 22 * scene.look.scale);
        pen.setCapStyle(Qt::RoundCap);
        painter.strokePath(pathAlong(shape.line), pen);
    }
}

void paintWaters(QPainter& painter, const Scene& scene) {
    const auto& layout = scene.layout;
    for (const auto& drawing : layout.reservoirs) {
        const double level = layout.scale.y_px(drawing.level_m);
        // The bed of the water is the edge of the rock here.
        QPolygonF rock = drawing.bed;
        const double depth = std::max(layout.plot.bottom(), drawing.bed.boundingRect().bottom());
        rock << QPointF(drawing.right_px, depth) << QPointF(drawing.left_px, depth);
        if (layout.groundGiven) {
            painter.fillPath(areaOf(rock), scene.look.rock);
        }
        painter.fillPath(areaOf(drawing.water), scene.look.water);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(scene.look.hairPen(scene.look.rockEdge));
        painter.drawPolyline(drawing.bed);
        painter.setPen(scene.look.pen(scene.look.waterEdge, scene.look.width.data));
        painter.drawLine(QPointF(drawing.left_px, level), QPointF(drawing.right_px, level));
    }
}

void paintConduits(QPainter& painter, const Scene& scene) {
    // All linings first, then all water, so that bores open into each other.
    for (const bool water : {false, true}) {
        const QColor& colour = water ? scene.look.water : scene.look.lining;
        for (const auto& shape : scene.layout.conduits) {
            for (const auto& bore : shape.bores) {
                painter.strokePath(pathAlong(bore.line),
                                   scene.look.pen(colour, water ? bore.water_px : bore.lining_px));
            }
        }
        for (const auto& unit : scene.layout.units) {
            const double wide = water ? scene.look.width.water : scene.look.width.lining;
            painter.strokePath(pathAlong(wayThrough(unit)), scene.look.pen(colour, wide));
        }
    }
}

void paintChambers(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    for (const auto& drawing : scene.layout.chambers) {
        const double floor = drawing.left.front().y();
        const double neck = drawing.throttled ? 2.0 * look.scale
                                              : std::abs(drawing.right.front().x() - drawing.x_px);
        // From the waterway up to the floor; a throttle is a narrow neck.
        if (std::abs(floor - drawing.axis_y_px) > 0.5) {
            const QRectF throat(drawing.x_px - neck, std::min(floor, drawing.axis_y_px), 2 * neck,
                                std::abs(floor - drawing.axis_y_px));
            painter.fillRect(throat.adjusted(-look.scale, 0, look.scale, 0), look.lining);
            painter.fillRect(throat, look.water);
        }
        painter.fillPath(areaOf(drawing.outline), look.sheet);
    }
}

void paintChamberWalls(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    painter.setBrush(Qt::NoBrush);
    painter.setPen(look.pen(look.lining, look.width.inHand));
    for (const auto& drawing : scene.layout.chambers) {
        painter.drawPolyline(drawing.left);
        painter.drawPolyline(drawing.right);
        const double neck = drawing.throttled ? 2.5 * look.scale : 0.0;
        const QPointF a = drawing.left.front(), b = drawing.right.front();
        if (neck > 0.0) {
            painter.drawLine(a, QPointF(drawing.x_px - neck, a.y()));
            painter.drawLine(QPointF(drawing.x_px + neck, b.y()), b);
        }
    }
}

void paintEnvelopes(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    for (const auto& [high, low] : scene.envelopes) {
        QPolygonF band = high;
        for (auto corner = low.rbegin(); corner != low.rend(); ++corner) {
            band << *corner;
        }
        painter.fillPath(areaOf(band), look.envelopeFill);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(look.hairPen(look.envelope));
        painter.drawPolyline(high);
        painter.drawPolyline(low);
    }
}

void paintBounds(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    for (const auto& drawing : scene.bounds) {
        if (drawing.guide) {
            QPen pen = look.hairPen(look.limit);
            pen.setDashPattern({5, 4});
            painter.setPen(pen);
            painter.drawPolyline(drawing.line);
            continue;
        }
        paintTexture(painter, drawing.zone, drawing.texture, look);
        painter.setPen(look.pen(look.limit, look.width.data));
        painter.drawPolyline(drawing.line);
    }
}

void paintUnits(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    for (const auto& drawing : scene.layout.units) {
        painter.setPen(look.pen(look.lining, look.width.data));
        painter.setBrush(look.sheet);
        painter.drawEllipse(drawing.centre, drawing.radius_px, drawing.radius_px);
    }
}

void paintBay(QPainter& painter, const Scene& scene) {
    const Span* bay = scene.layout.map.find(Span::Kind::bay);
    if (bay == nullptr || scene.layout.units.empty()) {
        return;
    }
    QPen pen = scene.look.hairPen(scene.look.muted);
    pen.setDashPattern({2, 4});
    painter.setPen(pen);
    const auto& plot = scene.layout.plot;
    const double x = scene.layout.map.x_px(bay->from_m);
    double top = plot.bottom();
    for (const auto& unit : scene.layout.units) {
        top = std::min(top, std::min(unit.inlet.y(), unit.centre.y()) - 3 * unit.radius_px);
    }
    painter.drawLine(QPointF(x, std::max(plot.top(), top)), QPointF(x, plot.bottom()));
}

void paintBreaks(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    const double unit = look.space.unit, y = scene.layout.plot.bottom();
    for (const double x : scene.layout.map.breaks_px()) {
        painter.setPen(look.pen(look.sheet, 3 * look.width.inHand));
        painter.drawLine(QPointF(x - unit, y), QPointF(x + unit, y - 2.6 * unit));
        painter.setPen(look.hairPen(look.text));
        for (const double aside : {-0.8 * unit, 0.8 * unit}) {
            painter.drawLine(QPointF(x - unit + aside, y),
                             QPointF(x + unit + aside, y - 2.6 * unit));
        }
    }
}

void paintHighlight(QPainter& painter, const Scene& scene) {
    if (scene.highlight.isEmpty()) {
        return;
    }
    painter.setBrush(Qt::NoBrush);
    painter.setPen(scene.look.pen(scene.look.accent, scene.look.width.selected));
    painter.drawPath(scene.highlight);
}

void paintEmpty(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    QPolygonF body = scene.emptyGround;
    if (!body.isEmpty()) {
        body << QPointF(body.back().x(), scene.layout.plot.bottom())
             << QPointF(body.front().x(), scene.layout.plot.bottom());
        painter.fillPath(areaOf(body), look.rock);
        painter.fillPath(areaOf(scene.emptyLake), look.lake);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(look.hairPen(look.rockEdge));
        painter.drawPolyline(scene.emptyGround);
    }
    for (const auto& frame : scene.actions) {
        painter.setPen(look.pen(look.accent, look.width.hair));
        painter.setBrush(look.sheet);
        painter.drawRoundedRect(frame, look.space.corner, look.space.corner);
    }
}

} // namespace

} // namespace section

void SectionPicture::paintStill(QPainter& painter) const {
    const Scene& scene = *scene_;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    if (scene.empty) {
        section::paintEmpty(painter, scene);
    } else {
        section::paintAxis(painter, scene);
        painter.setClipRect(scene.layout.plot);
        section::paintRock(painter, scene);
        section::paintWaters(painter, scene);
        section::paintEnvelopes(painter, scene);
        section::paintConduits(painter, scene);
        section::paintChambers(painter, scene);
        section::paintBounds(painter, scene);
        section::paintChamberWalls(painter, scene);
        section::paintBay(painter, scene);
        section::paintUnits(painter, scene);
        section::paintBreaks(painter, scene);
        section::paintHighlight(painter, scene);
    }
    for (const auto& label : scene.labels) {
        if (!label.framed) { // the lozenge's own lies above what moves
            paintLabel(painter, label, scene.look);
        }
    }
    painter.restore();
}

} // namespace headroom::drawing
