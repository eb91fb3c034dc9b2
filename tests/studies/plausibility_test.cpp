// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/plausibility.h"
#include "studies/rest_state.h"

#include "small_project.h"

#include "support/catch.h"

#include <algorithm>
#include <cmath>

using namespace headroom;
using headroom::studies::plausibility;
using headroom::studies::PlausibilityRow;
using headroom::studies::restState;

namespace {

const PlausibilityRow& rowOf(const std::vector<PlausibilityRow>& rows, const std::string& thing,
                             const std::string& label) {
    const auto found = std::find_if(rows.begin(), rows.end(), [&](const auto& row) {
        return row.thing == thing && row.label == label;
    });
    CAPTURE(thing, label);
    REQUIRE(found != rows.end());
    return *found;
}

} // namespace

TEST_CASE("plausibility: hand formulas beside the state at rest", "[studies][analytic]") {
    const auto snapshot = small::snapshot(small::projectTree());
    const auto rest = restState(*snapshot, -1, 0);
    REQUIRE(rest);
    CHECK(rest->residual < 1e-9);
    const auto rows = plausibility(*snapshot, -1, 0, *rest);
    const double flow = *rowOf(rows, "Tunnel", "Discharge").computed;
    CHECK(flow > 5.0);
    // Velocity and times derived here from the project's own figures: bore 4 m, shaft 8 m.
    const double pi = 3.14159265358979;
    CHECK_THAT(*rowOf(rows, "Tunnel", "Velocity").byHand, WithinRel(flow / (4.0 * pi), 1e-12));
    const double length = std::hypot(1000.0, 10.0);
    CHECK_THAT(*rowOf(rows, "Tunnel", "Reflection time").byHand,
               WithinRel(2.0 * length / 1000.0, 1e-12));
    CHECK_THAT(*rowOf(rows, "Shaft", "Surge period").byHand,
               WithinRel(2.0 * pi * std::sqrt(length * 16.0 * pi / (9.81 * 4.0 * pi)), 1e-9));
    CHECK_THAT(*rowOf(rows, "U1", "Gross head").byHand, WithinAbs(98.0, 1e-12));
    // By hand and from the solved rest, in two places of the plant.
    const auto& level = rowOf(rows, "Shaft", "Level");
    REQUIRE((level.byHand && level.computed));
    CHECK_THAT(*level.byHand, WithinAbs(*level.computed, 0.01));
    const auto& head = rowOf(rows, "U1", "Net head");
    REQUIRE((head.byHand && head.computed));
    CHECK_THAT(*head.byHand, WithinAbs(*head.computed, 0.01));
    for (const auto& row : rows) {
        CAPTURE(row.thing, row.label);
        CHECK((row.byHand || row.computed));
        CHECK((!row.byHand || !row.formula.empty()));
    }
}

TEST_CASE("rest state: an option that cannot run says why", "[studies][messages]") {
    const auto tree = small::projectTree();
    const auto snapshot =
        small::snapshot(plant::edited(tree, 0, small::shaftDiameter, small::number(-3)));
    const auto rest = restState(*snapshot, 0, 0);
    REQUIRE_FALSE(rest);
    CHECK(rest.findings().front().severity() == Severity::error);
    const auto all = studies::checkCells(*snapshot, {{-1, 0}, {0, 0}, {0, 1}});
    // Told once already, when the project was bound.
    CHECK(all.empty());
}
