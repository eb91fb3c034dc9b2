// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/text_table.h"

#include "support/catch.h"

using namespace headroom::batch;

TEST_CASE("text table: columns line up whatever the letters", "[batch][messages]") {
    CHECK(displayWidth("Höhe ≥ 1") == 8);
    CHECK(textTable({{"a", "value"}, {"Größe", "1"}, {"b", "22"}}, {1}) ==
          "a      value\n"
          "-----  -----\n"
          "Größe      1\n"
          "b         22\n");
    CHECK(textTable({{"a", "b"}, {"x", ""}}) == "a  b\n-  -\nx\n");
}
