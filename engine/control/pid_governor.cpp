// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/pid_governor.h"

#include "control/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::control {

namespace {

Finding finding(const Message& message, const std::string& subject,
                std::vector<std::pair<std::string, Argument>> arguments) {
    return {.message = &message, .subject = subject, .arguments = std::move(arguments)};
}

Amount pure(double value) {
    return amount(Quantity::factor, value);
}

void requireNotNegative(Findings& found, const std::string& subject, const std::string& name,
                        Amount value) {
    if (!std::isfinite(value.si)) {
        found.push_back(finding(governorNotNumber, subject, {{"name", name}}));
    } else if (value.si < 0.0) {
        found.push_back(finding(governorNegative, subject, {{"name", name}, {"value", value}}));
    }
}

void checkGains(Findings& found, const PidGains& gains, double filter_s, const std::string& mode,
                const std::string& subject) {
    requireNotNegative(found, subject, "proportional gain, " + mode, pure(gains.kp));
    requireNotNegative(found, subject, "integral gain, " + mode,
                       amount(Quantity::rate, gains.ki_1s));
    requireNotNegative(found, subject, "derivative gain, " + mode,
                       amount(Quantity::time, gains.kd_s));
    if (gains.kp == 0.0 && gains.ki_1s == 0.0) {
        found.push_back(finding(governorNoAction, subject, {{"mode", mode}}));
    }
    if (gains.kd_s > 0.0 && !(filter_s > 0.0)) {
        found.push_back(
            finding(governorNoFilter, subject, {{"value", amount(Quantity::time, filter_s)}}));
    }
}

/// The deviation less the dead band, without a jump at its edge.
double beyond(double deviation, double halfWidth) {
    const double size = std::fabs(deviation) - halfWidth;
    return size > 0.0 ? std::copysign(size, deviation) : 0.0;
}

} // namespace

Result<PidGovernor> PidGovernor::make(const PidSpec& spec, const std::string& subject) {
    Findings found;
    checkGains(found, spec.gains, spec.derivativeFilter_s, "on the grid", subject);
    if (spec.noLoad) {
        checkGains(found, *spec.noLoad, spec.derivativeFilter_s, "off the grid", subject);
    }
    requireNotNegative(found, subject, "droop", amount(Quantity::perUnit, spec.droop));
    requireNotNegative(found, subject, "droop off the grid",
                       amount(Quantity::perUnit, spec.noLoadDroop));
    requireNotNegative(found, subject, "dead band", amount(Quantity::perUnit, spec.deadBand_pu));
    requireNotNegative(found, subject, "derivative filter",
                       amount(Quantity::time, spec.derivativeFilter_s));
    requireNotNegative(found, subject, "sample time", amount(Quantity::time, spec.samplePeriod_s));
    requireNotNegative(found, subject, "feed-forward", pure(spec.feedForward));
    if (!(spec.openingLimit_pu > 0.0 && spec.openingLimit_pu <= 1.0)) {
        found.push_back(finding(governorLimit, subject,
                                {{"value", amount(Quantity::perUnit, spec.openingLimit_pu)}}));
    }
    if (spec.windUpTime_s && !(*spec.windUpTime_s > 0.0)) {
        found.push_back(finding(
            governorNegative, subject,
            {{"name", "anti-windup time"}, {"value", amount(Quantity::time, *spec.windUpTime_s)}}));
    }
    if (!found.empty()) {
        return found;
    }
    return PidGovernor(spec);
}

PidGovernor::PidGovernor(const PidSpec& spec) : spec_(spec) {}

std::unique_ptr<Controller> PidGovernor::clone() const {
    return std::make_unique<PidGovernor>(*this);
}

double PidGovernor::shortestTime_s() const {
    return spec_.derivativeFilter_s;
}

const PidGains& PidGovernor::gains(bool onGrid) const {
    return onGrid || !spec_.noLoad ? spec_.gains : *spec_.noLoad;
}

double PidGovernor::droop(bool onGrid) const {
    return onGrid ? spec_.droop : spec_.noLoadDroop;
}

double PidGovernor::deviation(const Measured& measured) const {
    const double plain = measured.speedReference_pu - measured.speed_pu;
    return measured.onGrid ? beyond(plain, spec_.deadBand_pu) : plain;
}

