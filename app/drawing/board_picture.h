// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"
#include "drawing/picture.h"
#include "drawing/selection.h"
#include "studies/board.h"

#include <QSizeF>

#include <memory>
#include <vector>

class QPainter;

namespace headroom::drawing {

struct BoardInput {
    const studies::Snapshot& snapshot;
    const std::vector<studies::Cell>& cells; ///< any order; missing ones count as not run
    Selection selection;
    QSizeF size;
    const Look& look;
    int firstRow = 0;      ///< scrolled to: study
    int firstColumn = 0;   ///< scrolled to: 0 the base, 1 + i option i
    int optionInHand = -1; ///< receives changes; its name is coloured
};

/// Studies down, options across: mark, share, letter of the worst limit, progress, staleness.
class BoardPicture {
public:
    Items items; ///< row titles, column titles, cells; counts of what is out of sight as labels
    int firstRow = 0, rowsShown = 0, firstColumn = 0, columnsShown = 0; ///< after clamping
    void paint(QPainter& painter) const;

    struct Scene; ///< inside of the drawing only
private:
    friend BoardPicture boardPicture(const BoardInput& input);
    std::shared_ptr<const Scene> scene_;
};

BoardPicture boardPicture(const BoardInput& input);

/// Height that shows every study at its usual row height.
double boardHeight(const studies::Snapshot& snapshot, const Look& look, double width_px);

} // namespace headroom::drawing
