// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/choice.h"

#include "batch/messages.h"
#include "files/project_file.h"
#include "program.h"

#include <set>

using namespace headroom;
using namespace headroom::batch;

namespace {

std::shared_ptr<const studies::Snapshot> demo() {
    return studies::makeSnapshot(files::openProject(program::demo).bound);
}

} // namespace

TEST_CASE("choice: all cells, or those named, in the project's order", "[batch][limit]") {
    const auto snapshot = demo();
    const auto all = chosenCells({}, *snapshot);
    REQUIRE(all);
    CHECK(all->size() ==
          static_cast<std::size_t>((snapshot->options() + 1) * snapshot->studies()));
    CHECK(all->front() == std::pair{-1, 0});
    Call call;
    call.options = {snapshot->optionName(0), snapshot->optionName(-1)};
    call.studies = {snapshot->studyName(1)};
    const auto some = chosenCells(call, *snapshot);
    REQUIRE(some);
    CHECK(*some == Cells{{-1, 1}, {0, 1}});
}

TEST_CASE("choice: the parts of a matrix are the matrix, each cell once", "[batch][invariant]") {
    const auto snapshot = demo();
    const auto all = chosenCells({}, *snapshot);
    std::multiset<std::pair<int, int>> seen;
    for (const char* part : {"1/3", "2/3", "3/3"}) {
        Call call;
        call.part = part;
        const auto cells = chosenCells(call, *snapshot);
        REQUIRE(cells);
        seen.insert(cells->begin(), cells->end());
    }
    CHECK(seen == std::multiset<std::pair<int, int>>(all->begin(), all->end()));
}

TEST_CASE("choice: unknown names and bad parts are all told, with the nearest known",
          "[batch][messages]") {
    const auto snapshot = demo();
    Call call;
    auto slip = snapshot->optionName(-1);
    slip.back() = 'x';
    call.options = {slip};
    call.studies = {"nothing of the kind at all"};
    call.part = "3/2";
    const auto none = chosenCells(call, *snapshot);
    REQUIRE_FALSE(none);
    REQUIRE(none.findings().size() == 3);
    CHECK(none.findings()[0].message == &unknownOptionNear);
    CHECK(none.findings()[1].message == &unknownStudy);
    CHECK(none.findings()[2].message == &badPart);
    for (const char* part : {"", "1/1"}) {
        CHECK(chosenCells({.part = part}, *snapshot));
    }
    for (const char* part : {"0/2", "1", "a/b", "1/2x", "/2", "1/"}) {
        CAPTURE(part);
        CHECK_FALSE(chosenCells({.part = part}, *snapshot));
    }
}
