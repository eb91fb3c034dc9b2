// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/choice.h"
#include "batch/commands.h"
#include "batch/findings_output.h"
#include "batch/project.h"
#include "batch/text_table.h"
#include "files/json_writer.h"
#include "files/schema.h"
#include "studies/plausibility.h"

#include <fmt/format.h>

#include <cstdio>

namespace headroom::batch {

namespace {

using plant::Tree;
using studies::PlausibilityRow;

std::string printed(Quantity quantity, const std::optional<double>& value) {
    return value ? print(quantity, *value) : std::string();
}

std::string sheetText(const std::vector<PlausibilityRow>& rows) {
    std::vector<std::vector<std::string>> table{
        {"thing", "what", "", "by hand", "computed", "by hand from"}};
    for (const auto& row : rows) {
        table.push_back({row.thing, row.label, row.symbol, printed(row.quantity, row.byHand),
                         printed(row.quantity, row.computed), row.formula});
    }
    return textTable(table, {3, 4});
}

Tree numberIn(Quantity quantity, const std::optional<double>& value) {
    return value ? Tree::number(fromSi(quantity, *value)) : Tree{};
}

Tree sheetTree(const std::vector<PlausibilityRow>& rows) {
    std::vector<Tree> trees;
    for (const auto& row : rows) {
        trees.push_back(Tree::object({
            {"thing", Tree::text(row.thing)},
            {"label", Tree::text(row.label)},
            {"symbol", Tree::text(row.symbol)},
            {"byHand", numberIn(row.quantity, row.byHand)},
            {"computed", numberIn(row.quantity, row.computed)},
            {"unit", Tree::text(std::string(info(row.quantity).symbol))},
            {"formula", Tree::text(row.formula)},
        }));
    }
    return Tree::array(std::move(trees));
}

/// Findings of all cells, told as they are found.
Findings checkModels(const Project& project, const Cells& cells) {
    Findings all;
    for (auto& cell : studies::checkCells(*project.snapshot, cells)) {
        const auto findings = placed(std::move(cell.findings), project.opened);
        tell(findings, project.opened.text, cellName(*project.snapshot, cell.option, cell.study));
        all.insert(all.end(), findings.begin(), findings.end());
    }
    return all;
}

void printSheet(const Call& call, const Project& project, const Cells& cells,
                const Findings& findings) {
    std::vector<PlausibilityRow> rows;
    std::string title;
    if (!cells.empty()) {
        const auto [option, study] = cells.front();
        title = cellName(*project.snapshot, option, study);
        const auto rest = studies::restState(*project.snapshot, option, study);
        if (rest) {
            rows = studies::plausibility(*project.snapshot, option, study, *rest);
        }
    }
    if (call.json) {
        fmt::print("{}", files::writeJson(Tree::object({{"findings", findingTrees(findings)},
                                                        {"cell", Tree::text(title)},
                                                        {"plausibility", sheetTree(rows)}})));
    } else if (!rows.empty()) {
        fmt::print("{}, at rest\n\n{}", title, sheetText(rows));
    }
}

} // namespace

Exit check(const Call& call) {
    const auto project = open(call.project);
    if (!project) {
        if (call.json) {
            const auto opened = files::openProject(call.project);
            fmt::print("{}", files::writeJson(Tree::object(
                                 {{"findings", findingTrees(opened.findings())}})));
        }
        return Exit::wrongInput;
    }
    const auto& snapshot = *project->snapshot;
    Cells cells;
    if (snapshot.studies() > 0 || !call.studies.empty()) {
        const auto chosen = chosenCells(call, snapshot);
        if (!chosen) {
            tell(chosen.findings());
            return Exit::wrongInput;
        }
        cells = *chosen;
    }
    auto findings = checkModels(*project, cells);
    const bool wrong = anyError(findings);
    const auto& read = project->opened.findings();
    findings.insert(findings.begin(), read.begin(), read.end());
    printSheet(call, *project, cells, findings);
    return wrong ? Exit::wrongInput : Exit::done;
}

Exit schema() {
    fmt::print("{}", files::projectSchemaText());
    return Exit::done;
}

} // namespace headroom::batch
