// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/area.h"

#include "grid/messages.h"
#include "numerics/elementary.h"
#include "numerics/roots.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::grid {

namespace {

using numerics::ValueAndSlope;

void require(Findings& found, const std::string& subject, const std::string& name, Amount value,
             bool mayBeZero) {
    if (!(mayBeZero ? value.si >= 0.0 : value.si > 0.0) || !std::isfinite(value.si)) {
        found.push_back({.message = mayBeZero ? &areaNegative : &areaNotPositive,
                         .subject = subject,
                         .arguments = {{"name", name}, {"value", value}}});
    }
}

/// What the other units would give for ever at this deviation, and its slope [W/Hz].
ValueAndSlope steadyReserve(const AreaSpec& spec, double deviation_Hz) {
    if (!spec.reserve) {
        return {};
    }
    const ReserveSpec& r = *spec.reserve;
    const double strength = r.power_W / (r.droop * spec.nominal_Hz);
    const double outside = std::fabs(deviation_Hz) - r.deadBand_Hz;
    if (!(outside > 0.0)) {
        return {};
    }
    const double wanted = -std::copysign(strength * outside, deviation_Hz);
    if (wanted > r.most_W) {
        return {r.most_W, 0.0};
    }
    if (wanted < r.least_W) {
        return {r.least_W, 0.0};
    }
    return {wanted, -strength};
}

/// Inertia M of M·dΔf/dt = ΔP [W s/Hz].
double inertia(const AreaSpec& spec, double extraEnergy_J) {
    return 2.0 * (spec.storedEnergy_J + extraEnergy_J) / spec.nominal_Hz;
}

/// The lag's answer to an input that runs straight from a to b, as r' = kept + share·b.
struct LagStep {
    double kept = 0.0, share = 1.0;
    double end(double b) const { return kept + share * b; }
};
LagStep lagStep(double before, double a, double lag_s, double step_s) {
    if (!(lag_s > 0.0)) {
        return {0.0, 1.0};
    }
    const double x = step_s / lag_s;
    const double decay = numerics::exp(-x);
    const double mean = -numerics::expm1(-x) / x; // (1 − e^−x)/x
    return {before * decay + a * (mean - decay), 1.0 - mean};
}

double surplus(const AreaSpec& spec, double own_W, double lost_W, double reserve_W,
               double deviation_Hz) {
    return own_W - lost_W + reserve_W - spec.load_W * spec.loadDamping_1Hz * deviation_Hz;
}

} // namespace

Findings check(const AreaSpec& spec, const std::string& subject) {
    Findings found;
    require(found, subject, "nominal frequency", amount(Quantity::frequency, spec.nominal_Hz),
            false);
    require(found, subject, "stored energy", amount(Quantity::energy, spec.storedEnergy_J), false);
    require(found, subject, "load", amount(Quantity::load, spec.load_W), true);
    require(found, subject, "load damping", amount(Quantity::loadDamping, spec.loadDamping_1Hz),
            true);
    if (spec.reserve) {
        const ReserveSpec& r = *spec.reserve;
        require(found, subject, "other reserve", amount(Quantity::power, r.power_W), true);
        require(found, subject, "other reserve's droop", amount(Quantity::perUnit, r.droop), false);
        require(found, subject, "other reserve's lag", amount(Quantity::time, r.lag_s), true);
        require(found, subject, "other reserve's dead band",
                amount(Quantity::frequency, r.deadBand_Hz), true);
        if (!(r.least_W <= 0.0 && r.most_W >= 0.0)) {
            found.push_back({.message = &reserveLimits,
                             .subject = subject,
                             .arguments = {{"least", amount(Quantity::power, r.least_W)},
                                           {"most", amount(Quantity::power, r.most_W)}}});
        }
    }
    return found;
}

AreaState advance(const AreaSpec& spec, const AreaState& state, const AreaStep& step) {
    const double share = 0.5 * step.step_s / inertia(spec, step.extraEnergy_J);
    const double before =
        surplus(spec, step.ownStart_W, step.lostStart_W, state.reserve_W, state.deviation_Hz);
    const double target = steadyReserve(spec, state.deviation_Hz).value;
    const LagStep lag = spec.reserve
                            ? lagStep(state.reserve_W, target, spec.reserve->lag_s, step.step_s)
                            : LagStep{0.0, 0.0};
    const auto reserveAfter = [&](double x) {
        const ValueAndSlope steady = steadyReserve(spec, x);
        return ValueAndSlope{lag.end(steady.value), lag.share * steady.slope};
    };
    // Rising in x and piecewise straight, so Newton ends after a few segments.
    const double damping = spec.load_W * spec.loadDamping_1Hz;
    double x = state.deviation_Hz + 2.0 * share * before;
    constexpr int mostSegments = 8;
    for (int i = 0; i < mostSegments; ++i) {
        const ValueAndSlope reserve = reserveAfter(x);
        const double after = surplus(spec, step.ownEnd_W, step.lostEnd_W, reserve.value, x);
        const double residual = x - state.deviation_Hz - share * (before + after);
        const double slope = 1.0 - share * (reserve.slope - damping);
        const double move = residual / slope;
        x -= move;
        constexpr double rounding = 1e-15;
        if (std::fabs(move) <= rounding * spec.nominal_Hz) {
            break;
        }
    }
    AreaState next;
    next.deviation_Hz = x;
    next.reserve_W = reserveAfter(x).value;
    next.imbalance_W = surplus(spec, step.ownEnd_W, step.lostEnd_W, next.reserve_W, x);
    next.rate_Hzs = next.imbalance_W / inertia(spec, step.extraEnergy_J);
    return next;
}

double deviationByPower(const AreaSpec& spec, const AreaStep& step) {
    const double share = 0.5 * step.step_s / inertia(spec, step.extraEnergy_J);
    return share / (1.0 + share * spec.load_W * spec.loadDamping_1Hz);
}

double steadyDeviation_Hz(const AreaSpec& spec, double lost_W) {
    // load damping + reserve strength beyond the dead band, limits by cases of a rising function.
    const double damping = spec.load_W * spec.loadDamping_1Hz;
    const auto balance = [&](double x) {
        const ValueAndSlope reserve = steadyReserve(spec, x);
        return ValueAndSlope{lost_W - reserve.value + damping * x, damping - reserve.slope};
    };
    const double widest = spec.nominal_Hz;
    const auto root = numerics::bracketedNewton(balance, -widest, widest, 0.0,
                                                {.argumentTolerance = 1e-14 * widest});
    return root.value_or(std::copysign(widest, -lost_W));
}

double initialRate_Hzs(const AreaSpec& spec, double lost_W) {
    return -lost_W / inertia(spec, 0.0);
}

double lost_W(std::span<const Loss> losses, double time_s) {
    double sum = 0.0;
    for (const auto& loss : losses) {
        sum += loss.time_s <= time_s ? loss.power_W : 0.0;
    }
    return sum;
}

} // namespace headroom::grid
