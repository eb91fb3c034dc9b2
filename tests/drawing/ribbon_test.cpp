// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/ribbon_picture.h"
#include "support/catch.h"

#include <algorithm>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

const QSizeF usual(928, 112);

} // namespace

TEST_CASE("Ribbon: says where least is left, and stands below the Section", "[drawing][messages]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto cell = test::doneCell(*snapshot, -1, 4);
    const Look& the = look(Scheme::light);
    const auto ribbon = ribbonPicture({*snapshot, &cell, {{{-1, 4}}, 0, 0, {}}, usual, the});
    CHECK(test::faults(ribbon.items, usual, the).toStdString() == "");
    const auto find = [&](const char* name) {
        return std::find_if(ribbon.items.begin(), ribbon.items.end(), [&](const Item& item) {
            return item.kind == ItemKind::ribbon && item.thing.back() == name;
        });
    };
    REQUIRE(find("Penstock") != ribbon.items.end());
    CHECK_THAT(find("Penstock")->description.toStdString(),
               ContainsSubstring("left to the upper limit"));
    REQUIRE(find("Headrace") != ribbon.items.end());
    CHECK_THAT(find("Headrace")->description.toStdString(), ContainsSubstring("no upper limit"));
    REQUIRE(find("Shaft, lowest") != ribbon.items.end());
    CHECK(find("Shaft, lowest")->label.toStdString() == "−1.9\u2009m");
    const auto section = sectionPicture({*snapshot, &cell, {}, {928, 285}, the});
    CHECK_THAT(find("Shaft, lowest")->shape.boundingRect().left(),
               WithinAbs(section.map().x_px(5000.0), 60.0));
}

TEST_CASE("Ribbon: the ruler says the compression and the bay", "[drawing][messages]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto ribbon = ribbonPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    const auto says = [&](const char* words) {
        return std::any_of(ribbon.items.begin(), ribbon.items.end(), [&](const Item& item) {
            return item.description.contains(QString::fromUtf8(words));
        });
    };
    CHECK(says("drawn 7.5× shorter than Penstock"));
    CHECK(says("unit bay, not to scale"));
    CHECK(says("Ruler of chainages"));
}
