// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/summary.h"

#include "files/project_file.h"
#include "files/verdicts_writer.h"
#include "program.h"
#include "studies/board.h"

#include "files/json_reader.h"

using namespace headroom;
using headroom::results::Mark;

namespace {

struct Made {
    std::shared_ptr<const studies::Snapshot> snapshot;
    std::vector<studies::Cell> cells;
};

/// The demo with one cell whose verdicts are written by hand.
Made made(Mark mark, double margin) {
    auto opened = files::openProject(program::demo);
    Made out{studies::makeSnapshot(opened.bound), {}};
    const auto store = studies::makeMemoryStore();
    auto cell = studies::judgeCell(*out.snapshot, -1, 0, *store);
    cell.state = studies::CellState::done;
    for (auto& verdict : cell.verdicts) {
        verdict.mark = Mark::held;
        verdict.reason.reset();
        verdict.margin = 1.0;
        verdict.share = 0.5;
    }
    auto& governing = cell.verdicts.front();
    governing.mark = mark;
    governing.margin = margin;
    governing.share = margin / 100.0;
    governing.extreme = governing.bound - margin;
    governing.uncertainty = 0.41;
    governing.unsignedLimit = true;
    out.cells.push_back(cell);
    return out;
}

} // namespace

TEST_CASE("summary: marks in words, margin with uncertainty, owners, definitions, caution",
          "[batch][messages]") {
    const auto of = made(Mark::broken, -0.002);
    const auto text = batch::summaryText(*of.snapshot, of.cells);
    CHECK_THAT(text, ContainsSubstring("BROKEN −1\u2009%"));
    CHECK_THAT(text, ContainsSubstring("−0.002 ± 0.5\u2009m"));
    CHECK_THAT(text, ContainsSubstring("(unsigned)"));
    CHECK_THAT(text, ContainsSubstring("Net head: "));
    CHECK_THAT(text, ContainsSubstring("does not permit operation."));
    CHECK_THAT(text, ContainsSubstring("Ostrelle local 2011"));
}

TEST_CASE("verdicts: the keys, in one order, with the unit beside the numbers", "[batch][files]") {
    const auto of = made(Mark::tight, 2.5);
    const auto text = files::writeVerdicts(*of.snapshot, of.cells,
                                           [](const studies::Cell&) { return std::string("t.csv"); });
    const auto parsed = files::parseJson(text, "verdicts.json");
    REQUIRE(parsed.findings.empty());
    REQUIRE(parsed.tree.items().size() == of.cells.front().verdicts.size());
    const auto& first = parsed.tree.items().front();
    for (const auto& row : parsed.tree.items()) {
        REQUIRE(row.members().size() == first.members().size());
        for (std::size_t i = 0; i < row.members().size(); ++i) {
            CHECK(row.members()[i].first == first.members()[i].first);
        }
    }
    CHECK(first.find("verdict")->asText() == "tight");
    CHECK(first.find("unit")->asText() == "m");
    CHECK_THAT(first.find("margin")->asNumber(), WithinAbs(2.5, 1e-12));
    CHECK(first.find("trace")->asText() == "t.csv");
    CHECK(first.find("reason")->isNull());
    for (const char* key : {"option", "study", "limit", "quantity", "at", "class", "bound",
                            "extreme", "time_s", "margin", "share", "uncertainty", "outside_s",
                            "unit", "verdict", "reason", "trace"}) {
        CAPTURE(key);
        CHECK(first.find(key) != nullptr);
    }
}
