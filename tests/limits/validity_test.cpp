// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/validity.h"

#include "limits/messages.h"

#include "hand_made.h"
#include "support/catch.h"

using namespace headroom;
using headroom::limits::usable;
using headroom::results::EndReason;
using headroom::results::Thing;

namespace {

constexpr Message emptied{"test.emptied", Severity::warning, "The shaft emptied.", "Widen it."};

results::Status::Invalid invalidFrom(double from_s, std::vector<Thing> stillValid = {}) {
    Finding why;
    why.message = &emptied;
    return {from_s, why, std::move(stillValid)};
}

} // namespace

TEST_CASE("usable: a whole run counts for ever", "[limits][run]") {
    const auto run = hand_made::shaftRun({1.0, 2.0});
    CHECK(usable(run, hand_made::shaftPlace, "limits/x").whole());
}

TEST_CASE("usable: until the earliest cause that touches the place", "[limits][run]") {
    auto run = hand_made::shaftRun({1.0, 2.0, 3.0, 4.0});
    run.status.invalid = {invalidFrom(3.0), invalidFrom(1.5, {Thing::unit})};
    const auto shaft = usable(run, hand_made::shaftPlace, "limits/x");
    CHECK(shaft.time_s == 1.5);
    CHECK(shaft.why->message == &emptied);
    CHECK(*shaft.why->time_s == 1.5);
    CHECK(usable(run, {Thing::unit, 0}, "limits/x").time_s == 3.0);
}

TEST_CASE("usable: a run that was cut short counts as far as it came", "[limits][run]") {
    auto run = hand_made::shaftRun({1.0, 2.0, 3.0});
    run.duration_s = 900.0;
    run.status.reason = EndReason::cancelled;
    const auto until = usable(run, hand_made::shaftPlace, "limits/x");
    CHECK(until.time_s == 2.0);
    CHECK(until.why->message == &limits::cutShort);

    run.status.reason = EndReason::failed;
    CHECK(usable(run, hand_made::shaftPlace, "limits/x").why->message == &limits::runFailed);
    run.status.why = invalidFrom(0.0).why;
    CHECK(usable(run, hand_made::shaftPlace, "limits/x").why->message == &emptied);
}

TEST_CASE("usable: of run and repeat the earlier end", "[limits][run]") {
    const auto run = hand_made::shaftRun({1.0, 2.0, 3.0});
    auto repeat = run;
    repeat.status.invalid = {invalidFrom(1.0)};
    CHECK(usable(run, &repeat, hand_made::shaftPlace, "limits/x").time_s == 1.0);
    CHECK(usable(run, nullptr, hand_made::shaftPlace, "limits/x").whole());
}
