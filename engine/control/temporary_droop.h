// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"

#include <string>

namespace headroom::control {

/// Parallel gains, opening (share) per speed (share): K_p + K_i/s + K_d·s/(1 + T_f s).
struct PidGains {
    double kp = 0.0;
    double ki_1s = 0.0;
    double kd_s = 0.0;
};

/// Temporary-droop form of a governor with permanent droop on its own output:
/// (1 + T_d s)(1 + T_n s)/(b_t T_d s) in series, or 1/b_t·(1 + 1/(T_d s) + T_n s) in parallel.
struct TemporaryDroop {
    double bt = 0.0;    ///< > 0
    double td_s = 0.0;  ///< > 0
    double tn_s = 0.0;  ///< ≥ 0
    bool series = true; ///< how T_n enters; without T_n the two are the same
};
/// Exact parallel gains, or a finding.
Result<PidGains> parallelGains(const TemporaryDroop& form, const std::string& subject = {});
/// Back again; the series form exists only where K_p² ≥ 4·K_i·K_d.
Result<TemporaryDroop> temporaryDroop(const PidGains& gains, bool series,
                                      const std::string& subject = {});
/// Starting values for a unit alone on its load: b_t = 2.25·T_w/T_a, T_d = 5·T_w, no derivative
/// (the middle of the usual 2…2.5 and 4…6; common practice, no source).
TemporaryDroop isolatedSettings(double waterStartingTime_s, double accelerationTime_s);

} // namespace headroom::control
