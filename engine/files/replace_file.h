// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <filesystem>
#include <string_view>

namespace headroom::files {

/// Replaces `path` by `text`: a reader sees the old file or the new one, never a part. Written to
/// `<path>.part` in the same folder, flushed to the disk, renamed. Empty if it was done.
Findings replaceFile(const std::filesystem::path& path, std::string_view text);

/// A plain write for folders that do not let a file be replaced; a crash may leave a part.
Findings overwriteFile(const std::filesystem::path& path, std::string_view text);

} // namespace headroom::files
