// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/constants.h"
#include "machines/francis_chart.h"

namespace headroom::tests {

/// The 120 MW Francis unit of the demo plant Dorvane (invented plant; its data sheet).
inline machines::FrancisRating plantA() {
    machines::FrancisRating r;
    r.ratedHead_m = 222.0;
    r.ratedFlow_m3s = 60.0;
    r.ratedSpeed_rads = 1000.0 / 3.0 * constants::pi / 30.0; // 18 poles at 50 Hz
    r.ratedPower_W = 121.5e6;
    r.runnerDiameter_m = 2.44;
    r.runaway_pu = 1.73;
    r.noLoadFlow_pu = 0.08;
    r.standstillFlow_pu = 1.15;
    r.bestPower_pu = 0.88;
    r.bestEfficiency_pu = 0.939;
    r.halfPowerEfficiency_pu = 0.880;
    r.flowByStroke = {{0.0, 0.0},   {0.10, 0.12}, {0.25, 0.29},
                      {0.50, 0.55}, {0.75, 0.79}, {1.00, 1.00}};
    return r;
}

} // namespace headroom::tests
