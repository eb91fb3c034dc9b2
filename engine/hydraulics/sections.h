// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// Cross-sections that run full. All lengths in metres and above zero.
namespace headroom::hydraulics {

struct Section {
    double area_m2 = 0.0;
    double perimeter_m = 0.0; ///< wetted: the whole of it

    double hydraulicRadius_m() const { return area_m2 / perimeter_m; }
    /// 4 A/P: the diameter of the circle with the same hydraulic radius.
    double hydraulicDiameter_m() const { return 4.0 * hydraulicRadius_m(); }
    /// The diameter of the circle with the same area (inertia, not friction).
    double equalAreaDiameter_m() const;
};

Section circle(double diameter_m);
/// Floor `width`, upright walls and a half-circle as roof; `height` from floor to crown must be
/// at least half the width.
Section dShape(double width_m, double height_m);
Section rectangle(double width_m, double height_m);

} // namespace headroom::hydraulics
