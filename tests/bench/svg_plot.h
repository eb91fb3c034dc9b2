// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <string>
#include <utility>
#include <vector>

/// A small double-logarithmic picture, enough to show an order of convergence.
namespace headroom::bench {

struct Curve {
    std::string name;
    std::vector<std::pair<double, double>> points; ///< both > 0
};

struct LogPlot {
    std::string title, xLabel, yLabel;
    std::vector<Curve> curves;
    double guideSlope = 2.0; ///< a thin line of this slope through the first curve's last point
};

/// The picture as SVG text.
std::string svg(const LogPlot& plot);

} // namespace headroom::bench
