// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "units/quantity.h"

#include <string>

/// Numbers of a verdict in print. Rounding never makes a verdict look better: margins are cut
/// towards the limit, uncertainties rounded up, and what is not zero never reads as zero. Marks
/// are made before any rounding.
namespace headroom::limits {

/// The quantity in which differences of another are printed: levels differ by a head.
Quantity differenceOf(Quantity quantity);

/// Size of a margin without sign and unit, "1.9": cut, with more decimals than usual rather than
/// a zero that is none.
std::string marginNumber(Quantity quantity, double margin, const NumberStyle& style = {});
/// An uncertainty without unit, rounded up: "0.5".
std::string uncertaintyNumber(Quantity quantity, double uncertainty, const NumberStyle& style = {});
/// "1.9 ± 0.5 m".
std::string marginAndUncertainty(Quantity quantity, double margin, double uncertainty,
                                 const NumberStyle& style = {});
/// An extreme beside its bound: more decimals than usual rather than reading equal to the bound
/// when it is not. With unit: "458.04 m".
std::string extremeText(Quantity quantity, double extreme, double bound,
                        const NumberStyle& style = {});

} // namespace headroom::limits
