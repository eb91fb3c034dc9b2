// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/rest_state.h"
#include "units/quantity.h"

#include <optional>
#include <string>
#include <vector>

namespace headroom::studies {

/// One line of the plausibility sheet: a hand formula beside what the program computed.
struct PlausibilityRow {
    std::string thing;             ///< the user's name
    std::string label;             ///< "Water starting time"
    std::string symbol;            ///< "Tw"; may be empty
    Quantity quantity = Quantity::factor;
    std::optional<double> byHand;  ///< [SI]
    std::optional<double> computed;///< [SI], from the state at rest
    std::string formula;           ///< of `byHand`, with the inputs it uses in words
};

/// Flows, velocities, losses, reflection times, surge periods, Thoma ratios, starting times and
/// specific speeds of one cell, at the flows and levels of its state at rest (ratios of a machine
/// at its rated point). What a plant lacks has no row.
std::vector<PlausibilityRow> plausibility(const Snapshot& snapshot, int option, int study,
                                          const RestState& rest);

} // namespace headroom::studies
