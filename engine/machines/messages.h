// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::machines {

inline constexpr Message ratedValueNotPositive{
    "machines.rated-value-not-positive", Severity::error,
    "The turbine's {name} is {value}; it must be above zero.",
    "Give the {name} of the rated point."};
inline constexpr Message ratedEfficiencyImpossible{
    "machines.rated-efficiency-impossible", Severity::error,
    "Rated power over rated water power ρ·g·Q·H gives an efficiency of {efficiency}; a turbine "
    "reaches {least} to {most}.",
    "Check rated head, flow and shaft power against each other; the power is that of one unit "
    "at the shaft."};
inline constexpr Message speedNotFrancis{
    "machines.speed-not-francis", Severity::error,
    "Squared rim speed over g·H is {value}; the synthetic Francis chart is made for {least} to "
    "{most}.",
    "Check rated speed, head and runner diameter (at the inlet)."};
inline constexpr Message targetOutOfRange{
    "machines.target-out-of-range", Severity::error,
    "The {name} asked of the chart is {value}; it must lie between {least} and {most}.",
    "Correct the value, or leave it out to use the usual one."};
inline constexpr Message chartMissesTarget{
    "machines.chart-misses-target", Severity::error,
    "No chart of this form meets the rated data: {name} comes out at {reached} where {asked} was "
    "asked, {times} times the allowed difference of {tolerance}.",
    "Move the {name} towards {reached}, or leave it out to use the usual value."};
inline constexpr Message chartLossTooSmall{
    "machines.chart-loss-too-small", Severity::error,
    "The rated point leaves a friction loss of {value} of the rated head in the runner; at least "
    "{least} is needed.",
    "Lower the rated power or the best efficiency a little, or check the runner diameter."};
inline constexpr Message chartTurnsBack{
    "machines.chart-turns-back", Severity::error,
    "The head of the chart falls with rising flow by {value} of the rated head at full opening; "
    "at most {most} is allowed.",
    "Check runaway speed and standstill flow: a higher runaway speed makes the curve steeper."};
inline constexpr Message gateLawNotRising{
    "machines.gate-law-not-rising", Severity::error,
    "Row {row} of the flow over stroke, ({stroke}, {flow}), does not lie above the row before it.",
    "Both columns must rise from row to row, strokes from 0 to 1."};
inline constexpr Message gateLawEnds{
    "machines.gate-law-ends", Severity::error,
    "The flow over stroke must run from (0, 0) to a full stroke of 1; it runs from ({firstStroke}, "
    "{firstFlow}) to stroke {lastStroke}.",
    "Add the missing first or last row."};
inline constexpr Message gateFlowOutOfReach{
    "machines.gate-flow-out-of-reach", Severity::error,
    "A flow of {flow} of rated at rated head and speed, asked at stroke {stroke}, is beyond what "
    "the runner can swallow.",
    "Lower that row of the flow over stroke."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::machines
