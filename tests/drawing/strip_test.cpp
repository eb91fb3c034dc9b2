// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/strip_picture.h"
#include "limits/judge.h"
#include "support/catch.h"

#include <algorithm>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

struct Shot {
    std::shared_ptr<const studies::Snapshot> snapshot;
    studies::Cell cell;
    StripPicture picture;
};

Shot sample(QSizeF size, int firstRow = 0) {
    test::startGui();
    auto snapshot = test::snapshotOf(test::sampleProject());
    auto cell = test::doneCell(*snapshot, -1, 4);
    auto picture = stripPicture(
        {*snapshot, &cell, {{{-1, 4}}, 3, 0, {}}, size, look(Scheme::light), firstRow});
    return {std::move(snapshot), std::move(cell), std::move(picture)};
}

int bars(const Items& items) {
    return static_cast<int>(std::count_if(
        items.begin(), items.end(), [](const Item& item) { return item.kind == ItemKind::bar; }));
}

} // namespace

TEST_CASE("Strip: worst first, every limit, value of bound with its unit", "[drawing][invariant]") {
    const auto shot = sample({336, 360});
    REQUIRE(shot.picture.order.size() == 8);
    for (std::size_t i = 1; i < shot.picture.order.size(); ++i) {
        const auto at = [&](std::size_t k) {
            return shot.cell.verdicts[static_cast<std::size_t>(shot.picture.order[k])];
        };
        CHECK_FALSE(limits::worse(at(i), at(i - 1)));
    }
    CHECK(bars(shot.picture.items) == 8);
    CHECK(shot.picture.items.front().limit == 0);
    CHECK_THAT(shot.picture.items.front().label.toStdString(),
               ContainsSubstring("456.1 of 458.0\u2009m"));
    CHECK_THAT(shot.picture.items.front().description.toStdString(), ContainsSubstring("broken"));
    CHECK(test::faults(shot.picture.items, {336, 360}, look(Scheme::light)).toStdString() == "");
}

TEST_CASE("Strip: what finds no room is counted, and can be scrolled to", "[drawing][limit]") {
    const auto top = sample({336, 170});
    CHECK(top.picture.rowsShown < 8);
    const auto& last = top.picture.items.back();
    CHECK(last.label.toStdString() == std::to_string(8 - top.picture.rowsShown) + " more below");
    const auto end = sample({336, 170}, 99);
    CHECK(end.picture.firstRow == 8 - end.picture.rowsShown);
    CHECK(end.picture.items.front().label.toStdString()
          == std::to_string(end.picture.firstRow) + " more above");
    CHECK(bars(end.picture.items) == end.picture.rowsShown);
}

TEST_CASE("Strip: without a run every limit is there and says not run", "[drawing][limit]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto picture = stripPicture({*snapshot, nullptr, {}, {336, 360}, look(Scheme::dark)});
    CHECK(bars(picture.items) == 8);
    for (const auto& item : picture.items) {
        CHECK_THAT(item.description.toStdString(), ContainsSubstring("not run"));
    }
}
