// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/board_picture.h"
#include "drawing/picture_export.h"
#include "drawing/ribbon_picture.h"
#include "drawing/section_picture.h"
#include "drawing/strip_picture.h"
#include "support/catch.h"

#include <QPainter>

#include <cmath>
#include <limits>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

/// Makes and paints all pictures; what counts is that they end, and have finite boxes.
void paintAll(const studies::Snapshot& snapshot, const studies::Cell* cell, QSizeF size,
              const Look& the, const Selection& selection) {
    const auto cells =
        cell == nullptr ? std::vector<studies::Cell>{} : std::vector<studies::Cell>{*cell};
    const auto section = sectionPicture({snapshot, cell, selection, size, the});
    const auto ribbon = ribbonPicture({snapshot, cell, selection, size, the});
    const auto strip = stripPicture({snapshot, cell, selection, size, the, 3});
    const auto board = boardPicture({snapshot, cells, selection, size, the, 2, 1, 0});
    QImage image(std::max(1, static_cast<int>(size.width())),
                 std::max(1, static_cast<int>(size.height())), QImage::Format_ARGB32_Premultiplied);
    QPainter painter(&image);
    section.paintStill(painter);
    section.paintMoving(painter, selection.time_s);
    ribbon.paint(painter);
    strip.paint(painter);
    board.paint(painter);
    CHECK_FALSE(section.description(selection.time_s).isEmpty());
    for (const auto* items : {&section.items, &ribbon.items, &strip.items, &board.items}) {
        for (const auto& item : *items) {
            CHECK(std::isfinite(item.box.left() + item.box.right() + item.box.top()
                                + item.box.bottom()));
        }
    }
}

} // namespace

TEST_CASE("Pictures: from one pixel to 4K, with and without results", "[drawing][limit]") {
    test::startGui();
    for (const QSizeF size : {QSizeF(0, 0), QSizeF(1, 1), QSizeF(40, 700), QSizeF(700, 12),
                              QSizeF(60, 60), QSizeF(3840, 2160)}) {
        for (const auto& project : {plant::Project{}, test::sampleProject(),
                                    test::branchedProject(), test::startedProject()}) {
            const auto snapshot = test::snapshotOf(project);
            const auto cell =
                snapshot->studies() > 0 ? test::doneCell(*snapshot, -1, 0) : studies::Cell{};
            for (const double scale : {1.0, 2.0}) {
                CAPTURE(size.width(), size.height(), scale);
                paintAll(*snapshot, &cell, size, look(Scheme::dark, scale),
                         {{{-1, 0}}, 0, 20, {"plant", "units", "U1"}});
                paintAll(*snapshot, nullptr, size, look(Scheme::print, scale), {});
            }
        }
    }
}

TEST_CASE("Pictures: selections that point nowhere are taken as nothing", "[drawing][limit]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto cell = test::doneCell(*snapshot, -1, 0);
    for (const Selection& selection :
         {Selection{{{99, 99}}, 99, 1e12, {"plant", "nothing"}},
          Selection{{{-5, -3}}, -7, -1e12, {""}},
          Selection{{}, 0, std::numeric_limits<double>::quiet_NaN(), {}}}) {
        paintAll(*snapshot, &cell, {928, 285}, look(Scheme::light), selection);
        paintAll(*snapshot, nullptr, {928, 285}, look(Scheme::light), selection);
    }
}

TEST_CASE("Pictures: unresolved references, empty runs and absurd numbers", "[drawing][limit]") {
    test::startGui();
    auto project = test::sampleProject();
    project.plant.conduits[0].to.index = -1;
    project.plant.units[0].from = {};
    project.plant.chambers[0].shape.areaByLevel.clear();
    project.plant.reservoirs[0].level_m = std::numeric_limits<double>::infinity();
    const auto snapshot = test::snapshotOf(project);
    studies::Cell cell;
    cell.state = studies::CellState::done;
    auto stored = std::make_shared<studies::StoredRun>();
    stored->run = std::make_shared<results::Run>();
    cell.stored = stored;
    results::Verdict verdict;
    verdict.limit = 0;
    verdict.mark = results::Mark::broken;
    verdict.extreme = verdict.margin = verdict.share = std::numeric_limits<double>::quiet_NaN();
    verdict.place = {results::Thing::chamber, 0};
    cell.verdicts = {verdict};
    paintAll(*snapshot, &cell, {928, 285}, look(Scheme::light), {{{-1, 0}}, 0, 20, {}});
    paintAll(*snapshot, nullptr, {928, 285}, look(Scheme::light), {});
}

TEST_CASE("Pictures: same data, same pixels", "[drawing][invariant]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto cell = test::doneCell(*snapshot, -1, 4);
    const auto once = [&] {
        const auto picture = sectionPicture(
            {*snapshot, &cell, {{{-1, 4}}, 0, 151, {}}, {928, 285}, look(Scheme::print)});
        return grey(paintToImage({928, 285}, 2.0, look(Scheme::print), [&](QPainter& p) {
            picture.paintStill(p);
            picture.paintMoving(p, 151);
        }));
    };
    const QImage first = once();
    CHECK(first == once());
    CHECK(first.format() == QImage::Format_Grayscale8);
    CHECK(first.size() == QSize(1856, 570));
}
