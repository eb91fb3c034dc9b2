// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/board_picture.h"
#include "drawing/label_placer.h"
#include "support/catch.h"

#include <algorithm>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

struct Shot {
    std::shared_ptr<const studies::Snapshot> snapshot;
    std::vector<studies::Cell> cells;
    BoardPicture picture;
};

Shot sample(QSizeF size, plant::Project project = test::sampleProject(), int row = 0,
            int column = 0) {
    test::startGui();
    auto snapshot = test::snapshotOf(std::move(project));
    auto cells = test::sampleCells(*snapshot);
    auto picture = boardPicture({*snapshot,
                                 cells,
                                 {{{1, 4}, {-1, 4}}, 0, 0, {}},
                                 size,
                                 look(Scheme::light),
                                 row,
                                 column,
                                 1});
    return {std::move(snapshot), std::move(cells), std::move(picture)};
}

int count(const Items& items, ItemKind kind) {
    return static_cast<int>(std::count_if(items.begin(), items.end(),
                                          [&](const Item& item) { return item.kind == kind; }));
}

} // namespace

TEST_CASE("Board: every study against the base and every option", "[drawing][invariant]") {
    const QSizeF size(336, 380);
    const auto shot = sample(size);
    CHECK(count(shot.picture.items, ItemKind::cell) == 8 * 5);
    CHECK(count(shot.picture.items, ItemKind::rowTitle) == 8);
    CHECK(count(shot.picture.items, ItemKind::columnTitle) == 5);
    CHECK(test::faults(shot.picture.items, size, look(Scheme::light)).toStdString() == "");
    for (const auto& item : shot.picture.items) {
        if (item.kind == ItemKind::cell) {
            const Item* hit = itemAt(shot.picture.items, item.box.center());
            REQUIRE(hit != nullptr);
            CHECK(hit->option == item.option);
            CHECK(hit->study == item.study);
        }
    }
}

TEST_CASE("Board: option names end inside the picture whatever they are", "[drawing][limit]") {
    for (const double width : {250.0, 336.0, 480.0, 700.0}) {
        auto project = test::sampleProject();
        project.options.add("A name of an option that is far too long for any column of any board");
        project.options.add("Donaudampfschifffahrtsgesellschaftskapitän");
        const QSizeF size(width, 420);
        const auto shot = sample(size, project);
        CAPTURE(width);
        CHECK(test::faults(shot.picture.items, size, look(Scheme::light)).toStdString() == "");
        for (const auto& item : shot.picture.items) {
            if (item.kind == ItemKind::columnTitle) {
                CHECK(item.description.size() >= 8);
                CHECK(QRectF(QPointF(), size).contains(item.box));
            }
        }
    }
}

TEST_CASE("Board: what is out of sight is counted", "[drawing][limit]") {
    auto project = test::sampleProject();
    for (int i = 0; i < 9; ++i) {
        project.options.add("Option " + std::to_string(i));
    }
    const auto shot = sample({336, 220}, project, 2, 3);
    CHECK(shot.picture.firstRow == 2);
    CHECK(shot.picture.firstColumn == 3);
    const auto& last = shot.picture.items.back();
    CHECK(last.kind == ItemKind::label);
    CHECK_THAT(last.label.toStdString(), ContainsSubstring("2 more above"));
    CHECK_THAT(last.label.toStdString(), ContainsSubstring("more to the right"));
    const auto far = sample({336, 220}, project, 99, 99);
    CHECK(far.picture.firstRow + far.picture.rowsShown == 8);
    CHECK(far.picture.firstColumn + far.picture.columnsShown == 14);
}

TEST_CASE("Board: a cell is read out in full", "[drawing][messages]") {
    const auto shot = sample({336, 380});
    const auto cell =
        std::find_if(shot.picture.items.begin(), shot.picture.items.end(), [](const Item& item) {
            return item.kind == ItemKind::cell && item.option == -1 && item.study == 0;
        });
    REQUIRE(cell != shot.picture.items.end());
    const auto words = cell->description.toStdString();
    CHECK_THAT(words,
               ContainsSubstring(
                   "Full rejection, As built: broken, share left −6 per cent, worst limit a"));
    CHECK_THAT(words, ContainsSubstring("456.1\u2009m at 151\u2009s"));
    CHECK(cell->limit == 0);
}

TEST_CASE("Board: its height holds all studies", "[drawing][invariant]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const double height = boardHeight(*snapshot, look(Scheme::light), 336);
    const auto shot = sample({336, height});
    CHECK(shot.picture.rowsShown == 8);
    CHECK(height < 420);
}

TEST_CASE("Board: a folded name keeps its numbers and units together", "[drawing][messages]") {
    test::startGui();
    const QFont font = look(Scheme::light).font(TextSize::small);
    const auto lines = [&](const char* name) {
        std::string out;
        for (const auto& line : folded(QString::fromUtf8(name), font)) {
            out += (out.empty() ? "" : "|") + line.toStdString();
        }
        return out;
    };
    CHECK(lines("Reload not before 300 s") == "Reload not|before 300 s");
    CHECK(lines("Loading in 20 s, low reservoir") == "Loading in 20 s,|low reservoir");
    CHECK(lines("Full rejection") == "Full|rejection");
    CHECK(lines("300 s") == "300 s");
    CHECK(lines("Runaway") == "Runaway");
}
