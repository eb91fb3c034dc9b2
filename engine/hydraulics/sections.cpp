// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/sections.h"

#include "base/constants.h"
#include "base/ensure.h"
#include "numerics/elementary.h"

namespace headroom::hydraulics {

using constants::pi;

double Section::equalAreaDiameter_m() const {
    return numerics::sqrt(4.0 * area_m2 / pi);
}

Section circle(double diameter_m) {
    ensure(diameter_m > 0.0, "a circle has a diameter");
    return {0.25 * pi * numerics::square(diameter_m), pi * diameter_m};
}

Section dShape(double width_m, double height_m) {
    const double radius = 0.5 * width_m;
    const double wall = height_m - radius;
    ensure(width_m > 0.0 && wall >= 0.0, "a D-shape is at least half as high as wide");
    return {width_m * wall + 0.5 * pi * numerics::square(radius),
            width_m + 2.0 * wall + pi * radius};
}

Section rectangle(double width_m, double height_m) {
    ensure(width_m > 0.0 && height_m > 0.0, "a rectangle has two sides");
    return {width_m * height_m, 2.0 * (width_m + height_m)};
}

} // namespace headroom::hydraulics
