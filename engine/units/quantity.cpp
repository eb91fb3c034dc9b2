// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/quantity.h"

#include "base/constants.h"
#include "base/ensure.h"

#include <fmt/format.h>

#include <array>
#include <cmath>

namespace headroom {

namespace {

constexpr double rpmToSi = constants::pi / 30.0;

// clang-format off
constexpr std::array rows{
    QuantityInfo{Quantity::count, "count", "", "", 1, 0, 0},
    QuantityInfo{Quantity::factor, "coefficient", "", "", 1, 0, 3},
    QuantityInfo{Quantity::perUnit, "share of base", "pu", "pu", 1, 0, 3},
    QuantityInfo{Quantity::percent, "percentage", "pct", "%", 0.01, 0, 1},
    QuantityInfo{Quantity::length, "length", "m", "m", 1, 0, 1},
    QuantityInfo{Quantity::elevation, "elevation", "m", "m", 1, 0, 1},
    QuantityInfo{Quantity::chainage, "chainage", "m", "m", 1, 0, 1},
    QuantityInfo{Quantity::head, "head", "m", "m", 1, 0, 1},
    QuantityInfo{Quantity::diameter, "diameter", "m", "m", 1, 0, 2},
    QuantityInfo{Quantity::roughness, "roughness", "mm", "mm", 1e-3, 0, 2},
    QuantityInfo{Quantity::thickness, "thickness", "mm", "mm", 1e-3, 0, 1},
    QuantityInfo{Quantity::area, "area", "m2", "m²", 1, 0, 2},
    QuantityInfo{Quantity::volume, "volume", "m3", "m³", 1, 0, 0},
    QuantityInfo{Quantity::discharge, "discharge", "m3s", "m³/s", 1, 0, 1},
    QuantityInfo{Quantity::velocity, "velocity", "mps", "m/s", 1, 0, 2},
    QuantityInfo{Quantity::gravity, "gravity", "mps2", "m/s²", 1, 0, 3},
    QuantityInfo{Quantity::time, "time", "s", "s", 1, 0, 1},
    QuantityInfo{Quantity::rate, "rate", "1s", "1/s", 1, 0, 3},
    QuantityInfo{Quantity::speedRatio, "speed", "pu", "pu", 1, 0, 3},
    QuantityInfo{Quantity::rotation, "speed of rotation", "rpm", "rpm", rpmToSi, 0, 1},
    QuantityInfo{Quantity::power, "power", "MW", "MW", 1e6, 0, 1},
    QuantityInfo{Quantity::apparentPower, "apparent power", "MVA", "MVA", 1e6, 0, 1},
    QuantityInfo{Quantity::powerRate, "rate of power", "MWs", "MW/s", 1e6, 0, 2},
    QuantityInfo{Quantity::energy, "energy", "GWs", "GW·s", 1e9, 0, 2},
    QuantityInfo{Quantity::load, "load", "GW", "GW", 1e9, 0, 2},
    QuantityInfo{Quantity::frequency, "frequency", "Hz", "Hz", 1, 0, 3},
    QuantityInfo{Quantity::frequencyRate, "rate of frequency", "Hzs", "Hz/s", 1, 0, 3},
    QuantityInfo{Quantity::loadDamping, "load damping", "pctHz", "%/Hz", 0.01, 0, 2},
    QuantityInfo{Quantity::inertia, "inertia", "tm2", "t·m²", 1e3, 0, 1},
    QuantityInfo{Quantity::pressure, "pressure", "kPa", "kPa", 1e3, 0, 1},
    QuantityInfo{Quantity::modulus, "modulus", "GPa", "GPa", 1e9, 0, 1},
    QuantityInfo{Quantity::temperature, "temperature", "degC", "°C", 1, 0, 1},
    QuantityInfo{Quantity::density, "density", "kgm3", "kg/m³", 1, 0, 1},
    QuantityInfo{Quantity::viscosity, "viscosity", "mm2s", "mm²/s", 1e-6, 0, 3},
    QuantityInfo{Quantity::throttleLoss, "throttle loss", "s2m5", "s²/m⁵", 1, 0, 5},
    QuantityInfo{Quantity::strickler, "Strickler number", "", "m^⅓/s", 1, 0, 1},
    QuantityInfo{Quantity::pressureRate, "rate of pressure", "mmin", "m/min", 1.0 / 60.0, 0, 1},
    QuantityInfo{Quantity::angle, "angle", "deg", "°", constants::pi / 180.0, 0, 1},
    QuantityInfo{Quantity::money, "cost", "M", "million", 1, 0, 2},
};
// clang-format on

} // namespace

std::span<const QuantityInfo> quantities() {
    return rows;
}

const QuantityInfo& info(Quantity quantity) {
    const auto& row = rows.at(static_cast<std::size_t>(quantity));
    ensure(row.quantity == quantity, "the rows of quantities are in the order of the list");
    return row;
}

double toSi(Quantity quantity, double fileValue) {
    const auto& row = info(quantity);
    return fileValue * row.toSi + row.offset;
}

double fromSi(Quantity quantity, double siValue) {
    const auto& row = info(quantity);
    return (siValue - row.offset) / row.toSi;
}

std::string printNumber(Quantity quantity, double siValue, const NumberStyle& style,
                        std::optional<int> decimals) {
    const double value = fromSi(quantity, siValue);
    std::string text = fmt::format("{:.{}f}", value, decimals.value_or(info(quantity).decimals));
    if (text.front() == '-' && text.find_first_of("123456789") == std::string::npos) {
        text.erase(0, 1); // "-0.0" is zero
    }
    for (char& letter : text) {
        if (letter == '.') {
            letter = style.decimalSign;
        }
    }
    if (style.trueMinus && text.front() == '-') {
        text.replace(0, 1, "−");
    }
    return text;
}

std::string print(Quantity quantity, double siValue, const NumberStyle& style) {
    const auto& row = info(quantity);
    std::string text = printNumber(quantity, siValue, style);
    if (!row.symbol.empty()) {
        text += "\u2009";
        text += row.symbol;
    }
    return text;
}

} // namespace headroom
