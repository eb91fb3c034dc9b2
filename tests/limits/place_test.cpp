// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/place.h"

#include "hand_made.h"
#include "support/catch.h"

using namespace headroom;
using headroom::limits::nameOf;
using headroom::limits::placeOf;
using headroom::plant::Collection;
using headroom::results::Place;
using headroom::results::Thing;

TEST_CASE("place: each kind of thing, heads of a unit at its inlet", "[limits][limit]") {
    const auto plant = hand_made::plantA();
    const auto at = [&](Measure measure, Collection collection, int index) {
        return *placeOf(hand_made::limit(measure, hand_made::reference("x", collection, index)),
                        plant);
    };
    CHECK(at(Measure::level, Collection::chambers, 0) == Place{Thing::chamber, 0});
    CHECK(at(Measure::head, Collection::chambers, 0) == Place{Thing::point, 1});
    CHECK(at(Measure::level, Collection::reservoirs, 1) == Place{Thing::reservoir, 1});
    CHECK(at(Measure::head, Collection::points, 2) == Place{Thing::point, 2});
    CHECK(at(Measure::speed, Collection::units, 0) == Place{Thing::unit, 0});
    CHECK(at(Measure::head, Collection::units, 0) == Place{Thing::point, 2});
    CHECK(at(Measure::draftPressureHead, Collection::units, 0) == Place{Thing::unit, 0});

    auto along = hand_made::limit(Measure::head, hand_made::reference("x", Collection::conduits, 1));
    along.at.alongConduit = true;
    along.at.chainage_m = 5250.0;
    CHECK(*placeOf(along, plant) == Place{Thing::conduit, 1, 5250.0});
}

TEST_CASE("place: the grid needs no name; what is not there is no place", "[limits][limit]") {
    const auto plant = hand_made::plantA();
    CHECK(*placeOf(hand_made::limit(Measure::frequency, {}), plant) == Place{});
    CHECK_FALSE(placeOf(hand_made::limit(Measure::level, {}), plant).has_value());
    CHECK_FALSE(
        placeOf(hand_made::limit(Measure::level,
                                 hand_made::reference("Gone", Collection::chambers, -1)),
                plant)
            .has_value());
}

TEST_CASE("place: is told by the user's name", "[limits][messages]") {
    const auto plant = hand_made::plantA();
    CHECK(nameOf({Thing::chamber, 0}, plant) == "Shaft");
    CHECK(nameOf({Thing::conduit, 1, 5250.0}, plant) == "Penstock at 5250\u2009m");
    CHECK(nameOf({}, plant) == "grid");
}
