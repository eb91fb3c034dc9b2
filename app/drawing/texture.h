// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

#include <QPolygonF>

class QPainter;

namespace headroom::drawing {

/// How a forbidden zone is textured: own clipped lines, no brush patterns, so that paper gets
/// lines too.
enum class Texture {
    hatch, ///< at no time
    rules, ///< upright: allowed for some time
};

/// The zone outward from a bound that is drawn as a line: as deep as `depth`, `up` or down.
QPolygonF zoneBeside(const QPolygonF& bound, double depth, bool up);

void paintTexture(QPainter& painter, const QPolygonF& zone, Texture texture, const Look& look);

} // namespace headroom::drawing
