// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

/// What the window itself has to say to its user.
namespace headroom::desk {

namespace say {

inline constexpr Message notOverwritten{"desk.not-overwritten", Severity::error,
    "The file \"{file}\" could not be read whole, so it is not written over.",
    "Save under another name."};
inline constexpr Message noName{"desk.no-name", Severity::error,
    "This project has no file yet.", "Save it under a name."};
inline constexpr Message internalError{"desk.internal", Severity::error,
    "Internal error: {what}. What you entered is kept.",
    "Save under another name, start again, and send this text to the makers of the program."};
inline constexpr Message demoNotCopied{"desk.demo-not-copied", Severity::error,
    "The demo plant could not be copied to \"{folder}\": {reason}.",
    "Open it where it is installed, or make room and start again."};
inline constexpr Message demoMissing{"desk.demo-missing", Severity::error,
    "The demo plant is not installed beside the program.",
    "Install the program again, or open a project file of your own."};

} // namespace say

/// Every message of the window.
std::span<const Message* const> messages();

} // namespace headroom::desk
