// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/load_control.h"
#include "control/pid_governor.h"
#include "control/servo.h"
#include "machines/francis_chart.h"
#include "support/catch.h"

#include <cmath>
#include <cstdio>
#include <cstdlib>

using namespace headroom;
using namespace headroom::control;

namespace {
machines::FrancisRating rating() {
    machines::FrancisRating r;
    r.ratedHead_m = 222; r.ratedFlow_m3s = 60; r.ratedSpeed_rads = 1000.0/3 * 3.14159265358979 / 30;
    r.ratedPower_W = 121.5e6; r.runnerDiameter_m = 2.44;
    r.runaway_pu = 1.73; r.noLoadFlow_pu = .08; r.standstillFlow_pu = 1.15; r.bestPower_pu = .88;
    r.bestEfficiency_pu = .939; r.halfPowerEfficiency_pu = .880;
    r.flowByStroke = {{0,0},{.1,.12},{.25,.29},{.5,.55},{.75,.79},{1,1}};
    return r;
}
}

TEST_CASE("rej") {
    const auto chart = machines::FrancisChart::calibrate(rating()).value();
    ServoSpec servo{.opening_s = 8, .closing = {{0.0, 9.0}}, .cushionBelow_pu = 0.12, .cushion_s = 3, .deadTime_s = 0.2, .lag_s = 0.15};
    REQUIRE(check(servo).empty());
    PidSpec pid; pid.gains = {2.2, 0.33, 0.6}; pid.droop = 0.06;
    if (getenv("NL")) { auto td = isolatedSettings(1.63, 7.11); pid.noLoad = parallelGains(td).value(); }
    if (getenv("TT")) pid.windUpTime_s = atof(getenv("TT"));
    auto gov = PidGovernor::make(pid).value();
    const double dt = 0.005;
    double y = 0.934;
    const double head = (512 - 270) / 222.0; // static
    const double loss = 10.0 / 222; // at q=1 
    // rest
    double q = 1.0, n = 1.0;
    for (int i = 0; i < 100; ++i) { q = chart.flow(head - loss * q * q, 1.0, chart.gate().relativeOpening(y)); }
    const double h0 = head - loss*q*q;
    const double ynl = chart.gate().stroke(chart.noLoadOpening(head, 1.0));
    printf("ynl %.4f h0 %.3f\n", ynl, h0);
    auto state = servoAtRest(servo, y, dt);
    Measured m; m.opening_pu = y; m.speed_pu = 1;
    auto ref = gov.rest(m);
    (void)ref;
    const double I = 60/(9.81*222)*(650/11.95+22/9.+28/12.);
    const double Ta = 700000*std::pow(1000.0/3*3.14159265/30,2)/121.5e6;
    printf("Tw %.3f Ta %.3f power %.3f\n", I, Ta, chart.netPower(h0,1,chart.gate().relativeOpening(y)));
    double order = y, nmax=0,hmax=0;
    for (int k = 0; k < 60000; ++k) {
        double t = k*dt;
        m.time_s = t+dt; m.step_s = dt; m.onGrid = false; m.speed_pu = n; m.opening_pu = state.opening_pu; m.reference = {ynl, 0};
        double next = gov.decide(m).opening_pu;
        advance(servo, state, {order, next}, t, dt); order = next;
        double tau = chart.gate().relativeOpening(state.opening_pu);
        double c = 1/std::max(tau, 0.003);
        double qn = q;
        machines::ChartPoint p;
        if (tau < 0.003) { p = chart.shut(n); qn = 0; }
        else for (int i=0;i<30;++i){ p = chart.at(qn,n,c); double f = I*(qn-q)/dt - (head - loss*qn*std::fabs(qn) - p.h); double s = I/dt + 2*loss*std::fabs(qn)+p.dh_dq; qn -= f/s; }
        q = qn; n += dt/Ta*p.m;
        nmax = std::max(nmax,n); hmax=std::max(hmax,p.h);
        if (k % 1000 == 0 ) printf("%6.2f n %.4f y %.4f order %.4f q %.4f h %.4f m %.4f\n", t, n, state.opening_pu, order, q, p.h, p.m);
    }
    printf("nmax %.4f hmax %.4f\n", nmax, (hmax-head)*222);
}
