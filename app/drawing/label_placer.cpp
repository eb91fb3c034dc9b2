// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/label_placer.h"

#include <QFontMetricsF>
#include <QPaintEngine>
#include <QPainter>
#include <QPainterPath>
#include <QStringList>

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace {

constexpr double haloWidth = 3.0;
constexpr float haloStrength = 0.85F;

bool crosses(const QLineF& line, const QRectF& box) {
    if (box.contains(line.p1()) || box.contains(line.p2())) {
        return true;
    }
    const QLineF edges[] = {{box.topLeft(), box.topRight()},
                            {box.topRight(), box.bottomRight()},
                            {box.bottomRight(), box.bottomLeft()},
                            {box.bottomLeft(), box.topLeft()}};
    return std::any_of(std::begin(edges), std::end(edges), [&](const QLineF& edge) {
        return line.intersects(edge, nullptr) == QLineF::BoundedIntersection;
    });
}

bool free(const std::vector<QRectF>& taken, const QRectF& box) {
    return std::none_of(taken.begin(), taken.end(),
                        [&](const QRectF& other) { return other.intersects(box); });
}

QPointF baseline(const Label& label, const QFontMetricsF& metrics) {
    return {label.box.left(),
            label.box.center().y() + (metrics.ascent() - metrics.descent()) / 2.0};
}

/// The ground's colour around letters, so that lines behind do not touch them. On a screen the text
/// itself is set beside itself eight times, ten times quicker than stroked outlines; where pictures
/// are kept as shapes, a text must stand there once.
void paintHalo(QPainter& painter, const QString& words, QPointF start, const Look& look) {
    QColor halo = look.sheet;
    halo.setAlphaF(haloStrength);
    if (painter.paintEngine()->type() != QPaintEngine::Raster) {
        QPainterPath outline;
        outline.addText(start, painter.font(), words);
        painter.strokePath(outline, look.pen(halo, haloWidth * look.scale));
        return;
    }
    painter.setPen(halo);
    const double off = std::max(1.0, std::round(look.scale));
    for (const double dx : {-off, 0.0, off}) {
        for (const double dy : {-off, 0.0, off}) {
            if (dx != 0.0 || dy != 0.0) {
                painter.drawText(start + QPointF(dx, dy), words);
            }
        }
    }
}

void paintFrame(QPainter& painter, const Label& label, const Look& look) {
    const double pad = look.space.unit;
    const QRectF frame = label.box.adjusted(-1.5 * pad, -0.5 * pad, 1.5 * pad, 0.5 * pad);
    painter.setPen(look.hairPen(look.limit));
    painter.setBrush(look.sheet);
    painter.drawRoundedRect(frame, look.space.corner, look.space.corner);
}

/// A number stays with the unit behind it.
bool belongTogether(const QString& before, const QString& after) {
    bool number = false;
    before.toDouble(&number);
    return number && after.size() <= 4;
}

} // namespace

std::vector<QString> folded(const QString& name, const QFont& font) {
    const QStringList words = name.split(QLatin1Char(' '), Qt::SkipEmptyParts);
    if (words.size() < 2) {
        return {name};
    }
    std::vector<QString> best;
    double least = 0.0;
    for (qsizetype cut = 1; cut < words.size(); ++cut) {
        if (belongTogether(words[cut - 1], words[cut].chopped(words[cut].endsWith(u',') ? 1 : 0))) {
            continue;
        }
        const QString first = words.mid(0, cut).join(QLatin1Char(' '));
        const QString second = words.mid(cut).join(QLatin1Char(' '));
        const double wide = std::max(textSize(first, font).width(), textSize(second, font).width());
        if (best.empty() || wide < least) {
            best = {first, second};
            least = wide;
        }
    }
    return best.empty() ? std::vector<QString>{name} : best;
}

QSizeF textSize(const QString& text, const QFont& font) {
    const QFontMetricsF metrics(font);
    return {std::ceil(metrics.horizontalAdvance(text)), std::ceil(metrics.height())};
}

void paintLabel(QPainter& painter, const Label& label, const Look& look) {
    const QFont font = look.font(label.size, label.weight);
    const QFontMetricsF metrics(font);
    const QPointF start = baseline(label, metrics);
    painter.setFont(font);
    if (label.leader) {
        painter.setPen(look.hairPen(label.framed ? look.limit : look.muted));
        painter.drawLine(QPointF(label.box.center().x(), label.leader->y() < label.box.top()
                                                             ? label.box.top() - 2
                                                             : label.box.bottom() + 2),
                         *label.leader);
    }
    if (label.framed) {
        paintFrame(painter, label, look);
    } else {
        paintHalo(painter, label.text, start, look);
    }
    painter.setPen(label.quiet ? look.muted : look.text);
    painter.drawText(start, label.text);
}

void paintPlain(QPainter& painter, const Label& label, const Look& look, Qt::Alignment alignment) {
    const QFont font = look.font(label.size, label.weight);
    const QFontMetricsF metrics(font);
    painter.setFont(font);
    painter.setPen(label.quiet ? look.muted : look.text);
    // A hair of slack: the advance of a text and the width of its box are rounded differently.
    const QString shown = metrics.elidedText(label.text, Qt::ElideRight, label.box.width() + 1.0);
    QPointF start = baseline(label, metrics);
    const double slack = label.box.width() - metrics.horizontalAdvance(shown);
    start.rx() += alignment.testFlag(Qt::AlignRight)     ? slack
                  : alignment.testFlag(Qt::AlignHCenter) ? slack / 2.0
                                                         : 0.0;
    painter.drawText(start, shown);
}

void LabelPlacer::avoid(const QPolygonF& line, double halfWidth) {
    for (qsizetype i = 1; i < line.size(); ++i) {
        lines_.push_back({QLineF(line[i - 1], line[i]), halfWidth});
    }
}

bool LabelPlacer::freeOfLabels(const QRectF& box) const {
    return free(labels_, box);
}

bool LabelPlacer::freeOfBodies(const QRectF& box) const {
    return free(bodies_, box);
}

bool LabelPlacer::freeOfLines(const QRectF& box) const {
    return std::none_of(lines_.begin(), lines_.end(), [&](const Line& line) {
        return crosses(line.line, box.adjusted(-line.half, -line.half, line.half, line.half));
    });
}

std::optional<QRectF> LabelPlacer::place(const std::vector<QRectF>& candidates, bool strict) {
    for (int pass = 0; pass < (strict ? 1 : 3); ++pass) {
        for (const QRectF& box : candidates) {
            const bool good = inside(box) && freeOfLabels(box) && (pass > 1 || freeOfBodies(box))
                              && (pass > 0 || freeOfLines(box));
            if (good) {
                take(box);
                return box;
            }
        }
    }
    return std::nullopt;
}

std::vector<QRectF> around(const QRectF& thing, QSizeF size, double gap) {
    const double w = size.width(), h = size.height();
    const QPointF middle = thing.center();
    const auto at = [&](double x, double y) { return QRectF(QPointF(x, y), size); };
    return {
        at(middle.x() - w / 2, thing.top() - gap - h),
        at(middle.x() - w / 2, thing.bottom() + gap),
        at(thing.right() + gap, middle.y() - h / 2),
        at(thing.left() - gap - w, middle.y() - h / 2),
        at(thing.right() + gap, thing.top() - gap - h),
        at(thing.right() + gap, thing.bottom() + gap),
        at(thing.left() - gap - w, thing.top() - gap - h),
        at(thing.left() - gap - w, thing.bottom() + gap),
    };
}

} // namespace headroom::drawing
