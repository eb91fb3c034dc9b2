// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/text.h"

#include "base/ensure.h"
#include "base/overloaded.h"

#include <fmt/format.h>

#include <cmath>

namespace headroom {

namespace {

/// An amount that is not zero never reads as zero: it gets two of its own digits instead.
std::string amountText(const Amount& amount, const NumberStyle& style) {
    constexpr int mostDecimals = 9;
    const auto quantity = static_cast<Quantity>(amount.quantity);
    const double value = std::abs(fromSi(quantity, amount.si));
    int decimals = info(quantity).decimals;
    const auto readsZero = [&](int count) { return value < 0.5 * std::pow(10.0, -count); };
    if (!(value > 0.0) || !readsZero(decimals) || readsZero(mostDecimals)) {
        return print(quantity, amount.si, style);
    }
    while (value < 10.0 * std::pow(10.0, -decimals) && decimals < mostDecimals) {
        ++decimals;
    }
    const auto& symbol = info(quantity).symbol;
    const auto number = printNumber(quantity, amount.si, style, decimals);
    return symbol.empty() ? number : number + "\u2009" + std::string(symbol);
}

std::string argumentText(const Argument& argument, const NumberStyle& style) {
    return std::visit(
        overloaded{[&](const Amount& amount) { return amountText(amount, style); },
                   [](std::int64_t number) { return fmt::format("{}", number); },
                   [](const std::string& words) { return words; }},
        argument);
}

std::string fill(std::string_view pattern, const Finding& finding, const NumberStyle& style) {
    std::string out;
    std::size_t at = 0;
    while (at < pattern.size()) {
        const auto open = pattern.find('{', at);
        if (open == std::string_view::npos) {
            out += pattern.substr(at);
            break;
        }
        const auto close = pattern.find('}', open);
        ensure(close != std::string_view::npos, "a message template closes its braces");
        out += pattern.substr(at, open - at);
        const auto name = pattern.substr(open + 1, close - open - 1);
        bool found = false;
        for (const auto& [key, value] : finding.arguments) {
            if (key == name) {
                out += argumentText(value, style);
                found = true;
                break;
            }
        }
        ensure(found, "a message template names only arguments that are given");
        at = close + 1;
    }
    return out;
}

} // namespace

std::string whatText(const Finding& finding, const NumberStyle& style) {
    return fill(finding.message->what, finding, style);
}

std::string mendText(const Finding& finding, const NumberStyle& style) {
    return fill(finding.message->mend, finding, style);
}

std::string text(const Finding& finding, const NumberStyle& style) {
    std::string head = finding.subject;
    if (finding.time_s) {
        head += " at t = " + print(Quantity::time, *finding.time_s, style);
    }
    if (!head.empty()) {
        head += ": ";
    }
    const auto mend = mendText(finding, style);
    return head + whatText(finding, style) + (mend.empty() ? "" : " " + mend);
}

} // namespace headroom
