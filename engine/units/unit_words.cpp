// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/expression.h"

#include "base/constants.h"

namespace headroom::expression {

namespace {

// Exact by definition: international foot and inch, standard gravity left out on purpose (a
// pressure head needs the water's density, so bar is no word for a head).
constexpr double foot_m = 0.3048, inch_m = 0.0254, pound_kg = 0.45359237;
constexpr double hour_s = 3600.0, minute_s = 60.0;
constexpr double psi_Pa = 6894.757293168361; // pound-force per square inch; definition
constexpr double horsepower_W = 745.6998715822702; // mechanical; definition
constexpr double metricHorsepower_W = 735.49875;   // definition

using Words = std::vector<UnitWord>;

Words lengths() {
    return {{"m", 1}, {"mm", 1e-3}, {"cm", 1e-2}, {"km", 1e3}, {"ft", foot_m}, {"in", inch_m}};
}
Words areas() {
    return {{"m²", 1}, {"m2", 1}, {"cm²", 1e-4}, {"cm2", 1e-4}, {"mm²", 1e-6}, {"mm2", 1e-6},
            {"ha", 1e4}, {"km²", 1e6}, {"km2", 1e6}, {"ft²", foot_m * foot_m},
            {"ft2", foot_m * foot_m}};
}
Words volumes() {
    return {{"m³", 1}, {"m3", 1}, {"l", 1e-3}, {"hm³", 1e6}, {"hm3", 1e6},
            {"ft³", foot_m * foot_m * foot_m}, {"ft3", foot_m * foot_m * foot_m}};
}
Words discharges() {
    return {{"m³/s", 1}, {"m3/s", 1}, {"l/s", 1e-3}, {"m³/h", 1 / hour_s}, {"m3/h", 1 / hour_s},
            {"cfs", foot_m * foot_m * foot_m}, {"ft³/s", foot_m * foot_m * foot_m},
            {"ft3/s", foot_m * foot_m * foot_m}};
}
Words times() {
    return {{"s", 1}, {"ms", 1e-3}, {"min", minute_s}, {"h", hour_s}, {"d", 24 * hour_s}};
}
Words powers() {
    return {{"MW", 1e6}, {"kW", 1e3}, {"W", 1}, {"GW", 1e9}, {"hp", horsepower_W},
            {"PS", metricHorsepower_W}};
}
Words pressures() {
    return {{"kPa", 1e3}, {"Pa", 1}, {"MPa", 1e6}, {"GPa", 1e9}, {"bar", 1e5}, {"mbar", 1e2},
            {"hPa", 1e2}, {"N/mm²", 1e6}, {"N/mm2", 1e6}, {"psi", psi_Pa}};
}

Words otherWords(Quantity quantity) {
    switch (quantity) {
    case Quantity::velocity:
        return {{"m/s", 1}, {"km/h", 1 / 3.6}, {"ft/s", foot_m}};
    case Quantity::gravity: return {{"m/s²", 1}, {"m/s2", 1}, {"ft/s²", foot_m}, {"ft/s2", foot_m}};
    case Quantity::rate: return {{"1/s", 1}, {"1/min", 1 / minute_s}};
    case Quantity::perUnit:
    case Quantity::speedRatio: return {{"pu", 1}, {"%", 0.01}};
    case Quantity::percent: return {{"%", 0.01}, {"pu", 1}};
    case Quantity::rotation:
        return {{"rpm", constants::pi / 30}, {"1/min", constants::pi / 30}, {"rad/s", 1},
                {"1/s", 2 * constants::pi}};
    case Quantity::apparentPower: return {{"MVA", 1e6}, {"kVA", 1e3}, {"VA", 1}, {"GVA", 1e9}};
    case Quantity::powerRate:
        return {{"MW/s", 1e6}, {"kW/s", 1e3}, {"MW/min", 1e6 / minute_s}};
    case Quantity::energy:
        return {{"GW·s", 1e9}, {"GWs", 1e9}, {"MW·s", 1e6}, {"MWs", 1e6}, {"MWh", 1e6 * hour_s},
                {"MJ", 1e6}, {"GJ", 1e9}};
    case Quantity::frequency: return {{"Hz", 1}, {"mHz", 1e-3}};
    case Quantity::frequencyRate: return {{"Hz/s", 1}, {"mHz/s", 1e-3}};
    case Quantity::loadDamping: return {{"%/Hz", 0.01}};
    case Quantity::inertia:
        return {{"t·m²", 1e3}, {"tm²", 1e3}, {"tm2", 1e3}, {"t·m2", 1e3}, {"kg·m²", 1},
                {"kgm²", 1}, {"kgm2", 1}, {"lb·ft²", pound_kg * foot_m * foot_m},
                {"lbft2", pound_kg * foot_m * foot_m}};
    case Quantity::temperature: return {{"°C", 1}, {"C", 1}};
    case Quantity::density: return {{"kg/m³", 1}, {"kg/m3", 1}, {"t/m³", 1e3}, {"t/m3", 1e3}};
    case Quantity::viscosity: return {{"mm²/s", 1e-6}, {"mm2/s", 1e-6}, {"m²/s", 1}, {"m2/s", 1}};
    case Quantity::throttleLoss: return {{"s²/m⁵", 1}, {"s2/m5", 1}};
    case Quantity::pressureRate:
        return {{"m/min", 1 / minute_s}, {"m/s", 1}, {"m/h", 1 / hour_s}};
    case Quantity::angle: return {{"°", constants::pi / 180}, {"deg", constants::pi / 180},
                                  {"rad", 1}};
    case Quantity::money: return {{"million", 1}, {"M", 1}};
    default: return {};
    }
}

Words wordsOf(Quantity quantity) {
    switch (quantity) {
    case Quantity::length:
    case Quantity::elevation:
    case Quantity::chainage:
    case Quantity::head:
    case Quantity::diameter:
    case Quantity::roughness:
    case Quantity::thickness: return lengths();
    case Quantity::area: return areas();
    case Quantity::volume: return volumes();
    case Quantity::discharge: return discharges();
    case Quantity::time: return times();
    case Quantity::power:
    case Quantity::load: return powers();
    case Quantity::pressure:
    case Quantity::modulus: return pressures();
    default: return otherWords(quantity);
    }
}

} // namespace

std::vector<UnitWord> unitWords(Quantity quantity) {
    auto words = wordsOf(quantity);
    for (std::size_t i = 1; i < words.size(); ++i) {
        if (words[i].word == info(quantity).symbol) {
            std::swap(words[0], words[i]);
        }
    }
    return words;
}

} // namespace headroom::expression
