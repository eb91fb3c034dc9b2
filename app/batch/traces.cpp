// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/traces.h"

#include "files/replace_file.h"
#include "files/safe_name.h"
#include "files/traces_writer.h"

#include <fmt/format.h>

#include <algorithm>

namespace headroom::batch {

namespace {

bool hasTraces(const studies::Cell& cell) {
    return cell.stored != nullptr && cell.stored->run != nullptr &&
           std::any_of(cell.stored->run->channels.begin(), cell.stored->run->channels.end(),
                       [](const auto& channel) { return !channel.trace.last.empty(); });
}

} // namespace

TracePaths::TracePaths(const studies::Snapshot& snapshot) {
    files::SafeNames names;
    for (int option = -1; option < snapshot.options(); ++option) {
        for (int study = 0; study < snapshot.studies(); ++study) {
            const auto name = names.of(fmt::format("{} {}", snapshot.optionName(option),
                                                   snapshot.studyName(study)));
            paths_[{option, study}] = fmt::format("traces/{}.csv", name);
        }
    }
}

std::string TracePaths::of(const studies::Cell& cell) const {
    return hasTraces(cell) ? of(cell.option, cell.study) : std::string();
}

Findings writeTraceFiles(const std::filesystem::path& folder, const studies::Snapshot& snapshot,
                         const std::vector<studies::Cell>& cells, const TracePaths& paths,
                         int mostRows) {
    Findings findings;
    for (const auto& cell : cells) {
        const auto path = paths.of(cell);
        if (path.empty()) {
            continue;
        }
        const auto text =
            files::writeTraces(*cell.stored->run, snapshot.variant(cell.option).plant, mostRows);
        for (auto& finding : files::replaceFile(folder / path, text)) {
            findings.push_back(std::move(finding));
        }
    }
    return findings;
}

} // namespace headroom::batch
