// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/friction_factor.h"

#include "base/ensure.h"
#include "numerics/elementary.h"

#include <cmath>

namespace headroom::hydraulics {

namespace {

// Constants of Colebrook's law as he gave them; other roundings move f by up to 0.1 %.
constexpr double roughConstant = 3.7;
constexpr double smoothConstant = 2.51;

} // namespace

double laminarFactor(double reynolds) {
    constexpr double hagenPoiseuille = 64.0;
    return hagenPoiseuille / reynolds;
}

double colebrookWhiteFactor(double reynolds, double relativeRoughness) {
    ensure(reynolds > 0.0 && relativeRoughness >= 0.0,
           "Reynolds number above 0, roughness not below");
    const double rough = relativeRoughness / roughConstant;
    const double smooth = smoothConstant / reynolds;
    const double perLog = 2.0 / numerics::log(10.0);
    constexpr double settled = 1e-14; // Newton's last change, relative
    constexpr int mostSteps = 60;     // six are usual; the function is concave and rising
    double x = 8.0;                   // 1/√f for f = 1/64
    for (int step = 0; step < mostSteps; ++step) {
        const double inside = rough + smooth * x;
        const double change =
            (x + perLog * numerics::log(inside)) / (1.0 + perLog * smooth / inside);
        x = x - change > 0.0 ? x - change : 0.5 * x;
        if (std::fabs(change) <= settled * x) {
            break;
        }
    }
    return 1.0 / (x * x);
}

double fullyRoughFactor(double relativeRoughness) {
    ensure(relativeRoughness > 0.0 && relativeRoughness < roughConstant, "roughness in the pipe");
    return 1.0 / numerics::square(2.0 * numerics::log10(roughConstant / relativeRoughness));
}

double darcyFactor(double reynolds, double relativeRoughness) {
    ensure(reynolds > 0.0, "Reynolds number above 0");
    if (reynolds <= laminarReynolds) {
        return laminarFactor(reynolds);
    }
    if (reynolds >= turbulentReynolds) {
        return colebrookWhiteFactor(reynolds, relativeRoughness);
    }
    const double excess = colebrookWhiteFactor(turbulentReynolds, relativeRoughness)
                          - laminarFactor(turbulentReynolds);
    const double share = (reynolds - laminarReynolds) / (turbulentReynolds - laminarReynolds);
    return laminarFactor(reynolds) + share * excess;
}

double factorOfStrickler(double strickler, double hydraulicRadius_m, double gravity_mps2) {
    return 8.0 * gravity_mps2
           / (numerics::square(strickler) * numerics::pow(hydraulicRadius_m, 1.0 / 3.0));
}

double stricklerOfFactor(double factor, double hydraulicRadius_m, double gravity_mps2) {
    return numerics::sqrt(8.0 * gravity_mps2
                          / (factor * numerics::pow(hydraulicRadius_m, 1.0 / 3.0)));
}

} // namespace headroom::hydraulics
