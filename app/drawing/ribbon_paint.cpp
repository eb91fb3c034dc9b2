// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/ribbon_scene.h"

#include <QPainter>
#include <QPainterPath>

namespace headroom::drawing {

namespace {

using Scene = RibbonPicture::Scene;

void paintTicks(QPainter& painter, const Scene& scene) {
    const double height = scene.look.lineHeight(TextSize::small);
    for (const auto& [y, words] : scene.ticks) {
        painter.setPen(scene.look.hairPen(scene.look.line));
        painter.drawLine(QPointF(scene.chart.left(), y), QPointF(scene.chart.right(), y));
        const Label label =
            quietLabel(words, QRectF(0, y - height / 2, scene.chart.left() - 6, height));
        paintPlain(painter, label, scene.look, Qt::AlignRight);
    }
}

void paintBands(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    painter.setClipRect(scene.chart);
    for (const auto& band : scene.bands) {
        QPainterPath body;
        body.addPolygon(band.body);
        body.closeSubpath();
        painter.fillPath(body, band.toAxis ? look.envelopeFill : look.ribbon);
        QPen pen =
            band.toAxis ? look.hairPen(look.envelope) : look.pen(look.ribbonEdge, look.width.data);
        if (band.toAxis) {
            pen.setDashPattern({3, 3});
        }
        painter.setBrush(Qt::NoBrush);
        painter.setPen(pen);
        painter.drawPolyline(band.edge);
    }
    painter.setClipping(false);
    painter.setPen(look.pen(look.text, look.width.hair));
    painter.drawLine(QPointF(scene.chart.left(), scene.zero_y),
                     QPointF(scene.chart.right(), scene.zero_y));
}

void paintMarks(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    const double half = 2 * look.space.unit;
    for (const auto& mark : scene.marks) {
        painter.setPen(look.hairPen(mark.colour));
        painter.drawLine(QPointF(mark.at.x(), scene.zero_y), mark.at);
        painter.setPen(
            look.pen(mark.colour, mark.leading ? 2 * look.width.inHand : look.width.selected));
        painter.drawLine(mark.at - QPointF(half, 0), mark.at + QPointF(half, 0));
    }
}

void paintRuler(QPainter& painter, const Scene& scene) {
    const auto& look = scene.look;
    if (scene.ruler.empty()) {
        return;
    }
    painter.setPen(look.hairPen(look.muted));
    painter.drawLine(QPointF(scene.chart.left(), scene.ruler_y),
                     QPointF(scene.chart.right(), scene.ruler_y));
    for (const auto& tick : scene.ruler) {
        painter.setPen(look.hairPen(look.muted));
        painter.drawLine(QPointF(tick.x_px, scene.ruler_y),
                         QPointF(tick.x_px, scene.ruler_y + look.space.unit));
        if (!tick.label.isEmpty()) {
            const Label label = quietLabel(tick.label, tick.box);
            paintPlain(painter, label, look, Qt::AlignLeft);
        }
    }
    for (const double x : scene.map.breaks_px()) {
        const double unit = look.space.unit;
        painter.setPen(look.pen(look.sheet, 2 * look.width.inHand));
        painter.drawLine(QPointF(x - unit, scene.ruler_y + unit),
                         QPointF(x + unit, scene.ruler_y - unit));
        painter.setPen(look.hairPen(look.text));
        for (const double aside : {-0.8 * unit, 0.8 * unit}) {
            painter.drawLine(QPointF(x - unit + aside, scene.ruler_y + unit),
                             QPointF(x + unit + aside, scene.ruler_y - unit));
        }
    }
}

} // namespace

void RibbonPicture::paint(QPainter& painter) const {
    const Scene& scene = *scene_;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    paintTicks(painter, scene);
    if (!scene.ruler.empty()) {
        paintBands(painter, scene);
        paintMarks(painter, scene);
    }
    paintRuler(painter, scene);
    for (const auto& label : scene.labels) {
        paintLabel(painter, label, scene.look);
    }
    painter.restore();
}

} // namespace headroom::drawing
