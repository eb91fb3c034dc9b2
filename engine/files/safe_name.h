// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <set>
#include <string>
#include <string_view>

namespace headroom::files {

/// Names for files from names of things: letters, digits and `-`; a clash gets `-2`, `-3` …
/// Letters beyond ASCII are kept as they are; two names that differ only in case clash.
class SafeNames {
public:
    std::string of(std::string_view name);

private:
    std::set<std::string> used_;
};

/// The same without regard to clashes; "unnamed" if nothing is left.
std::string safeName(std::string_view name);

} // namespace headroom::files
