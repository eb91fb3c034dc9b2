// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/look.h"

#include "drawing/look_schemes.h"

#include <QFontMetricsF>

#include <algorithm>
#include <cmath>
#include <map>
#include <utility>

namespace headroom::drawing {

namespace {

constexpr double leastScale = 0.5, greatestScale = 4.0;

/// Heights of letters in logical pixels (3/4 of them in points).
double pixels(TextSize size) {
    switch (size) {
    case TextSize::small:
        return 12.0;
    case TextSize::body:
        return 13.0;
    case TextSize::heading:
        return 15.0;
    case TextSize::sentence:
        return 18.0;
    }
    return 13.0;
}

void scaleAll(Look& look) {
    auto& s = look.space;
    for (double* value :
         {&s.leftMargin, &s.rightMargin, &s.laneGutter, &s.unit, &s.row, &s.bar, &s.mark,
          &s.sentenceMark, &s.target, &s.textureStep, &s.textureDepth, &s.corner}) {
        *value *= look.scale;
    }
    auto& w = look.width;
    for (double* value :
         {&w.hair, &w.data, &w.inHand, &w.selected, &w.lining, &w.water, &w.focus}) {
        *value *= look.scale;
    }
}

} // namespace

QPen Look::pen(const QColor& colour, double penWidth) const {
    QPen pen(colour, penWidth);
    pen.setCapStyle(Qt::FlatCap);
    pen.setJoinStyle(Qt::RoundJoin);
    return pen;
}

QPen Look::runPen(int run) const {
    const auto index = static_cast<std::size_t>(std::clamp(run, 0, runColourCount - 1));
    QPen made = pen(runs[index], run == 0 ? width.inHand : width.data);
    if (scheme == Scheme::print && !dashes[index].isEmpty()) {
        made.setDashPattern(dashes[index]);
    }
    return made;
}

QFont Look::font(TextSize size, TextWeight weight) const {
    QFont made(fontFamily());
    made.setPixelSize(std::max(1, static_cast<int>(std::lround(pixels(size) * scale))));
    made.setWeight(weight == TextWeight::strong ? QFont::DemiBold : QFont::Normal);
    return made;
}

double Look::lineHeight(TextSize size) const {
    return QFontMetricsF(font(size)).height();
}

const Look& look(Scheme scheme, double scale) {
    static std::map<std::pair<Scheme, double>, Look> made; // nodes stay where they are
    const double kept = std::isfinite(scale) ? std::clamp(scale, leastScale, greatestScale) : 1.0;
    const auto key = std::pair(scheme, kept);
    auto found = made.find(key);
    if (found == made.end()) {
        Look fresh = colours(scheme);
        fresh.scale = kept;
        scaleAll(fresh);
        found = made.emplace(key, std::move(fresh)).first;
    }
    return found->second;
}

} // namespace headroom::drawing
