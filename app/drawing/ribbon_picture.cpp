// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/axis_ticks.h"
#include "drawing/head_bounds.h"
#include "drawing/marks.h"
#include "drawing/ribbon_scene.h"
#include "drawing/shown.h"
#include "drawing/words.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::drawing {

namespace {

using Scene = RibbonPicture::Scene;

constexpr double leastScale_m = 10.0;
const double none = std::numeric_limits<double>::quiet_NaN();

struct Making {
    const SectionInput& input;
    Scene& scene;
    Items& items;
    Shown what;
    LabelPlacer placer;
};

/// Metres left along one conduit, at its stations.
struct Margins {
    int conduit = -1;
    std::vector<double> chainage_m, upper_m, lower_m, axis_m; ///< NaN where no limit is near
};

double nearest(const HeadBounds& bounds, int conduit, bool upper, double chainage, double head) {
    double best = none;
    for (const auto& line : bounds.lines) {
        const bool judges =
            line.conduit == conduit && line.upper == upper && line.places.size() > 1;
        if (judges && line.covers(chainage)) {
            const double bound = line.effective_m(chainage);
            best = std::fmin(best, upper ? bound - head : head - bound); // fmin passes NaN by
        }
    }
    return best;
}

std::vector<Margins> marginsOf(const Shown& what, const HeadBounds& bounds) {
    std::vector<Margins> out;
    if (what.run == nullptr) {
        return out;
    }
    for (const auto& envelope : what.run->envelopes) {
        const std::size_t count = envelope.chainage_m.size();
        if (envelope.conduit < 0 || envelope.conduit >= what.variant->plant.conduits.size()
            || envelope.least_m.size() != count || envelope.greatest_m.size() != count) {
            continue;
        }
        const auto axis =
            axisOf(what.variant->plant, what.variant->plant.conduits[envelope.conduit]);
        Margins margins{envelope.conduit, envelope.chainage_m, {}, {}, {}};
        for (std::size_t i = 0; i < count; ++i) {
            const double at = envelope.chainage_m[i];
            margins.upper_m.push_back(
                nearest(bounds, envelope.conduit, true, at, envelope.greatest_m[i]));
            margins.lower_m.push_back(
                nearest(bounds, envelope.conduit, false, at, envelope.least_m[i]));
            margins.axis_m.push_back(axis.empty() ? none
                                                  : envelope.least_m[i] - elevationOn(axis, at));
        }
        out.push_back(std::move(margins));
    }
    return out;
}

// --- bands --------------------------------------------------------------------------------------

double heightOf(const Scene& scene, double margin_m, bool upper) {
    const double limit = scene.chart.height() / 2.0;
    const double px = std::clamp(margin_m * scene.pixelsPerMetre, -limit, limit);
    return upper ? scene.zero_y - px : scene.zero_y + px;
}

void addBand(Scene& scene, const std::vector<QPointF>& edge, bool toAxis) {
    if (edge.size() < 2) {
        return;
    }
    RibbonBand band;
    band.toAxis = toAxis;
    for (const QPointF& point : edge) {
        band.edge << point;
    }
    band.body = band.edge;
    band.body << QPointF(edge.back().x(), scene.zero_y) << QPointF(edge.front().x(), scene.zero_y);
    scene.bands.push_back(std::move(band));
}

/// Splits the values into stretches without NaN; one point a pixel or so is enough.
void addBands(Scene& scene, const Margins& margins, const std::vector<double>& values, bool upper,
              bool toAxis) {
    std::vector<QPointF> edge;
    for (std::size_t i = 0; i < values.size(); ++i) {
        if (!std::isfinite(values[i])) {
            addBand(scene, edge, toAxis);
            edge.clear();
            continue;
        }
        const QPointF at(scene.map.x_px(margins.chainage_m[i]), heightOf(scene, values[i], upper));
        const bool last = i + 1 == values.size() || !std::isfinite(values[i + 1]);
        if (edge.empty() || last || std::abs(at.x() - edge.back().x()) >= 1.0) {
            edge.push_back(at);
        }
    }
    addBand(scene, edge, toAxis);
}

std::vector<double> whereNone(const std::vector<double>& limits,
                              const std::vector<double>& instead) {
    std::vector<double> out;
    for (std::size_t i = 0; i < limits.size(); ++i) {
        // One station of overlap, so that the two bands meet.
        const bool before = i > 0 && !std::isfinite(limits[i - 1]);
        const bool after = i + 1 < limits.size() && !std::isfinite(limits[i + 1]);
        out.push_back(!std::isfinite(limits[i]) || before || after ? instead[i] : none);
    }
    return out;
}

QString leastWords(const std::vector<double>& values, const std::vector<double>& chainage,
                   const char* side) {
    std::size_t best = values.size();
    for (std::size_t i = 0; i < values.size(); ++i) {
        if (std::isfinite(values[i]) && (best == values.size() || values[i] < values[best])) {
            best = i;
        }
    }
    if (best == values.size()) {
        return QStringLiteral("no %1 limit").arg(QLatin1String(side));
    }
    return QStringLiteral("%1 left to the %2 limit at chainage %3")
        .arg(signedMargin(Quantity::head, values[best]), QLatin1String(side),
             wholeAmount(Quantity::chainage, chainage[best]));
}

void addConduit(Making& making, const Margins& margins) {
    auto& scene = making.scene;
    const std::size_t first = scene.bands.size();
    addBands(scene, margins, whereNone(margins.lower_m, margins.axis_m), false, true);
    addBands(scene, margins, margins.upper_m, true, false);
    addBands(scene, margins, margins.lower_m, false, false);
    Item item;
    item.kind = ItemKind::ribbon;
    const auto& name = making.what.variant->plant.conduits.name(margins.conduit);
    item.thing = {"plant", "conduits", name};
    for (std::size_t i = first; i < scene.bands.size(); ++i) {
        item.shape.addPolygon(scene.bands[i].body);
        making.placer.avoid(scene.bands[i].edge, 1.0);
    }
    item.box = item.shape.boundingRect();
    item.description =
        QStringLiteral("%1: %2; %3")
            .arg(text(name), leastWords(margins.upper_m, margins.chainage_m, "upper"),
                 leastWords(margins.lower_m, margins.chainage_m, "lower"));
    making.items.push_back(std::move(item));
}

// --- marks of single limits ---------------------------------------------------------------------

std::optional<double> chainageOf(const plant::Plant& plant, const results::Place& place) {
    int point = place.thing == results::Thing::point ? place.index : -1;
    if (place.thing == results::Thing::chamber && place.index < plant.chambers.size()) {
        point = plant.chambers[place.index].at.index;
    }
    if (point >= 0 && point < plant.points.size()) {
        return plant.points[point].chainage_m;
    }
    return place.thing == results::Thing::conduit ? std::optional(place.chainage_m) : std::nullopt;
}

bool onRibbon(const results::Verdict& verdict) {
    const bool asHead = verdict.measure == Measure::level || verdict.measure == Measure::head
                        || verdict.measure == Measure::pressureHead;
    return asHead && std::isfinite(verdict.margin) && verdict.mark != results::Mark::notApplicable
           && verdict.mark != results::Mark::notRun;
}

void addMark(Making& making, const results::Verdict& verdict, bool leading) {
    auto& scene = making.scene;
    const auto chainage = chainageOf(making.what.variant->plant, verdict.place);
    if (!chainage) {
        return;
    }
    const auto& limits = making.what.variant->limits;
    const QPointF at(scene.map.x_px(*chainage), heightOf(scene, verdict.margin, verdict.upper));
    scene.marks.push_back({at, verdict.limit, scene.look.mark(markOf(verdict.mark)), leading});
    const double half = 2 * scene.look.space.unit;
    const QRectF bar(at.x() - half, at.y() - 2, 2 * half, 4);
    making.placer.avoid(bar);
    const QString words = signedMargin(Quantity::head, verdict.margin);
    const auto weight = leading ? TextWeight::strong : TextWeight::normal;
    const QSizeF size = textSize(words, scene.look.font(TextSize::small, weight));
    auto places = around(bar, size, 0.5 * scene.look.space.unit);
    std::rotate(places.begin(), places.begin() + 2, places.begin() + 4); // beside, then above
    Item item;
    item.kind = ItemKind::ribbon;
    item.limit = verdict.limit;
    item.time_s = verdict.time_s;
    item.thing = {"limits", limits.name(verdict.limit)};
    item.box = bar;
    item.description =
        spokenVerdict(text(limits.name(verdict.limit)), limits[verdict.limit], verdict);
    if (const auto box = making.placer.place(places)) {
        scene.labels.push_back({words, *box, TextSize::small, weight, !leading, false, {}});
        item.label = words;
        item.box = bar.united(*box);
    }
    item.shape.addRect(item.box);
    making.items.push_back(std::move(item));
}

void addMarks(Making& making) {
    const auto* leading = making.what.leading(making.input.selection.limit);
    if (leading != nullptr && onRibbon(*leading)) {
        addMark(making, *leading, true);
    }
    for (const auto& verdict : making.what.verdicts) {
        if (&verdict != leading && onRibbon(verdict)) {
            addMark(making, verdict, false);
        }
    }
}

// --- scale, captions, ruler ---------------------------------------------------------------------

void chooseScale(Scene& scene, const std::vector<Margins>& all, const Shown& what) {
    double most = leastScale_m;
    const auto take = [&](double value) {
        most = std::isfinite(value) ? std::max(most, std::abs(value)) : most;
    };
    for (const auto& margins : all) {
        std::for_each(margins.upper_m.begin(), margins.upper_m.end(), take);
        std::for_each(margins.lower_m.begin(), margins.lower_m.end(), take);
    }
    for (const auto& verdict : what.verdicts) {
        take(onRibbon(verdict) ? verdict.margin : 0.0);
    }
    scene.pixelsPerMetre = 0.46 * scene.chart.height() / most;
    const double half_m = 0.5 * scene.chart.height() / scene.pixelsPerMetre;
    const double line_m = 1.1 * scene.look.lineHeight(TextSize::small) / scene.pixelsPerMetre;
    scene.ticks.emplace_back(scene.zero_y, QStringLiteral("0"));
    double before = 0.0;
    for (const double value : roundValues(0.0, half_m, 3)) {
        if (value - before >= line_m && value + 0.35 * line_m <= half_m) {
            before = value;
            const QString label = text(printNumber(Quantity::head, value, {}, 0));
            scene.ticks.emplace_back(scene.zero_y - value * scene.pixelsPerMetre, label);
            scene.ticks.emplace_back(scene.zero_y + value * scene.pixelsPerMetre, label);
        }
    }
}

void addCaption(Making& making, const QString& words, bool upper) {
    auto& scene = making.scene;
    const QSizeF size = textSize(words, scene.look.font(TextSize::small));
    const double outer = upper ? scene.chart.top() + 1 : scene.chart.bottom() - size.height() - 1;
    const double inner = upper ? scene.zero_y - size.height() - 2 : scene.zero_y + 2;
    std::vector<QRectF> places;
    for (const double share : {0.02, 0.12, 0.25, 0.40, 0.55, 0.70}) {
        for (const double y : {outer, inner}) {
            places.push_back(
                QRectF(QPointF(scene.chart.left() + share * scene.chart.width(), y), size));
        }
    }
    if (const auto box = making.placer.place(places)) {
        scene.labels.push_back(quietLabel(words, *box));
        Item item;
        item.kind = ItemKind::label;
        item.box = *box;
        item.shape.addRect(*box);
        item.label = item.description = words;
        making.items.push_back(std::move(item));
    }
}

void addTick(Making& making, double chainage, bool withUnit, std::vector<QRectF>& taken) {
    auto& scene = making.scene;
    const double x = scene.map.x_px(chainage);
    const QString label = withUnit ? wholeAmount(Quantity::chainage, chainage)
                                   : wholeAmount(Quantity::count, chainage);
    const QSizeF size = textSize(label, scene.look.font(TextSize::small));
    QRectF box(QPointF(x - size.width() / 2, scene.ruler_y + 1.2 * scene.look.space.unit), size);
    const QRectF wide = box.adjusted(-6, 0, 6, 0);
    const bool crowded = std::any_of(taken.begin(), taken.end(),
                                     [&](const QRectF& other) { return other.intersects(wide); });
    if (crowded || box.left() < 0 || box.right() > making.input.size.width()) {
        scene.ruler.push_back({x, {}, {}});
        return;
    }
    taken.push_back(box);
    scene.ruler.push_back({x, label, box});
}

void addRuler(Making& making) {
    auto& scene = making.scene;
    const auto& spans = scene.map.spans();
    std::vector<QRectF> taken;
    std::vector<std::pair<double, bool>> edges; // chainage, last one to scale
    for (const auto& span : spans) {
        if (span.kind != Span::Kind::lead && span.kind != Span::Kind::bay) {
            edges.emplace_back(span.from_m, false);
            edges.emplace_back(span.to_m, false);
        }
    }
    if (!edges.empty()) {
        edges.back().second = true;
    }
    double before = std::nan("");
    for (auto edge = edges.rbegin(); edge != edges.rend(); ++edge) {
        if (edge->first != before) {
            addTick(making, edge->first, edge->second, taken);
        }
        before = edge->first;
    }
    for (int i = 0; i < static_cast<int>(spans.size()); ++i) {
        const auto& span = spans[static_cast<std::size_t>(i)];
        const double width = scene.map.to_px(i) - scene.map.from_px(i);
        scene.spanEdges_px.push_back(scene.map.from_px(i));
        if (span.kind != Span::Kind::lead && span.kind != Span::Kind::bay) {
            const int most = std::max(1, static_cast<int>(width / (66.0 * scene.look.scale)));
            for (const double value : roundValues(span.from_m, span.to_m, most)) {
                addTick(making, value, false, taken);
            }
        }
    }
}

void addRulerWords(Making& making) {
    auto& scene = making.scene;
    const double line = scene.look.lineHeight(TextSize::small);
    const double y = scene.ruler_y + 1.2 * scene.look.space.unit + line;
    LabelPlacer placer(QRectF(0, y - 1, making.input.size.width(), 1.2 * line + 2));
    for (int i = 0; i < static_cast<int>(scene.map.spans().size()); ++i) {
        QString words = scene.map.compressionWords(i);
        const auto& span = scene.map.spans()[static_cast<std::size_t>(i)];
        if (span.kind == Span::Kind::bay) {
            words = QStringLiteral("unit bay, ") + words;
        }
        if (words.isEmpty()) {
            continue;
        }
        const QSizeF size = textSize(words, scene.look.font(TextSize::small));
        const double middle = (scene.map.from_px(i) + scene.map.to_px(i)) / 2;
        const double right = making.input.size.width() - size.width();
        const auto box =
            placer.place({QRectF(QPointF(middle - size.width() / 2, y), size),
                          QRectF(QPointF(std::min(scene.map.from_px(i), right), y), size),
                          QRectF(QPointF(scene.map.to_px(i) - size.width(), y), size)});
        if (!box) {
            continue;
        }
        scene.labels.push_back(quietLabel(words, *box));
        Item item;
        item.kind = ItemKind::label;
        item.box = *box;
        item.shape.addRect(*box);
        item.label = item.description = words;
        making.items.push_back(std::move(item));
    }
}

void addRulerItem(Making& making) {
    auto& scene = making.scene;
    Item item;
    item.kind = ItemKind::ruler;
    item.box = QRectF(scene.chart.left(), scene.ruler_y, scene.chart.width(),
                      making.input.size.height() - scene.ruler_y);
    item.shape.addRect(item.box);
    item.description = QStringLiteral("Ruler of chainages");
    for (int i = 0; i < static_cast<int>(scene.map.spans().size()); ++i) {
        const QString words = scene.map.compressionWords(i);
        const auto& span = scene.map.spans()[static_cast<std::size_t>(i)];
        if (!words.isEmpty() && !span.name.isEmpty()) {
            item.description += QStringLiteral("; %1 %2").arg(span.name, words);
        }
    }
    making.items.insert(making.items.begin(), std::move(item));
}

} // namespace

