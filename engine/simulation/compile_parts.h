// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/model.h"

/// The parts of compiling a plant, in the order in which `compile` calls them.
namespace headroom::simulation {

/// Points and reservoirs that stand alone; which of them have a known head.
void fillNodes(Model& model, const plant::Plant& plant, Findings& findings);
/// Geometry of conduits, not yet cut into cells.
void fillConduits(Model& model, const plant::Plant& plant, Findings& findings);
/// Cells, rigid inertia, storage of short elements.
void cutConduits(Model& model, const StepChoice& choice);
void fillChambers(Model& model, const plant::Plant& plant, Findings& findings);
/// Units with chart, shaft, drive, servo and governor, and what the study's start asks of them.
void fillUnits(Model& model, const plant::Plant& plant, const plant::Study& study,
               Findings& findings);
/// Connected sets of unknown nodes. Findings: what is cut off from every known level.
void fillClusters(Model& model, Findings& findings);

/// The chart of a rating; calibrated once for a process and shared between runs and threads.
Result<std::shared_ptr<const machines::FrancisChart>> sharedChart(
    const machines::FrancisRating& rating, const std::string& subject);

} // namespace headroom::simulation
