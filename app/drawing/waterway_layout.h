// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/chainage_map.h"
#include "drawing/look.h"
#include "plant/project.h"

#include <QPolygonF>
#include <QRectF>

#include <vector>

namespace headroom::drawing {

/// Elevation ↔ picture; elevation grows upward.
struct ElevationScale {
    double low_m = 0.0, high_m = 1.0; ///< high_m > low_m
    double bottom_px = 1.0, top_px = 0.0;

    double pixelsPerMetre() const { return (bottom_px - top_px) / (high_m - low_m); }
    double y_px(double elevation_m) const {
        return bottom_px - (elevation_m - low_m) * pixelsPerMetre();
    }
    double elevation_m(double y_px) const { return low_m + (bottom_px - y_px) / pixelsPerMetre(); }
};

/// A stretch of one bore, in pixels.
struct BoreShape {
    QPolygonF line;
    double water_px = 0.0, lining_px = 0.0;
};
struct ConduitShape {
    int conduit = -1;
    QPolygonF line; ///< the whole axis, offset included
    std::vector<BoreShape> bores;
    double length_m = 0.0; ///< surveyed, else along the axis
    QRectF box() const { return line.boundingRect(); }
    double halfWidth() const;
};
struct ChamberDrawing {
    int chamber = -1;
    double x_px = 0.0, axis_y_px = 0.0; ///< where it stands on the waterway
    QPolygonF left, right;              ///< walls from the floor up, same elevations
    QPolygonF outline;
    bool throttled = false;
    double halfWidth_px(double y_px) const; ///< of the bore at a height, straight between rows
    QRectF box() const { return outline.boundingRect(); }
};
struct UnitDrawing {
    int unit = -1;
    QPointF centre, inlet, outlet;
    double radius_px = 0.0;
    QRectF box() const {
        return {centre.x() - radius_px, centre.y() - radius_px, 2 * radius_px, 2 * radius_px};
    }
};
/// The water's way from a unit's inlet through the rosette to its outlet.
QPolygonF wayThrough(const UnitDrawing& unit);

struct ReservoirDrawing {
    int reservoir = -1;
    double level_m = 0.0;
    bool tail = false;
    double left_px = 0.0, right_px = 0.0;
    QPolygonF water, bed; ///< bed: what the rock takes as its edge under the water
};

/// Where everything of a plant lies in the Section.
struct WaterwayLayout {
    QRectF plot;
    ChainageMap map;
    ElevationScale scale;
    bool groundGiven = false;
    QPolygonF ground; ///< surface from the left edge to the right
    std::vector<ConduitShape> conduits;
    std::vector<ChamberDrawing> chambers;
    std::vector<UnitDrawing> units;
    std::vector<ReservoirDrawing> reservoirs;

    QPointF at(double chainage_m, double elevation_m) const {
        return {map.x_px(chainage_m), scale.y_px(elevation_m)};
    }
};

struct LayoutInput {
    const plant::Plant& plant;
    const plant::Rows& ground;
    std::vector<double> level_m; ///< of each reservoir as it stands in the study shown
    std::vector<double> show_m;  ///< further elevations that must be in sight
    QRectF plot;
    const Look& look;
    Scales scales = Scales::three;
};

WaterwayLayout waterwayLayout(const LayoutInput& input);

/// Axis of a conduit from its first point to its last: (chainage, elevation); empty if an end is
/// not resolved.
plant::Rows axisOf(const plant::Plant& plant, const plant::Conduit& conduit);
/// Elevation of an axis at a chainage, straight between corners.
double elevationOn(const plant::Rows& axis, double chainage_m);

/// Room left of the intake for the upper reservoir, of a picture this wide.
double leadWidth(double plotWidth_px, const Look& look);
/// The plot's left and right edges are common to Section, Ribbon and (left) Lanes.
QRectF plotArea(QSizeF size, const Look& look, double top_px, double bottom_px);

} // namespace headroom::drawing
