// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/choice.h"
#include "batch/commands.h"
#include "batch/findings_output.h"
#include "batch/project.h"
#include "batch/text_table.h"
#include "files/json_writer.h"
#include "limits/place.h"
#include "studies/rest_state.h"

#include <fmt/format.h>

#include <cstdio>

namespace headroom::batch {

namespace {

using plant::Tree;
using studies::RestState;

std::string restText(const studies::Snapshot& snapshot, int option, const RestState& rest) {
    std::vector<std::vector<std::string>> table{{"place", "what", "value"}};
    for (const auto& row : rest.values) {
        table.push_back({limits::nameOf(row.place, snapshot.variant(option).plant),
                         std::string(info(row.measure).label),
                         print(info(row.measure).quantity, row.value)});
    }
    return textTable(table, {2});
}

Tree restTree(const studies::Snapshot& snapshot, int option, int study, const RestState& rest) {
    std::vector<Tree> rows;
    for (const auto& row : rest.values) {
        const auto quantity = info(row.measure).quantity;
        rows.push_back(Tree::object({
            {"quantity", Tree::text(std::string(info(row.measure).key))},
            {"at", Tree::text(limits::nameOf(row.place, snapshot.variant(option).plant))},
            {"value", Tree::number(fromSi(quantity, row.value))},
            {"unit", Tree::text(std::string(info(quantity).symbol))},
        }));
    }
    return Tree::object({{"option", Tree::text(snapshot.optionName(option))},
                         {"study", Tree::text(snapshot.studyName(study))},
                         {"standsStill", Tree::boolean(rest.standsStill)},
                         {"values", Tree::array(std::move(rows))}});
}

} // namespace

Exit rest(const Call& call) {
    const auto project = open(call.project);
    if (!project) {
        return Exit::wrongInput;
    }
    const auto& snapshot = *project->snapshot;
    const auto cells = chosenCells(call, snapshot);
    if (!cells) {
        tell(cells.findings());
        return Exit::wrongInput;
    }
    bool wrong = false;
    std::vector<Tree> trees;
    for (const auto& [option, study] : *cells) {
        const auto name = cellName(snapshot, option, study);
        const auto state = studies::restState(snapshot, option, study);
        const auto findings = placed(state.findings(), project->opened);
        tell(findings, project->opened.text, name);
        wrong = wrong || anyError(findings);
        if (!state) {
            continue;
        }
        if (call.json) {
            trees.push_back(restTree(snapshot, option, study, *state));
        } else {
            fmt::print("{}\n\n{}\n", name, restText(snapshot, option, *state));
        }
    }
    if (call.json) {
        fmt::print("{}", files::writeJson(Tree::array(std::move(trees))));
    }
    return wrong ? Exit::wrongInput : Exit::done;
}

} // namespace headroom::batch
