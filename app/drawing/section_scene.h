// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/head_bounds.h"
#include "drawing/label_placer.h"
#include "drawing/marks.h"
#include "drawing/section_picture.h"
#include "drawing/shown.h"
#include "drawing/texture.h"
#include "drawing/waterway_layout.h"

#include <optional>

namespace headroom::drawing {

struct Tick {
    double at_px = 0.0;
    QString label;
};
struct BoundDrawing {
    int limit = -1;
    QPolygonF line, zone;
    Texture texture = Texture::hatch;
    bool guide = false; ///< straight between places: thin and broken, it does not judge there
};
struct LozengeDrawing {
    int limit = -1;
    QPointF at;
    std::optional<QPointF> computed; ///< where the head itself is, if an allowance was added
    MarkState mark = MarkState::held;
    bool leading = false;
};
struct HeadLine {
    const results::Envelope* envelope = nullptr;
    std::vector<int> stations; ///< those that are drawn, at most one a pixel or so
    std::vector<double> x_px;
};
struct MovingLevel {
    std::size_t chamber = 0; ///< position among the layout's chambers
    const results::Channel* channel = nullptr;
    QRectF labelBox; ///< kept free for the level at the cursor; null: no room
};
struct Turning {
    std::size_t unit = 0;
    std::vector<float> turns; ///< turned until each recording instant, slowed down for the eye
};

/// All that the painters need; made once, then only read.
struct SectionPicture::Scene {
    explicit Scene(const Look& style, QSizeF extent, WaterwayLayout&& where)
        : look(style), size(extent), layout(std::move(where)) {}

    const Look& look;
    QSizeF size;
    WaterwayLayout layout;
    bool empty = false;
    Shown shown;
    QPolygonF emptyGround, emptyLake;
    std::vector<QRectF> actions;

    std::vector<Tick> ticks;
    std::vector<std::pair<QPolygonF, QPolygonF>> envelopes; ///< greatest, least
    std::vector<BoundDrawing> bounds;
    std::vector<LozengeDrawing> lozenges;
    std::vector<Label> labels;
    QPainterPath highlight; ///< outline of what is selected

    std::vector<HeadLine> headLines;
    std::vector<MovingLevel> levels;
    std::vector<Turning> turning;
    QRectF clockBox; ///< kept free for "head line at 151.0 s"
};

/// The steps of making a Section, in this order.
namespace section {

using Scene = SectionPicture::Scene;

struct Making {
    const SectionInput& input;
    Scene& scene;
    Items& items;
    LabelPlacer placer;
    int leftOut = 0;
};

void addBodies(Making& making); ///< ground, waters, conduits, chambers, units as items
void addResults(Making& making, const HeadBounds& bounds); ///< envelope, bounds, lozenges, motion
void addLabels(Making& making, const HeadBounds& bounds);
void makeEmpty(Making& making);
std::vector<double> elevationsOf(const Shown& shown, const HeadBounds& bounds);

/// Value of a channel at a time, straight between instants; `atRest` without a trace.
double valueAt(const results::Channel& channel, double interval_s, double time_s);
/// Head at a station at a time.
double headAt(const results::Envelope& envelope, double interval_s, std::size_t station,
              double time_s);
/// Path of a thing in the project: {"plant", "chambers", "Surge shaft"}.
plant::Path pathOf(const char* collection, const std::string& name);
/// Whether the selected path is this thing or something in it.
bool selects(const plant::Path& selected, const plant::Path& thing);
QString describe(const Scene& scene, double time_s);

} // namespace section

} // namespace headroom::drawing
