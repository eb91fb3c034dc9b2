// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/francis_chart.h"

#include "machines/francis_solve.h"
#include "numerics/elementary.h"
#include "numerics/roots.h"

#include <algorithm>
#include <cmath>

namespace headroom::machines {

using numerics::ValueAndSlope;

FrancisChart::FrancisChart(FrancisRating rating, FrancisTargets targets, FrancisForm form,
                           GateLaw gate, std::vector<CalibrationRow> calibration)
    : rating_(std::move(rating)), targets_(targets), form_(form), gate_(std::move(gate)),
      calibration_(std::move(calibration)) {}

double FrancisChart::flow(double h, double n, double relativeOpening) const {
    if (!(relativeOpening > shutOpening)) {
        return 0.0;
    }
    return flowAt(form_, h, n, 1.0 / relativeOpening);
}

FrancisPoint FrancisChart::point(double h, double n, double relativeOpening) const {
    if (!(relativeOpening > shutOpening)) {
        const ChartPoint still = form_.shut(n);
        return {0.0, still.m, still.m * n, 0.0};
    }
    const double q = flow(h, n, relativeOpening);
    const double m = form_.at(q, n, 1.0 / relativeOpening).m;
    const double water = q * h;
    const double share = water > 0.0 ? m * n / water : 0.0;
    return {q, m, m * n, form_.ratedEfficiency * share};
}

double FrancisChart::efficiency(double h, double n, double relativeOpening) const {
    return point(h, n, relativeOpening).efficiency;
}

double FrancisChart::netPower(double h, double n, double relativeOpening) const {
    return point(h, n, relativeOpening).power;
}

FrancisPoint FrancisChart::runaway(double h, double relativeOpening, double* speed) const {
    const double n = runawayAt(form_, 1.0 / relativeOpening) * numerics::sqrt(h);
    if (speed != nullptr) {
        *speed = n;
    }
    return point(h, n, relativeOpening);
}

double FrancisChart::noLoadOpening(double h, double n) const {
    const double unitSpeed = n / numerics::sqrt(h);
    const auto torque = [&](double tau) {
        const double c = 1.0 / tau;
        const double q = flowAt(form_, 1.0, unitSpeed, c);
        const ChartPoint p = form_.at(q, unitSpeed, c);
        const double dq_dc = -p.dh_dc / p.dh_dq;
        return ValueAndSlope{p.m, (p.dm_dc + p.dm_dq * dq_dc) * (-c * c)};
    };
    // From almost shut to fully open; without a change of sign the runner cannot hold the speed.
    constexpr double almostShut = 1e-3;
    const double open = gate_.largestOpening();
    const auto root = numerics::bracketedNewton(torque, almostShut, open, 0.1);
    return root.value_or(torque(open).value < 0.0 ? open : almostShut);
}

} // namespace headroom::machines
