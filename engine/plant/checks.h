// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "plant/report.h"

/// What the rows alone cannot see: how the things of a plant fit together. Each check reports all
/// faults and skips what an earlier finding already covers (unresolved names, missing tables).
namespace headroom::plant {

void checkConduits(const Plant& plant, Report& report);
void checkWaters(const Plant& plant, Report& report); ///< reservoirs and chambers
void checkUnits(const Plant& plant, Report& report);
void checkNetwork(const Plant& plant, Report& report);
void checkLimits(const Plant& plant, const Keyed<Limit>& limits, Report& report);
void checkStudies(const Plant& plant, const Keyed<Study>& studies, Report& report);

/// Chainage and elevation of a conduit's axis from end to end; empty while an end is unresolved.
Rows axisOf(const Plant& plant, const Conduit& conduit);

/// Usual moment of inertia of generator and turbine [kg m²] for a rating [VA] and a speed [rad/s]:
/// J ∝ (S/n^1.5)^1.25, the trend of built hydro generators; common practice, no source.
double usualInertia_kgm2(double rated_VA, double speed_rads);

} // namespace headroom::plant
