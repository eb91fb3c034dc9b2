// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/report.h"
#include "support/catch.h"

using namespace headroom;
using namespace headroom::plant;

namespace {

/// Only the chambers have a place.
std::optional<FilePlace> onlyChambers(const Path& path) {
    if (path == Path{"plant", "chambers"}) {
        return FilePlace{"a.json", 7, 3};
    }
    return std::nullopt;
}

} // namespace

TEST_CASE("Report: a finding stands at the nearest place around it", "[plant][messages]") {
    Report report(onlyChambers);
    report.add(say::floorAboveRim, {"plant", "chambers", "Shaft", "shape"});
    report.add(say::emptyPlant, {"plant"});
    REQUIRE(report.findings().size() == 2);
    CHECK(report.findings()[0].subject == "plant/chambers/Shaft/shape");
    REQUIRE(report.findings()[0].place);
    CHECK(report.findings()[0].place->line == 7);
    CHECK_FALSE(report.findings()[1].place);
    CHECK_FALSE(placeOf({}, {"plant"}));
}

TEST_CASE("Report: in an option the subject is where the option says it", "[plant][messages]") {
    const Tree base =
        Tree::object({}).with({"plant", "units", "U1", "inertia", "j_tm2"}, Tree::number(700));
    const Tree changes =
        Tree::object({}).with({"plant", "units", "U2", "from"}, Tree::text("Inlet"));
    const Report report({}, OptionInHand{"Second set", &changes, &base});
    CHECK(join(report.subjectOf({"plant", "units", "U1", "inertia"})) == "plant/units/U1/inertia");
    CHECK(join(report.subjectOf({"plant", "units", "U2", "from"}))
          == "options/Second set/changes/plant/units/U2/from");
    CHECK(join(report.subjectOf({"plant", "units", "U2", "to"}))
          == "options/Second set/changes/plant/units/U2/to");
}

TEST_CASE("listed: names side by side, the rest counted", "[plant][messages]") {
    CHECK(listed({}) == "");
    CHECK(listed({"a", "b"}) == "a, b");
    CHECK(listed({"a", "b", "c", "d"}, 2) == "a, b (+2)");
}
