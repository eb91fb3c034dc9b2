// SPDX-License-Identifier: GPL-3.0-or-later
#include "results/run.h"

#include "support/catch.h"

using namespace headroom;
using namespace headroom::results;

namespace {

Channel channel(Measure measure, Place place, double atRest) {
    Channel made;
    made.measure = measure;
    made.place = place;
    made.atRest = atRest;
    return made;
}

} // namespace

TEST_CASE("Run: a channel is found by measure and place, by nothing less", "[results][invariant]") {
    Run run;
    run.channels = {channel(Measure::level, {Thing::chamber, 0}, 1.0),
                    channel(Measure::level, {Thing::reservoir, 0}, 2.0),
                    channel(Measure::head, {Thing::conduit, 0, 100.0}, 3.0)};
    REQUIRE(run.find(Measure::level, {Thing::reservoir, 0}) != nullptr);
    CHECK(run.find(Measure::level, {Thing::reservoir, 0})->atRest == 2.0);
    CHECK(run.find(Measure::level, {Thing::chamber, 1}) == nullptr);
    CHECK(run.find(Measure::head, {Thing::chamber, 0}) == nullptr);
    CHECK(run.find(Measure::head, {Thing::conduit, 0, 101.0}) == nullptr);
    CHECK(run.find(Measure::head, {Thing::conduit, 0, 100.0}) != nullptr);
}
