// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/temporary_droop.h"

#include "control/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <cmath>

namespace headroom::control {

namespace {

Finding finding(const Message& message, const std::string& subject,
                std::vector<std::pair<std::string, Argument>> arguments) {
    return {.message = &message, .subject = subject, .arguments = std::move(arguments)};
}

Finding badValue(const std::string& subject, const std::string& name, Amount value) {
    return finding(temporaryDroopValues, subject, {{"name", name}, {"value", value}});
}

} // namespace

Result<PidGains> parallelGains(const TemporaryDroop& form, const std::string& subject) {
    Findings found;
    if (!(form.bt > 0.0) || !std::isfinite(form.bt)) {
        found.push_back(badValue(subject, "temporary droop", amount(Quantity::perUnit, form.bt)));
    }
    if (!(form.td_s > 0.0) || !std::isfinite(form.td_s)) {
        found.push_back(badValue(subject, "reset time", amount(Quantity::time, form.td_s)));
    }
    if (!(form.tn_s >= 0.0) || !std::isfinite(form.tn_s)) {
        found.push_back(badValue(subject, "derivative time", amount(Quantity::time, form.tn_s)));
    }
    if (!found.empty()) {
        return found;
    }
    const double proportional = form.series ? (form.td_s + form.tn_s) / form.td_s : 1.0;
    return PidGains{proportional / form.bt, 1.0 / (form.bt * form.td_s), form.tn_s / form.bt};
}

Result<TemporaryDroop> temporaryDroop(const PidGains& k, bool series, const std::string& subject) {
    if (!(k.ki_1s > 0.0) || !(k.kp > 0.0) || !(k.kd_s >= 0.0)) {
        return finding(noIntegralForm, subject,
                       {{"name", !(k.kp > 0.0) ? "a proportional part" : "an integral part"}});
    }
    if (!series || k.kd_s == 0.0) {
        return TemporaryDroop{1.0 / k.kp, k.kp / k.ki_1s, k.kd_s / k.kp, series};
    }
    const double left = numerics::square(k.kp);
    const double right = 4.0 * k.ki_1s * k.kd_s;
    if (!(left >= right)) {
        return finding(
            noSeriesForm, subject,
            {{"left", amount(Quantity::factor, left)}, {"right", amount(Quantity::factor, right)}});
    }
    const double root = numerics::sqrt(left - right);
    const double td = (k.kp + root) / (2.0 * k.ki_1s);
    return TemporaryDroop{1.0 / (k.ki_1s * td), td, 2.0 * k.kd_s / (k.kp + root), true};
}

TemporaryDroop isolatedSettings(double waterStartingTime_s, double accelerationTime_s) {
    constexpr double droopShare = 2.25, resetShare = 5.0;
    return {droopShare * waterStartingTime_s / accelerationTime_s, resetShare * waterStartingTime_s,
            0.0, true};
}

} // namespace headroom::control
