// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/look.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace headroom::drawing {

namespace {

using Triple = std::array<double, 3>;
using Matrix = std::array<Triple, 3>;

/// sRGB transfer, IEC 61966-2-1.
double linear(double share) {
    return share <= 0.04045 ? share / 12.92 : std::pow((share + 0.055) / 1.055, 2.4);
}
double encoded(double share) {
    return share <= 0.0031308 ? 12.92 * share : 1.055 * std::pow(share, 1.0 / 2.4) - 0.055;
}

Triple linear(const QColor& colour) {
    return {linear(colour.redF()), linear(colour.greenF()), linear(colour.blueF())};
}

Triple times(const Matrix& matrix, const Triple& vector) {
    Triple out{};
    for (std::size_t i = 0; i < 3; ++i) {
        out[i] = matrix[i][0] * vector[0] + matrix[i][1] * vector[1] + matrix[i][2] * vector[2];
    }
    return out;
}

/// Linear sRGB to CIE XYZ, white D65 (IEC 61966-2-1).
constexpr Matrix toXyz{{{0.4124564, 0.3575761, 0.1804375},
                        {0.2126729, 0.7151522, 0.0721750},
                        {0.0193339, 0.1191920, 0.9503041}}};

/// Complete dichromacy on linear sRGB: Machado, Oliveira, Fernandes 2009, severity 1.0.
const Matrix& dichromacy(Vision vision) {
    static constexpr Matrix protan{{{0.152286, 1.052583, -0.204868},
                                    {0.114503, 0.786281, 0.099216},
                                    {-0.003882, -0.048116, 1.051998}}};
    static constexpr Matrix deutan{{{0.367322, 0.860646, -0.227968},
                                    {0.280085, 0.672501, 0.047413},
                                    {-0.011820, 0.042940, 0.968881}}};
    static constexpr Matrix tritan{{{1.255528, -0.076749, -0.178779},
                                    {-0.078411, 0.930809, 0.147602},
                                    {0.004733, 0.691367, 0.303900}}};
    return vision == Vision::protan ? protan : vision == Vision::deutan ? deutan : tritan;
}

double luminance(const QColor& colour) {
    return times(toXyz, linear(colour))[1];
}

Triple lab(const QColor& colour) {
    constexpr Triple white{0.95047, 1.0, 1.08883};
    constexpr double bend = 6.0 / 29.0;
    Triple f = times(toXyz, linear(colour));
    for (std::size_t i = 0; i < 3; ++i) {
        const double t = f[i] / white[i];
        f[i] = t > bend * bend * bend ? std::cbrt(t) : t / (3.0 * bend * bend) + 4.0 / 29.0;
    }
    return {116.0 * f[1] - 16.0, 500.0 * (f[0] - f[1]), 200.0 * (f[1] - f[2])};
}

} // namespace

double contrast(const QColor& a, const QColor& b) {
    const double bright = std::max(luminance(a), luminance(b));
    const double dim = std::min(luminance(a), luminance(b));
    return (bright + 0.05) / (dim + 0.05);
}

QColor seenWith(Vision vision, const QColor& colour) {
    if (vision == Vision::normal) {
        return colour;
    }
    Triple seen = times(dichromacy(vision), linear(colour));
    for (double& share : seen) {
        share = encoded(std::clamp(share, 0.0, 1.0));
    }
    return QColor::fromRgbF(static_cast<float>(seen[0]), static_cast<float>(seen[1]),
                            static_cast<float>(seen[2]));
}

double colourDistance(const QColor& a, const QColor& b) {
    const Triple p = lab(a), q = lab(b);
    return std::hypot(p[0] - q[0], p[1] - q[1], p[2] - q[2]);
}

} // namespace headroom::drawing
