// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "machines/francis_form.h"
#include "machines/gate_law.h"

#include <optional>
#include <string>
#include <utility>
#include <vector>

namespace headroom::machines {

/// What is known of a Francis turbine. The four rated values are needed; the others have defaults
/// that `FrancisChart::calibrate` fills in and `FrancisTargets` shows.
struct FrancisRating {
    double ratedHead_m = 0.0;     ///< net head, > 0
    double ratedFlow_m3s = 0.0;   ///< > 0
    double ratedSpeed_rads = 0.0; ///< > 0
    double ratedPower_W = 0.0;    ///< at the shaft; fixes the rated efficiency
    double gravity_mps2 = 9.81;
    double density_kgm3 = 1000.0;
    std::optional<double> runnerDiameter_m = {};  ///< inlet; else from the specific speed
    std::optional<double> runaway_pu = {};        ///< of rated speed, full opening, rated head
    std::optional<double> noLoadFlow_pu = {};     ///< of rated flow at rated head and speed
    std::optional<double> standstillFlow_pu = {}; ///< of rated flow, full opening, rated head
    std::optional<double> bestPower_pu = {};      ///< of rated power, where efficiency is best
    std::optional<double> bestEfficiency_pu = {};
    std::optional<double> halfPowerEfficiency_pu = {};
    std::vector<std::pair<double, double>> flowByStroke =
        {}; ///< shares of one; empty: a straight line
};

/// The rating with every default filled in, per unit of rated.
struct FrancisTargets {
    double ratedEfficiency = 0.0;
    double runnerDiameter_m = 0.0;
    double u1 = 0.0; ///< U₁
    double specificSpeed_mhp = 0.0;
    double runaway = 0.0, noLoadFlow = 0.0, standstillFlow = 0.0;
    double bestPower = 0.0, bestEfficiency = 0.0, halfPowerEfficiency = 0.0;
};

/// What the calibration asked for and what the chart gives.
struct CalibrationRow {
    std::string name; ///< "runaway speed"
    double asked = 0.0, reached = 0.0, tolerance = 0.0;
    double residual() const { return (asked - reached) / tolerance; }
};

/// One steady point of the unit at a given head, speed and opening, per unit of rated.
struct FrancisPoint {
    double q = 0.0, m = 0.0;
    double power = 0.0;      ///< m·n
    double efficiency = 0.0; ///< absolute; 0 where no water power is taken
};

/// Synthetic chart of a Francis turbine: the closed form, its gate law and its scale.
/// Const after calibration; shared between runs.
class FrancisChart {
public:
    /// Fits the form's six free shape parameters to the rating and refuses what it cannot meet:
    /// the finding names the worst residual, its size and how to mend it.
    /// @param subject path of the unit, for the findings
    static Result<FrancisChart> calibrate(const FrancisRating& rating,
                                          const std::string& subject = {});

    /// Head and torque at flow q, speed n and c = 1/τ, per unit. For c above 1/`shutOpening`
    /// the gate counts as shut and q is taken as 0.
    ChartPoint at(double q, double n, double c) const {
        return c < 1.0 / shutOpening ? form_.at(q, n, c) : form_.shut(n);
    }
    ChartPoint shut(double n) const { return form_.shut(n); }

    /// The flow at which the runner takes head h at speed n and relative opening τ.
    double flow(double h, double n, double relativeOpening) const;
    FrancisPoint point(double h, double n, double relativeOpening) const;
    /// Speed at which the torque vanishes at head h > 0 and this opening: runaway.
    FrancisPoint runaway(double h, double relativeOpening, double* speed) const;
    /// The smallest relative opening that keeps speed n without load at head h.
    double noLoadOpening(double h, double n) const;
    /// Efficiency, absolute, at head h, speed n, opening τ; 0 where no water power is taken.
    double efficiency(double h, double n, double relativeOpening) const;
    /// Shaft power per unit of rated.
    double netPower(double h, double n, double relativeOpening) const;

    const FrancisForm& form() const { return form_; }
    const GateLaw& gate() const { return gate_; }
    const FrancisTargets& targets() const { return targets_; }
    const std::vector<CalibrationRow>& calibration() const { return calibration_; }

    // Scale: SI value = per-unit value times these.
    double ratedHead_m() const { return rating_.ratedHead_m; }
    double ratedFlow_m3s() const { return rating_.ratedFlow_m3s; }
    double ratedSpeed_rads() const { return rating_.ratedSpeed_rads; }
    double ratedPower_W() const { return rating_.ratedPower_W; }
    double ratedTorque_Nm() const { return rating_.ratedPower_W / rating_.ratedSpeed_rads; }

    /// Below this relative opening the gate counts as shut.
    static constexpr double shutOpening = 1e-6;

private:
    FrancisChart(FrancisRating rating, FrancisTargets targets, FrancisForm form, GateLaw gate,
                 std::vector<CalibrationRow> calibration);

    FrancisRating rating_;
    FrancisTargets targets_;
    FrancisForm form_;
    GateLaw gate_;
    std::vector<CalibrationRow> calibration_;
};

/// Fills in the defaults of a rating whose four rated values are positive.
FrancisTargets targetsOf(const FrancisRating& rating);

} // namespace headroom::machines
