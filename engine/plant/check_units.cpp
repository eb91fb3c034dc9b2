// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "plant/checks.h"

#include <cmath>

namespace headroom::plant {

namespace {

/// J within these multiples of the trend passes; about four times is the mark of a GD².
/// Common practice, no source.
constexpr double leastTrend = 0.35, mostTrend = 2.6, leastGd2 = 2.8, mostGd2 = 5.6;

void checkInertia(const Unit& unit, double speed_rads, const Path& at, Report& report) {
    if (!unit.inertia_kgm2 || !unit.generator) {
        return;
    }
    const double trend_kgm2 = usualInertia_kgm2(unit.generator->rated_VA, speed_rads);
    const double ratio = *unit.inertia_kgm2 / trend_kgm2;
    if (ratio > leastTrend && ratio < mostTrend) {
        return;
    }
    const auto inertia = [](double value) { return amount(Quantity::inertia, value); };
    Path path = at;
    path.insert(path.end(), {"inertia", "j_tm2"});
    const bool gd2 = ratio > leastGd2 && ratio < mostGd2;
    report.add(gd2 ? say::inertiaIsGd2 : say::inertiaUnusual, path,
               {{"value", inertia(*unit.inertia_kgm2)},
                {"trend", inertia(trend_kgm2)},
                {"quarter", inertia(*unit.inertia_kgm2 / 4.0)},
                {"rating", amount(Quantity::apparentPower, unit.generator->rated_VA)},
                {"speed", amount(Quantity::rotation, speed_rads)}});
}

void checkFrancis(const Unit& unit, const FrancisTurbine& turbine, const Path& at, Report& report) {
    const auto needs = [&](bool there, const char* key, const char* label) {
        if (!there) {
            report.add(say::turningNeeds, at,
                       {{"key", std::string(key)}, {"label", std::string(label)}});
        }
    };
    needs(unit.inertia_kgm2.has_value(), "inertia", "moment of inertia");
    needs(unit.generator.has_value(), "generator", "rating of the generator");
    needs(unit.servo.has_value(), "servo", "rates of the gate");
    // The water's power with the standard gravity; 2 % for colder water and higher places.
    const double water_W =
        1000.0 * constants::gravity_mps2 * turbine.ratedHead_m * turbine.ratedFlow_m3s;
    if (turbine.ratedPower_W > 1.02 * water_W) {
        Path path = at;
        path.insert(path.end(), {"turbine", "francis", "ratedPower_MW"});
        report.add(say::powerNotRated, path,
                   {{"power", amount(Quantity::power, turbine.ratedPower_W)},
                    {"water", amount(Quantity::power, water_W)}});
    }
    if (turbine.ratedSpeed_rads > 0.0) {
        checkInertia(unit, turbine.ratedSpeed_rads, at, report);
    }
}

void checkStages(const Unit& unit, const Path& at, Report& report) {
    if (!unit.servo || unit.servo->closingStages.empty()) {
        return;
    }
    const double last = unit.servo->closingStages.back().first;
    if (last > 0.0) {
        Path path = at;
        path.insert(path.end(), {"servo", "closingStages"});
        report.add(say::stageNotToClosed, path, {{"value", amount(Quantity::percent, last)}});
    }
}

} // namespace

double usualInertia_kgm2(double rated_VA, double speed_rads) {
    // Fitted to three machines of common practice: 722 t·m² at 135 MVA and 333.33 rpm, 218 at
    // 95 MVA and 500 rpm, 905 at 105 MVA and 250 rpm (within 0.3 %).
    constexpr double factor_kgm2 = 84.4e6;
    const double rated_MVA = fromSi(Quantity::apparentPower, rated_VA);
    const double speed_rpm = fromSi(Quantity::rotation, speed_rads);
    const double x = rated_MVA / (speed_rpm * std::sqrt(speed_rpm));
    return factor_kgm2 * x * std::sqrt(std::sqrt(x));
}

void checkUnits(const Plant& plant, Report& report) {
    for (int i = 0; i < plant.units.size(); ++i) {
        const auto& unit = plant.units[i];
        const Path at{"plant", "units", plant.units.name(i)};
        if (const auto* francis = std::get_if<FrancisTurbine>(&unit.turbine)) {
            if (francis->ratedPower_W > 0.0) { // else its kind or data are reported missing
                checkFrancis(unit, *francis, at, report);
            }
        }
        checkStages(unit, at, report);
    }
}

} // namespace headroom::plant
