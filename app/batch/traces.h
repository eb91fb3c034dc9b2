// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

#include <filesystem>
#include <map>
#include <string>
#include <vector>

namespace headroom::batch {

/// Path of each cell's trace file, relative to the results' folder: option and study made safe
/// for file names, clashes numbered in the order of the whole matrix, so that a part of it gives
/// the same names.
class TracePaths {
public:
    explicit TracePaths(const studies::Snapshot& snapshot);
    const std::string& of(int option, int study) const { return paths_.at({option, study}); }
    /// The same, or "" for a cell without traces.
    std::string of(const studies::Cell& cell) const;

private:
    std::map<std::pair<int, int>, std::string> paths_;
};

/// Rows of a trace file unless the user asks for others; enough for any plot.
inline constexpr int usualTraceRows = 6000;

/// Writes the trace file of every cell that has one below `folder`.
Findings writeTraceFiles(const std::filesystem::path& folder, const studies::Snapshot& snapshot,
                         const std::vector<studies::Cell>& cells, const TracePaths& paths,
                         int mostRows);

} // namespace headroom::batch
