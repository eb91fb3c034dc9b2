// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/texture.h"

#include <QPainter>
#include <QPainterPath>
#include <QVector>

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace {

constexpr double lineStrength = 0.45;
constexpr int mostLines = 4000; ///< a zone wider than any screen does not hang the painter

QVector<QLineF> linesOver(const QRectF& box, Texture texture, double step) {
    QVector<QLineF> lines;
    const double slant = texture == Texture::hatch ? box.height() : 0.0;
    const double wanted = (box.width() + slant) / step;
    const int count = static_cast<int>(std::clamp(wanted, 0.0, double{mostLines})) + 1;
    // Counted from a fixed grid, so that neighbouring zones meet without a seam.
    const double first = std::floor(box.left() / step) * step;
    lines.reserve(count);
    for (int i = 0; i < count; ++i) {
        const double x = first + i * step;
        lines.append(
            QLineF(x - slant, box.bottom(), x, box.top()).translated(slant > 0 ? step : 0, 0));
    }
    return lines;
}

} // namespace

QPolygonF zoneBeside(const QPolygonF& bound, double depth, bool up) {
    QPolygonF zone = bound;
    for (auto corner = bound.rbegin(); corner != bound.rend(); ++corner) {
        zone << QPointF(corner->x(), corner->y() + (up ? -depth : depth));
    }
    return zone;
}

void paintTexture(QPainter& painter, const QPolygonF& zone, Texture texture, const Look& look) {
    const QRectF box = zone.boundingRect();
    if (box.isEmpty() || !std::isfinite(box.width()) || !std::isfinite(box.height())) {
        return;
    }
    QPainterPath area;
    area.addPolygon(zone);
    area.closeSubpath();
    painter.save();
    painter.fillPath(area, look.limitFill);
    painter.setClipPath(area, Qt::IntersectClip);
    QColor colour = look.limit;
    colour.setAlphaF(static_cast<float>(lineStrength));
    painter.setPen(look.hairPen(colour));
    painter.drawLines(linesOver(box, texture, look.space.textureStep));
    painter.restore();
}

} // namespace headroom::drawing
