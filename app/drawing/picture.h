// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/tree.h"

#include <QPainterPath>
#include <QRectF>
#include <QString>

#include <vector>

namespace headroom::drawing {

/// What an item of a picture is; painter, hit test, accessibility, read-out table and tests read
/// the same items.
enum class ItemKind {
    ground,
    reservoir,
    conduit,
    chamber,
    unit,
    point,
    headLine,
    envelope,
    limitZone,
    lozenge,
    ribbon,
    ruler,
    label,
    breakMark,
    cell,
    rowTitle,
    columnTitle,
    bar,
};

/// One thing of a picture, in the picture's logical pixels.
struct Item {
    ItemKind kind = ItemKind::label;
    plant::Path thing;    ///< path in the project it stands for; empty if none
    int limit = -1;       ///< for limit zones, lozenges and bars
    int option = -2;      ///< for cells and column titles; -1: the base
    int study = -1;       ///< for cells and row titles
    double time_s = -1.0; ///< for lozenges
    QPainterPath shape;   ///< hit area
    QRectF box;
    QString label;       ///< printed text, if any
    QString description; ///< spoken: "Surge shaft, level 456.1 m, 1.9 m below its limit"
};

using Items = std::vector<Item>;

/// Topmost item under a position, or nullptr; `reach` widens thin shapes.
const Item* itemAt(const Items& items, QPointF position, double reach = 4.0);

} // namespace headroom::drawing
