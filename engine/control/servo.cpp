// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/servo.h"

#include "control/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::control {

namespace {

Finding finding(const Message& message, const std::string& subject,
                std::vector<std::pair<std::string, Argument>> arguments) {
    return {.message = &message, .subject = subject, .arguments = std::move(arguments)};
}

Amount share(double value) {
    return amount(Quantity::perUnit, value);
}
Amount seconds(double value) {
    return amount(Quantity::time, value);
}

void requirePositive(Findings& found, const std::string& subject, const std::string& name,
                     double time_s) {
    if (!(time_s > 0.0) || !std::isfinite(time_s)) {
        found.push_back(
            finding(servoTimeNotPositive, subject, {{"name", name}, {"value", seconds(time_s)}}));
    }
}

void requireNotNegative(Findings& found, const std::string& subject, const std::string& name,
                        double time_s) {
    if (!(time_s >= 0.0) || !std::isfinite(time_s)) {
        found.push_back(
            finding(servoNegative, subject, {{"name", name}, {"value", seconds(time_s)}}));
    }
}

void checkStages(Findings& found, const ServoSpec& spec, const std::string& subject) {
    double above = spec.highest_pu;
    if (spec.closing.empty()) {
        requirePositive(found, subject, "closing time", 0.0);
    }
    for (std::size_t i = 0; i < spec.closing.size(); ++i) {
        const auto& stage = spec.closing[i];
        requirePositive(found, subject, "closing time", stage.fullStroke_s);
        const bool last = i + 1 == spec.closing.size();
        const bool falls = stage.downTo_pu < above && stage.downTo_pu >= 0.0;
        if (!falls || (last && stage.downTo_pu != 0.0)) {
            found.push_back(finding(
                servoStages, subject,
                {{"row", static_cast<std::int64_t>(i + 1)}, {"stroke", share(stage.downTo_pu)}}));
        }
        above = stage.downTo_pu;
    }
}

/// The lag's answer to a straight order u0 → u1 over `d`: exact.
double lagged(double y, double u0, double u1, double lag_s, double d) {
    if (!(lag_s > 0.0)) {
        return u1;
    }
    const double slope = (u1 - u0) / d;
    const double behind = slope * lag_s; // steady distance behind a ramp
    return u1 - behind + (y - u0 + behind) * numerics::exp(-d / lag_s);
}

/// The lowest stroke that closing at the limiting rates can reach from `y` in `d`.
double lowestWithin(const ServoSpec& spec, double y, double d, bool emergency) {
    while (y > spec.lowest_pu) {
        const auto rate = spec.closingRate(y, emergency);
        const double until = std::max(rate.until_pu, spec.lowest_pu);
        const double needed = (y - until) / rate.rate_1s;
        if (needed >= d) {
            return y - rate.rate_1s * d;
        }
        d -= needed;
        y = until;
    }
    return spec.lowest_pu;
}

/// An order at an end of the stroke presses beyond it by what keeps the limiting rate to the end.
double pressed(const ServoSpec& spec, double order, bool emergency) {
    if (order <= spec.lowest_pu) {
        const double rate = spec.closingRate(spec.lowest_pu, emergency).rate_1s;
        return spec.lowest_pu - spec.lag_s * rate;
    }
    if (order >= spec.highest_pu) {
        return spec.highest_pu + spec.lag_s / spec.opening_s;
    }
    return order;
}

/// One piece of a step in which the felt order is straight.
double advancePiece(const ServoSpec& spec, double y, double u0, double u1, double d,
                    bool emergency) {
    const double wanted =
        lagged(y, pressed(spec, u0, emergency), pressed(spec, u1, emergency), spec.lag_s, d);
    const double highest = std::min(y + d / spec.opening_s, spec.highest_pu);
    if (wanted >= y) {
        return std::min(wanted, highest);
    }
    return std::max(wanted, lowestWithin(spec, y, d, emergency));
}

} // namespace