RibbonPicture ribbonPicture(const SectionInput& input) {
    const double text_px = input.look.lineHeight(TextSize::small);
    const double below = 2 * text_px + 2.2 * input.look.space.unit;
    const QRectF chart = plotArea(input.size, input.look, 2.0, below);
    Shown what = shown(input.snapshot, input.inHand, input.selection);
    const auto& ground = input.snapshot.project().ground;
    const double lead =
        what.variant->plant.points.empty() ? 0.0 : leadWidth(chart.width(), input.look);
    std::optional<double> lastGround;
    if (ground.size() >= 2) {
        lastGround = ground.back().first;
    }
    auto scene = std::make_shared<RibbonPicture::Scene>(
        input.look, chainageMap(what.variant->plant, chart.left(), chart.right(), lead,
                                input.scales, lastGround));
    scene->chart = chart;
    scene->zero_y = chart.center().y();
    scene->ruler_y = chart.bottom() + 0.5 * input.look.space.unit;
    RibbonPicture picture;
    Making making{input, *scene, picture.items, std::move(what), LabelPlacer(chart)};
    if (making.what.variant->plant.points.empty()) {
        picture.scene_ = std::move(scene);
        return picture;
    }
    const auto bounds =
        headBounds(*making.what.variant, making.what.loadClass, making.what.verdicts);
    const auto margins = marginsOf(making.what, bounds);
    chooseScale(*scene, margins, making.what);
    for (const auto& conduit : margins) {
        addConduit(making, conduit);
    }
    making.placer.avoid(QPolygonF{{chart.left(), scene->zero_y}, {chart.right(), scene->zero_y}},
                        1.0);
    addMarks(making);
    if (making.what.run != nullptr) {
        addCaption(making, QStringLiteral("metres left to the upper limit"), true);
        addCaption(making, QStringLiteral("metres left to the lower limit; pale: above the axis"),
                   false);
    } else {
        addCaption(making, QStringLiteral("no run to show: metres left to the limits stand here"),
                   true);
    }
    addRuler(making);
    addRulerWords(making);
    addRulerItem(making);
    picture.scene_ = std::move(scene);
    return picture;
}

} // namespace headroom::drawing
