// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <optional>
#include <span>
#include <string>
#include <string_view>

namespace headroom {

/// The closed list of quantities. One quantity has one unit in the file (named by the key's
/// suffix), one SI unit behind the reader, and one way to print.
enum class Quantity {
    count,          ///< a number of things
    factor,         ///< a pure coefficient without unit (loss coefficient, share)
    perUnit,        ///< share of a named base, key suffix _pu
    percent,        ///< key suffix _pct, SI is the share 0…1
    length,         ///< _m
    elevation,      ///< _m, a level above the site's datum (a position)
    chainage,       ///< _m, along the waterway
    head,           ///< _m, a difference of levels or a piezometric level
    diameter,       ///< _m
    roughness,      ///< _mm
    thickness,      ///< _mm
    area,           ///< _m2
    volume,         ///< _m3
    discharge,      ///< _m3s
    velocity,       ///< _mps
    gravity,        ///< _mps2
    time,           ///< _s
    rate,           ///< _1s, per second
    speedRatio,     ///< _pu of rated speed
    rotation,       ///< _rpm, SI rad/s
    power,          ///< _MW, SI W
    apparentPower,  ///< _MVA, SI VA
    powerRate,      ///< _MWs (MW per second), SI W/s
    energy,         ///< _GWs, SI J
    load,           ///< _GW, SI W
    frequency,      ///< _Hz
    frequencyRate,  ///< _Hzs, Hz per second
    loadDamping,    ///< _pctHz, percent of load per Hz, SI 1/Hz
    inertia,        ///< _tm2, SI kg m²
    pressure,       ///< _kPa, SI Pa
    modulus,        ///< _GPa, SI Pa
    temperature,    ///< _degC
    density,        ///< _kgm3
    viscosity,      ///< _mm2s, SI m²/s
    throttleLoss,   ///< _s2m5, head per discharge squared
    strickler,      ///< Strickler number m^(1/3)/s, no suffix
    pressureRate,   ///< _mmin, metres of water per minute, SI m/s
    angle,          ///< _deg, SI rad
    money,          ///< _M, millions of the user's currency
};

/// Everything that is said about a quantity, written once.
struct QuantityInfo {
    Quantity quantity;
    std::string_view name;     ///< for people, "discharge"
    std::string_view suffix;   ///< of keys in the file, without the underscore; "" if none
    std::string_view symbol;   ///< unit as printed in the file's unit, "m³/s"; "" if none
    double toSi;               ///< SI value = file value * toSi + offset
    double offset;
    int decimals;              ///< usual decimals when printed in the file's unit
};

std::span<const QuantityInfo> quantities();
const QuantityInfo& info(Quantity quantity);

double toSi(Quantity quantity, double fileValue);
double fromSi(Quantity quantity, double siValue);

/// How numbers are printed. Display units other than the file's come with later work.
struct NumberStyle {
    char decimalSign = '.';
    bool trueMinus = true; ///< U+2212 instead of the hyphen
};

/// "456.1 m": the value in the file's unit with its usual decimals and its unit after U+2009.
std::string print(Quantity quantity, double siValue, const NumberStyle& style = {});
/// The number alone, with `decimals` or the usual ones.
std::string printNumber(Quantity quantity, double siValue, const NumberStyle& style = {},
                        std::optional<int> decimals = {});

} // namespace headroom
