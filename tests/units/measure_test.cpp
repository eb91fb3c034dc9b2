// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/measure.h"

#include "support/catch.h"

#include <set>
#include <string_view>

using namespace headroom;

TEST_CASE("Measure: every row is complete, in order and unique", "[units][invariant]") {
    std::set<std::string_view> keys;
    for (const auto& row : measures()) {
        CAPTURE(row.key);
        CHECK(info(row.measure).key == row.key);
        CHECK_FALSE(row.label.empty());
        CHECK(row.help.size() > 20);
        CHECK(keys.insert(row.key).second);
    }
    CHECK(keys.size() == 17);
}
