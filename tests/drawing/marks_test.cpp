// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/marks.h"
#include "drawing/picture_export.h"
#include "support/catch.h"

#include <QPainter>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

QImage markAlone(MarkState state, double side, const Look& the, double progress = 0.4) {
    return paintToImage({side + 6, side + 6}, 1.0, the, [&](QPainter& painter) {
        paintMark(painter, QRectF(3, 3, side, side), state, the, progress);
    });
}

} // namespace

TEST_CASE("Marks: nine shapes that differ without any colour, from 14 px on",
          "[drawing][invariant]") {
    test::startGui();
    for (const Scheme scheme : {Scheme::light, Scheme::dark, Scheme::print}) {
        // One tint for all, so that only the shape can tell them apart.
        Look plain = look(scheme);
        plain.marks.fill(plain.text);
        for (const double side : {14.0, 18.0, 28.0, 48.0}) {
            for (int a = 0; a < markStateCount; ++a) {
                for (int b = a + 1; b < markStateCount; ++b) {
                    CAPTURE(side, a, b);
                    // A dashed rim differs from a whole one by its gaps alone; all others by far more.
                    CHECK(test::differing(markAlone(static_cast<MarkState>(a), side, plain),
                                          markAlone(static_cast<MarkState>(b), side, plain))
                          > 0.012);
                }
            }
        }
    }
}

TEST_CASE("Marks: each stays inside its box, but for drops and lid by a little",
          "[drawing][limit]") {
    test::startGui();
    const Look& the = look(Scheme::light);
    for (int state = 0; state < markStateCount; ++state) {
        const QImage image = paintToImage({60, 60}, 1.0, the, [&](QPainter& painter) {
            paintMark(painter, QRectF(20, 20, 20, 20), static_cast<MarkState>(state), the, 1.0);
        });
        const QRgb ground = image.pixel(0, 0);
        int painted = 0;
        for (int y = 0; y < 60; ++y) {
            for (int x = 0; x < 60; ++x) {
                const bool inked = image.pixel(x, y) != ground;
                painted += inked ? 1 : 0;
                CAPTURE(state, x, y);
                CHECK_FALSE((inked && (x < 18 || x > 41 || y < 18 || y > 41)));
            }
        }
        CHECK(painted > 10);
    }
}

TEST_CASE("Marks: progress moves the line of a running mark", "[drawing][invariant]") {
    test::startGui();
    const Look& the = look(Scheme::light);
    CHECK(test::differing(markAlone(MarkState::running, 28, the, 0.1),
                          markAlone(MarkState::running, 28, the, 0.9))
          > 0.005);
}

TEST_CASE("Marks: a cell shows its worst verdict only when it is done", "[drawing][invariant]") {
    const auto snapshot = test::snapshotOf(test::sampleProject());
    auto cell = test::doneCell(*snapshot, -1, 0);
    CHECK(markOf(cell) == MarkState::broken);
    cell.verdicts[0].mark = results::Mark::held;
    CHECK(markOf(cell) == MarkState::undecided);
    using studies::CellState;
    const std::pair<CellState, MarkState> states[] = {
        {CellState::notRun, MarkState::notRun},
        {CellState::outdated, MarkState::outdated},
        {CellState::running, MarkState::running},
        {CellState::waiting, MarkState::running},
        {CellState::cutShort, MarkState::notValid},
        {CellState::failed, MarkState::notValid},
        {CellState::notApplicable, MarkState::notApplicable}};
    for (const auto& [state, mark] : states) {
        cell.state = state;
        CHECK(markOf(cell) == mark);
    }
    // Broken before the run was cut short is broken.
    cell.verdicts[0].mark = results::Mark::broken;
    cell.state = CellState::cutShort;
    CHECK(markOf(cell) == MarkState::broken);
}

TEST_CASE("Marks: sheet of all marks for people", "[drawing][files]") {
    test::startGui();
    for (const Scheme scheme : {Scheme::light, Scheme::dark}) {
        const Look& the = look(scheme);
        const QImage image = paintToImage({760, 250}, 1.0, the, [&](QPainter& painter) {
            for (int state = 0; state < markStateCount; ++state) {
                double y = 10;
                for (const double side : {14.0, 18.0, 28.0, 48.0}) {
                    paintMark(painter, QRectF(20 + 82 * state, y, side, side),
                              static_cast<MarkState>(state), the, 0.4);
                    y += side + 14;
                }
                painter.setFont(the.font(TextSize::small));
                painter.setPen(the.text);
                painter.drawText(QPointF(12 + 82 * state, 215),
                                 words(static_cast<MarkState>(state)));
            }
        });
        test::keep(image, scheme == Scheme::dark ? "marks_dark" : "marks_light");
        CHECK_FALSE(image.isNull());
    }
}
