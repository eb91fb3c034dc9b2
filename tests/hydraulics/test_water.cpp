// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "hydraulics/messages.h"
#include "hydraulics/water.h"
#include "support/catch.h"
#include "units/text.h"

#include <array>
#include <cmath>

using namespace headroom;
using namespace headroom::hydraulics;

namespace {

// Independent formulas, for places between the rows of the table.

// Del Grosso & Mader 1972 / Marczak 1997, J. Acoust. Soc. Am. 102, 2776: sound speed.
double marczak(double t) {
    return 1402.385
           + t
                 * (5.038813
                    + t * (-5.799136e-2 + t * (3.287156e-4 + t * (-1.398845e-6 + t * 2.78786e-9))));
}
// Kell 1975, density of air-free water; from memory.
double kell(double t) {
    return (999.83952
            + t
                  * (16.945176
                     + t
                           * (-7.9870401e-3
                              + t * (-46.170461e-6 + t * (105.56302e-9 - t * 280.54253e-12)))))
           / (1.0 + 16.879850e-3 * t);
}
// Wagner & Pruss 2002, saturation pressure; from memory.
double wagnerPruss(double t) {
    const double kelvin = t + 273.15, tau = 1.0 - kelvin / 647.096;
    const double sum = -7.85951783 * tau + 1.84408259 * std::pow(tau, 1.5)
                       - 11.7866497 * std::pow(tau, 3) + 22.6807411 * std::pow(tau, 3.5)
                       - 15.9618719 * std::pow(tau, 4) + 1.80122502 * std::pow(tau, 7.5);
    return 22.064e6 * std::exp(647.096 / kelvin * sum);
}
// Kestin, Sokolov & Wakeham 1978, dynamic viscosity against 1.002 mPa s at 20 °C; from memory.
double kestin(double t) {
    const double d = 20.0 - t;
    return 1.002e-3 * std::pow(10.0, d / (t + 96.0) * (1.2364 - 1.37e-3 * d + 5.7e-6 * d * d));
}

} // namespace

TEST_CASE("Water: the table's rows come back", "[hydraulics][reference]") {
    // Source: IAPWS-95 at 101 325 Pa, recomputed with a steam-property library; columns:
    // T, ρ, K_S [GPa], sound speed, p_v, ν.
    const std::array<std::array<double, 6>, 7> rows{
        {{0.01, 999.844, 1.96651, 1402.43, 611.7, 1.7914e-6},
         {5, 999.967, 2.03389, 1426.17, 872.6, 1.5182e-6},
         {10, 999.703, 2.09397, 1447.27, 1228.2, 1.3063e-6},
         {15, 999.103, 2.14702, 1465.93, 1705.7, 1.1386e-6},
         {20, 998.207, 2.19341, 1482.35, 2339.2, 1.0034e-6},
         {25, 997.048, 2.23350, 1496.70, 3169.7, 8.9266e-7},
         {30, 995.650, 2.26764, 1509.15, 4246.7, 8.0071e-7}}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        const auto water = waterAt(row[0]);
        REQUIRE(water);
        CHECK_THAT(water->density_kgm3, WithinRel(row[1], 1e-12));
        CHECK_THAT(water->bulkModulus_Pa, WithinRel(row[2] * 1e9, 1e-12));
        CHECK_THAT(water->soundSpeed_mps(), WithinRel(row[3], 1e-5)); // rounding of K and ρ
        CHECK_THAT(water->vapourPressure_Pa, WithinRel(row[4], 1e-12));
        CHECK_THAT(water->viscosity_m2s, WithinRel(row[5], 1e-12));
    }
}

TEST_CASE("Water: between the rows", "[hydraulics][reference]") {
    // Tolerances asked: ρ 0.05 %, K 1 %, c 0.5 %, p_v 1 %, ν 1 %. Held here: those in water.h.
    for (double t = 0.0; t <= 30.0; t += 0.25) {
        CAPTURE(t);
        const auto water = waterAt(t);
        REQUIRE(water);
        CHECK_THAT(water->density_kgm3, WithinRel(kell(t), 1e-5));
        CHECK_THAT(water->soundSpeed_mps(), WithinRel(marczak(t), 5e-5));
        CHECK_THAT(water->bulkModulus_Pa, WithinRel(kell(t) * marczak(t) * marczak(t), 1e-4));
        CHECK_THAT(water->vapourPressure_Pa, WithinRel(wagnerPruss(t), 1e-4));
        CHECK_THAT(water->viscosity_m2s, WithinRel(kestin(t) / kell(t), 5e-3));
    }
    // The polynomial's own printed values.
    CHECK_THAT(waterAt(10.0)->soundSpeed_mps(), WithinAbs(1447.289, 0.03));
    CHECK_THAT(waterAt(20.0)->soundSpeed_mps(), WithinAbs(1482.380, 0.04));
    CHECK_THAT(waterAt(30.0)->soundSpeed_mps(), WithinAbs(1509.167, 0.03));
}

TEST_CASE("Water: outside the table there is a finding, never a guess", "[hydraulics][messages]") {
    for (const double t : {-0.1, 30.1, std::nan(""), 1e300}) {
        const auto water = waterAt(t, "site");
        REQUIRE_FALSE(water);
        CHECK(water.findings()[0].message == &temperatureOutOfRange);
        CHECK_THAT(text(water.findings()[0]), ContainsSubstring("30.0") && ContainsSubstring("°C"));
    }
}

TEST_CASE("Site: gravity by latitude and altitude", "[hydraulics][reference]") {
    // Source: IEC 60041:1991, from memory; recomputed.
    const double degree = constants::pi / 180.0;
    CHECK_THAT(*gravityAt(60 * degree, 0.0), WithinAbs(9.819177, 5e-7));
    CHECK_THAT(*gravityAt(60 * degree, 500.0), WithinAbs(9.817677, 5e-7));
    CHECK_THAT(*gravityAt(45 * degree, 0.0), WithinAbs(9.806218, 5e-7));
    // Cross-check: GRS80 short formula, from memory.
    CHECK_THAT(*gravityAt(60 * degree, 500.0), WithinAbs(9.817636, 5e-5));
    const auto nowhere = gravityAt(91 * degree, 9000.0);
    REQUIRE_FALSE(nowhere);
    CHECK(nowhere.findings().size() == 2);
}

TEST_CASE("Site: air pressure by altitude", "[hydraulics][reference]") {
    // Source: ICAO standard atmosphere, from memory; recomputed.
    const std::array<std::array<double, 3>, 6> rows{{{0, 101325.0, 10.3287},
                                                     {500, 95460.8, 9.7310},
                                                     {1000, 89874.6, 9.1615},
                                                     {1500, 84556.0, 8.6194},
                                                     {2000, 79495.2, 8.1035},
                                                     {3000, 70108.5, 7.1466}}};
    for (const auto& [altitude, pressure, head] : rows) {
        CHECK_THAT(*airPressureAt(altitude), WithinAbs(pressure, 0.06));
        CHECK_THAT(*airPressureAt(altitude) / 9810.0, WithinAbs(head, 6e-5));
    }
    // Gauge vapour head at 10 °C, sea level, with ρ g = 9810 N/m³.
    Water water = *waterAt(10.0);
    water.density_kgm3 = 1000.0;
    CHECK_THAT(vapourHead_m(water, *airPressureAt(0.0), 9.81), WithinAbs(-10.2035, 6e-5));
    CHECK_FALSE(airPressureAt(std::nan("")));
}
