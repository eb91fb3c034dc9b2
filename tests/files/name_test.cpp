// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/safe_name.h"
#include "support/catch.h"

using namespace headroom::files;

TEST_CASE("safeName: letters, digits and hyphens", "[files][invariant]") {
    CHECK(safeName("Reject, then reload") == "Reject-then-reload");
    CHECK(safeName("  A/B\\C..  ") == "A-B-C");
    CHECK(safeName("../../etc/passwd") == "etc-passwd");
    CHECK(safeName("Größe 2") == "Größe-2");
    CHECK(safeName("///") == "unnamed");
    CHECK(safeName("") == "unnamed");
}

TEST_CASE("SafeNames: a clash gets a number, also one in case only", "[files][invariant]") {
    SafeNames names;
    CHECK(names.of("Wider shaft") == "Wider-shaft");
    CHECK(names.of("Wider-shaft") == "Wider-shaft-2");
    CHECK(names.of("wider shaft") == "wider-shaft-3");
    CHECK(names.of("Wider shaft 2") == "Wider-shaft-2-2");
}
