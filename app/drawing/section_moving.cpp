// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"

#include <QPainter>
#include <QPainterPath>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace headroom::drawing {

namespace section {

namespace {

constexpr int petals = 5;

/// One petal pointing up from the origin, for a rosette of radius 1.
QPainterPath petal() {
    QPainterPath path(QPointF(0, 0));
    path.cubicTo(QPointF(-0.38, -0.30), QPointF(-0.22, -0.80), QPointF(0.10, -0.86));
    path.cubicTo(QPointF(0.36, -0.62), QPointF(0.30, -0.25), QPointF(0, 0));
    return path;
}

double turnsAt(const Turning& turning, double interval_s, double time_s) {
    const double last = static_cast<double>(turning.turns.size() - 1);
    const double place = std::isfinite(time_s) && interval_s > 0.0
                             ? std::clamp(time_s / interval_s, 0.0, last)
                             : 0.0;
    const auto before = static_cast<std::size_t>(place);
    const std::size_t after = std::min(before + 1, turning.turns.size() - 1);
    const double share = place - static_cast<double>(before);
    return static_cast<double>(turning.turns[before]) * (1.0 - share)
           + static_cast<double>(turning.turns[after]) * share;
}

void paintRosette(QPainter& painter, const UnitDrawing& unit, double turns, const Look& look) {
    static const QPainterPath one = petal();
    painter.save();
    painter.translate(unit.centre);
    painter.rotate(360.0 * (turns - std::floor(turns)));
    painter.scale(0.92 * unit.radius_px, 0.92 * unit.radius_px);
    QPen pen = look.pen(look.headLine, look.width.data);
    pen.setCosmetic(true);
    painter.setPen(pen);
    painter.setBrush(look.water);
    for (int i = 0; i < petals; ++i) {
        painter.drawPath(one);
        painter.rotate(360.0 / petals);
    }
    painter.restore();
}

void paintRosettes(QPainter& painter, const Scene& scene, double time_s) {
    for (std::size_t i = 0; i < scene.layout.units.size(); ++i) {
        double turns = 0.0;
        for (const auto& turning : scene.turning) {
            if (turning.unit == i) {
                turns = turnsAt(turning, scene.shown.run->recordInterval_s, time_s);
            }
        }
        paintRosette(painter, scene.layout.units[i], turns, scene.look);
    }
}

/// Water in a chamber: the outline up to a level.
QPolygonF waterIn(const ChamberDrawing& drawing, double level_y) {
    QPolygonF left, right;
    for (qsizetype i = 0; i < drawing.left.size() && drawing.left[i].y() > level_y; ++i) {
        left << drawing.left[i];
        right << drawing.right[i];
    }
    if (left.isEmpty()) {
        return {};
    }
    const double y = std::max(level_y, drawing.left.back().y());
    const double half = drawing.halfWidth_px(y);
    left << QPointF(drawing.x_px - half, y) << QPointF(drawing.x_px + half, y);
    for (auto corner = right.rbegin(); corner != right.rend(); ++corner) {
        left << *corner;
    }
    return left;
}

void paintLevels(QPainter& painter, const Scene& scene, double time_s) {
    const auto& look = scene.look;
    for (const auto& moving : scene.levels) {
        const auto& drawing = scene.layout.chambers[moving.chamber];
        const double level = valueAt(*moving.channel, scene.shown.run->recordInterval_s, time_s);
        if (!std::isfinite(level)) {
            continue;
        }
        const double y = scene.layout.scale.y_px(level);
        painter.setPen(Qt::NoPen);
        painter.setBrush(look.water);
        // Inside the walls, which belong to the still layer.
        painter.save();
        const double wall = look.width.inHand / 2.0;
        painter.setClipRect(drawing.box().adjusted(wall, -20, -wall, 0), Qt::IntersectClip);
        painter.drawPolygon(waterIn(drawing, y));
        painter.setPen(look.pen(look.waterEdge, look.width.inHand));
        const double half = drawing.halfWidth_px(y);
        painter.drawLine(QPointF(drawing.x_px - half, y), QPointF(drawing.x_px + half, y));
        painter.restore();
        if (!moving.labelBox.isNull()) {
            const Label label = quietLabel(numberText(Quantity::elevation, level), moving.labelBox);
            paintPlain(painter, label, look, Qt::AlignLeft);
        }
    }
}

/// Leaves out corners that the eye does not see: a thick line with few corners is quick.
QPolygonF withoutStraight(const QPolygonF& line) {
    constexpr double seen_px = 0.35;
    QPolygonF out;
    qsizetype from = 0;
    while (from < line.size()) {
        out << line[from];
        // As far as one straight line stays close to all corners passed, within a cone of slopes.
        double least = -1e300, most = 1e300;
        qsizetype end = from + 1;
        for (; end < line.size(); ++end) {
            const double dx = std::max(line[end].x() - line[from].x(), 1e-9);
            const double dy = line[end].y() - line[from].y();
            if (dy / dx < least || dy / dx > most) {
                break;
            }
            least = std::max(least, (dy - seen_px) / dx);
            most = std::min(most, (dy + seen_px) / dx);
        }
        from = end == from + 1 ? end : end - 1;
        if (end == line.size()) {
            break;
        }
    }
    if (!line.isEmpty() && out.back() != line.back()) {
        out << line.back();
    }
    return out;
}

void paintHeadLines(QPainter& painter, const Scene& scene, double time_s) {
    painter.setPen(scene.look.pen(scene.look.headLine, scene.look.width.inHand));
    painter.setBrush(Qt::NoBrush);
    for (const auto& line : scene.headLines) {
        QPolygonF shape;
        shape.reserve(static_cast<qsizetype>(line.stations.size()));
        for (std::size_t i = 0; i < line.stations.size(); ++i) {
            const double head = headAt(*line.envelope, scene.shown.run->lineInterval_s,
                                       static_cast<std::size_t>(line.stations[i]), time_s);
            if (std::isfinite(head)) {
                shape << QPointF(line.x_px[i], scene.layout.scale.y_px(head));
            }
        }
        QPainterPath path;
        path.addPolygon(withoutStraight(shape));
        painter.drawPath(path);
    }
}

void paintLozenges(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    for (const auto& drawing : scene.lozenges) {
        const double half = (drawing.leading ? 5.5 : 4.0) * look.scale;
        if (drawing.computed) {
            QPen pen = look.hairPen(look.mark(drawing.mark));
            pen.setDashPattern({2, 2});
            painter.setPen(pen);
            painter.drawLine(*drawing.computed, drawing.at);
        }
        const QPolygonF shape{{drawing.at.x(), drawing.at.y() - half},
                              {drawing.at.x() + half, drawing.at.y()},
                              {drawing.at.x(), drawing.at.y() + half},
                              {drawing.at.x() - half, drawing.at.y()}};
        painter.setPen(look.pen(look.sheet, look.width.data));
        painter.setBrush(look.mark(drawing.mark));
        painter.drawPolygon(shape);
    }
}

} // namespace

} // namespace section

void SectionPicture::paintMoving(QPainter& painter, double time_s) const {
    const Scene& scene = *scene_;
    if (scene.empty) {
        return;
    }
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    painter.setClipRect(scene.layout.plot);
    section::paintLevels(painter, scene, time_s);
    section::paintRosettes(painter, scene, time_s);
    section::paintHeadLines(painter, scene, time_s);
    section::paintLozenges(painter, scene);
    if (!scene.clockBox.isNull()) {
        const Label label = quietLabel(
            QStringLiteral("head line at ") + numberText(Quantity::time, time_s), scene.clockBox);
        paintPlain(painter, label, scene.look, Qt::AlignRight);
    }
    painter.setClipping(false);
    for (const auto& label : scene.labels) {
        if (label.framed) {
            paintLabel(painter, label, scene.look);
        }
    }
    painter.restore();
}

} // namespace headroom::drawing
