// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"

#include <algorithm>
#include <cmath>

/// The empty sheet: an unpeopled ground line, a pale reservoir, and the ways to begin.
namespace headroom::drawing::section {

namespace {

constexpr const char* firstWords = "Start where the water does.";

struct Action {
    const char* words;
    const char* says;
};
constexpr Action actions[] = {
    {openDemoWords, "Dorvane, ready to run"},
    {openProjectWords, "a file of your own"},
};

void makeGround(Scene& scene) {
    const QRectF& plot = scene.layout.plot;
    // Shares of width and height: a lake left, a ridge, a valley right.
    const std::pair<double, double> corners[] = {
        {0.00, 0.42}, {0.02, 0.50}, {0.08, 0.60}, {0.13, 0.56}, {0.17, 0.40},
        {0.26, 0.30}, {0.36, 0.34}, {0.46, 0.27}, {0.56, 0.38}, {0.66, 0.60},
        {0.76, 0.80}, {0.88, 0.86}, {1.00, 0.85}};
    for (const auto& [x, y] : corners) {
        scene.emptyGround << QPointF(plot.left() + x * plot.width(),
                                     plot.top() + (0.40 + 0.6 * y) * plot.height());
    }
    const double level = plot.top() + (0.40 + 0.6 * 0.48) * plot.height();
    QPolygonF lake{{plot.left() + 0.0155 * plot.width(), level}};
    lake << scene.emptyGround[1] << scene.emptyGround[2] << scene.emptyGround[3];
    lake << QPointF(plot.left() + 0.15 * plot.width(), level);
    scene.emptyLake = lake;
}

void put(Making& making, Label label, const QString& said) {
    Item item;
    item.kind = ItemKind::label;
    item.box = label.box;
    item.shape.addRect(label.box);
    item.label = label.text;
    item.description = said;
    making.items.push_back(std::move(item));
    making.scene.labels.push_back(std::move(label));
}

void makeActions(Making& making, double top) {
    auto& scene = making.scene;
    const auto& look = scene.look;
    const double gap = 3 * look.space.unit;
    double wide = 0.0;
    for (const auto& action : actions) {
        const QFont strong = look.font(TextSize::body, TextWeight::strong);
        wide = std::max(
            {wide, textSize(QString::fromUtf8(action.words), strong).width(),
             textSize(QString::fromUtf8(action.says), look.font(TextSize::small)).width()});
    }
    wide += 2 * gap;
    const double first = look.lineHeight(TextSize::body), second = look.lineHeight(TextSize::small);
    const double high = first + second + gap;
    const QRectF& plot = scene.layout.plot;
    const double count = static_cast<double>(std::size(actions));
    const bool row = count * wide + (count - 1) * gap <= plot.width();
    double x = plot.center().x() - (row ? (count * wide + (count - 1) * gap) / 2 : wide / 2),
           y = top;
    for (const auto& action : actions) {
        const QRectF frame(x, y, wide, high);
        if (!plot.contains(frame)) {
            return;
        }
        scene.actions.push_back(frame);
        const QString words = QString::fromUtf8(action.words),
                      says = QString::fromUtf8(action.says);
        const auto line = [&](const QString& what, double at, TextSize size, TextWeight weight) {
            const QSizeF extent = textSize(what, look.font(size, weight));
            return QRectF(frame.center().x() - extent.width() / 2, at, extent.width(),
                          extent.height());
        };
        put(making,
            {words, line(words, y + gap / 2, TextSize::body, TextWeight::strong), TextSize::body,
             TextWeight::strong},
            words + QStringLiteral(": ") + says);
        making.items.back().box = frame; // the whole frame is pressed
        making.items.back().shape = QPainterPath();
        making.items.back().shape.addRect(frame);
        scene.labels.push_back(
            quietLabel(says, line(says, y + gap / 2 + first, TextSize::small, TextWeight::normal)));
        x += row ? wide + gap : 0.0;
        y += row ? 0.0 : high + gap / 2;
    }
}

} // namespace

void makeEmpty(Making& making) {
    auto& scene = making.scene;
    makeGround(scene);
    const QString words = QString::fromUtf8(firstWords);
    const QSizeF size = textSize(words, scene.look.font(TextSize::sentence, TextWeight::strong));
    const QRectF& plot = scene.layout.plot;
    const QRectF box(
        QPointF(plot.center().x() - size.width() / 2, plot.top() + 0.06 * plot.height()), size);
    if (plot.contains(box)) {
        put(making, {words, box, TextSize::sentence, TextWeight::strong},
            QStringLiteral("Empty project. ") + words);
    }
    makeActions(making, box.bottom() + 3 * scene.look.space.unit);
}

} // namespace headroom::drawing::section
