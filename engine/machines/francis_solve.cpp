// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/francis_solve.h"

#include "base/ensure.h"
#include "numerics/elementary.h"
#include "numerics/roots.h"

#include <cmath>

namespace headroom::machines {

namespace {

using numerics::ValueAndSlope;

/// Derivative of the flow by c at constant head and speed.
double flowSlope(const ChartPoint& p) {
    return -p.dh_dc / p.dh_dq;
}

constexpr double tightest = 1e-15;

} // namespace

double flowAt(const FrancisForm& form, double h, double n, double c) {
    const auto head = [&](double q) {
        const ChartPoint p = form.at(q, n, c);
        return ValueAndSlope{p.h - h, p.dh_dq};
    };
    const double scale = numerics::sqrt(std::fabs(h) + n * n);
    if (!(scale > 0.0)) {
        return 0.0;
    }
    double low = -scale;
    double high = scale;
    constexpr int mostDoublings = 60;
    for (int i = 0; i < mostDoublings && !(head(high).value > 0.0); ++i) {
        high *= 2.0;
    }
    for (int i = 0; i < mostDoublings && !(head(low).value < 0.0); ++i) {
        low *= 2.0;
    }
    const double guess = numerics::signedRoot(h / std::fmax(form.flowTerm(c), tightest));
    const auto root =
        numerics::bracketedNewton(head, low, high, guess, {.argumentTolerance = tightest * scale});
    ensure(root.has_value(), "the head of a runner rises without bound with its flow");
    return *root;
}

std::optional<double> inverseOpeningFor(const FrancisForm& form, double q) {
    const auto head = [&](double c) {
        const ChartPoint p = form.at(q, 1.0, c);
        return ValueAndSlope{p.h - 1.0, p.dh_dc};
    };
    constexpr double widestOpening = 1.6;
    constexpr double largest = 1e6;
    const double low = 1.0 / widestOpening;
    double high = 1.0;
    while (high < largest && !(head(high).value > 0.0)) {
        high *= 2.0;
    }
    return numerics::bracketedNewton(head, low, high, 1.0 / q,
                                     {.argumentTolerance = tightest * high});
}

double runawayAt(const FrancisForm& form, double c) {
    const auto torque = [&](double n) {
        const ChartPoint p = form.at(flowAt(form, 1.0, n, c), n, c);
        return ValueAndSlope{p.m, p.dm_dn - p.dm_dq * p.dh_dn / p.dh_dq};
    };
    double high = 1.5;
    constexpr double fastest = 20.0;
    while (high < fastest && !(torque(high).value < 0.0)) {
        high *= 1.5;
    }
    const auto root = numerics::bracketedNewton(torque, 0.0, high, 0.9 * high);
    // A shut gate gives no torque at standstill either.
    return root.value_or(0.0);
}

RatedHeadPoint ratedHeadPoint(const FrancisForm& form, double c) {
    const double q = flowAt(form, 1.0, 1.0, c);
    return {c, q, form.at(q, 1.0, c).m};
}

std::optional<RatedHeadPoint> pointOfTorque(const FrancisForm& form, double m) {
    const auto torque = [&](double c) {
        const ChartPoint p = form.at(flowAt(form, 1.0, 1.0, c), 1.0, c);
        return ValueAndSlope{p.m - m, p.dm_dc + p.dm_dq * flowSlope(p)};
    };
    constexpr double open = 0.9; // a little beyond the rated opening
    constexpr double almostShut = 1e3;
    const auto c = numerics::bracketedNewton(torque, open, almostShut, 2.0);
    return c ? std::optional(ratedHeadPoint(form, *c)) : std::nullopt;
}

std::optional<RatedHeadPoint> bestPoint(const FrancisForm& form) {
    // The sign of dη/dc, from η ~ m/q.
    const auto gain = [&](double c) {
        const double q = flowAt(form, 1.0, 1.0, c);
        const ChartPoint p = form.at(q, 1.0, c);
        const double dq = flowSlope(p);
        return ((p.dm_dc + p.dm_dq * dq) * q - p.m * dq) / (q * q);
    };
    const auto withSlope = [&](double c) {
        const double move = 1e-5 * c;
        return ValueAndSlope{gain(c), (gain(c + move) - gain(c - move)) / (2.0 * move)};
    };
    constexpr double widest = 1.3, narrowest = 0.3, stride = 0.05;
    double low = 1.0 / widest;
    for (double tau = widest - stride; tau > narrowest; tau -= stride) {
        const double high = 1.0 / tau;
        if (gain(low) > 0.0 && gain(high) <= 0.0) {
            const auto c = numerics::bracketedNewton(withSlope, low, high, 0.5 * (low + high),
                                                     {.argumentTolerance = 1e-12});
            return c ? std::optional(ratedHeadPoint(form, *c)) : std::nullopt;
        }
        low = high;
    }
    return std::nullopt;
}

} // namespace headroom::machines
