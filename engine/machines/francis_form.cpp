// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/francis_form.h"

#include "numerics/elementary.h"

#include <cmath>

namespace headroom::machines {

namespace {

using numerics::square;

/// A value with its derivatives by q, n and c, enough for the few products below.
struct Slopes {
    double v = 0.0, q = 0.0, n = 0.0, c = 0.0;

    friend Slopes operator+(const Slopes& a, const Slopes& b) {
        return {a.v + b.v, a.q + b.q, a.n + b.n, a.c + b.c};
    }
    friend Slopes operator-(const Slopes& a, const Slopes& b) {
        return {a.v - b.v, a.q - b.q, a.n - b.n, a.c - b.c};
    }
    friend Slopes operator*(double k, const Slopes& a) {
        return {k * a.v, k * a.q, k * a.n, k * a.c};
    }
    friend Slopes operator*(const Slopes& a, const Slopes& b) {
        return {a.v * b.v, a.v * b.q + b.v * a.q, a.v * b.n + b.v * a.n, a.v * b.c + b.v * a.c};
    }
    friend Slopes squared(const Slopes& a) {
        const double twice = 2.0 * a.v;
        return {a.v * a.v, twice * a.q, twice * a.n, twice * a.c};
    }
    /// f(a) for a function with value f and derivative slope at a.
    friend Slopes through(const Slopes& a, double f, double slope) {
        return {f, slope * a.q, slope * a.n, slope * a.c};
    }
};

/// Weighted mean of turbine and pump values: pump + w·(turbine − pump).
Slopes mix(const Slopes& w, const Slopes& turbine, const Slopes& pump) {
    return pump + w * (turbine - pump);
}

/// κ_r n|n| exp(−(q/(q_c n))²) with slopes; 0 with all slopes at n = 0.
Slopes recirculationTorque(const FrancisForm& f, double q, double n) {
    if (n == 0.0) {
        return {};
    }
    const double x = q / (f.recirculationFlow * n);
    const double decay = f.recirculation * numerics::exp(-x * x);
    const double size = std::fabs(n);
    return {decay * n * size, -2.0 * decay * x * size / f.recirculationFlow,
            2.0 * decay * size * (1.0 + x * x), 0.0};
}

} // namespace

ChartPoint FrancisForm::at(double q, double n, double c) const {
    const double radius2 = n * n + square(blendRound * q);
    if (!(radius2 > 0.0)) {
        return {};
    }
    const Slopes flow{q, 1.0, 0.0, 0.0};
    const Slopes speed{n, 0.0, 1.0, 0.0};
    const Slopes vanes{e1 * c * q, e1 * c, 0.0, e1 * q}; // swirl offered, c_v
    const Slopes exit = speed - (1.0 / phi) * flow;
    const Slopes pumpSwirl = slip * speed + e2 * flow; // c_b
    const Slopes flow2{q * q, 2.0 * q, 0.0, 0.0};
    const Slopes gateLoss{gate * (c * c - 1.0), 0.0, 0.0, 2.0 * gate * c};
    const Slopes pipeT{gateLoss.v + frictionTurbine, 0.0, 0.0, gateLoss.c};
    const Slopes pipeP{gateLoss.v + frictionPump, 0.0, 0.0, gateLoss.c};

    const Slopes eulerT = u1 * vanes - u2 * exit;
    const Slopes eulerP = u1 * pumpSwirl;
    const Slopes lossT = (0.5 * shockTurbine * u1) * squared(vanes - speed - e2 * flow)
                         + (0.5 * exitTurbine * u2) * squared(exit) + pipeT * flow2;
    const Slopes lossP = (0.5 * shockPump * u1) * squared(pumpSwirl - vanes)
                         + (0.5 * exitPump * u2) * squared(speed - (1.0 / phiPump) * flow)
                         + pipeP * flow2;

    const double radius = numerics::sqrt(radius2);
    const double width = blendWidth * radius;
    const double xi = vanes.v / width;
    const Slopes blend{xi, e1 * c * n * n / (width * radius2), -xi * n / radius2, e1 * q / width};
    const double sign = numerics::tanh(xi);
    const double shifted = numerics::tanh(xi + blendShift);
    const Slopes sigma = through(blend, sign, 1.0 - sign * sign);
    const Slopes w = through(blend, 0.5 * (1.0 + shifted), 0.5 * (1.0 - shifted * shifted));

    const Slopes euler = mix(w, eulerT, eulerP);
    const Slopes head = speed * euler + sigma * mix(w, lossT, lossP);
    const Slopes still{disc * n * std::fabs(n), 0.0, 2.0 * disc * std::fabs(n), 0.0};
    const Slopes torque =
        (1.0 / ratedEfficiency) * (flow * euler) - still - recirculationTorque(*this, q, n);
    return {head.v, torque.v, head.q, head.n, torque.q, torque.n, head.c, torque.c};
}

ChartPoint FrancisForm::shut(double n) const {
    const double w0 = 0.5 * (1.0 + numerics::tanh(blendShift));
    const double headFactor = (1.0 - w0) * u1 * slip - w0 * u2;
    const double torqueFactor = disc + recirculation;
    ChartPoint point;
    point.h = headFactor * n * n;
    point.dh_dn = 2.0 * headFactor * n;
    point.m = -torqueFactor * n * std::fabs(n);
    point.dm_dn = -2.0 * torqueFactor * std::fabs(n);
    return point;
}

double FrancisForm::flowTerm(double c) const {
    const double e = e1 * c - e2;
    return 0.5 * shockTurbine * u1 * e * e + 0.5 * exitTurbine * u2 / square(phi) + frictionTurbine
           + gate * (c * c - 1.0);
}

double FrancisForm::mixedTerm(double c) const {
    const double e = e1 * c - e2;
    return u1 * e1 * c + u2 / phi - shockTurbine * u1 * e - exitTurbine * u2 / phi;
}

double FrancisForm::speedTerm() const {
    return -u2 + 0.5 * shockTurbine * u1 + 0.5 * exitTurbine * u2;
}

} // namespace headroom::machines
