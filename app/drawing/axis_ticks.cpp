// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/axis_ticks.h"

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

std::vector<double> roundValues(double low, double high, int most) {
    std::vector<double> out;
    if (!(high > low) || !std::isfinite(high - low) || most < 1) {
        return out;
    }
    const double rough = (high - low) / most;
    const double power = std::pow(10.0, std::floor(std::log10(rough)));
    double step = 10.0 * power;
    for (const double times : {1.0, 2.0, 5.0}) {
        if (times * power >= rough) {
            step = times * power;
            break;
        }
    }
    const double first = std::ceil(low / step);
    for (double index = first; index * step <= high && static_cast<int>(out.size()) < most + 1;
         index += 1.0) {
        out.push_back(index * step + 0.0); // never −0
    }
    return out;
}

} // namespace headroom::drawing
