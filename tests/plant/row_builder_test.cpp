// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/row_builder.h"
#include "plant/walk.h"
#include "support/catch.h"

using namespace headroom;
using namespace headroom::plant;
using namespace headroom::plant::rows;

namespace {

struct Slow {
    double time_s = 0.0;
};
struct Fast {
    double share = 0.25;
};
struct Thing {
    double power_W = 2e6;
    std::optional<double> level_m;
    std::variant<Slow, Fast> kind;
    Keyed<Slow> parts;
    Reference at;
};

RowsOf<Slow> slowRows() {
    return {number(&Slow::time_s, Quantity::time, {"time_s", "Time", "A time."}).needed()};
}

RowsOf<Thing> thingRows() {
    return {
        number(&Thing::power_W, Quantity::power, {"power_MW", "Power", "A power."}).range(0, 10),
        number(&Thing::level_m, Quantity::elevation, {"level_m", "Level", "A level."}),
        oneOf<Thing>(
            {
                kind(&Thing::kind, slowRows(), {"slow", "Slow", "The slow kind."}),
                kind(&Thing::kind,
                     RowsOf<Fast>{number(&Fast::share, Quantity::percent,
                                         {"share_pct", "Share", "A share."})},
                     {"fast", "Fast", "The fast kind."}),
            },
            {"kind", "Kind", "The kind."}),
        keyed(&Thing::parts, Collection::none, slowRows(), {"parts", "Parts", "The parts."}),
        reference(&Thing::at, {Collection::points}, {"at", "Place", "A place."}),
    };
}

} // namespace

TEST_CASE("rows: ranges are given in the file's unit and kept in SI", "[plant][invariant]") {
    const auto rows = thingRows().fields;
    CHECK(rows[0].hard->high == 1e7);
    CHECK(rows[0].fallback == 2e6);
    CHECK_FALSE(rows[1].fallback);
    CHECK_FALSE(rows[2].fields[0].fields[0].fallback); // required: no default
    CHECK(rows[2].fields[1].fields[0].fallback == 0.25);
}

TEST_CASE("rows: values go in and come out through the row", "[plant][invariant]") {
    const auto rows = thingRows().fields;
    Thing thing;
    rows[0].binding.set(&thing, 5e6);
    CHECK(thing.power_W == 5e6);
    CHECK_FALSE(rows[1].binding.get(&thing));
    rows[1].binding.set(&thing, 3.0);
    CHECK(std::get<double>(*rows[1].binding.get(&thing)) == 3.0);
    const auto& fast = rows[2].fields[1];
    CHECK(fast.binding.count(&thing) == 0);
    fast.fields[0].binding.set(fast.binding.make(&thing, "fast"), 0.5);
    CHECK(std::get<Fast>(thing.kind).share == 0.5);
    CHECK(fast.binding.count(&thing) == 1);
    CHECK(rows[2].fields[0].binding.count(&thing) == 0);
    rows[3].binding.make(&thing, "first");
    CHECK(rows[3].binding.name(&thing, 0) == "first");
}

TEST_CASE("walk: visits what is there, in the order of the rows", "[plant][invariant]") {
    const auto rows = thingRows().fields;
    Thing thing;
    thing.parts.add("one").time_s = 1;
    thing.parts.add("two").time_s = 2;
    thing.at = {"Inlet", Collection::points, 4};
    std::string seen;
    walk(rows, &thing, [&](const Field& row, const void*) { seen += std::string(row.key) + " "; });
    CHECK(seen == "power_MW level_m time_s time_s time_s at ");
    replaceReferences(rows, &thing, [](const Field& row, const Reference& old) {
        CHECK(row.key == "at");
        return Reference{old.name, old.collection, 9};
    });
    CHECK(thing.at.index == 9);
}
