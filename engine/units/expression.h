// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "base/result.h"
#include "units/quantity.h"

#include <span>
#include <string>
#include <string_view>
#include <vector>

/// Numbers as people type them: arithmetic and unit words, one quantity at a time.
namespace headroom::expression {

/// A word for a unit of one quantity.
struct UnitWord {
    std::string_view word; ///< as typed or printed: "ft", "m³/s", "m3/s"
    double toSi;           ///< SI value = number · toSi
};

/// Words that a quantity understands; its own unit first. Empty for pure numbers.
std::vector<UnitWord> unitWords(Quantity quantity);

/// Value of an entry [SI of the quantity].
///
/// Grammar: sums, products, quotients, signs and parentheses over numbers; a number or a
/// parenthesis may be followed by a unit word. The decimal sign is a point or a comma, groups of
/// three digits may stand apart ("5 000"). What has no unit word at the end is in the quantity's
/// own unit of the project file. A unit times a unit, and a number over a unit, are refused.
Result<double> evaluate(std::string_view text, Quantity quantity);

/// Value of an entry that may change a value there is [SI]: "=…" and a plain entry replace it,
/// "+=…", "-=…", "*=…" and "/=…" work on `current_si`; the last two take pure numbers.
Result<double> entered(std::string_view text, Quantity quantity, double current_si);

/// Every message of this part.
std::span<const Message* const> messages();

} // namespace headroom::expression
