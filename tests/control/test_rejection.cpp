// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "control/pid_governor.h"
#include "control/servo.h"
#include "machines/francis_chart.h"
#include "machines/shaft.h"
#include "support/catch.h"

#include <cmath>

using namespace headroom;
using namespace headroom::control;

namespace {

/// The demo plant's unit, servo and penstock (invented plant), rigid column below still water.
struct Rejection {
    machines::FrancisChart chart = makeChart();
    ServoSpec servo{.opening_s = 8.0,
                    .closing = {{0.0, 9.0}},
                    .cushionBelow_pu = 0.12,
                    .cushion_s = 3.0,
                    .deadTime_s = 0.2,
                    .lag_s = 0.15};
    double step_s = 0.005;

    double highestSpeed = 0.0, closedFrom_s = -1.0, settled_s = -1.0, lowestAfter = 10.0;
    int reversals = 0; ///< of the gate, after it has left the closed end

    static machines::FrancisChart makeChart() {
        machines::FrancisRating r;
        r.ratedHead_m = 222.0;
        r.ratedFlow_m3s = 60.0;
        r.ratedSpeed_rads = 1000.0 / 3.0 * constants::pi / 30.0;
        r.ratedPower_W = 121.5e6;
        r.runnerDiameter_m = 2.44;
        r.runaway_pu = 1.73;
        r.flowByStroke = {{0.0, 0.0},   {0.10, 0.12}, {0.25, 0.29},
                          {0.50, 0.55}, {0.75, 0.79}, {1.00, 1.00}};
        return machines::FrancisChart::calibrate(r).value();
    }

    void run(PidGovernor governor) {
        const double head = (512.0 - 270.0) / 222.0, loss = 10.0 / 222.0;
        const double column = 60.0 / (9.81 * 222.0) * (650.0 / 11.95 + 22.0 / 9.0 + 28.0 / 12.0);
        const double ta = machines::accelerationTime_s(700e3, chart.ratedSpeed_rads(), 121.5e6);
        const double idle = chart.gate().stroke(chart.noLoadOpening(head, 1.0));
        Measured m;
        m.opening_pu = 0.934;
        m.reference = governor.rest(m);
        ServoState gate = servoAtRest(servo, 0.934, step_s);
        double q = 1.0, n = 1.0, order = 0.934, rate = 0.0;
        for (int i = 0; i < 100; ++i) {
            q = chart.flow(head - loss * q * q, 1.0, chart.gate().relativeOpening(0.934));
        }
        for (int i = 0; i < static_cast<int>(200.0 / step_s); ++i) {
            const double t = i * step_s;
            m = {.time_s = t + step_s,
                 .step_s = step_s,
                 .speed_pu = n,
                 .frequency_pu = 1.0,
                 .opening_pu = gate.opening_pu,
                 .power_pu = 0.0,
                 .inletHead_m = 0.0,
                 .chamberLevel_m = 0.0,
                 .reference = {idle, 0.0},
                 .speedReference_pu = 1.0,
                 .onGrid = false};
            const double next = governor.decide(m).opening_pu;
            advance(servo, gate, {order, next}, t, step_s);
            order = next;
            const double tau = chart.gate().relativeOpening(gate.opening_pu);
            machines::ChartPoint p = chart.shut(n);
            q = tau < 0.003 ? 0.0 : q;
            const double before = q;
            for (int k = 0; k < 20 && tau >= 0.003; ++k) {
                p = chart.at(q, n, 1.0 / tau);
                const double residual =
                    column * (q - before) / step_s - head + loss * q * std::fabs(q) + p.h;
                q -= residual / (column / step_s + 2.0 * loss * std::fabs(q) + p.dh_dq);
            }
            n += step_s / ta * p.m;
            note(t, n, gate, rate);
        }
    }

    void note(double t, double n, const ServoState& gate, double& rate) {
        highestSpeed = std::max(highestSpeed, n);
        if (closedFrom_s < 0.0 && gate.opening_pu == 0.0) {
            closedFrom_s = t;
        }
        if (closedFrom_s < 0.0) {
            return;
        }
        lowestAfter = std::min(lowestAfter, n);
        constexpr double moving = 1e-4; // 1/s, well above creeping to the end
        if (std::fabs(gate.rate_1s) > moving) {
            reversals += gate.rate_1s * rate < 0.0 ? 1 : 0;
            rate = gate.rate_1s;
        }
        if (std::fabs(n - 1.0) > 0.005) {
            settled_s = -1.0;
        } else if (settled_s < 0.0) {
            settled_s = t;
        }
    }
};

} // namespace

TEST_CASE("Rejection: the gate closes fully, then the speed settles without hunting",
          "[governor][run]") {
    // Once with the as-built gains kept off the grid, once with the starter settings for a unit
    // alone (b_t 2.25·T_w/T_a, T_d 5·T_w; common practice, no source).
    for (const bool starter : {false, true}) {
        PidSpec spec;
        spec.gains = {2.2, 0.33, 0.6};
        spec.droop = 0.06;
        if (starter) {
            spec.noLoad = parallelGains(isolatedSettings(1.63, 7.11)).value();
        }
        Rejection rejection;
        rejection.run(PidGovernor::make(spec).value());
        CAPTURE(starter, rejection.highestSpeed, rejection.closedFrom_s, rejection.settled_s);
        // Dead time, 0.934 → 0.12 at 9 s, cushion 3 s (derived here from the servo's data).
        CHECK_THAT(rejection.closedFrom_s, WithinAbs(0.2 + (0.934 - 0.12) * 9.0 + 3.0, 0.02));
        CHECK(rejection.highestSpeed > 1.39);
        CHECK(rejection.highestSpeed < 1.53); // without the tunnel's loss, so above the plant's own
        CHECK(rejection.lowestAfter > 0.975);
        CHECK(rejection.settled_s > 0.0);
        CHECK(rejection.settled_s < 80.0);
        CHECK(rejection.reversals <= 2); // opens, may ease back, rests
    }
}
