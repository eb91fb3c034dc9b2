// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "plant/project.h"
#include "results/run.h"

#include <functional>
#include <stop_token>

namespace headroom::studies {

/// One run to be computed.
struct Job {
    const plant::Site& site;
    const plant::Plant& plant;
    const plant::Study& study; ///< references resolved in `plant`
    double longestStep_s = 0.01;
    int refinement = 1;        ///< divides cells and step
    bool keepTraces = true;
};

/// Share done, 0…1.
using Progress = std::function<void(double share)>;

/// Computes a job: a run, however it ended, or the findings that allow none. Answers a stop
/// request within 0.2 s. Called from several threads at once.
using Simulate =
    std::function<Result<results::Run>(const Job& job, std::stop_token stop, const Progress&)>;

/// Compiles the plant and runs it.
Result<results::Run> simulateStudy(const Job& job, std::stop_token stop, const Progress& progress);

} // namespace headroom::studies
