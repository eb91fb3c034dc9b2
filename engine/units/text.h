// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "units/quantity.h"

#include <string>

namespace headroom {

inline Amount amount(Quantity quantity, double si) {
    return {static_cast<int>(quantity), si};
}

/// Full text of a finding: subject and time, what is so, what to do.
/// An argument that the template does not name is left out; a name without argument is a `Bug`.
std::string text(const Finding& finding, const NumberStyle& style = {});
/// The two halves alone: event and mending.
std::string whatText(const Finding& finding, const NumberStyle& style = {});
std::string mendText(const Finding& finding, const NumberStyle& style = {});

} // namespace headroom
