// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/choices.h"
#include "desk/selection_model.h"
#include "driver.h"

using namespace headroom;
using namespace headroom::desk;

TEST_CASE("SelectionModel: at most six different runs, told once", "[desk][selection]") {
    application();
    SelectionModel model;
    int told = 0;
    QObject::connect(&model, &SelectionModel::changed, [&] { ++told; });
    Selection next;
    for (int i = 0; i < 9; ++i) {
        next.shown.push_back({i / 2, 0});
        next.shown.push_back({i, 1});
    }
    model.set(next);
    CHECK(model.now().shown.size() == SelectionModel::mostShown);
    CHECK(told == 1);
    model.set(model.now());
    CHECK(told == 1);
}

TEST_CASE("choices: a pressed cell comes into the hand and pushes the old one out", "[desk][selection]") {
    application();
    drive::Bench bench;
    bench.window->openFile(bench.demo());
    const auto& board = bench.window->bench().board();
    Selection now;
    now.shown = {{-1, 0}, {1, 0}};
    const auto other = withCell(board, now, {2, 0});
    CHECK(other.shown == std::vector<CellId>{{2, 0}, {-1, 0}, {1, 0}}); // the base stays
    CHECK(withCell(board, other, {3, 0}).shown == std::vector<CellId>{{3, 0}, {-1, 0}, {1, 0}});
    CHECK(withCell(board, other, {2, 4}).shown == std::vector<CellId>{{2, 4}, {-1, 4}, {1, 4}});
    const auto compared = withCell(board, now, {1, 0});
    CHECK(compared.shown == std::vector<CellId>{{1, 0}, {-1, 0}});
    const auto back = withCell(board, compared, {-1, 0});
    CHECK(back.shown == std::vector<CellId>{{-1, 0}});
    const auto added = toggled(now, {3, 0});
    CHECK(added.shown.size() == 3);
    CHECK(toggled(added, {3, 0}).shown == now.shown);
    Selection alone;
    alone.shown = {{-1, 0}};
    CHECK(toggled(alone, {-1, 0}).shown.size() == 1); // something always stays in the hand
}

TEST_CASE("choices: the next problem walks the Board row by row and around", "[desk][selection]") {
    application();
    drive::Bench bench;
    bench.window->openFile(bench.demo());
    const auto& board = bench.window->bench().board();
    const int options = board.snapshot().options() + 1, studies = board.snapshot().studies();
    CellId at{-1, 0};
    for (int step = 0; step < options * studies; ++step) {
        at = nextProblem(board, at); // nothing is run: every cell is a problem
    }
    CHECK(at == CellId{-1, 0});
    CHECK(nextProblem(board, {-1, 0}) == CellId{0, 0});
    CHECK(nextProblem(board, {board.snapshot().options() - 1, 0}) == CellId{-1, 1});
}

TEST_CASE("choices: a selection of another project is cut to what is there", "[desk][selection]") {
    application();
    drive::Bench bench;
    bench.window->openFile(bench.demo());
    Selection odd;
    odd.shown = {{99, 99}, {-1, 1}};
    odd.limit = 500;
    const auto kept = fitted(bench.window->bench().board(), odd);
    REQUIRE(kept.shown.size() == 1);
    CHECK(kept.shown[0] == CellId{-1, 1});
    CHECK(kept.limit < bench.window->bench().snapshot().variant(-1).limits.size());
}
