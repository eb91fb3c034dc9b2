// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/board_picture.h"
#include "drawing/picture_export.h"
#include "drawing/ribbon_picture.h"
#include "drawing/section_picture.h"
#include "drawing/strip_picture.h"
#include "support/catch.h"

#include <QPainter>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

/// The pictures together as they stand in the window, written for people to look at.
namespace {

QImage sheet(const plant::Project& project, Scheme scheme, double scale, bool results,
             QSizeF size) {
    test::startGui();
    const auto snapshot = test::snapshotOf(project);
    auto cells =
        snapshot->studies() > 0 ? test::sampleCells(*snapshot) : std::vector<studies::Cell>{};
    const auto cell =
        results && snapshot->studies() > 0 ? test::doneCell(*snapshot, -1, 4) : studies::Cell{};
    const studies::Cell* inHand = results ? &cell : nullptr;
    const Look& the = look(scheme, scale);
    const Selection selection{{{-1, 4}, {1, 4}}, 0, 151.0, {}};
    const double block = 352 * scale, left = size.width() - block;
    const QSizeF upper(left, 0.36 * size.height()), ribbon(left, 112 * scale);
    const auto section = sectionPicture({*snapshot, inHand, selection, upper, the});
    const auto margins = ribbonPicture({*snapshot, inHand, selection, ribbon, the});
    const double inner = block - 24 * scale;
    const double high = std::min(boardHeight(*snapshot, the, inner), 0.55 * size.height());
    const auto board = boardPicture({*snapshot, cells, selection, {inner, high}, the, 0, 0, 1});
    const QSizeF rest(inner, size.height() - high - 100 * scale);
    const auto strip = stripPicture({*snapshot, inHand, selection, rest, the});
    return paintToImage(size, 1.0, the, [&](QPainter& painter) {
        painter.fillRect(QRectF(left, 0, block, size.height()), the.titleBlock);
        section.paintStill(painter);
        section.paintMoving(painter, selection.time_s);
        painter.translate(0, upper.height());
        margins.paint(painter);
        painter.resetTransform();
        painter.translate(left + 12 * scale, 60 * scale);
        board.paint(painter);
        painter.translate(0, high + 16 * scale);
        strip.paint(painter);
    });
}

} // namespace

TEST_CASE("Sheets: pictures as in the window, for people", "[drawing][files]") {
    const QSizeF small(1280, 800), large(1920, 1080);
    test::keep(sheet(test::sampleProject(), Scheme::light, 1, true, small), "sheet_light");
    test::keep(sheet(test::sampleProject(), Scheme::dark, 1, true, small), "sheet_dark");
    test::keep(grey(sheet(test::sampleProject(), Scheme::print, 1, true, small)), "sheet_print");
    test::keep(sheet(test::sampleProject(), Scheme::light, 1, true, large), "sheet_large");
    test::keep(sheet(test::sampleProject(), Scheme::light, 1.5, true, large), "sheet_scaled");
    test::keep(sheet(test::sampleProject(), Scheme::light, 1, false, small), "sheet_without");
    test::keep(sheet(test::branchedProject(), Scheme::light, 1, true, small), "sheet_branched");
    test::keep(sheet(test::startedProject(), Scheme::light, 1, false, small), "sheet_started");
    test::keep(sheet({}, Scheme::light, 1, false, small), "sheet_empty");
    const QImage empty = sheet({}, Scheme::dark, 1, false, small);
    test::keep(empty, "sheet_empty_dark");
    CHECK(empty.size() == QSize(1280, 800));
}
