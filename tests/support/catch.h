// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

/// The one way into the test library: hides the difference between its versions 2 and 3.

#ifdef HEADROOM_CATCH_3
#include <catch2/catch_all.hpp>
using Catch::Matchers::ContainsSubstring;
#else
#include <catch2/catch.hpp>
inline auto ContainsSubstring(const std::string& part) { return Catch::Matchers::Contains(part); }
#endif

using Catch::Matchers::WithinAbs;
using Catch::Matchers::WithinRel;

#include <cstdlib>

/// The small count normally, the large one when HEADROOM_LONG is set (`packaging/test.sh --long`).
inline int testCount(int small, int large) {
    return std::getenv("HEADROOM_LONG") != nullptr ? large : small;
}
