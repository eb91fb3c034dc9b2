// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/rounded.h"

#include <fmt/format.h>

#include <cmath>

namespace headroom::limits {

namespace {

constexpr int mostDecimals = 6;

/// Ten to a small whole power, exact.
double tenTo(int power) {
    double value = 1.0;
    for (int i = 0; i < power; ++i) {
        value *= 10.0;
    }
    return value;
}

/// A size in the file's unit, |difference|: offsets of a quantity (°C) drop out.
double sizeInUnit(Quantity quantity, double si) {
    return std::abs(si / info(quantity).toSi);
}

std::string digits(Quantity quantity, double inUnit, int decimals, const NumberStyle& style) {
    const auto& row = info(quantity);
    return printNumber(quantity, inUnit * row.toSi + row.offset, style, decimals);
}

std::string withSymbol(std::string number, Quantity quantity) {
    const auto symbol = info(quantity).symbol;
    return symbol.empty() ? number : fmt::format("{}\u2009{}", number, symbol);
}

} // namespace

Quantity differenceOf(Quantity quantity) {
    return quantity == Quantity::elevation ? Quantity::head : quantity;
}

std::string marginNumber(Quantity quantity, double margin, const NumberStyle& style) {
    const double size = sizeInUnit(quantity, margin);
    // A slack of a millionth of the last place, so that 1.9 written as 1.8999… stays 1.9.
    constexpr double slack = 1e-6;
    for (int decimals = info(quantity).decimals; decimals <= mostDecimals; ++decimals) {
        const double scale = tenTo(decimals);
        const double cut = std::floor(size * scale + slack) / scale;
        if (cut > 0.0 || size == 0.0) {
            return digits(quantity, cut, decimals, style);
        }
    }
    return fmt::format("less than {}",
                       digits(quantity, 1.0 / tenTo(mostDecimals), mostDecimals, style));
}

std::string uncertaintyNumber(Quantity quantity, double uncertainty, const NumberStyle& style) {
    constexpr double slack = 1e-6;
    const double scale = tenTo(info(quantity).decimals);
    const double up = std::ceil(sizeInUnit(quantity, uncertainty) * scale - slack) / scale;
    return digits(quantity, up, info(quantity).decimals, style);
}

std::string marginAndUncertainty(Quantity quantity, double margin, double uncertainty,
                                 const NumberStyle& style) {
    return withSymbol(fmt::format("{} ± {}", marginNumber(quantity, margin, style),
                                  uncertaintyNumber(quantity, uncertainty, style)),
                      quantity);
}

std::string extremeText(Quantity quantity, double extreme, double bound,
                        const NumberStyle& style) {
    int decimals = info(quantity).decimals;
    const auto reads = [&](double value) { return printNumber(quantity, value, style, decimals); };
    while (extreme != bound && decimals < mostDecimals && reads(extreme) == reads(bound)) {
        ++decimals;
    }
    return withSymbol(reads(extreme), quantity);
}

} // namespace headroom::limits
