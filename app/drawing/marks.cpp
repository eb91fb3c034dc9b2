// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/marks.h"

#include "limits/judge.h"

#include <QPainter>
#include <QPainterPath>

#include <algorithm>

namespace headroom::drawing {

namespace {

/// A bowl: rim from left to right at `rim`, its bottom half an ellipse.
struct Bowl {
    double left, right, rim, depth, pen;
    double width() const { return right - left; }
    double middle() const { return (left + right) / 2.0; }
};

Bowl bowlIn(const QRectF& box) {
    const double side = std::min(box.width(), box.height());
    const double wide = 0.78 * side;
    const double left = box.center().x() - wide / 2.0;
    return {left, left + wide, box.center().y() - 0.15 * side, 0.45 * side,
            std::max(1.2, std::min(side / 15.0, 1.0 + side / 40.0))};
}

QPainterPath body(const Bowl& bowl) {
    QPainterPath path(QPointF(bowl.left, bowl.rim));
    path.arcTo(QRectF(bowl.left, bowl.rim - bowl.depth, bowl.width(), 2 * bowl.depth), 180, 180);
    path.closeSubpath();
    return path;
}

/// The part of the bowl below a level, as a share of its depth from the bottom.
QPainterPath filled(const Bowl& bowl, double share) {
    QPainterPath water;
    const double top = bowl.rim + (1.0 - share) * bowl.depth;
    water.addRect(QRectF(bowl.left, top, bowl.width(), bowl.depth * share + 1.0));
    return body(bowl).intersected(water);
}

void outline(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look,
             bool dashed = false) {
    QPen pen = look.pen(colour, bowl.pen);
    if (dashed) {
        pen.setDashPattern({1.8, 1.5});
    }
    painter.setPen(pen);
    painter.setBrush(Qt::NoBrush);
    painter.drawPath(body(bowl));
}

void fill(QPainter& painter, const QPainterPath& path, const QColor& colour) {
    painter.setPen(Qt::NoPen);
    painter.setBrush(colour);
    painter.drawPath(path);
}

void paintHeld(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look) {
    fill(painter, filled(bowl, 0.5), colour);
    outline(painter, bowl, colour, look);
}

void paintTight(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look) {
    fill(painter, body(bowl), colour);
    painter.setPen(look.pen(colour, bowl.pen * 1.3));
    const double over = 0.12 * bowl.width();
    const double lid = bowl.rim - 2.2 * bowl.pen;
    painter.drawLine(QPointF(bowl.left - over, lid), QPointF(bowl.right + over, lid));
}

void paintBroken(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look) {
    // Moved to the left: the drops need room.
    const double shift = 0.10 * bowl.width();
    const Bowl moved{bowl.left - shift, bowl.right - shift, bowl.rim + 0.5 * bowl.pen, bowl.depth,
                     bowl.pen};
    fill(painter, body(moved), colour);
    QPainterPath bulge(QPointF(moved.left + 0.02 * moved.width(), moved.rim - 1.2 * bowl.pen));
    bulge.quadTo(QPointF(moved.middle(), moved.rim - 0.62 * bowl.depth),
                 QPointF(moved.right - 0.02 * moved.width(), moved.rim - 1.2 * bowl.pen));
    painter.setBrush(Qt::NoBrush);
    painter.setPen(look.pen(colour, bowl.pen * 1.15));
    painter.drawPath(bulge);
    const double radius = 0.10 * bowl.width();
    QPainterPath drops;
    drops.addEllipse(QPointF(moved.right + 0.9 * radius, moved.rim + 0.35 * bowl.depth), radius,
                     1.3 * radius);
    drops.addEllipse(QPointF(moved.right + 0.3 * radius, moved.rim + 1.05 * bowl.depth),
                     0.8 * radius, 1.1 * radius);
    fill(painter, drops, colour);
}

void paintUndecided(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look) {
    // The surface is one wave through the rim: a crest left, a trough right.
    const double high = 0.75 * bowl.depth, low = 0.75 * bowl.depth;
    QPainterPath surface(QPointF(bowl.left, bowl.rim + 0.1 * bowl.depth));
    surface.cubicTo(QPointF(bowl.left + 0.18 * bowl.width(), bowl.rim - 1.5 * high),
                    QPointF(bowl.left + 0.38 * bowl.width(), bowl.rim - 1.1 * high),
                    QPointF(bowl.left + 0.52 * bowl.width(), bowl.rim + 0.15 * low));
    surface.cubicTo(QPointF(bowl.left + 0.66 * bowl.width(), bowl.rim + 1.2 * low),
                    QPointF(bowl.left + 0.86 * bowl.width(), bowl.rim + 0.8 * low),
                    QPointF(bowl.right, bowl.rim - 0.15 * bowl.depth));
    QPainterPath under = surface;
    under.lineTo(bowl.right, bowl.rim + 2.0 * bowl.depth);
    under.lineTo(bowl.left, bowl.rim + 2.0 * bowl.depth);
    under.closeSubpath();
    fill(painter, under.intersected(body(bowl)), colour);
    painter.setBrush(Qt::NoBrush);
    painter.setPen(look.pen(colour, bowl.pen));
    painter.drawPath(surface);
    QPainterPath wall(QPointF(bowl.left, bowl.rim));
    wall.arcTo(QRectF(bowl.left, bowl.rim - bowl.depth, bowl.width(), 2 * bowl.depth), 180, 180);
    painter.drawPath(wall);
}

void paintStruck(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look) {
    outline(painter, bowl, colour, look);
    painter.setPen(look.pen(colour, bowl.pen * 1.1));
    const double up = bowl.rim - 0.35 * bowl.depth, down = bowl.rim + 1.1 * bowl.depth;
    painter.drawLine(QPointF(bowl.left, up), QPointF(bowl.right, down));
    painter.drawLine(QPointF(bowl.left, down), QPointF(bowl.right, up));
}

void paintRunning(QPainter& painter, const Bowl& bowl, const QColor& colour, const Look& look,
                  double progress) {
    outline(painter, bowl, colour, look);
    const double y = bowl.rim + bowl.depth + 2.4 * bowl.pen;
    const double split = bowl.left + std::clamp(progress, 0.0, 1.0) * bowl.width();
    painter.setPen(look.pen(look.line, bowl.pen * 1.5));
    painter.drawLine(QPointF(split, y), QPointF(bowl.right, y));
    painter.setPen(look.pen(look.accent, bowl.pen * 1.5));
    painter.drawLine(QPointF(bowl.left, y), QPointF(split, y));
}

} // namespace

void paintMark(QPainter& painter, const QRectF& box, MarkState state, const Look& look,
               double progress) {
    const Bowl bowl = bowlIn(box);
    const QColor& colour = look.mark(state);
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    switch (state) {
    case MarkState::held:
        paintHeld(painter, bowl, colour, look);
        break;
    case MarkState::tight:
        paintTight(painter, bowl, colour, look);
        break;
    case MarkState::broken:
        paintBroken(painter, bowl, colour, look);
        break;
    case MarkState::undecided:
        paintUndecided(painter, bowl, colour, look);
        break;
    case MarkState::notValid:
        paintStruck(painter, bowl, colour, look);
        break;
    case MarkState::notRun:
        outline(painter, bowl, colour, look);
        break;
    case MarkState::outdated:
        outline(painter, bowl, colour, look, true);
        break;
    case MarkState::running:
        paintRunning(painter, bowl, colour, look, progress);
        break;
    case MarkState::notApplicable:
        painter.setPen(look.pen(colour, bowl.pen * 1.2));
        painter.drawLine(QPointF(bowl.middle() - 0.25 * bowl.width(), box.center().y()),
                         QPointF(bowl.middle() + 0.25 * bowl.width(), box.center().y()));
        break;
    }
    painter.restore();
}

MarkState markOf(results::Mark mark) {
    switch (mark) {
    case results::Mark::held:
        return MarkState::held;
    case results::Mark::tight:
        return MarkState::tight;
    case results::Mark::undecided:
        return MarkState::undecided;
    case results::Mark::broken:
        return MarkState::broken;
    case results::Mark::notValid:
        return MarkState::notValid;
    case results::Mark::notRun:
        return MarkState::notRun;
    case results::Mark::notApplicable:
        return MarkState::notApplicable;
    }
    return MarkState::notRun;
}

MarkState markOf(const studies::Cell& cell) {
    switch (cell.state) {
    case studies::CellState::notApplicable:
        return MarkState::notApplicable;
    case studies::CellState::notRun:
        return MarkState::notRun;
    case studies::CellState::outdated:
        return MarkState::outdated;
    case studies::CellState::waiting:
    case studies::CellState::running:
        return MarkState::running;
    case studies::CellState::done:
        break;
    case studies::CellState::cutShort:
    case studies::CellState::failed:
        break;
    }
    const auto* worst = limits::worst(cell.verdicts);
    if (cell.state == studies::CellState::done) {
        return worst == nullptr ? MarkState::notApplicable : markOf(worst->mark);
    }
    // What was broken before the end stays broken; else nothing is known.
    const bool broken = worst != nullptr && worst->mark == results::Mark::broken;
    return broken ? MarkState::broken : MarkState::notValid;
}

QString words(MarkState state) {
    switch (state) {
    case MarkState::held:
        return QStringLiteral("held");
    case MarkState::tight:
        return QStringLiteral("tight");
    case MarkState::broken:
        return QStringLiteral("broken");
    case MarkState::undecided:
        return QStringLiteral("undecided");
    case MarkState::notValid:
        return QStringLiteral("not valid");
    case MarkState::notRun:
        return QStringLiteral("not run");
    case MarkState::outdated:
        return QStringLiteral("outdated");
    case MarkState::running:
        return QStringLiteral("running");
    case MarkState::notApplicable:
        return QStringLiteral("not applicable");
    }
    return {};
}

} // namespace headroom::drawing
