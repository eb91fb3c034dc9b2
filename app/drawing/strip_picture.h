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

struct StripInput {
    const studies::Snapshot& snapshot;
    const studies::Cell* inHand = nullptr;
    Selection selection;
    QSizeF size;
    const Look& look;
    int firstRow = 0; ///< scrolled to
};

/// One bar a limit, worst first: full = at rest, zero = limit, whisker = U.
class StripPicture {
public:
    Items items;            ///< bars that are seen, in order; the counts of the others as labels
    std::vector<int> order; ///< limits, worst first, all of them
    int firstRow = 0;       ///< after clamping
    int rowsShown = 0;
    void paint(QPainter& painter) const;

    struct Scene; ///< inside of the drawing only
private:
    friend StripPicture stripPicture(const StripInput& input);
    std::shared_ptr<const Scene> scene_;
};

StripPicture stripPicture(const StripInput& input);

} // namespace headroom::drawing
