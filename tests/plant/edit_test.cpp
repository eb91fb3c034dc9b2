// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_writer.h"
#include "support/catch.h"

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::dorvane;
using support::json;

namespace {

const Path diameter = split("plant/chambers/Surge shaft/shape/throttled/diameter_m");

int optionOf(const Tree& tree, const std::string& name) {
    const auto& options = tree.find("options")->members();
    for (std::size_t i = 0; i < options.size(); ++i) {
        if (options[i].first == name) {
            return static_cast<int>(i);
        }
    }
    return -1;
}

const Tree& changesOf(const Tree& tree, const std::string& name) {
    return *tree.at({"options", name, "changes"});
}

} // namespace

TEST_CASE("edited: with the base in the hand the base changes", "[plant][invariant]") {
    const Tree next = edited(dorvane(), -1, diameter, Tree::number(9));
    CHECK(next.at(diameter)->asNumber() == 9.0);
    CHECK(next.find("options")->sameAs(*dorvane().find("options")));
    const Tree removed = edited(next, -1, split("plant/reservoirs/Tailwater/highest_m"), Tree());
    CHECK(removed.at(split("plant/reservoirs/Tailwater/highest_m")) == nullptr);
}

TEST_CASE("edited: with an option in the hand its changes grow and shrink", "[plant][invariant]") {
    const int late = optionOf(dorvane(), "Reload not before 300 s");
    const Tree next = edited(dorvane(), late, diameter, Tree::number(10));
    CHECK(next.find("plant")->sameAs(*dorvane().find("plant")));
    CHECK(changesOf(next, "Reload not before 300 s").at(diameter)->asNumber() == 10.0);
    CHECK(variant(bind(next).project, late).plant.chambers[0].shape.diameter_m == 10.0);
    // A value equal to the base's is taken back, and so is one by name.
    CHECK(edited(next, late, diameter, Tree::number(8)) == dorvane());
    CHECK(takenBack(next, late, diameter) == dorvane());
    // What an option cannot change is changed for all.
    const Path end = split("studies/Full rejection/until_s");
    CHECK(edited(dorvane(), late, end, Tree::number(700)).at(end)->asNumber() == 700.0);
}

TEST_CASE("edited: a change of kind or form writes the null beside it", "[plant][invariant]") {
    const int wide = optionOf(dorvane(), "Wider shaft");
    const Path shape = split("plant/chambers/Surge shaft/shape");
    Path open = shape;
    open.emplace_back("open");
    const Tree kind =
        edited(dorvane(), wide, open, json(R"({"diameter_m": 12, "floor_m": 455, "rim_m": 536})"));
    const Tree& changes = changesOf(kind, "Wider shaft");
    CHECK(changes.at(shape)->find("throttled")->isNull());
    CHECK(bind(kind).usable());
    CHECK_FALSE(variant(bind(kind).project, wide).plant.chambers[0].shape.throttled);
    CHECK(takenBack(kind, wide, open).at({"options", "Wider shaft", "changes"})->members().empty());

    const Path stages = split("plant/units/U1/servo/closingStages");
    const Tree form = edited(dorvane(), wide, stages, json("[[60, 8], [0, 12]]"));
    CHECK(changesOf(form, "Wider shaft").at(split("plant/units/U1/servo/closing_s"))->isNull());
    CHECK(bind(form).usable());
    // And back to the base's form: nothing remains.
    const Tree back = edited(form, wide, split("plant/units/U1/servo/closing_s"), Tree::number(9));
    CHECK(back == dorvane());
    CHECK(bind(edited(dorvane(), -1, stages, json("[[60, 8], [0, 12]]"))).usable());
}

TEST_CASE("edited: a whole group in an option becomes exactly that group", "[plant][invariant]") {
    const int wide = optionOf(dorvane(), "Wider shaft");
    const Path servo = split("plant/units/U1/servo");
    const Tree next = edited(dorvane(), wide, servo, json(R"({"opening_s": 12, "closing_s": 9})"));
    const auto changed = variant(bind(next).project, wide);
    REQUIRE(changed.usable());
    CHECK(changed.plant.units[0].servo->opening_s == 12.0);
    CHECK(changed.plant.units[0].servo->deadTime_s == 0.0);
}

TEST_CASE("edited: removing in an option writes null", "[plant][invariant]") {
    const int wide = optionOf(dorvane(), "Wider shaft");
    const Path chamber = split("plant/chambers/Surge shaft");
    const Tree next = edited(dorvane(), wide, chamber, Tree());
    CHECK(changesOf(next, "Wider shaft").at(chamber)->isNull());
    CHECK(variant(bind(next).project, wide).plant.chambers.empty());
}

TEST_CASE("ordered: keys follow the rows, names keep their order", "[plant][invariant]") {
    CHECK(ordered(dorvane()).sameAs(dorvane()));
    const Tree mixed = json(
        R"({"plant": {"points": {"b": {"elevation_m": 2, "x-mine": 1, "chainage_m": 1, "note": "n"}, "a": {}}}, "headroom": 1})");
    CHECK(
        ordered(mixed)
        == json(
            R"({"headroom": 1, "plant": {"points": {"b": {"chainage_m": 1, "elevation_m": 2, "note": "n", "x-mine": 1}, "a": {}}}})"));
    const Tree patch = json(
        R"({"options": {"o": {"changes": {"plant": {"units": {}, "points": {}}, "site": {}}}}})");
    CHECK(
        ordered(patch)
        == json(
            R"({"options": {"o": {"changes": {"site": {}, "plant": {"points": {}, "units": {}}}}}})"));
}
