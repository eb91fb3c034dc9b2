// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/board.h"

#include "limits/messages.h"
#include "small_project.h"
#include "studies/messages.h"

#include "units/text.h"

#include "support/catch.h"

#include <set>

using namespace headroom;
using headroom::plant::Tree;
using headroom::results::Mark;
using headroom::studies::CellState;
using headroom::studies::judgeCell;
using headroom::studies::makeMemoryStore;
using headroom::studies::StoredRun;

namespace {

/// Keeps a run for a cell as the runner would.
void keep(studies::RunStore& store, const studies::Snapshot& snapshot, int option, int study,
          bool withRepeat = true, double reached = 1.0) {
    const auto& inputs = snapshot.inputs(option, study);
    const auto& variant = snapshot.variant(option);
    studies::Job job{variant.site, variant.plant, *inputs.study};
    auto stored = std::make_shared<StoredRun>();
    stored->fingerprint = inputs.fingerprint;
    stored->run = std::make_shared<const results::Run>(
        small::fakeRun(job, reached * inputs.study->until_s));
    if (withRepeat) {
        job.refinement = 2;
        stored->repeat =
            std::make_shared<const results::Run>(small::fakeRun(job, inputs.study->until_s));
    }
    store.keep(std::move(stored));
}

} // namespace

TEST_CASE("snapshot: base and options bound, each cell with its own fingerprint",
          "[studies][invariant]") {
    const auto snapshot = small::snapshot(small::projectTree());
    for (const auto& finding : snapshot->bound->findings) {
        INFO(text(finding));
        CHECK(finding.severity() != Severity::error);
    }
    REQUIRE(snapshot->options() == 2);
    REQUIRE(snapshot->studies() == 2);
    CHECK(snapshot->optionName(-1) == "As built");
    CHECK(snapshot->optionName(1) == "Widest");
    std::set<plant::Fingerprint> all;
    for (const auto& cell : small::allCells(*snapshot)) {
        const auto& inputs = snapshot->inputs(cell.option, cell.study);
        CHECK_FALSE(inputs.blocked.has_value());
        all.insert(inputs.fingerprint);
    }
    CHECK(all.size() == 6);
}

TEST_CASE("snapshot: an edit shares what it does not touch", "[studies][invariant]") {
    const auto tree = small::projectTree();
    const auto before = small::snapshot(tree);
    const auto after =
        small::snapshot(tree.with({"studies", "Trip", "until_s"}, Tree::number(30)), before.get());
    CHECK(after->variants == before->variants);
    CHECK(after->cells[1] == before->cells[1]); // Long trip, base
    CHECK(after->cells[0] != before->cells[0]);
    CHECK(after->inputs(-1, 0).fingerprint != before->inputs(-1, 0).fingerprint);

    const auto widened = plant::edited(tree, 0, small::shaftDiameter, Tree::number(11));
    const auto option = small::snapshot(widened, before.get());
    CHECK(option->variants[0] == before->variants[0]);
    CHECK(option->variants[1] != before->variants[1]);
    CHECK(option->variants[2] == before->variants[2]);
}

TEST_CASE("snapshot: a changed limit, a name or a note changes no fingerprint",
          "[studies][invariant]") {
    const auto tree = small::projectTree();
    const auto before = small::snapshot(tree);
    const auto limit = small::snapshot(tree.with(small::shaftBound, Tree::number(105)), before.get());
    const auto title = small::snapshot(tree.with({"title"}, Tree::text("Other")), before.get());
    const auto renamed = plant::renamed(tree, {"plant", "chambers", "Shaft"}, "Tower");
    REQUIRE(renamed);
    const auto tower = small::snapshot(*renamed, before.get());
    for (const auto& cell : small::allCells(*before)) {
        const auto& fingerprint = before->inputs(cell.option, cell.study).fingerprint;
        CHECK(limit->inputs(cell.option, cell.study).fingerprint == fingerprint);
        CHECK(title->inputs(cell.option, cell.study).fingerprint == fingerprint);
        CHECK(tower->inputs(cell.option, cell.study).fingerprint == fingerprint);
    }
}

TEST_CASE("snapshot: a study that names what an option lacks cannot run there",
          "[studies][limit]") {
    auto tree = small::projectTree();
    tree = tree.with({"options", "No unit", "changes", "plant", "units", "U1"}, Tree{});
    const auto snapshot = small::snapshot(tree);
    REQUIRE(snapshot->options() == 3);
    CHECK(snapshot->inputs(2, 0).blocked.has_value());
    CHECK_FALSE(snapshot->inputs(-1, 0).blocked.has_value());
    const auto cell = judgeCell(*snapshot, 2, 0, *makeMemoryStore());
    CHECK(cell.state == CellState::notApplicable);
    REQUIRE(cell.verdicts.size() == 1);
    CHECK(cell.verdicts[0].mark == Mark::notApplicable);
    CHECK(cell.verdicts[0].reason->message == cell.reason->message);
}

TEST_CASE("snapshot: a faulty option stops its own cells, a faulty study its own",
          "[studies][limit]") {
    const auto tree = small::projectTree();
    const auto badOption = small::snapshot(
        plant::edited(tree, 0, small::shaftDiameter, Tree::number(-3)));
    CHECK(badOption->inputs(0, 0).blocked.has_value());
    CHECK_FALSE(badOption->inputs(-1, 0).blocked.has_value());
    CHECK_FALSE(badOption->inputs(1, 1).blocked.has_value());
    const auto badStudy =
        small::snapshot(tree.with({"studies", "Trip", "until_s"}, Tree::text("long")));
    CHECK(badStudy->inputs(-1, 0).blocked.has_value());
    CHECK(badStudy->inputs(0, 0).blocked.has_value());
    CHECK_FALSE(badStudy->inputs(-1, 1).blocked.has_value());
}

