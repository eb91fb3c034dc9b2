// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/waterway_layout.h"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <optional>

namespace headroom::drawing {

namespace {

constexpr double leadShare = 0.065;
constexpr double widestBore_px = 22.0;
constexpr double boreToScaleFrom_px = 4.0;
constexpr double chamberNarrowest_px = 14.0, chamberWidest_px = 90.0;
constexpr double rosetteRadius_px = 14.0;
constexpr double threadOffset_px = 11.0;

using plant::Collection;

const plant::Point* pointOf(const plant::Plant& plant, const plant::Reference& reference) {
    const bool known = reference.collection == Collection::points && reference.resolved()
                       && reference.index < plant.points.size();
    return known ? &plant.points[reference.index] : nullptr;
}

// --- scale --------------------------------------------------------------------------------------

/// Raises the top for the names above the waters, lowers the bottom for rosettes and their names.
void leaveRoom(ElevationScale& scale, const LayoutInput& in) {
    const double line = in.look.lineHeight(TextSize::small), gap = in.look.space.unit;
    const double height = scale.bottom_px - scale.top_px;
    // What the edges of the plot leave free already counts.
    const double edgeAbove = scale.top_px - in.plot.top();
    const double edgeBelow = in.plot.bottom() - scale.bottom_px;
    const double unitBelow = rosetteRadius_px * in.look.scale + line + 1.5 * gap;
    const double above = std::clamp(2 * line + 1.5 * gap - edgeAbove, 0.0, 0.2 * height);
    const double below = std::clamp(unitBelow - edgeBelow, 0.0, 0.2 * height);
    for (const double level : in.level_m) {
        if (std::isfinite(level) && (scale.high_m - level) * scale.pixelsPerMetre() < above) {
            scale.high_m = level + above / (height - above) * std::max(level - scale.low_m, 1.0);
        }
    }
    for (const auto& [name, unit] : in.plant.units) {
        const auto* inlet = pointOf(in.plant, unit.from);
        const double centre =
            unit.centreline_m.value_or(inlet != nullptr ? inlet->elevation_m : scale.high_m);
        if (std::isfinite(centre) && (centre - scale.low_m) * scale.pixelsPerMetre() < below) {
            scale.low_m = centre - below / (height - below) * std::max(scale.high_m - centre, 1.0);
        }
    }
}

ElevationScale elevationScale(const LayoutInput& in) {
    double low = std::numeric_limits<double>::infinity(), high = -low;
    const auto take = [&](double elevation) {
        if (std::isfinite(elevation)) {
            low = std::min(low, elevation);
            high = std::max(high, elevation);
        }
    };
    for (const auto& [name, conduit] : in.plant.conduits) {
        for (const auto& [chainage, elevation] : axisOf(in.plant, conduit)) {
            take(elevation);
        }
    }
    for (const auto& [name, point] : in.plant.points) {
        take(point.elevation_m);
    }
    for (const auto& [name, chamber] : in.plant.chambers) {
        if (!chamber.shape.areaByLevel.empty()) {
            take(chamber.shape.floor_m());
            take(chamber.shape.rim_m());
        }
    }
    for (const auto* list : {&in.level_m, &in.show_m}) {
        std::for_each(list->begin(), list->end(), take);
    }
    for (const auto& [chainage, elevation] : in.ground) {
        take(elevation);
    }
    if (!(high > low)) {
        low = std::isfinite(low) ? low - 50.0 : 0.0;
        high = low + 100.0;
    }
    const double room = in.look.space.unit;
    ElevationScale scale{low, high, in.plot.bottom() - 6 * room, in.plot.top() + 5 * room};
    scale.bottom_px = std::max(scale.bottom_px, scale.top_px + 1.0);
    leaveRoom(scale, in);
    return scale;
}

// --- conduits -----------------------------------------------------------------------------------

double boreDiameter_m(const plant::Reach& reach) {
    return reach.diameter_m.value_or(std::sqrt(4.0 * reach.area_m2 / std::numbers::pi));
}

/// Part of an axis between two chainages (grows from → to).
plant::Rows cut(const plant::Rows& axis, double from_m, double to_m) {
    plant::Rows out{{from_m, elevationOn(axis, from_m)}};
    for (const auto& corner : axis) {
        if (corner.first > from_m && corner.first < to_m) {
            out.push_back(corner);
        }
    }
    out.push_back({to_m, elevationOn(axis, to_m)});
    return out;
}

QPolygonF toPixels(const WaterwayLayout& layout, const plant::Rows& axis, QPointF offset) {
    QPolygonF out;
    for (const auto& [chainage, elevation] : axis) {
        out << layout.at(chainage, elevation) + offset;
    }
    return out;
}

BoreShape boreShape(const WaterwayLayout& layout, const plant::Rows& axis, double diameter_m,
                    QPointF offset, const Look& look) {
    const double toScale = diameter_m * layout.scale.pixelsPerMetre();
    const bool large = toScale > boreToScaleFrom_px * look.scale && std::isfinite(toScale);
    const double water = large ? std::min(toScale, widestBore_px * look.scale) : look.width.water;
    return {toPixels(layout, axis, offset), std::max(water, look.width.water),
            std::max(water, look.width.water) + look.width.lining - look.width.water};
}

std::vector<BoreShape> boresOf(const WaterwayLayout& layout, const plant::Conduit& conduit,
                               const plant::Rows& axis, QPointF offset, const Look& look) {
    std::vector<BoreShape> bores;
    const bool rising = axis.front().first < axis.back().first;
    if (conduit.reaches.size() < 2 || !rising) {
        const double diameter = conduit.reaches.empty() ? 0.0 : boreDiameter_m(conduit.reaches[0]);
        bores.push_back(boreShape(layout, axis, diameter, offset, look));
        return bores;
    }
    double from = axis.front().first;
    for (const auto& [name, reach] : conduit.reaches) {
        const double end = std::min(reach.to_m.value_or(axis.back().first), axis.back().first);
        if (end > from) {
            bores.push_back(
                boreShape(layout, cut(axis, from, end), boreDiameter_m(reach), offset, look));
            from = end;
        }
    }
    return bores;
}

double lengthAlong(const plant::Rows& axis) {
    double length = 0.0;
    for (std::size_t i = 1; i < axis.size(); ++i) {
        length +=
            std::hypot(axis[i].first - axis[i - 1].first, axis[i].second - axis[i - 1].second);
    }
    return length;
}

/// Whether two lines lie upon each other over most of their common width.
bool hides(const plant::Rows& a, const plant::Rows& b, const WaterwayLayout& layout,
           double near_px) {
    const double from = std::max(a.front().first, b.front().first);
    const double to = std::min(a.back().first, b.back().first);
    if (layout.map.x_px(to) - layout.map.x_px(from) < 2 * near_px) {
        return false;
    }
    int close = 0;
    for (int i = 1; i <= 5; ++i) {
        const double at = from + (to - from) * i / 6.0;
        const double apart =
            layout.scale.y_px(elevationOn(a, at)) - layout.scale.y_px(elevationOn(b, at));
        close += std::abs(apart) < near_px ? 1 : 0;
    }
    return close >= 4;
}

void layConduits(WaterwayLayout& layout, const LayoutInput& in) {
    std::vector<plant::Rows> laid;
    for (int i = 0; i < in.plant.conduits.size(); ++i) {
        const auto& conduit = in.plant.conduits[i];
        const auto axis = axisOf(in.plant, conduit);
        if (axis.size() < 2) {
            continue;
        }
        // Branches on the same way are drawn beside each other, as threads.
        const auto threads = std::count_if(laid.begin(), laid.end(), [&](const plant::Rows& other) {
            return hides(other, axis, layout, in.look.width.lining);
        });
        laid.push_back(axis);
        const QPointF along = layout.at(axis.back().first, axis.back().second)
                              - layout.at(axis.front().first, axis.front().second);
        const double length = std::max(1.0, std::hypot(along.x(), along.y()));
        const QPointF offset = QPointF(-along.y(), along.x()) / length
                               * (static_cast<double>(threads) * threadOffset_px * in.look.scale);
        ConduitShape shape;
        shape.conduit = i;
        shape.bores = boresOf(layout, conduit, axis, offset, in.look);
        shape.length_m = conduit.length_m.value_or(lengthAlong(axis));
        shape.line = toPixels(layout, axis, offset);
        if (threads > 0) {
            // The thread leaves and meets the common way at its ends.
            auto& first = shape.bores.front().line;
            auto& last = shape.bores.back().line;
            first.prepend(layout.at(axis.front().first, axis.front().second));
            last.append(layout.at(axis.back().first, axis.back().second));
            shape.line.prepend(first.front());
            shape.line.append(last.back());
        }
        layout.conduits.push_back(std::move(shape));
    }
}

// --- chambers -----------------------------------------------------------------------------------

void layChambers(WaterwayLayout& layout, const LayoutInput& in) {
    for (int i = 0; i < in.plant.chambers.size(); ++i) {
        const auto& chamber = in.plant.chambers[i];
        const auto* point = pointOf(in.plant, chamber.at);
        if (point == nullptr || chamber.shape.areaByLevel.size() < 2) {
            continue;
        }
        double widest = 0.0;
        for (const auto& [level, area] : chamber.shape.areaByLevel) {
            widest = std::max(widest, std::sqrt(4.0 * std::max(area, 0.0) / std::numbers::pi));
        }
        // To the scale of elevations, but never too thin to see or so wide that it hides things.
        const double wanted = widest * layout.scale.pixelsPerMetre();
        const double shown = std::clamp(wanted, chamberNarrowest_px * in.look.scale,
                                        chamberWidest_px * in.look.scale);
        ChamberDrawing drawing;
        drawing.chamber = i;
        drawing.throttled = chamber.shape.throttled;
        drawing.x_px = layout.map.x_px(point->chainage_m);
        drawing.axis_y_px = layout.scale.y_px(point->elevation_m);
        for (const auto& [level, area] : chamber.shape.areaByLevel) {
            const double width = std::sqrt(4.0 * std::max(area, 0.0) / std::numbers::pi);
            const double half = widest > 0.0 ? std::max(2.0, 0.5 * shown * width / widest) : 2.0;
            drawing.left << QPointF(drawing.x_px - half, layout.scale.y_px(level));
            drawing.right << QPointF(drawing.x_px + half, layout.scale.y_px(level));
        }
        drawing.outline = drawing.left;
        for (auto wall = drawing.right.rbegin(); wall != drawing.right.rend(); ++wall) {
            drawing.outline << *wall;
        }
        layout.chambers.push_back(std::move(drawing));
    }
}

// --- units --------------------------------------------------------------------------------------

void layUnits(WaterwayLayout& layout, const LayoutInput& in) {
    const Span* bay = layout.map.find(Span::Kind::bay);
    const double left = bay != nullptr ? layout.map.x_px(bay->from_m) : layout.plot.left();
    const double right = bay != nullptr ? layout.map.x_px(bay->to_m) : layout.plot.right();
    for (int i = 0; i < in.plant.units.size(); ++i) {
        const auto& unit = in.plant.units[i];
        const auto* inlet = pointOf(in.plant, unit.from);
        if (inlet == nullptr) {
            continue;
        }
        UnitDrawing drawing;
        drawing.unit = i;
        drawing.inlet = layout.at(inlet->chainage_m, inlet->elevation_m);
        drawing.centre = {left + 0.28 * (right - left),
                          layout.scale.y_px(unit.centreline_m.value_or(inlet->elevation_m))};
        const auto* outlet = pointOf(in.plant, unit.to);
        drawing.outlet = outlet != nullptr
                             ? layout.at(outlet->chainage_m, outlet->elevation_m)
                             : QPointF(left + 0.60 * (right - left), drawing.centre.y());
        layout.units.push_back(drawing);
    }
    // Units at one height stand on shelves, none before another.
    const double count = static_cast<double>(std::max<std::size_t>(1, layout.units.size()));
    const double name = in.look.lineHeight(TextSize::small) + in.look.space.unit;
    const double room = std::max(1.0, layout.plot.height() - 20.0) / count;
    const bool named = room > name + 16.0; // else the names find room elsewhere, or are counted
    const double radius =
        std::clamp((named ? room - name : room / 1.3) / 2.0, 3.0, rosetteRadius_px * in.look.scale);
    const double apart = named ? 2 * radius + name : 2.5 * radius;
    std::vector<UnitDrawing*> order;
    for (auto& drawing : layout.units) {
        drawing.radius_px = radius;
        order.push_back(&drawing);
    }
    std::stable_sort(order.begin(), order.end(), [](const UnitDrawing* a, const UnitDrawing* b) {
        return a->centre.y() > b->centre.y();
    });
    double lowest = layout.plot.bottom() - radius - 2.0;
    for (auto* drawing : order) {
        drawing->centre.setY(std::min(drawing->centre.y(), lowest));
        lowest = drawing->centre.y() - apart;
    }
}

// --- waters -------------------------------------------------------------------------------------

/// Ground under a water from `left` to `right`, where the project gives it.
QPolygonF groundBetween(const WaterwayLayout& layout, double left, double right) {
    QPolygonF out;
    for (const QPointF& corner : layout.ground) {
        if (corner.x() > left && corner.x() < right) {
            out << corner;
        }
    }
    return out;
}

double heightOf(const QPolygonF& line, double x) {
    for (qsizetype i = 1; i < line.size(); ++i) {
        const QPointF& a = line[i - 1];
        const QPointF& b = line[i];
        if (x >= a.x() && x <= b.x() && b.x() > a.x()) {
            return a.y() + (b.y() - a.y()) * (x - a.x()) / (b.x() - a.x());
        }
    }
    return line.isEmpty() ? 0.0 : (x < line.front().x() ? line.front().y() : line.back().y());
}

/// A wedge of water: level on top, the ground or a plain bed below, deepest at the waterway.
void layWater(WaterwayLayout& layout, ReservoirDrawing& drawing, double mouth_y, bool mouthRight,
              const Look& look) {
    const double level = layout.scale.y_px(drawing.level_m);
    const double shallow = level + 2 * look.space.unit;
    const double deep = std::max(mouth_y + look.width.lining / 2.0, shallow);
    const double leftDepth = mouthRight ? shallow : deep, rightDepth = mouthRight ? deep : shallow;
    QPolygonF bed;
    bed << QPointF(drawing.left_px, leftDepth);
    if (layout.groundGiven) {
        for (QPointF corner : groundBetween(layout, drawing.left_px, drawing.right_px)) {
            corner.setY(std::max(corner.y(), level));
            bed << corner;
        }
        const double shore = mouthRight ? drawing.left_px : drawing.right_px;
        const double ground = std::max(heightOf(layout.ground, shore), level);
        (mouthRight ? bed.front() : bed.back()).setY(ground > level ? ground : shallow);
    }
    bed << QPointF(drawing.right_px, rightDepth);
    drawing.bed = bed;
    drawing.water = bed;
    drawing.water << QPointF(drawing.right_px, level) << QPointF(drawing.left_px, level);
}

/// Where the ground left of a mouth first rises above the water.
double shoreLeftOf(const WaterwayLayout& layout, QPointF mouth, double level_y, double furthest) {
    double shore = mouth.x();
    for (double x = mouth.x(); x > furthest && heightOf(layout.ground, x) > level_y; x -= 1.0) {
        shore = x;
    }
    return shore;
}

bool beginsHere(const plant::Plant& plant, int point) {
    return std::any_of(plant.conduits.begin(), plant.conduits.end(),
                       [&](const auto& item) { return item.second.from.index == point; });
}

/// Height of the lowest unit that discharges straight into a water, for its mouth.
std::optional<QPointF> outletInto(const WaterwayLayout& layout, const plant::Plant& plant,
                                  int water) {
    std::optional<QPointF> found;
    for (const auto& drawing : layout.units) {
        const auto& to = plant.units[drawing.unit].to;
        if (to.collection == Collection::reservoirs && to.index == water
            && (!found || drawing.outlet.y() > found->y())) {
            found = drawing.outlet;
        }
    }
    return found;
}

void layReservoirs(WaterwayLayout& layout, const LayoutInput& in) {
    const double lead = leadWidth(layout.plot.width(), in.look);
    for (int i = 0; i < in.plant.reservoirs.size(); ++i) {
        const auto& reservoir = in.plant.reservoirs[i];
        ReservoirDrawing drawing;
        drawing.reservoir = i;
        drawing.level_m = static_cast<std::size_t>(i) < in.level_m.size()
                              ? in.level_m[static_cast<std::size_t>(i)]
                              : reservoir.level_m;
        const auto* point = pointOf(in.plant, reservoir.at);
        const auto outlet = outletInto(layout, in.plant, i);
        if (point != nullptr) {
            const QPointF mouth = layout.at(point->chainage_m, point->elevation_m);
            drawing.tail = !beginsHere(in.plant, reservoir.at.index);
            const bool first = mouth.x() - layout.plot.left() < 1.6 * lead;
            drawing.left_px = drawing.tail ? mouth.x()
                              : first      ? layout.plot.left()
                                           : mouth.x() - lead;
            drawing.right_px = drawing.tail ? layout.plot.right() : mouth.x();
            layWater(layout, drawing, mouth.y(), !drawing.tail, in.look);
        } else if (outlet) {
            drawing.tail = true;
            drawing.right_px = layout.plot.right();
            drawing.left_px = outlet->x();
            if (layout.groundGiven) {
                drawing.left_px = shoreLeftOf(layout, *outlet, layout.scale.y_px(drawing.level_m),
                                              layout.plot.left());
            }
            layWater(layout, drawing, outlet->y(), false, in.look);
        } else {
            continue;
        }
        layout.reservoirs.push_back(std::move(drawing));
    }
}

void layGround(WaterwayLayout& layout, const LayoutInput& in) {
    layout.groundGiven = in.ground.size() >= 2;
    if (!layout.groundGiven) {
        return;
    }
    QPolygonF& line = layout.ground;
    for (const auto& [chainage, elevation] : in.ground) {
        line << layout.at(chainage, elevation);
    }
    // The plot is filled to its edges; what lies beyond is cut off by the painter.
    if (line.front().x() > layout.plot.left()) {
        line.prepend(QPointF(layout.plot.left(), line.front().y()));
    }
    if (line.back().x() < layout.plot.right()) {
        line.append(QPointF(layout.plot.right(), line.back().y()));
    }
}

} // namespace

double ConduitShape::halfWidth() const {
    double widest = 0.0;
    for (const auto& bore : bores) {
        widest = std::max(widest, bore.lining_px);
    }
    return widest / 2.0;
}

QPolygonF wayThrough(const UnitDrawing& unit) {
    const double beside = 1.6 * unit.radius_px;
    return {unit.inlet, unit.centre - QPointF(beside, 0), unit.centre,
            unit.centre + QPointF(beside, 0), unit.outlet};
}

double ChamberDrawing::halfWidth_px(double y_px) const {
    for (qsizetype i = 1; i < right.size(); ++i) {
        const double low = right[i - 1].y(), high = right[i].y();
        if (y_px <= low && y_px >= high) {
            const double share = low > high ? (low - y_px) / (low - high) : 0.0;
            return right[i - 1].x() + share * (right[i].x() - right[i - 1].x()) - x_px;
        }
    }
    return y_px > right.front().y() ? right.front().x() - x_px : right.back().x() - x_px;
}

plant::Rows axisOf(const plant::Plant& plant, const plant::Conduit& conduit) {
    const auto* from = pointOf(plant, conduit.from);
    const auto* to = pointOf(plant, conduit.to);
    if (from == nullptr || to == nullptr) {
        return {};
    }
    plant::Rows axis{{from->chainage_m, from->elevation_m}};
    axis.insert(axis.end(), conduit.axis.begin(), conduit.axis.end());
    axis.push_back({to->chainage_m, to->elevation_m});
    return axis;
}

double elevationOn(const plant::Rows& axis, double chainage_m) {
    for (std::size_t i = 1; i < axis.size(); ++i) {
        const auto& [a, low] = axis[i - 1];
        const auto& [b, high] = axis[i];
        if (chainage_m >= std::min(a, b) && chainage_m <= std::max(a, b) && a != b) {
            return low + (high - low) * (chainage_m - a) / (b - a);
        }
    }
    const bool nearFirst =
        std::abs(chainage_m - axis.front().first) <= std::abs(chainage_m - axis.back().first);
    return nearFirst ? axis.front().second : axis.back().second;
}

double leadWidth(double plotWidth_px, const Look& look) {
    return std::min(leadShare * plotWidth_px, 90.0 * look.scale);
}

QRectF plotArea(QSizeF size, const Look& look, double top_px, double bottom_px) {
    const double left = std::min(look.space.leftMargin, 0.4 * size.width());
    const double right = std::max(size.width() - look.space.rightMargin, left + 1.0);
    return {left, top_px, right - left, std::max(1.0, size.height() - top_px - bottom_px)};
}

WaterwayLayout waterwayLayout(const LayoutInput& in) {
    const bool drawn = in.plant.points.size() > 0;
    const double lead = drawn ? leadWidth(in.plot.width(), in.look) : 0.0;
    std::optional<double> lastGround;
    if (in.ground.size() >= 2) {
        lastGround = in.ground.back().first;
    }
    WaterwayLayout layout{
        in.plot,
        chainageMap(in.plant, in.plot.left(), in.plot.right(), lead, in.scales, lastGround),
        elevationScale(in),
        false,
        {},
        {},
        {},
        {},
        {}};
    layGround(layout, in);
    layConduits(layout, in);
    layChambers(layout, in);
    layUnits(layout, in);
    layReservoirs(layout, in);
    return layout;
}

} // namespace headroom::drawing
