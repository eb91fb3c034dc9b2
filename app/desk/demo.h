// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"

#include <QString>
#include <filesystem>

namespace headroom::desk {

/// Folder of the demo plants, beside the program or where it was built; empty if not found.
std::filesystem::path demoFolder();

/// The user's own copy of the demo plant, `documents`/Headroom/Dorvane/…; made if it is not there,
/// never written over.
Result<std::filesystem::path> ownDemo(const std::filesystem::path& documents);

/// Where the user keeps documents.
std::filesystem::path documentsFolder();

} // namespace headroom::desk
