// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "plant/project.h"
#include "plant/study.h"
#include "results/run.h"

#include <functional>
#include <memory>
#include <stop_token>
#include <string>
#include <vector>

/// From plant values to a run: compile, rest, advance.
namespace headroom::simulation {

/// The compiled plant and study: arrays and indices, const, shared between runs and threads.
class Model;

struct Settings {
    double longestStep_s = 0.01; ///< cap of the step
    int refinement = 1;          ///< divides every cell and the step by this; models stay as chosen
    bool keepTraces = true;      ///< repeats keep only extremes and envelopes
    bool keepLines = true;       ///< moving head line along the conduits
    std::string instructions = {}; ///< "" = best of this machine; "baseline", "avx2", "avx512"
};

/// Compiles a plant (bound and free of errors) for one study. Findings: what cannot be computed,
/// with what, where, value and how to mend; notes on every model choice.
Result<std::shared_ptr<const Model>> compile(const plant::Site& site, const plant::Plant& plant,
                                             const plant::Study& study, const Settings& settings);

/// One thing at rest, for the batch program's `rest` and the plausibility sheet.
struct RestRow {
    Measure measure;
    results::Place place;
    double value = 0.0; ///< [SI]
};
struct Rest {
    std::vector<RestRow> rows; ///< every head, flow, loss by place
    double residual = 0.0;     ///< largest scaled residual, < 1e-9
    bool standsStill = true;   ///< within 1e-6 m and 1e-6 of rated flow over 100 s undisturbed
    Findings findings;         ///< if it moves: what, and how far
};
/// The starting state of the study by Newton with continuation from 10 % output; where the
/// power–gate curve turns, the finding says what can be reached and what stops it.
Result<Rest> rest(const Model& model);

/// Share of simulated time done, 0…1; called at most about 50 times a second of wall time.
using Progress = std::function<void(double share)>;

/// Runs the model from its rest. Answers a stop request within 0.2 s; a cancelled run keeps what
/// it has. Never throws for physical reasons: `Status` says how it ended. Same inputs, same bits,
/// whatever the thread or instruction set.
results::Run run(const Model& model, std::stop_token stop = {}, const Progress& progress = {});

} // namespace headroom::simulation
