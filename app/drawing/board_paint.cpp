// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/board_scene.h"

#include <QPainter>

namespace headroom::drawing {

namespace {

using Scene = BoardPicture::Scene;

constexpr float fillStrength = 0.22F;

void paintColumn(QPainter& painter, const BoardColumn& column, const Look& look) {
    const QFont font =
        look.font(TextSize::small, column.inHand ? TextWeight::strong : TextWeight::normal);
    const QFontMetricsF metrics(font);
    painter.setFont(font);
    painter.setPen(column.inHand ? look.accent : look.text);
    if (!column.slanted) {
        for (std::size_t i = 0; i < column.lines.size(); ++i) {
            const QRectF& box = column.boxes[i];
            painter.drawText(QPointF(box.left(), box.top() + metrics.ascent()), column.lines[i]);
        }
        return;
    }
    painter.save();
    painter.translate(column.pivot);
    painter.rotate(slant_deg);
    const double line = look.lineHeight(TextSize::small);
    double y = -line * static_cast<double>(column.lines.size()) + metrics.ascent();
    for (const auto& words : column.lines) {
        painter.drawText(QPointF(-metrics.horizontalAdvance(words), y), words);
        y += line;
    }
    painter.restore();
}

void paintCell(QPainter& painter, const BoardCell& cell, const Look& look) {
    if (!cell.fill.isEmpty()) {
        QColor colour = look.accent;
        colour.setAlphaF(fillStrength);
        painter.fillRect(cell.fill, colour);
    }
    if (cell.shownAs >= 0) {
        const bool inHand = cell.shownAs == 0;
        const auto run = static_cast<std::size_t>(std::min(cell.shownAs, runColourCount - 1));
        painter.setPen(look.pen(inHand ? look.accent : look.runs[run],
                                inHand ? look.width.inHand : look.width.data));
        painter.setBrush(inHand ? QBrush(look.sheet) : QBrush(Qt::NoBrush));
        painter.drawRoundedRect(cell.frame, look.space.corner, look.space.corner);
        if (inHand && !cell.fill.isEmpty()) {
            QColor colour = look.accent;
            colour.setAlphaF(fillStrength);
            painter.fillRect(cell.fill.adjusted(1, 0, -1, -1), colour);
        }
    }
    paintMark(painter, cell.markBox, cell.mark, look, cell.progress);
    paintPlain(painter, cell.share, look, Qt::AlignLeft);
    paintPlain(painter, cell.letter, look, Qt::AlignLeft);
}

} // namespace

void BoardPicture::paint(QPainter& painter) const {
    const Scene& scene = *scene_;
    const auto& look = scene.look;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    for (const auto& row : scene.rows) {
        if (row.selected) {
            painter.fillRect(row.row, look.selection);
        }
        painter.setPen(look.hairPen(look.line));
        painter.drawLine(row.row.bottomLeft(), row.row.bottomRight());
        paintPlain(painter, row.letter, look, Qt::AlignLeft);
        for (const auto& line : row.name) {
            paintPlain(painter, line, look, Qt::AlignLeft);
        }
    }
    painter.setPen(look.hairPen(look.line));
    painter.drawLine(QPointF(0, scene.headerBottom), QPointF(scene.width, scene.headerBottom));
    for (const auto& column : scene.columns) {
        paintColumn(painter, column, look);
    }
    for (const auto& cell : scene.cells) {
        paintCell(painter, cell, look);
    }
    for (const auto& label : scene.labels) {
        paintPlain(painter, label, look, Qt::AlignLeft);
    }
    painter.restore();
}

} // namespace headroom::drawing
