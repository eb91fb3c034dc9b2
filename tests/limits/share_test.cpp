// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/share.h"

#include "hand_made.h"
#include "support/catch.h"

using namespace headroom;
using headroom::limits::marginShare;
using headroom::limits::spanOf;

TEST_CASE("share: all of the way from rest to bound is one, at the bound it is nothing",
          "[limits][limit]") {
    CHECK(marginShare(30.0, 460.0, 490.0, 81.0) == 1.0);
    CHECK(marginShare(0.0, 460.0, 490.0, 81.0) == 0.0);
    CHECK(marginShare(-1.5, 460.0, 490.0, 81.0) == -0.05);
}

TEST_CASE("share: near the bound at rest, two percent of the span are the measure",
          "[limits][limit]") {
    CHECK_THAT(marginShare(0.81, 460.0, 460.0, 81.0), WithinAbs(0.5, 1e-12));
    CHECK_THAT(marginShare(0.81, 460.0, 461.0, 81.0), WithinAbs(0.5, 1e-12));
    CHECK(marginShare(-2.0, 0.0, 0.0, 0.0) == -1.0);
    CHECK(marginShare(0.0, 0.0, 0.0, 0.0) == 0.0);
}

TEST_CASE("span: both bounds, else the chamber, else the static head, else the bound",
          "[limits][limit]") {
    const auto plant = hand_made::plantA();
    const auto study = hand_made::study();
    auto both = hand_made::shaftLevel();
    both.least[0] = 460.0;
    both.greatest[0] = 534.0;
    CHECK(spanOf(both, plant, study, hand_made::shaftPlace, 460.0) == 74.0);
    both.greatest[0].reset();
    CHECK(spanOf(both, plant, study, hand_made::shaftPlace, 460.0) == 81.0);
    const auto inlet = hand_made::reference("Inlet", plant::Collection::points, 2);
    CHECK(spanOf(hand_made::limit(Measure::head, inlet), plant, study,
                 {results::Thing::point, 2}, 590.0) == 242.0);
    const auto unit = hand_made::reference("U1", plant::Collection::units, 0);
    CHECK(spanOf(hand_made::limit(Measure::speed, unit), plant, study, {results::Thing::unit, 0},
                 1.5) == 1.5);
}
