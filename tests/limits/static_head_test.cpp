// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/static_head.h"

#include "hand_made.h"
#include "support/catch.h"

using namespace headroom;
using headroom::limits::axisElevation_m;
using headroom::limits::staticHead_m;
using headroom::results::Thing;

TEST_CASE("static head: reservoir less tailwater at a unit, less the axis elsewhere",
          "[limits][analytic]") {
    const auto plant = hand_made::plantA();
    auto study = hand_made::study();
    CHECK(*staticHead_m(plant, study, {Thing::unit, 0}) == 242.0);
    CHECK(*staticHead_m(plant, study, {Thing::point, 2}) == 242.0);
    CHECK(*staticHead_m(plant, study, {Thing::point, 1}) == 60.0);
    CHECK(*staticHead_m(plant, study, {Thing::chamber, 0}) == 57.0);
    CHECK_THAT(*staticHead_m(plant, study, {Thing::conduit, 1, 5140.0}),
               WithinAbs(512.0 - 357.0, 1e-9));
    CHECK_FALSE(staticHead_m(plant, study, {}).has_value());

    study.start.level_m = {
        {hand_made::reference("Upper", plant::Collection::reservoirs, 0), 488.0},
        {hand_made::reference("Tail", plant::Collection::reservoirs, 1), 269.0}};
    CHECK(*staticHead_m(plant, study, {Thing::unit, 0}) == 219.0);
}

TEST_CASE("static head: of two connected reservoirs the higher one, and none if cut off",
          "[limits][limit]") {
    auto plant = hand_made::plantA();
    plant.points.add("Side", {4000.0, 480.0});
    plant::Reservoir side;
    side.at = hand_made::reference("Side", plant::Collection::points, 3);
    side.level_m = 530.0;
    plant.reservoirs.add("Side lake", side);
    const auto study = hand_made::study();
    CHECK(*staticHead_m(plant, study, {Thing::unit, 0}) == 242.0); // not yet connected
    plant::Conduit adit;
    adit.from = side.at;
    adit.to = hand_made::reference("Foot", plant::Collection::points, 1);
    plant.conduits.add("Adit", adit);
    CHECK(*staticHead_m(plant, study, {Thing::unit, 0}) == 260.0);
    plant.reservoirs[0].at = {};
    plant.reservoirs[2].at = {};
    CHECK_FALSE(staticHead_m(plant, study, {Thing::unit, 0}).has_value());
}

TEST_CASE("axis: straight between corners, held beyond the ends", "[limits][analytic]") {
    const auto plant = hand_made::plantA();
    CHECK(axisElevation_m(plant, 1, 5030.0) == 452.0);
    CHECK_THAT(axisElevation_m(plant, 1, 5140.0), WithinAbs(357.0, 1e-9));
    CHECK(axisElevation_m(plant, 1, 5600.0) == 262.0);
    CHECK(axisElevation_m(plant, 1, 4000.0) == 452.0);
    CHECK(axisElevation_m(plant, 1, 9000.0) == 262.0);
    CHECK_THAT(axisElevation_m(plant, 0, 2500.0), WithinAbs(463.5, 1e-9));
}
