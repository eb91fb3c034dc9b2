// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/axis_ticks.h"
#include "drawing/section_scene.h"
#include "drawing/words.h"

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace section {

plant::Path pathOf(const char* collection, const std::string& name) {
    return {"plant", collection, name};
}

bool selects(const plant::Path& selected, const plant::Path& thing) {
    return selected.size() >= thing.size() && !thing.empty()
           && std::equal(thing.begin(), thing.end(), selected.begin());
}

namespace {

/// Interpolation in a row of equally spaced values; clamps at the ends.
template <class At>
double between(double time_s, double interval_s, std::size_t count, const At& at) {
    const double last = static_cast<double>(count - 1);
    const double place = std::clamp(interval_s > 0.0 ? time_s / interval_s : 0.0, 0.0, last);
    const auto before = static_cast<std::size_t>(place);
    const std::size_t after = std::min(before + 1, count - 1);
    const double share = place - static_cast<double>(before);
    return (1.0 - share) * at(before) + share * at(after);
}

} // namespace

double valueAt(const results::Channel& channel, double interval_s, double time_s) {
    const auto& values = channel.trace.last;
    if (values.empty() || !std::isfinite(time_s)) {
        return channel.atRest;
    }
    return between(time_s, interval_s, values.size(),
                   [&](std::size_t i) { return static_cast<double>(values[i]); });
}

double headAt(const results::Envelope& envelope, double interval_s, std::size_t station,
              double time_s) {
    const std::size_t stations = envelope.chainage_m.size();
    const std::size_t instants = stations > 0 ? envelope.line_m.size() / stations : 0;
    if (instants == 0 || !std::isfinite(time_s)) {
        return station < envelope.rest_m.size() ? envelope.rest_m[station] : std::nan("");
    }
    return between(time_s, interval_s, instants, [&](std::size_t i) {
        return static_cast<double>(envelope.line_m[i * stations + station]);
    });
}

namespace {

void addTicks(Making& making) {
    auto& scene = making.scene;
    const auto& scale = scene.layout.scale;
    const double spacing = 2.6 * scene.look.lineHeight(TextSize::small);
    const int most = std::max(1, static_cast<int>((scale.bottom_px - scale.top_px) / spacing));
    const auto values = roundValues(scale.elevation_m(scene.layout.plot.bottom()),
                                    scale.elevation_m(scene.layout.plot.top()), most);
    for (const double value : values) {
        const bool top = value == values.back();
        scene.ticks.push_back({scale.y_px(value), top ? wholeAmount(Quantity::elevation, value)
                                                      : wholeAmount(Quantity::count, value)});
    }
}

} // namespace

} // namespace section

SectionPicture sectionPicture(const SectionInput& input) {
    Shown what = shown(input.snapshot, input.inHand, input.selection);
    const auto bounds = headBounds(*what.variant, what.loadClass, what.verdicts);
    const auto plot = plotArea(input.size, input.look, 2.0, 2.0);
    auto layout =
        waterwayLayout({what.variant->plant, input.snapshot.project().ground, what.level_m(),
                        section::elevationsOf(what, bounds), plot, input.look, input.scales});
    auto scene = std::make_shared<SectionPicture::Scene>(input.look, input.size, std::move(layout));
    scene->shown = std::move(what);
    const auto& plant = scene->shown.variant->plant;
    scene->empty = plant.points.empty() && plant.conduits.empty() && plant.reservoirs.empty();

    SectionPicture picture;
    section::Making making{input, *scene, picture.items, LabelPlacer(plot.adjusted(2, 2, -2, -2))};
    if (scene->empty) {
        section::makeEmpty(making);
    } else {
        section::addTicks(making);
        section::addBodies(making);
        section::addResults(making, bounds);
        section::addLabels(making, bounds);
    }
    picture.labelsLeftOut = making.leftOut;
    picture.scene_ = std::move(scene);
    return picture;
}

const ChainageMap& SectionPicture::map() const {
    return scene_->layout.map;
}

double SectionPicture::y_px(double elevation_m) const {
    return scene_->layout.scale.y_px(elevation_m);
}

double SectionPicture::elevation_m(double y_px) const {
    return scene_->layout.scale.elevation_m(y_px);
}

QString SectionPicture::description(double time_s) const {
    return section::describe(*scene_, time_s);
}

} // namespace headroom::drawing
