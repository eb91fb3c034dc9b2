// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/simulate.h"

#include "simulation/run.h"

namespace headroom::studies {

Result<results::Run> simulateStudy(const Job& job, std::stop_token stop,
                                   const Progress& progress) {
    simulation::Settings settings;
    settings.longestStep_s = job.longestStep_s;
    settings.refinement = job.refinement;
    settings.keepTraces = job.keepTraces;
    settings.keepLines = job.keepTraces;
    auto model = simulation::compile(job.site, job.plant, job.study, settings);
    if (!model) {
        return model.findings();
    }
    return simulation::run(**model, std::move(stop), progress);
}

} // namespace headroom::studies
