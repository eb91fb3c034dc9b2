// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "control/controller.h"

#include <optional>
#include <string>

namespace headroom::control {

/// Parallel gains, opening (share) per speed (share): K_p + K_i/s + K_d·s/(1 + T_f s).
struct PidGains {
    double kp = 0.0;
    double ki_1s = 0.0;
    double kd_s = 0.0;
};

enum class DroopOn { opening, power };

struct PidSpec {
    PidGains gains;
    std::optional<PidGains> noLoad;  ///< off the grid; absent: the same gains
    double droop = 0.04;             ///< b_p, share of frequency for full opening or power; on the grid
    double noLoadDroop = 0.0;        ///< off the grid: 0 holds the speed exactly
    DroopOn droopOn = DroopOn::opening;
    double derivativeFilter_s = 0.05; ///< T_f, > 0 where K_d is not 0
    double deadBand_pu = 0.0;        ///< half width of speed deviation without action, on the grid
    double samplePeriod_s = 0.0;     ///< 0: continuous
    double openingLimit_pu = 1.0;    ///< opening limiter
    double feedForward = 1.0;        ///< share of the load reference sent straight to the order
    std::optional<double> windUpTime_s; ///< tracking time of the anti-windup; default K_p/K_i
};

/// PID speed governor with permanent droop:
///
///     e = n_ref − n + b_p·(reference − feedback)
///     order = feed-forward + K_p·e + ∫(K_i·e + (limited − order)/T_t) dt + K_d·s/(1+T_f s)·(n_ref − n)
///
/// The feedback of the droop is the order itself (droop on opening) or the measured power.
/// Integrals by the trapezoid, implicit in its own output; the derivative filter is exact for a
/// speed that varies linearly over the step. Order two where no limit acts.
/// Derivation: resources/theory/governor_and_grid.md.
class PidGovernor final : public Controller {
public:
    /// Refuses what cannot work: K_p, K_i, K_d < 0, no action at all, droop < 0, a derivative
    /// without filter, no integral with feed-forward off, limit outside (0, 1].
    static Result<PidGovernor> make(const PidSpec& spec, const std::string& subject = {});

    Order decide(const Measured& measured) override;
    LoadReference rest(const Measured& measured) override;
    std::unique_ptr<Controller> clone() const override;
    double samplePeriod_s() const override { return spec_.samplePeriod_s; }
    double shortestTime_s() const override;

    const PidSpec& spec() const { return spec_; }

private:
    explicit PidGovernor(const PidSpec& spec);
    const PidGains& gains(bool onGrid) const;
    double droop(bool onGrid) const;
    double deviation(const Measured& measured) const;
    double base(const Measured& measured) const;
    void changeMode(const Measured& measured);

    PidSpec spec_;
    bool onGrid_ = true;
    double deviation_ = 0.0; ///< n_ref − n after the dead band, at the last call
    double error_ = 0.0;     ///< e at the last call
    double integral_ = 0.0;  ///< share of opening
    double filtered_ = 0.0;  ///< state of the derivative filter
    double windUp_1s = 0.0;  ///< (limited − order)/T_t at the last call
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
