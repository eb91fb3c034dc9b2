// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/picture.h"

#include <QPainterPathStroker>

namespace headroom::drawing {

namespace {

bool hits(const Item& item, QPointF position, double reach) {
    const QRectF box = item.box.isNull() ? item.shape.boundingRect() : item.box;
    if (!box.adjusted(-reach, -reach, reach, reach).contains(position)) {
        return false;
    }
    if (item.shape.isEmpty()) {
        return true;
    }
    const QRectF touched(position.x() - reach, position.y() - reach, 2 * reach, 2 * reach);
    return item.shape.contains(position) || item.shape.intersects(touched);
}

} // namespace

const Item* itemAt(const Items& items, QPointF position, double reach) {
    // Exactly under the pointer first; only then what is near.
    for (const double allowed : {0.0, reach}) {
        for (auto item = items.rbegin(); item != items.rend(); ++item) {
            if (hits(*item, position, allowed)) {
                return &*item;
            }
        }
    }
    return nullptr;
}

} // namespace headroom::drawing
