// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/plant.h"
#include "units/measure.h"

#include <array>
#include <optional>
#include <string>

namespace headroom::plant {

/// Load classes, mildest first. A limit may carry a value for each.
enum class LoadClass { normal, exceptional, extreme, catastrophic };
inline constexpr int loadClassCount = 4;

/// Bound by class [SI of the limit's measure]; absent where the user gave none.
using ClassValues = std::array<std::optional<double>, loadClassCount>;

enum class TimeRule {
    momentary,  ///< no excursion is allowed
    continuous, ///< one excursion may last `allowed_s`
    cumulative, ///< all excursions of an event together may last `allowed_s`
};

/// Added to the computed value before it is compared, because it is not computed.
struct Allowance {
    double shareOfHead = 0.0; ///< of the static head of the unit or point [share]
    double shareOfRise = 0.0; ///< of the computed change from rest [share]
};

/// A bound the user puts on a measured thing. In the file the measure is the key of its group:
/// `"Shaft, lowest": {"level": {"at": "Surge shaft", "min_m": {"normal": 460}}, …}`.
struct Limit {
    Measure measure = Measure::level;
    Location at;                   ///< not given for grid measures
    bool wholeConduit = false;     ///< `pressureHead` along a whole conduit (worst chainage)
    ClassValues least, greatest;   ///< either or both sides
    double reserve = 0.0;          ///< R ≥ 0 [SI of the measure]
    double modelUncertainty = 0.0; ///< U_mod ≥ 0 declared by the user [SI of the measure]
    Allowance allowance;
    TimeRule timeRule = TimeRule::momentary;
    double allowed_s = 0.0;
    std::string consequence;
    Source source; ///< a limit without author and document is unsigned
};

} // namespace headroom::plant
