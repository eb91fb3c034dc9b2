// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/rest_state.h"

#include "simulation/run.h"
#include "units/text.h"

#include <set>

namespace headroom::studies {

std::optional<double> RestState::find(Measure measure, const results::Place& place) const {
    for (const auto& row : values) {
        if (row.measure == measure && row.place == place) {
            return row.value;
        }
    }
    return std::nullopt;
}

Result<RestState> restState(const Snapshot& snapshot, int option, int study) {
    const auto& inputs = snapshot.inputs(option, study);
    if (inputs.blocked) {
        return *inputs.blocked;
    }
    const auto& variant = snapshot.variant(option);
    simulation::Settings settings;
    settings.longestStep_s = snapshot.project().numerics.longestStep_s;
    const auto model =
        simulation::compile(variant.site, variant.plant, *inputs.study, settings);
    if (!model) {
        return model.findings();
    }
    const auto rest = simulation::rest(**model);
    if (!rest) {
        return rest.findings();
    }
    RestState state;
    for (const auto& row : rest->rows) {
        state.values.push_back({row.measure, row.place, row.value});
    }
    state.residual = rest->residual;
    state.standsStill = rest->standsStill;
    return {std::move(state), rest->findings};
}

std::vector<CellFindings> checkCells(const Snapshot& snapshot,
                                     const std::vector<std::pair<int, int>>& cells) {
    std::vector<CellFindings> all;
    std::set<std::string> told;
    for (const auto& finding : snapshot.bound->findings) {
        told.insert(text(finding));
    }
    for (const auto& [option, study] : cells) {
        CellFindings cell{option, study, {}};
        const auto rest = restState(snapshot, option, study);
        for (const auto& finding : rest.findings()) {
            if (told.insert(text(finding)).second) {
                cell.findings.push_back(finding);
            }
        }
        if (!cell.findings.empty()) {
            all.push_back(std::move(cell));
        }
    }
    return all;
}

} // namespace headroom::studies
