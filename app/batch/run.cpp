// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/choice.h"
#include "batch/commands.h"
#include "batch/findings_output.h"
#include "batch/messages.h"
#include "batch/project.h"
#include "batch/run_progress.h"
#include "batch/summary.h"
#include "batch/traces.h"
#include "files/replace_file.h"
#include "files/verdicts_writer.h"
#include "studies/rest_state.h"
#include "studies/runner.h"

#include <fmt/format.h>

#include <cstdio>
#include <filesystem>
#include <set>
#include <system_error>

namespace headroom::batch {

namespace {

using studies::Cell;
using studies::CellState;
using studies::Snapshot;

/// Compiles every wanted cell before anything is run; false if one cannot be.
bool compiles(const Project& project, const Cells& cells) {
    bool good = true;
    for (auto& cell : studies::checkCells(*project.snapshot, cells)) {
        const auto findings = placed(std::move(cell.findings), project.opened);
        // What one option lacks makes that cell not applicable; it is no fault of the project.
        const bool lacking =
            project.snapshot->inputs(cell.option, cell.study).blocked.has_value();
        good = good && (lacking || !anyError(findings));
        tell(findings, project.opened.text, cellName(*project.snapshot, cell.option, cell.study));
    }
    return good;
}

std::vector<Cell> runAll(const Call& call, const Snapshot& snapshot,
                         std::shared_ptr<const Snapshot> shared, const Cells& cells) {
    std::vector<studies::Runner::Wanted> wanted;
    std::map<plant::Fingerprint, std::string> names;
    for (const auto& [option, study] : cells) {
        wanted.push_back({option, study});
        names.try_emplace(snapshot.inputs(option, study).fingerprint,
                          cellName(snapshot, option, study));
    }
    const auto store = studies::makeMemoryStore();
    RunProgress progress(static_cast<int>(names.size()),
                         [&](const plant::Fingerprint& fingerprint) {
                             return names.at(fingerprint);
                         });
    {
        studies::Runner runner(*store, call.jobs > 0 ? call.jobs : studies::batchThreads(),
                               progress.listener());
        progress.watch(runner);
        runner.want(std::move(shared), wanted);
        runner.waitUntilIdle();
    }
    std::vector<Cell> judged;
    for (const auto& [option, study] : cells) {
        judged.push_back(studies::judgeCell(snapshot, option, study, *store));
    }
    return judged;
}

Findings makeFolder(const std::filesystem::path& folder) {
    std::error_code fault;
    std::filesystem::create_directories(folder / "traces", fault);
    if (!fault) {
        return {};
    }
    return {{.message = &folderNotMade,
             .arguments = {{"folder", folder.string()}, {"reason", fault.message()}}}};
}

Findings write(const Call& call, const Snapshot& snapshot, const std::vector<Cell>& cells,
               const TracePaths& paths, const std::string& verdicts) {
    const std::filesystem::path folder = call.out;
    Findings findings = makeFolder(folder);
    if (!findings.empty()) {
        return findings;
    }
    const auto add = [&](Findings more) {
        findings.insert(findings.end(), more.begin(), more.end());
    };
    add(writeTraceFiles(folder, snapshot, cells, paths,
                        call.traceRows > 0 ? call.traceRows : usualTraceRows));
    add(files::replaceFile(folder / "summary.txt", summaryText(snapshot, cells)));
    add(files::replaceFile(folder / "verdicts.json", verdicts)); // last: what it names is there
    return findings;
}

Exit outcome(const Call& call, const std::vector<Cell>& cells) {
    bool broken = false;
    for (const auto& cell : cells) {
        if (cell.state == CellState::failed || cell.state == CellState::cutShort) {
            return Exit::runFailed;
        }
        for (const auto& verdict : cell.verdicts) {
            broken = broken || verdict.mark == results::Mark::broken;
        }
    }
    return broken && call.strict ? Exit::broken : Exit::done;
}

/// Everything that can be wrong before a run: the call, the project, its models.
std::optional<Cells> prepared(const Call& call, const Project& project) {
    auto cells = chosenCells(call, *project.snapshot);
    if (!cells) {
        tell(cells.findings());
        return std::nullopt;
    }
    return compiles(project, *cells) ? std::optional(std::move(cells).value()) : std::nullopt;
}

} // namespace

Exit run(const Call& call) {
    if (call.out.empty() && !call.json) {
        tell({{.message = &noOutput}});
        return Exit::wrongInput;
    }
    const auto project = open(call.project);
    const auto cells = project ? prepared(call, *project) : std::nullopt;
    if (!cells) {
        return Exit::wrongInput;
    }
    const auto& snapshot = *project->snapshot;
    const auto judged = runAll(call, snapshot, project->snapshot, *cells);
    for (const auto& cell : judged) {
        if (cell.state == CellState::failed && cell.reason) {
            tell({*cell.reason}, {}, cellName(snapshot, cell.option, cell.study));
        }
    }
    const TracePaths paths(snapshot);
    const bool keepsTraces = !call.out.empty();
    const auto verdicts = files::writeVerdicts(snapshot, judged, [&](const Cell& cell) {
        return keepsTraces ? paths.of(cell) : std::string();
    });
    if (keepsTraces) {
        const auto findings = write(call, snapshot, judged, paths, verdicts);
        tell(findings);
        if (anyError(findings)) {
            return Exit::wrongInput;
        }
    }
    if (call.json) {
        std::fwrite(verdicts.data(), 1, verdicts.size(), stdout);
    }
    return outcome(call, judged);
}

} // namespace headroom::batch
