// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <limits>
#include <optional>
#include <span>
#include <string>

/// Grid: one frequency for a whole area.
namespace headroom::grid {

/// Every other governed unit of the area as one.
struct ReserveSpec {
    double power_W = 0.0;                                    ///< rating on which the droop is based
    double droop = 0.04;                                     ///< share of frequency for full power
    double lag_s = 5.0;                                      ///< first order; 0: at once
    double deadBand_Hz = 0.0;                                ///< half width without action
    double most_W = std::numeric_limits<double>::infinity(); ///< largest increase
    double least_W = -std::numeric_limits<double>::infinity(); ///< largest decrease, ≤ 0
};

struct AreaSpec {
    double nominal_Hz = 50.0;
    double storedEnergy_J = 0.0; ///< E_k of everything but the plant's own units, > 0
    double load_W = 0.0;
    double loadDamping_1Hz = 0.0; ///< share of the load per Hz
    std::optional<ReserveSpec> reserve = {};
};

Findings check(const AreaSpec& spec, const std::string& subject = {});

struct AreaState {
    double deviation_Hz = 0.0; ///< from the frequency at rest
    double rate_Hzs = 0.0;
    double reserve_W = 0.0;   ///< of the other units, from rest
    double imbalance_W = 0.0; ///< surplus accelerating the area, at this instant
};

/// Powers as deviations from rest, at the beginning and the end of a step, positive into the area.
struct AreaStep {
    double ownStart_W = 0.0, ownEnd_W = 0.0;   ///< of the plant's units minus their rest
    double lostStart_W = 0.0, lostEnd_W = 0.0; ///< lost generation, positive = lost
    double step_s = 0.0;
    double extraEnergy_J = 0.0; ///< of units locked to the frequency, at nominal speed
};

/// (2E_k/f₀)·dΔf/dt = ΔP_own − ΔP_lost + ΔP_reserve − D·load·Δf by the trapezoid; the reserve's lag
/// exact for a frequency that varies linearly over the step. Pure: nothing is committed, so a
/// caller may ask several times within its own iteration.
AreaState advance(const AreaSpec& spec, const AreaState& state, const AreaStep& step);

/// Slope of the new deviation by own power at the end of the step [Hz/W], for a caller's Newton.
double deviationByPower(const AreaSpec& spec, const AreaStep& step);

/// Steady deviation after a lasting loss, dead band and limits included [Hz].
double steadyDeviation_Hz(const AreaSpec& spec, double lost_W);

/// f₀·ΔP/(2E_k), negative for a loss [Hz/s].
double initialRate_Hzs(const AreaSpec& spec, double lost_W);

/// Generation lost in the area at an instant.
struct Loss {
    double time_s = 0.0;
    double power_W = 0.0;
};
/// Sum of the losses that have happened strictly before or at `time_s`.
double lost_W(std::span<const Loss> losses, double time_s);

} // namespace headroom::grid
