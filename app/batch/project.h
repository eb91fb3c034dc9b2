// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "files/project_file.h"
#include "studies/board.h"

#include <optional>

namespace headroom::batch {

/// A project that is open and without errors.
struct Project {
    files::Opened opened;
    std::shared_ptr<const studies::Snapshot> snapshot;
};

/// Opens a project and tells its findings on standard error; nothing if an error is among them.
std::optional<Project> open(const std::string& path);

/// Findings that only compiling shows get the place of what they are about.
Findings placed(Findings findings, const files::Opened& opened);

} // namespace headroom::batch
