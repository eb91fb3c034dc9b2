// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/surge_formulas.h"

#include "base/constants.h"
#include "base/ensure.h"
#include "numerics/elementary.h"
#include "numerics/roots.h"

#include <limits>

namespace headroom::hydraulics {

using numerics::exp;
using numerics::pow;
using numerics::sqrt;
using numerics::square;
using numerics::ValueAndSlope;

namespace {

double effectiveHead_m(const ThomaHeads& heads) {
    return heads.gross_m - heads.tunnelLoss_m - 3.0 * heads.penstockLoss_m;
}

} // namespace

double surgePeriod_s(const SurgeTunnel& tunnel, double chamberArea_m2) {
    return 2.0 * constants::pi * sqrt(tunnel.inertia_1m * chamberArea_m2 / tunnel.gravity_mps2);
}

double surgeAmplitude_m(const SurgeTunnel& tunnel, double chamberArea_m2, double flow_m3s) {
    return flow_m3s * sqrt(tunnel.inertia_1m / (tunnel.gravity_mps2 * chamberArea_m2));
}

double relativeLoss(const SurgeTunnel& tunnel, double chamberArea_m2, double flow_m3s) {
    return tunnel.loss_s2m5 * square(flow_m3s) / surgeAmplitude_m(tunnel, chamberArea_m2, flow_m3s);
}

double upsurgeEstimate(double relativeLoss) {
    return 1.0 - 2.0 / 3.0 * relativeLoss + square(relativeLoss) / 9.0;
}

double followingDownsurgeEstimate(double relativeLoss) {
    return -1.0 / (1.0 + 7.0 / 3.0 * relativeLoss);
}

double acceptanceDownsurgeEstimate(double relativeLoss, double initialShare) {
    // Vogt's fit with his constants.
    const double epsilon = 1.0 / square(relativeLoss);
    return 1.0
           + (sqrt(epsilon - 0.275 * sqrt(initialShare)) + 0.05 / epsilon - 0.9)
                 * (1.0 - initialShare) * (1.0 - initialShare / pow(epsilon, 0.62));
}

double fullAcceptanceEstimate(double relativeLoss) {
    return -(1.0 + 0.125 * relativeLoss);
}

double upsurge(double relativeLoss, double throttleLoss) {
    ensure(relativeLoss >= 0.0 && throttleLoss >= 0.0, "losses take head");
    const double loss = relativeLoss + throttleLoss; // of tunnel and throttle together
    if (loss == 0.0) {
        return 1.0;
    }
    // With u = (v/v₀)², x = z/Z*, β = 2·loss: du/dx + βu = −2x, u = 1 at x = −K. Its solution is
    // a decaying part plus −(2/β)(x − 1/β); the chamber turns where u = 0.
    const double beta = 2.0 * loss;
    const double start = -relativeLoss;
    const auto particular = [beta](double x) { return -2.0 / beta * (x - 1.0 / beta); };
    const double constant = 1.0 - particular(start);
    const auto kinetic = [&](double x) {
        const double decayed = constant * exp(-beta * (x - start));
        return ValueAndSlope{decayed + particular(x), -beta * decayed - 2.0 / beta};
    };
    constexpr double weak = 1e-4; // below it 1/β² cancels; the series error is below 1e-8
    if (beta < weak) {
        return 1.0 - 2.0 / 3.0 * loss;
    }
    return numerics::bracketedNewton(kinetic, start, 1.0 + relativeLoss, 0.7).value();
}

double followingDownsurge(double relativeLoss) {
    const double top = upsurge(relativeLoss);
    constexpr double weak = 1e-4;
    const double beta = 2.0 * relativeLoss;
    if (beta < weak) {
        return -(top - 2.0 / 3.0 * relativeLoss * 2.0);
    }
    // (1 + βx) e^(−βx) has the same value at both turning points.
    const double level = (1.0 + beta * top) * exp(-beta * top);
    const auto difference = [&](double x) {
        const double e = exp(-beta * x);
        return ValueAndSlope{(1.0 + beta * x) * e - level, -beta * beta * x * e};
    };
    return numerics::bracketedNewton(difference, -top, 0.0, -0.8 * top).value();
}

double thomaArea_m2(const SurgeTunnel& tunnel, const ThomaHeads& heads) {
    const double head = effectiveHead_m(heads);
    if (!(head > 0.0) || !(tunnel.loss_s2m5 > 0.0)) {
        return std::numeric_limits<double>::infinity();
    }
    return tunnel.inertia_1m / (2.0 * tunnel.gravity_mps2 * tunnel.loss_s2m5 * head);
}

bool thomaAmplitudeHolds(const ThomaHeads& heads) {
    return heads.tunnelLoss_m < 0.5 * effectiveHead_m(heads);
}

double SurgeMode::period_s() const {
    return 2.0 * constants::pi / frequency_rads;
}

double SurgeMode::ratioPerCycle() const {
    return exp(growth_1s * period_s());
}

SurgeMode governedSurgeMode(const SurgeTunnel& tunnel, const ThomaHeads& heads,
                            double chamberArea_m2, double flow_m3s) {
    // s² + s (friction − demand) + (spring − friction·demand) = 0.
    const double friction =
        2.0 * tunnel.loss_s2m5 * flow_m3s * tunnel.gravity_mps2 / tunnel.inertia_1m;
    const double demand = flow_m3s / (chamberArea_m2 * effectiveHead_m(heads));
    const double spring = tunnel.gravity_mps2 / (tunnel.inertia_1m * chamberArea_m2);
    const double growth = 0.5 * (demand - friction);
    const double square2 = spring - friction * demand - square(growth);
    if (square2 > 0.0) {
        return {growth, sqrt(square2)};
    }
    return {growth + sqrt(-square2), 0.0}; // creeps: the slower of two real roots
}

} // namespace headroom::hydraulics