LoadReference PidGovernor::rest(const Measured& measured) {
    // With e = 0 everything that integrates stands still: reference = feedback − Δn/b_p.
    const double shift =
        droop(measured.onGrid) > 0.0 ? deviation(measured) / droop(measured.onGrid) : 0.0;
    LoadReference reference{measured.opening_pu, measured.power_pu};
    (spec_.droopOn == DroopOn::opening ? reference.opening_pu : reference.power_pu) -= shift;
    onGrid_ = measured.onGrid;
    deviation_ = deviation(measured);
    error_ = 0.0;
    order_ = measured.opening_pu;
    filtered_ = deviation_;
    windUp_1s_ = 0.0;
    integral_ = measured.opening_pu - spec_.feedForward * reference.opening_pu;
    return reference;
}

void PidGovernor::changeMode(const Measured& measured) {
    // The order must not jump because other gains take over: the integral takes the difference.
    const PidGains old = gains(onGrid_);
    const double oldError = error_;
    onGrid_ = measured.onGrid;
    const PidGains& now = gains(onGrid_);
    const double tf = spec_.derivativeFilter_s;
    const double rate = tf > 0.0 ? (deviation_ - filtered_) / tf : 0.0;
    error_ = errorWith(measured, order_) - deviation(measured) + deviation_;
    integral_ += old.kp * oldError - now.kp * error_ + (old.kd_s - now.kd_s) * rate;
}

double PidGovernor::advanceDerivative(double now, double kd_s, double step) {
    const double tf = spec_.derivativeFilter_s;
    if (!(tf > 0.0)) {
        filtered_ = now;
        return 0.0;
    }
    if (step > 0.0) { // the filter's exact answer to a straight input
        const double behind = (now - deviation_) / step * tf;
        filtered_ = now - behind + (filtered_ - deviation_ + behind) * numerics::exp(-step / tf);
    }
    return kd_s * (now - filtered_) / tf;
}

Order PidGovernor::decide(const Measured& measured) {
    if (measured.onGrid != onGrid_) {
        changeMode(measured);
    }
    const PidGains& k = gains(measured.onGrid);
    const double step = measured.step_s;
    const double now = deviation(measured);

    const double derivative = advanceDerivative(now, k.kd_s, step);

    // order = base + K·e' with e' = plain − b_p·order, K = K_p + ½K_iΔt: linear in the order.
    const double gain = k.kp + 0.5 * k.ki_1s * step;
    const double carried = integral_ + 0.5 * step * (k.ki_1s * error_ + windUp_1s_);
    const double base = spec_.feedForward * measured.reference.opening_pu + carried + derivative;
    const double feedback = spec_.droopOn == DroopOn::opening ? droop(onGrid_) : 0.0;
    const double plain = errorWith(measured, 0.0);
    const double wanted = (base + gain * plain) / (1.0 + gain * feedback);
    order_ = std::clamp(wanted, 0.0, spec_.openingLimit_pu);
    error_ = plain - feedback * order_;
    windUp_1s_ = order_ == wanted ? 0.0 : leadBack(base + gain * error_, step);
    integral_ = carried + 0.5 * step * (k.ki_1s * error_ + windUp_1s_);
    deviation_ = now;
    return {order_};
}

double PidGovernor::errorWith(const Measured& measured, double order) const {
    const double bp = droop(onGrid_);
    const double missing = spec_.droopOn == DroopOn::opening
                               ? measured.reference.opening_pu - order
                               : measured.reference.power_pu - measured.power_pu;
    return deviation(measured) + bp * missing;
}

double PidGovernor::leadBack(double driven, double step) const {
    // unlimited = driven + ½Δt·w with w = (order − unlimited)/T_t, solved for w.
    const PidGains& k = gains(onGrid_);
    constexpr double whenNoIntegral_s = 1.0; // nothing winds up then; any time will do
    const double natural_s = k.ki_1s > 0.0 && k.kp > 0.0 ? k.kp / k.ki_1s : whenNoIntegral_s;
    return (order_ - driven) / (spec_.windUpTime_s.value_or(natural_s) + 0.5 * step);
}

} // namespace headroom::control
