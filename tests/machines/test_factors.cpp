// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/factors.h"
#include "machines/francis_chart.h"
#include "support/catch.h"

#include <array>
#include <cmath>

#include "plant_a.h"

using namespace headroom;
using namespace headroom::machines;

namespace {

// Worked point used by the sources below.
const TurbineDuty duty{.speed_rpm = 1000.0 / 3.0,
                       .flow_m3s = 30.0,
                       .head_m = 250.0,
                       .diameter_m = 2.2,
                       .efficiency = 0.92};

} // namespace

TEST_CASE("Water starting time", "[factors][analytic]") {
    // Source: T_w = Q/(gH)·ΣL/A (IEC 61362; IEEE 1207, from memory; recomputed).
    const std::array pieces{ConduitPiece{400.0, 7.0}, ConduitPiece{300.0, 6.0},
                            ConduitPiece{50.0, 4.5}};
    CHECK_THAT(waterStartingTime_s(pieces, 30.0, 250.0, 9.81), WithinRel(1.446531722, 1e-9));
}

TEST_CASE("Numbers of an elastic penstock", "[factors][analytic]") {
    // Source: 2L/a, T_e, Z_n, T_w, Allievi (from memory; recomputed).
    const auto n = penstockNumbers({600.0, 7.0}, 1200.0, 30.0, 250.0, 9.81);
    CHECK_THAT(n.reflectionTime_s, WithinAbs(1.0, 1e-12));
    CHECK_THAT(n.travelTime_s, WithinAbs(0.5, 1e-12));
    CHECK_THAT(n.impedance_pu, WithinRel(2.096985583, 1e-9));
    CHECK_THAT(n.waterStartingTime_s, WithinRel(1.048492792, 1e-9));
    CHECK_THAT(n.allievi, WithinRel(1.048492792, 1e-9));
    // Slow changes: −Z_n tanh(T_e s) → −T_w s; at a quarter period of the pipe it has no bound.
    const std::complex<double> slow{0.0, 1e-4};
    CHECK_THAT(std::abs(pipeResponse(n, slow) / (-n.waterStartingTime_s * slow)),
               WithinAbs(1.0, 1e-8));
    CHECK(std::abs(pipeResponse(n, {0.0, constants::pi})) > 1e10);
}

TEST_CASE("Unit quantities and IEC factors", "[factors][analytic]") {
    // Source: IEC 60193 definitions (from memory; recomputed).
    CHECK_THAT(duty.power_W(), WithinRel(67.689e6, 1e-12));
    CHECK_THAT(duty.torque_Nm(), WithinRel(1939147.010, 1e-8));
    const auto unit = unitQuantities(duty);
    CHECK_THAT(unit.n11, WithinRel(46.380072349, 2e-6)); // source rounds n to 333.333 here
    CHECK_THAT(unit.q11, WithinRel(0.392017892, 1e-9));
    CHECK_THAT(unit.t11, WithinRel(728.454924767, 1e-8));
    CHECK_THAT(unit.p11, WithinRel(3538.039876680, 1e-10));
    const auto energy = energyFactors(duty);
    CHECK_THAT(energy.nEd, WithinRel(0.246800291, 1e-8));
    CHECK_THAT(energy.qEd, WithinRel(0.125161680, 1e-8));
    CHECK_THAT(energy.tEd, WithinRel(0.074256363, 1e-8));
    CHECK_THAT(energy.pEd, WithinRel(0.115148746, 1e-8));
    const auto speed = speedFactors(duty);
    CHECK_THAT(speed.eNd, WithinRel(16.417561983, 1e-9));
    CHECK_THAT(speed.qNd, WithinRel(0.507137491, 1e-9));
    CHECK_THAT(speed.tNd, WithinRel(1.219108448, 1e-9));
    CHECK_THAT(speed.pNd, WithinRel(7.659884291, 1e-9));
    // η = 2π n_ED T_ED/Q_ED closes the circle.
    CHECK_THAT(2.0 * constants::pi * energy.nEd * energy.tEd / energy.qEd, WithinRel(0.92, 1e-12));
    CHECK_THAT(energy.nEd, WithinRel(unit.n11 / (60.0 * std::sqrt(9.81)), 1e-12));
}

TEST_CASE("Specific speeds", "[factors][analytic]") {
    // Source: definitions (from memory; recomputed).
    const auto n = specificSpeeds(duty);
    CHECK_THAT(n.nQe, WithinRel(0.087313493, 1e-8));
    CHECK_THAT(n.nq, WithinRel(29.039181165, 1e-9));
    CHECK_THAT(n.kilowatt, WithinRel(87.239422799, 1e-9));
    CHECK_THAT(n.horsepower, WithinRel(101.723621678, 1e-9));
    CHECK_THAT(n.speedNumber, WithinRel(0.326203587, 1e-8));
    CHECK_THAT(n.nq / n.nQe, WithinRel(332.5853, 1e-6));
    CHECK_THAT(n.nq / n.speedNumber, WithinRel(89.0216, 1e-6));
    // Source: Encyclopaedia Britannica, article "Turbine", selection by specific speed:
    // 100 000 hp, 40 ft, 72 rpm → 226 (recomputed 226.338); 863.02 in kW and m with 12.192 m.
    CHECK_THAT(specificSpeed(72.0, 100e3, 40.0), WithinAbs(226.338, 1e-3));
    CHECK_THAT(specificSpeed(72.0, 74570.0, 12.192), WithinRel(863.02, 1e-4));
}

