// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/allowance.h"

#include "support/catch.h"

#include <random>

using headroom::limits::Added;
using headroom::limits::Side;

TEST_CASE("Added: on the side of the bound, the share of the rise only on the way there",
          "[limits][analytic]") {
    // Derived here: 5 % of 242 m is 12.1 m, 10 % of a rise of 40 m is 4 m.
    const Added up{Side::upper, 12.1, 0.1, 512.0};
    CHECK_THAT(up.to(552.0), WithinAbs(552.0 + 12.1 + 4.0, 1e-12));
    CHECK_THAT(up.to(500.0), WithinAbs(512.1, 1e-12));
    const Added down{Side::lower, 2.0, 0.5, 10.0};
    CHECK_THAT(down.to(4.0), WithinAbs(4.0 - 2.0 - 3.0, 1e-12));
    CHECK_THAT(down.to(11.0), WithinAbs(9.0, 1e-12));
}

TEST_CASE("Added: taking away undoes adding", "[limits][invariant]") {
    std::mt19937_64 random(5);
    std::uniform_real_distribution<double> value(-20.0, 20.0);
    std::uniform_real_distribution<double> share(0.0, 1.0);
    for (int i = 0; i < 1000; ++i) {
        const Added added{i % 2 == 0 ? Side::upper : Side::lower, 5.0 * share(random),
                          share(random), value(random)};
        const double computed = value(random);
        CAPTURE(i, computed);
        REQUIRE_THAT(added.from(added.to(computed)), WithinAbs(computed, 1e-11));
        REQUIRE(added.sign() * (added.to(computed) - computed) >= 0.0);
    }
}
