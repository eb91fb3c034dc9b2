// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"
#include "results/verdict.h"
#include "studies/board.h"

#include <QRectF>
#include <QString>

class QPainter;

namespace headroom::drawing {

/// Paints one of the nine bowls into the middle of `box`; readable from 14 px on.
/// `progress` (0 … 1) is used by `running` only.
void paintMark(QPainter& painter, const QRectF& box, MarkState state, const Look& look,
               double progress = 0.0);

MarkState markOf(results::Mark mark);
/// The mark of a cell: its governing verdict once done, else how far it is.
MarkState markOf(const studies::Cell& cell);
/// "held", "not valid" …
QString words(MarkState state);

} // namespace headroom::drawing