TEST_CASE("Trial values over head", "[factors][analytic]") {
    // Sources: USBR Engineering Monograph 20 (1976), De Siervo & de Leva (1976), ESHA guide (2004),
    // all from memory; recomputed.
    CHECK_THAT(trialSpecificSpeed_mhp(100.0), WithinAbs(233.40, 5e-3));
    CHECK_THAT(trialSpecificSpeed_mhp(250.0), WithinAbs(147.62, 1e-2));
    CHECK_THAT(trialSpecificSpeed_kW(100.0), WithinAbs(195.13, 5e-3));
    CHECK_THAT(trialSpecificSpeed_kW(400.0), WithinAbs(82.04, 5e-3));
    CHECK_THAT(trialEnergySpecificSpeed(250.0), WithinAbs(0.11388, 5e-6));
    CHECK_THAT(trialRunaway_pu(233.4), WithinAbs(1.8748, 5e-5));
    CHECK_THAT(trialRunaway_pu(147.62), WithinAbs(1.7107, 5e-5));
    CHECK_THAT(trialRunaway_pu(116.7), WithinAbs(1.6321, 5e-5));
}

TEST_CASE("Euler equation", "[factors][analytic]") {
    // Source: gH = u₁c_u1 − u₂c_u2 (from memory; recomputed).
    CHECK_THAT(eulerHead_m({55.0, 40.0, 25.0, 0.0}, 9.81), WithinRel(224.260958, 1e-8));
    CHECK_THAT(eulerHead_m({38.397243544, 34.073346416, 27.925268032, -1.358403529}, 9.81),
               WithinRel(137.233065, 1e-8));
}

TEST_CASE("Linear turbine coefficients", "[factors][analytic]") {
    // Source: definitions in IEEE notation (from memory); ideal unit and the analytic
    // characteristics q = y√(1.2h − 0.2n²), m = q(2u − n) (constructed case; derived).
    const LinearTurbine ideal = idealTurbine();
    CHECK(ideal.mH == 1.5);
    CHECK(ideal.mX == -1.0);
    CHECK(ideal.mY == 1.0);
    CHECK(ideal.qH == 0.5);
    CHECK(ideal.qX == 0.0);
    CHECK(ideal.qY == 1.0);
    // The analytic unit as a chart: h = ((q c)² + 0.2n²)/1.2, m = q(2 q c − n), slopes at 1, 1, 1.
    ChartPoint p;
    p.dh_dq = 2.0 / 1.2;
    p.dh_dn = 0.4 / 1.2;
    p.dh_dc = 2.0 / 1.2;
    p.dm_dq = 3.0; // 4qc − n
    p.dm_dn = -1.0;
    p.dm_dc = 2.0;
    const LinearTurbine unit = linearTurbine(p, 1.0);
    CHECK_THAT(unit.mH, WithinAbs(1.8, 1e-12));
    CHECK_THAT(unit.mX, WithinAbs(-1.6, 1e-12));
    CHECK_THAT(unit.mY, WithinAbs(1.0, 1e-12));
    CHECK_THAT(unit.qH, WithinAbs(0.6, 1e-12));
    CHECK_THAT(unit.qX, WithinAbs(-0.2, 1e-12));
    CHECK_THAT(unit.qY, WithinAbs(1.0, 1e-12));
}

TEST_CASE("Linear coefficients of a Francis chart are those of its own steady points",
          "[factors][invariant]") {
    const auto chart = FrancisChart::calibrate(tests::plantA()).value();
    const double tau = 0.8, q = chart.flow(1.0, 1.0, tau);
    const LinearTurbine unit = linearTurbine(chart.at(q, 1.0, 1.0 / tau), tau);
    const double d = 1e-5;
    const auto slope = [&](double dh, double dn, double dy, double FrancisPoint::*what) {
        return (chart.point(1.0 + dh, 1.0 + dn, tau + dy).*what
                - chart.point(1.0 - dh, 1.0 - dn, tau - dy).*what)
               / (2.0 * d);
    };
    CHECK_THAT(unit.qH, WithinAbs(slope(d, 0, 0, &FrancisPoint::q), 1e-8));
    CHECK_THAT(unit.qX, WithinAbs(slope(0, d, 0, &FrancisPoint::q), 1e-8));
    CHECK_THAT(unit.qY, WithinAbs(slope(0, 0, d, &FrancisPoint::q), 1e-8));
    CHECK_THAT(unit.mH, WithinAbs(slope(d, 0, 0, &FrancisPoint::m), 1e-8));
    CHECK_THAT(unit.mX, WithinAbs(slope(0, d, 0, &FrancisPoint::m), 1e-8));
    CHECK_THAT(unit.mY, WithinAbs(slope(0, 0, d, &FrancisPoint::m), 1e-8));
}
