// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/board_picture.h"
#include "drawing/label_placer.h"
#include "drawing/marks.h"

namespace headroom::drawing {

struct BoardRow {
    int study = -1;
    QRectF row;
    bool selected = false;
    Label letter;
    std::vector<Label> name; ///< one line, or two where one has no room
};
struct BoardColumn {
    int option = -2;
    QRectF column;
    bool inHand = false;
    bool slanted = false;
    QPointF pivot;              ///< where slanted lines end
    std::vector<QString> lines; ///< at most two
    std::vector<QRectF> boxes;  ///< of level lines
    QPainterPath shape;         ///< where the name is
};
struct BoardCell {
    CellId id;
    QRectF frame, markBox, fill;
    MarkState mark = MarkState::notRun;
    double progress = 0.0;
    int shownAs = -1; ///< position in the comparison; 0: in the hand
    Label share, letter;
};

struct BoardPicture::Scene {
    explicit Scene(const Look& style) : look(style) {}
    const Look& look;
    double headerBottom = 0.0, width = 0.0;
    std::vector<BoardRow> rows;
    std::vector<BoardColumn> columns;
    std::vector<BoardCell> cells;
    std::vector<Label> labels; ///< heading and counts
};

inline constexpr double slant_deg = 55.0;

} // namespace headroom::drawing
