// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/plant.h"
#include "plant/project.h"
#include "results/verdict.h"
#include "units/quantity.h"

#include <QString>

/// Numbers and verdicts in words, the same in every picture, spoken or printed.
namespace headroom::drawing {

QString text(std::string_view utf8);
/// "456.1 m", with thin space and true minus.
QString numberText(Quantity quantity, double si);
/// "5 000 m": without decimals, thousands set apart.
QString wholeAmount(Quantity quantity, double si);
/// "151 s", "9.4 s".
QString timeWords(double time_s);
/// "456.1 of 458.0 m".
QString amountOf(Quantity quantity, double si, double bound);
/// Share as whole per cent without its sign: "−6"; never rounded to the other side of 0.
QString percent(double share);

/// Quantity in which a limit's values, margins and uncertainties are printed: differences of
/// levels are heads.
Quantity valueQuantity(const plant::Limit& limit);
Quantity marginQuantity(const plant::Limit& limit);

/// "1.9 m below", "2.7 m inside", "at the limit".
QString marginWords(const plant::Limit& limit, const results::Verdict& verdict);
/// "−1.8 m": distance to the limit with its sign, cut towards the limit.
QString signedMargin(Quantity quantity, double margin);
/// "456.1 of 458.0 m": the extreme of its bound, never rounded to the bound itself.
QString extremeOfBound(const plant::Limit& limit, const results::Verdict& verdict);
/// "456.1 m at 151 s, 1.9 m below"; lozenge's label.
QString lozengeWords(const plant::Limit& limit, const results::Verdict& verdict);
/// Whole sentence for a screen reader: name, mark, value, bound, margin ± uncertainty, when.
QString spokenVerdict(const QString& name, const plant::Limit& limit,
                      const results::Verdict& verdict);

/// Letter of a limit in Board and Strip: "a", "b" … "z", "aa" …; by position in the project, an
/// option's own limits after those.
QString limitLetter(const plant::Project& project, const plant::Variant& variant, int limit);
/// "N", "X", "E", "C".
QString classLetter(plant::LoadClass loadClass);
QString className(plant::LoadClass loadClass);

} // namespace headroom::drawing
