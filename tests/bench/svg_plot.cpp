// SPDX-License-Identifier: GPL-3.0-or-later
#include "svg_plot.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace headroom::bench {

namespace {

constexpr double width = 640, height = 440, left = 80, right = 20, top = 40, bottom = 50;
constexpr std::array inks{"black", "dimgray", "darkorange", "steelblue"};
constexpr std::array dashes{"", "6 4", "2 3", "8 3 2 3"};

struct Range {
    double low = 1e300, high = -1e300;
    void add(double value) {
        low = std::min(low, value);
        high = std::max(high, value);
    }
};

struct Scale {
    Range x, y;
    double px(double value) const {
        return left + (std::log10(value) - x.low) / (x.high - x.low) * (width - left - right);
    }
    double py(double value) const {
        return height - bottom - (std::log10(value) - y.low) / (y.high - y.low) * (height - top - bottom);
    }
};

Scale scaleOf(const LogPlot& plot) {
    Scale scale;
    for (const auto& curve : plot.curves) {
        for (const auto& [x, y] : curve.points) {
            scale.x.add(std::log10(x));
            scale.y.add(std::log10(y));
        }
    }
    scale.x.low -= 0.1;
    scale.x.high += 0.1;
    scale.y.low = std::floor(scale.y.low);
    scale.y.high = std::ceil(scale.y.high);
    return scale;
}

std::string grid(const Scale& scale) {
    std::string out;
    for (double power = scale.y.low; power <= scale.y.high; power += 1.0) {
        const double y = scale.py(std::pow(10.0, power));
        out += fmt::format("<line x1='{}' x2='{}' y1='{:.1f}' y2='{:.1f}' stroke='lightgray'/>\n", left,
                           width - right, y, y);
        out += fmt::format("<text x='{}' y='{:.1f}' text-anchor='end'>1e{:.0f}</text>\n", left - 8,
                           y + 4, power);
    }
    return out;
}

std::string curveText(const Curve& curve, const Scale& scale, std::size_t index) {
    std::string points;
    for (const auto& [x, y] : curve.points) {
        points += fmt::format("{:.1f},{:.1f} ", scale.px(x), scale.py(y));
    }
    std::string out = fmt::format(
        "<polyline points='{}' fill='none' stroke='{}' stroke-width='1.5' stroke-dasharray='{}'/>\n",
        points, inks[index % inks.size()], dashes[index % dashes.size()]);
    const auto& [x, y] = curve.points.front();
    out += fmt::format("<text x='{:.1f}' y='{:.1f}' text-anchor='end'>{}</text>\n", scale.px(x) - 6,
                       scale.py(y) - 6, curve.name);
    for (const auto& [at, value] : curve.points) {
        out += fmt::format("<text x='{:.1f}' y='{}' text-anchor='middle'>{:g}</text>\n", scale.px(at),
                           height - bottom + 18, at);
    }
    return out;
}

} // namespace

std::string svg(const LogPlot& plot) {
    const auto scale = scaleOf(plot);
    std::string out = fmt::format("<svg xmlns='http://www.w3.org/2000/svg' width='{}' height='{}' "
                                  "font-family='sans-serif' font-size='11'>\n", width, height);
    out += fmt::format("<text x='{}' y='20' font-size='13'>{}</text>\n", left, plot.title);
    out += grid(scale);
    for (std::size_t i = 0; i < plot.curves.size(); ++i) {
        out += curveText(plot.curves[i], scale, i);
    }
    const auto& [x0, y0] = plot.curves.front().points.back();
    const double x1 = plot.curves.front().points.front().first;
    const double y1 = y0 * std::pow(x1 / x0, plot.guideSlope);
    out += fmt::format("<line x1='{:.1f}' y1='{:.1f}' x2='{:.1f}' y2='{:.1f}' stroke='gray' "
                       "stroke-dasharray='1 3'/>\n", scale.px(x0), scale.py(y0), scale.px(x1), scale.py(y1));
    out += fmt::format("<text x='{}' y='{}' text-anchor='middle'>{}</text>\n", width / 2, height - 10,
                       plot.xLabel);
    out += fmt::format("<text x='14' y='{}' transform='rotate(-90 14 {})' text-anchor='middle'>{}"
                       "</text>\n</svg>\n", height / 2, height / 2, plot.yLabel);
    return out;
}

} // namespace headroom::bench
