// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/label_placer.h"
#include "drawing/ribbon_picture.h"
#include "drawing/waterway_layout.h"

namespace headroom::drawing {

struct RibbonBand {
    QPolygonF edge;      ///< metres left along a conduit, in pixels
    QPolygonF body;      ///< between the edge and the zero line
    bool toAxis = false; ///< no limit there: metres above the conduit's axis, pale
};
struct RibbonMark {
    QPointF at; ///< metres left at the place of one limit
    int limit = -1;
    QColor colour;
    bool leading = false;
};
struct RulerTick {
    double x_px = 0.0;
    QString label; ///< empty: a tick alone
    QRectF box;
};

struct RibbonPicture::Scene {
    explicit Scene(const Look& style, ChainageMap&& along) : look(style), map(std::move(along)) {}

    const Look& look;
    ChainageMap map;
    QRectF chart; ///< metres left
    double zero_y = 0.0;
    double pixelsPerMetre = 1.0;
    std::vector<std::pair<double, QString>> ticks; ///< y and what is written there
    std::vector<RibbonBand> bands;
    std::vector<RibbonMark> marks;
    std::vector<Label> labels;
    std::vector<RulerTick> ruler;
    double ruler_y = 0.0;
    std::vector<double> spanEdges_px;
};

} // namespace headroom::drawing
