// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <stdexcept>
#include <string>

namespace headroom {

/// A fault of ours, never of the user's. Caught in one place of each program.
class Bug : public std::logic_error {
public:
    using std::logic_error::logic_error;
};

/// Throws `Bug` with the caller's file and line unless `holds`. On in every build.
inline void ensure(bool holds, const char* what, const char* file = __builtin_FILE(),
                   int line = __builtin_LINE()) {
    if (!holds) {
        throw Bug(std::string(file) + ":" + std::to_string(line) + ": " + what);
    }
}

} // namespace headroom
