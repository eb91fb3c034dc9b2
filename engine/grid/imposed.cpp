// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/imposed.h"

#include "base/constants.h"
#include "base/overloaded.h"
#include "numerics/elementary.h"

namespace headroom::grid {

namespace {

double turns(const FrequencySine& sine) {
    return 2.0 * constants::pi / sine.period_s;
}

} // namespace

double frequency_Hz(const ImposedFrequency& law, double time_s) {
    return std::visit(
        overloaded{
            [&](const FrequencyStep& step) {
                return time_s > step.time_s ? step.after_Hz : step.before_Hz;
            },
            [&](const FrequencyRamp& ramp) {
                const double share = (time_s - ramp.time_s) / ramp.over_s;
                const double inside = share < 0.0 ? 0.0 : (share > 1.0 ? 1.0 : share);
                return ramp.from_Hz + inside * (ramp.to_Hz - ramp.from_Hz);
            },
            [&](const FrequencySine& sine) {
                const double since = time_s - sine.time_s;
                return since > 0.0
                           ? sine.mean_Hz + sine.amplitude_Hz * numerics::sin(turns(sine) * since)
                           : sine.mean_Hz;
            },
            [&](const FrequencyTable& table) { return table.rows.value(time_s - table.time_s); }},
        law);
}

double rate_Hzs(const ImposedFrequency& law, double time_s) {
    return std::visit(
        overloaded{[](const FrequencyStep&) { return 0.0; },
                   [&](const FrequencyRamp& ramp) {
                       const double since = time_s - ramp.time_s;
                       const bool moving = since >= 0.0 && since < ramp.over_s;
                       return moving ? (ramp.to_Hz - ramp.from_Hz) / ramp.over_s : 0.0;
                   },
                   [&](const FrequencySine& sine) {
                       const double since = time_s - sine.time_s;
                       return since >= 0.0 ? sine.amplitude_Hz * turns(sine)
                                                 * numerics::cos(turns(sine) * since)
                                           : 0.0;
                   },
                   [&](const FrequencyTable& table) {
                       const double since = time_s - table.time_s;
                       return since < table.rows.x().back() ? table.rows.slope(since) : 0.0;
                   }},
        law);
}

} // namespace headroom::grid