TEST_CASE("cell: not run, done, outdated, and back again by undo", "[studies][limit]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    const auto notRun = judgeCell(*first, -1, 0, *store);
    CHECK(notRun.state == CellState::notRun);
    REQUIRE(notRun.verdicts.size() == 1);
    CHECK(notRun.verdicts[0].mark == Mark::notRun);

    keep(*store, *first, -1, 0);
    const auto done = judgeCell(*first, -1, 0, *store);
    CHECK(done.state == CellState::done);
    CHECK(done.progress == 1.0);
    CHECK(done.verdicts[0].mark == Mark::broken); // 600 m³ on 50 m² rise 11.9 m, over 111 m

    const auto wider = tree.with(small::shaftDiameter, Tree::number(9));
    const auto second = small::snapshot(wider, first.get());
    const auto outdated = judgeCell(*second, -1, 0, *store);
    CHECK(outdated.state == CellState::outdated);
    CHECK(outdated.verdicts[0].mark == Mark::notRun);
    CHECK(judgeCell(*second, -1, 1, *store).state == CellState::notRun);

    const auto third = small::snapshot(tree, second.get());
    const auto again = judgeCell(*third, -1, 0, *store);
    CHECK(again.state == CellState::done);
    CHECK(again.verdicts[0].extreme == done.verdicts[0].extreme);
}

TEST_CASE("cell: a changed limit judges again what was run", "[studies][limit]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    keep(*store, *first, -1, 0);
    const auto laxer = small::snapshot(tree.with(small::shaftBound, Tree::number(120)), first.get());
    const auto cell = judgeCell(*laxer, -1, 0, *store);
    CHECK(cell.state == CellState::done);
    CHECK(cell.verdicts[0].mark == Mark::held);
}

TEST_CASE("cell: what did not change is not judged again, what did is", "[studies][invariant]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    keep(*store, *first, -1, 0);
    auto before = judgeCell(*first, -1, 0, *store);
    before.verdicts[0].share = 123.0; // to be recognised by
    const auto title = small::snapshot(tree.with({"title"}, Tree::text("Other")), first.get());
    CHECK(judgeCell(*title, -1, 0, *store, &before).verdicts[0].share == 123.0);
    const auto laxer = small::snapshot(tree.with(small::shaftBound, Tree::number(120)), first.get());
    CHECK(judgeCell(*laxer, -1, 0, *store, &before).verdicts[0].share != 123.0);
    keep(*store, *first, -1, 0); // run anew
    CHECK(judgeCell(*title, -1, 0, *store, &before).verdicts[0].share != 123.0);
}

TEST_CASE("cell: what was stopped, and what could not be computed, says so", "[studies][limit]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    keep(*store, *snapshot, -1, 0, false, 0.5);
    const auto cut = judgeCell(*snapshot, -1, 0, *store);
    CHECK(cut.state == CellState::cutShort);
    CHECK(cut.reason->message == &studies::stopped);
    CHECK(cut.verdicts[0].mark == Mark::notValid);

    keep(*store, *snapshot, -1, 1, false);
    const auto half = judgeCell(*snapshot, -1, 1, *store);
    CHECK(half.state == CellState::cutShort);
    CHECK(half.reason->message == &studies::repeatStopped);
    CHECK(half.verdicts[0].mark == Mark::notRun);
    CHECK(half.verdicts[0].reason->message == &limits::repeatMissing);

    auto refused = std::make_shared<StoredRun>();
    refused->fingerprint = snapshot->inputs(0, 0).fingerprint;
    Finding why;
    why.message = &studies::stopped;
    refused->refused = why;
    store->keep(refused);
    const auto none = judgeCell(*snapshot, 0, 0, *store);
    CHECK(none.state == CellState::notApplicable);
    CHECK(none.verdicts[0].mark == Mark::notApplicable);

    auto failed = std::make_shared<StoredRun>(*store->find(snapshot->inputs(-1, 0).fingerprint));
    auto run = *failed->run;
    run.status.reason = results::EndReason::failed;
    run.status.why = why;
    failed->fingerprint = snapshot->inputs(0, 1).fingerprint;
    failed->run = failed->repeat = std::make_shared<const results::Run>(run);
    store->keep(failed);
    const auto ended = judgeCell(*snapshot, 0, 1, *store);
    CHECK(ended.state == CellState::failed);
    CHECK(ended.reason.has_value());
    CHECK(ended.verdicts[0].mark == Mark::broken); // it was, at 5 s, before the run ended
}

TEST_CASE("snapshot: a renamed option stays outdated, it does not become new",
          "[studies][limit]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    keep(*store, *first, 0, 0);
    const auto renamed = plant::renamed(tree, {"options", "Wider"}, "Broad");
    REQUIRE(renamed);
    const auto second = small::snapshot(*renamed, first.get());
    CHECK(judgeCell(*second, 0, 0, *store).state == CellState::done);
    const auto third = small::snapshot(
        plant::edited(*renamed, 0, small::shaftDiameter, Tree::number(11)), second.get());
    CHECK(judgeCell(*third, 0, 0, *store).state == CellState::outdated);
}
