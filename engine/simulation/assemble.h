// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/channels.h"
#include "simulation/record.h"
#include "simulation/watch.h"

/// From what was watched and recorded to the plain values of a run.
namespace headroom::simulation {

/// Channels as watched, and those that follow from them: pressure heads at points, velocities.
std::vector<results::Channel> assembleChannels(const Model& model, const Channels& channels,
                                               const Watch& watch, Record& record,
                                               const std::vector<double>& atRest,
                                               const double* atEnd);
std::vector<results::Envelope> assembleEnvelopes(const Model& model, const Channels& channels,
                                                 const Watch& watch, const Record& record,
                                                 const std::vector<double>& atRest);

} // namespace headroom::simulation
