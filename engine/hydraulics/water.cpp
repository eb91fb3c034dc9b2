// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/water.h"

#include "base/constants.h"
#include "hydraulics/messages.h"
#include "units/text.h"

#include <array>

namespace headroom::hydraulics {

namespace {

// Water at 101 325 Pa by the IAPWS-95 formulation: temperature, density, isentropic bulk modulus,
// kinematic viscosity, vapour pressure.
struct WaterRow {
    double temperature_degC, density_kgm3, bulkModulus_GPa, viscosity_mm2s, vapourPressure_Pa;
};
constexpr std::array<WaterRow, 7> rows{{
    {0.01, 999.844, 1.96651, 1.7914, 611.7},
    {5.0, 999.967, 2.03389, 1.5182, 872.6},
    {10.0, 999.703, 2.09397, 1.3063, 1228.2},
    {15.0, 999.103, 2.14702, 1.1386, 1705.7},
    {20.0, 998.207, 2.19341, 1.0034, 2339.2},
    {25.0, 997.048, 2.23350, 0.89266, 3169.7},
    {30.0, 995.650, 2.26764, 0.80071, 4246.7},
}};

using Column = std::array<double, rows.size()>;

template <class Pick>
Column column(Pick pick) {
    Column made{};
    for (std::size_t i = 0; i < rows.size(); ++i) {
        made[i] = pick(rows[i]);
    }
    return made;
}

// The polynomial through all rows, by Newton's divided differences.
double throughRows(Column y, double temperature_degC) {
    for (std::size_t order = 1; order < y.size(); ++order) {
        for (std::size_t i = y.size() - 1; i >= order; --i) {
            y[i] =
                (y[i] - y[i - 1]) / (rows[i].temperature_degC - rows[i - order].temperature_degC);
        }
    }
    double value = y.back();
    for (std::size_t i = y.size() - 1; i-- > 0;) {
        value = y[i] + (temperature_degC - rows[i].temperature_degC) * value;
    }
    return value;
}

Finding altitudeFinding(double altitude_m, const std::string& subject) {
    return {.message = &altitudeOutOfRange,
            .subject = subject,
            .arguments = {{"altitude", amount(Quantity::elevation, altitude_m)},
                          {"lowest", amount(Quantity::elevation, lowestAltitude_m)},
                          {"highest", amount(Quantity::elevation, highestAltitude_m)}}};
}

bool altitudeKnown(double altitude_m) {
    return altitude_m >= lowestAltitude_m && altitude_m <= highestAltitude_m;
}

} // namespace

Result<Water> waterAt(double temperature_degC, const std::string& subject) {
    if (!(temperature_degC >= coldestWater_degC && temperature_degC <= warmestWater_degC)) {
        const auto celsius = [](double value) {
            return amount(Quantity::temperature, toSi(Quantity::temperature, value));
        };
        return Finding{.message = &temperatureOutOfRange,
                       .subject = subject,
                       .arguments = {{"temperature", celsius(temperature_degC)},
                                     {"lowest", celsius(coldestWater_degC)},
                                     {"highest", celsius(warmestWater_degC)}}};
    }
    static const Column density = column([](const WaterRow& r) { return r.density_kgm3; });
    static const Column modulus = column([](const WaterRow& r) { return r.bulkModulus_GPa; });
    static const Column viscosity =
        column([](const WaterRow& r) { return numerics::log(r.viscosity_mm2s); });
    static const Column vapour =
        column([](const WaterRow& r) { return numerics::log(r.vapourPressure_Pa); });
    const double t = temperature_degC;
    return Water{throughRows(density, t), 1e9 * throughRows(modulus, t),
                 1e-6 * numerics::exp(throughRows(viscosity, t)),
                 numerics::exp(throughRows(vapour, t))};
}

Result<double> gravityAt(double latitude_rad, double altitude_m, const std::string& subject) {
    Findings findings;
    if (!(latitude_rad >= -0.5 * constants::pi && latitude_rad <= 0.5 * constants::pi)) {
        findings.push_back({.message = &latitudeOutOfRange,
                            .subject = subject,
                            .arguments = {{"latitude", amount(Quantity::angle, latitude_rad)}}});
    }
    if (!altitudeKnown(altitude_m)) {
        findings.push_back(altitudeFinding(altitude_m, subject));
    }
    if (!findings.empty()) {
        return findings;
    }
    constexpr double equator = 9.7803; // at sea level [m/s²]
    constexpr double flattening = 0.0053;
    constexpr double perMetre = 3e-6; // [1/s²]
    return equator * (1.0 + flattening * numerics::square(numerics::sin(latitude_rad)))
           - perMetre * altitude_m;
}

Result<double> airPressureAt(double altitude_m, const std::string& subject) {
    if (!altitudeKnown(altitude_m)) {
        return altitudeFinding(altitude_m, subject);
    }
    constexpr double lapse = 2.25577e-5; // [1/m]
    constexpr double exponent = 5.25588;
    return constants::standardAir_Pa * numerics::pow(1.0 - lapse * altitude_m, exponent);
}

double vapourHead_m(const Water& water, double airPressure_Pa, double gravity_mps2) {
    return (water.vapourPressure_Pa - airPressure_Pa) / (water.density_kgm3 * gravity_mps2);
}

} // namespace headroom::hydraulics
