// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "control/controller.h"
#include "control/temporary_droop.h"

#include <optional>
#include <string>

namespace headroom::control {

enum class DroopOn { opening, power };

struct PidSpec {
    PidGains gains = {};
    std::optional<PidGains> noLoad = {}; ///< off the grid; absent: the same gains
    double droop = 0.04;      ///< b_p, share of frequency for full opening or power; on the grid
    double noLoadDroop = 0.0; ///< off the grid: 0 holds the speed exactly
    DroopOn droopOn = DroopOn::opening;
    double derivativeFilter_s = 0.05; ///< T_f, > 0 where K_d is not 0
    double deadBand_pu = 0.0;         ///< half width of speed deviation without action, on the grid
    double samplePeriod_s = 0.0;      ///< 0: continuous
    double openingLimit_pu = 1.0;     ///< opening limiter
    double feedForward = 1.0;         ///< share of the load reference sent straight to the order
    std::optional<double> windUpTime_s = {}; ///< tracking time of the anti-windup; default K_p/K_i
};

/// PID speed governor with permanent droop:
///
///     e = n_ref − n + b_p·(reference − feedback)
///     order = feed-forward + K_p·e + ∫(K_i·e + (limited − order)/T_t) dt
///             + K_d·s/(1+T_f s)·(n_ref − n)
///
/// The feedback of the droop is the order itself (droop on opening) or the measured power.
/// Integrals by the trapezoid, implicit in its own output; the derivative filter is exact for a
/// speed that varies linearly over the step. Order two where no limit acts.
/// Derivation: resources/theory/governor_and_grid.md.
class PidGovernor final : public Controller {
public:
    /// Refuses what cannot work: negative or infinite values, no action at all, a derivative
    /// without filter, an opening limit outside (0, 1].
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
    double errorWith(const Measured& measured, double order) const;
    double advanceDerivative(double now, double kd_s, double step);
    double leadBack(double driven, double step) const;
    void changeMode(const Measured& measured);

    PidSpec spec_;
    bool onGrid_ = true;
    double deviation_ = 0.0; ///< n_ref − n after the dead band, at the last call
    double order_ = 0.0;     ///< the last order
    double error_ = 0.0;     ///< e at the last call
    double integral_ = 0.0;  ///< share of opening
    double filtered_ = 0.0;  ///< state of the derivative filter
    double windUp_1s_ = 0.0; ///< (limited − order)/T_t at the last call
};

} // namespace headroom::control
