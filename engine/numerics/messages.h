// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::numerics {

inline constexpr Message tableTooShort{"numerics.table-too-short", Severity::error,
                                       "The table has {rows} complete rows; it needs at least two.",
                                       "Give a first and a last row, each with both columns."};
inline constexpr Message tableNotFinite{
    "numerics.table-not-finite", Severity::error,
    "Row {row} of the table holds a value that is not a finite number.",
    "Replace the value in that row by a number, or remove the row."};
inline constexpr Message tableNotRising{
    "numerics.table-not-rising", Severity::error,
    "The first column does not rise from row to row: row {row} is not above the one before it.",
    "Sort the rows by the first column and remove repeated ones."};
inline constexpr Message curveNotRising{
    "numerics.curve-not-rising", Severity::error,
    "The second column must rise from row to row, and row {row} is not above the one before it.",
    "Correct that row, or remove it."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::numerics
