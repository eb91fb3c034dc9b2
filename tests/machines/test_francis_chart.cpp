// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/francis_chart.h"
#include "machines/francis_solve.h"
#include "support/catch.h"
#include "units/text.h"
#include <cstdio>
using namespace headroom::machines;
TEST_CASE("print") {
    FrancisRating r;
    r.ratedHead_m = 222; r.ratedFlow_m3s = 60; r.ratedSpeed_rads = 333.333 * 3.14159265358979 / 30;
    r.ratedPower_W = 0.930 * 1000 * 9.81 * 222 * 60; r.runnerDiameter_m = 2.44;
    r.runaway_pu = 1.73; r.noLoadFlow_pu = .08; r.standstillFlow_pu = 1.15; r.bestPower_pu = .88;
    r.bestEfficiency_pu = .939; r.halfPowerEfficiency_pu = .880;
    r.flowByStroke = {{0,0},{.1,.12},{.25,.29},{.5,.55},{.75,.79},{1,1}};
    auto c = FrancisChart::calibrate(r);
    if (!c) { for (auto& f : c.findings()) puts(headroom::text(f).c_str()); }
    REQUIRE(c);
    auto& f = c->form();
    printf("U1 %.6f U2 %.5f phi %.5f qi %.5f zi %.5f zs %.5f kr %.5f e1 %.6f e2 %.6f kf %.6f\n", f.u1,f.u2,f.phi,1/(f.e1-f.e2),f.shockTurbine,f.exitTurbine,f.recirculation,f.e1,f.e2,f.frictionTurbine);
    printf("A %.5f B %.5f C %.5f\n", f.flowTerm(1), f.mixedTerm(1), f.speedTerm());
    for (auto& row : c->calibration()) printf("%s %g %.5f %.3f\n", row.name.c_str(), row.asked,row.reached,row.residual());
    for (double p : {.3,.4,.5,.6,.7,.8,.88,1.0}) { auto x = pointOfTorque(f,p); printf("%.2f %.4f\n", p, x->efficiency(f)); }
    for (double s : {.1,.25,.5,.75,1.}) { double n; auto p = c->runaway(1, c->gate().relativeOpening(s), &n); printf("stroke %.2f tau %.4f run %.4f q %.4f m %g\n", s, c->gate().relativeOpening(s), n, p.q,p.m); }
    printf("standstill torque %.4f half %.4f\n", c->point(1,0,1).m, c->point(1,0,.5).m);
    printf("zero flow %.4f %.4f\n", f.shut(1).h, f.shut(1).m);
    printf("noload tau %.4f\n", c->noLoadOpening(1,1));
    auto p = f.at(1,1,1); printf("dq/dn %.4f\n", -p.dh_dn/p.dh_dq);
}