ServoSpec::Rate ServoSpec::closingRate(double opening_pu, bool emergency) const {
    Rate found{0.0, lowest_pu};
    if (emergency && emergencyClosing_s) {
        found.rate_1s = 1.0 / *emergencyClosing_s;
    } else {
        for (const auto& stage : closing) {
            found = {1.0 / stage.fullStroke_s, stage.downTo_pu};
            if (opening_pu > stage.downTo_pu) {
                break;
            }
        }
    }
    if (cushionBelow_pu > 0.0) {
        if (opening_pu > cushionBelow_pu) {
            found.until_pu = std::max(found.until_pu, cushionBelow_pu);
        } else {
            found.rate_1s = std::min(found.rate_1s, cushionBelow_pu / cushion_s);
        }
    }
    return found;
}

double ServoSpec::closingTime_s(double from_pu, double to_pu) const {
    double time_s = 0.0;
    double y = from_pu;
    while (y > to_pu) {
        const auto rate = closingRate(y, false);
        const double until = std::max(rate.until_pu, to_pu);
        time_s += (y - until) / rate.rate_1s;
        y = until;
    }
    return time_s;
}

Findings check(const ServoSpec& spec, const std::string& subject) {
    Findings found;
    requirePositive(found, subject, "opening time", spec.opening_s);
    if (!(spec.lowest_pu >= 0.0 && spec.highest_pu > spec.lowest_pu && spec.highest_pu <= 1.0)) {
        found.push_back(
            finding(servoRange, subject,
                    {{"least", share(spec.lowest_pu)}, {"most", share(spec.highest_pu)}}));
    }
    checkStages(found, spec, subject);
    const bool none = spec.cushionBelow_pu == 0.0;
    if (!none
        && !(spec.cushionBelow_pu > 0.0 && spec.cushionBelow_pu < 1.0 && spec.cushion_s > 0.0
             && std::isfinite(spec.cushion_s))) {
        found.push_back(
            finding(servoCushion, subject,
                    {{"stroke", share(spec.cushionBelow_pu)}, {"time", seconds(spec.cushion_s)}}));
    }
    requireNotNegative(found, subject, "dead time", spec.deadTime_s);
    requireNotNegative(found, subject, "lag", spec.lag_s);
    requireNotNegative(found, subject, "emergency dead time", spec.emergencyDeadTime_s);
    if (spec.emergencyClosing_s) {
        requirePositive(found, subject, "emergency closing time", *spec.emergencyClosing_s);
    }
    return found;
}

ServoState servoAtRest(const ServoSpec& spec, double opening_pu, double step_s) {
    ServoState state;
    state.opening_pu = opening_pu;
    state.orders = OrderMemory(opening_pu, spec.deadTime_s, step_s);
    return state;
}

void advance(const ServoSpec& spec, ServoState& state, const ServoOrder& order, double time_s,
             double step_s) {
    const double end_s = time_s + step_s;
    state.orders.push(time_s, order.atStart_pu);
    state.orders.push(end_s, order.atEnd_pu);
    const double before = state.opening_pu;
    double y = before;
    const double tripped_s = state.emergency_s ? *state.emergency_s + spec.emergencyDeadTime_s
                                               : std::numeric_limits<double>::infinity();
    // Pieces between knots of the felt order, and the instant the emergency path takes over.
    for (double t = time_s; t < end_s && !state.stuck;) {
        const bool emergency = t >= tripped_s;
        const double felt_s = t - spec.deadTime_s;
        double until = state.orders.nextKnot(felt_s, end_s - spec.deadTime_s) + spec.deadTime_s;
        if (!emergency) {
            until = std::min(until, tripped_s);
        }
        until = std::min(until, end_s);
        constexpr double shortest = 1e-9; // of a step: below it is rounding of the shifted times
        if (until - t < shortest * step_s) {
            until = std::min(t + shortest * step_s, end_s);
        }
        const double from = emergency ? spec.lowest_pu : state.orders.after(felt_s);
        const double to = emergency ? spec.lowest_pu : state.orders.before(until - spec.deadTime_s);
        const double next = advancePiece(spec, y, from, to, until - t, emergency);
        state.travel_pu += std::fabs(next - y);
        y = next;
        t = until;
    }
    state.opening_pu = y;
    state.rate_1s = (y - before) / step_s;
    state.orders.forget(end_s - spec.deadTime_s);
}

} // namespace headroom::control
