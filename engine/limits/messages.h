// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::limits {

inline constexpr Message notRun{
    "limits.not-run", Severity::note, "This study has not been run for these inputs.",
    "Run what is due."};
inline constexpr Message repeatMissing{
    "limits.repeat-missing", Severity::note,
    "The repeat with divided cells is missing, so the numerical uncertainty is not known.",
    "Run this study again to its end; margin and time shown here are those of the first run."};
inline constexpr Message cutShort{
    "limits.cut-short", Severity::warning,
    "The run stopped at {reached} of {wanted}; before that the limit was not broken, after it "
    "nothing is known.",
    "Run this study again to its end."};
inline constexpr Message runFailed{
    "limits.run-failed", Severity::error,
    "The run ended at {reached} because it could not be computed further.",
    "See the finding of the run and mend what it names."};
inline constexpr Message placeMissing{
    "limits.place-missing", Severity::note, "This option has no \"{place}\".",
    "Remove the limit in this option, or point it to a place that is there."};
inline constexpr Message classMissing{
    "limits.class-missing", Severity::note,
    "The limit has no value for the class {class} or a milder one.",
    "Give a value for that class if the limit is meant to hold in this study."};
inline constexpr Message notRecorded{
    "limits.not-recorded", Severity::warning, "{measure} is not computed at \"{place}\".",
    "Choose a place where it is computed, or another quantity."};
inline constexpr Message noTrace{
    "limits.no-trace", Severity::warning,
    "The bound is passed, and how long cannot be told: no trace is recorded at this place.",
    "Declare a point there and put the limit on it, or allow no excursion."};
inline constexpr Message noStaticHead{
    "limits.no-static-head", Severity::warning,
    "The allowance is a share of the static head, and no reservoir stands over this place.",
    "Give the allowance as a share of the rise, or leave it out."};
inline constexpr Message notFinite{
    "limits.not-finite", Severity::error, "The computed value is not a finite number.",
    "Send the project to the makers of this program; this must not happen."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::limits
