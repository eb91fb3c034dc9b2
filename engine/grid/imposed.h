// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "numerics/table.h"

#include <variant>

namespace headroom::grid {

/// Constant until `time_s`, then another value.
struct FrequencyStep {
    double time_s = 0.0, before_Hz = 50.0, after_Hz = 50.0;
};
/// From one value to another along a straight line over `over_s` > 0.
struct FrequencyRamp {
    double time_s = 0.0, over_s = 1.0, from_Hz = 50.0, to_Hz = 50.0;
};
/// Sine about a mean from `time_s` on.
struct FrequencySine {
    double time_s = 0.0, mean_Hz = 50.0, amplitude_Hz = 0.0, period_s = 1.0;
};
/// Rows (s, Hz) counted from `time_s`; held before and after.
struct FrequencyTable {
    double time_s = 0.0;
    numerics::Table rows;
};

using ImposedFrequency = std::variant<FrequencyStep, FrequencyRamp, FrequencySine, FrequencyTable>;

/// Frequency at `time_s` [Hz], an exact function of counted time. At a step's own instant the value
/// is still the one before it.
double frequency_Hz(const ImposedFrequency& law, double time_s);
/// Its rate [Hz/s], the right-hand one at a corner.
double rate_Hzs(const ImposedFrequency& law, double time_s);

} // namespace headroom::grid
