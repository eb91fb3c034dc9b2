// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"

#include <string>
#include <vector>

namespace headroom::limits {

/// One line of the definition sheet that goes with every result.
struct Definition {
    std::string term; ///< "Net head"
    std::string text; ///< whole sentences
};

/// What the words of a result mean, for this variant: net head, base of percent rise, momentary
/// overspeed, place of power, datum, stroke or opening, how uncertainty and marks are made; then
/// one line for each limit with an allowance: what was added, and to what.
std::vector<Definition> definitions(const plant::Variant& variant);

} // namespace headroom::limits
