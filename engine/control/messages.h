// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::control {

inline constexpr Message servoTimeNotPositive{
    "control.servo-time-not-positive", Severity::error,
    "The servo's {name} is {value}; it must be above zero.",
    "Give the time of a full stroke at that rate."};
inline constexpr Message servoNegative{"control.servo-negative", Severity::error,
                                       "The servo's {name} is {value}; it cannot be negative.",
                                       "Give zero or a positive value."};
inline constexpr Message servoStages{
    "control.servo-stages", Severity::error,
    "Closing stage {row} ends at stroke {stroke}; stages must end at falling strokes, the last at "
    "0.",
    "Order the stages from the open end down and let the last one end at 0."};
inline constexpr Message servoRange{
    "control.servo-range", Severity::error,
    "The servo's strokes run from {least} to {most}; they must rise and stay within 0 and 1.",
    "Correct the two ends of the stroke."};
inline constexpr Message servoCushion{
    "control.servo-cushion", Severity::error,
    "The cushion begins at stroke {stroke} and takes {time} to the closed end.",
    "Give a stroke between 0 and 1 and a time above zero, or leave both out."};
inline constexpr Message governorNegative{
    "control.governor-negative", Severity::error,
    "The governor's {name} is {value}; it cannot be negative.", "Give zero or a positive value."};
inline constexpr Message governorNoAction{
    "control.governor-no-action", Severity::error,
    "The governor has neither proportional nor integral gain ({mode}).",
    "Give at least one of the two."};
inline constexpr Message governorNoFilter{
    "control.governor-no-filter", Severity::error,
    "The governor has a derivative gain but its derivative filter is {value}.",
    "Give a filter time above zero; 0.02 to 0.1 s is usual."};
inline constexpr Message governorLimit{
    "control.governor-limit", Severity::error,
    "The opening limit is {value}; it must lie above 0 and not above 1.",
    "Give the limit as a share of the servo stroke."};
inline constexpr Message governorNotNumber{"control.governor-not-number", Severity::error,
                                           "The governor's {name} is not a finite number.",
                                           "Give a number."};
inline constexpr Message temporaryDroopValues{
    "control.temporary-droop-values", Severity::error,
    "The temporary droop form has {name} = {value}, which cannot be converted.",
    "Temporary droop and reset time must be above zero, the derivative time not negative."};
inline constexpr Message noSeriesForm{"control.no-series-form", Severity::error,
                                      "These gains have no series form: K_p² = {left} is below "
                                      "4·K_i·K_d = {right}, so its times would "
                                      "not be real.",
                                      "Use the parallel form, raise K_p, or lower K_i or K_d."};
inline constexpr Message noIntegralForm{"control.no-integral-form", Severity::error,
                                        "Gains without {name} have no temporary-droop form.",
                                        "Give proportional and integral gains above zero."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::control
