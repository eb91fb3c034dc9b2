// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/run_progress.h"

#include "support/catch.h"

using headroom::batch::timeLeft_s;
using headroom::studies::Runner;

TEST_CASE("time left: from what is done of all wanted, never below zero", "[batch][limit]") {
    Runner::Load load;
    load.wantedSeconds = 100.0;
    CHECK_FALSE(timeLeft_s(3.0, load).has_value());
    load.doneSeconds = 25.0;
    CHECK(*timeLeft_s(3.0, load) == 9.0);
    load.doneSeconds = 100.0;
    CHECK(*timeLeft_s(3.0, load) == 0.0);
    load.doneSeconds = 101.0;
    CHECK(*timeLeft_s(3.0, load) == 0.0);
}
