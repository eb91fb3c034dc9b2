// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/sentence.h"

#include "small_project.h"
#include "studies/messages.h"

#include "support/catch.h"

using namespace headroom;
using headroom::results::Mark;
using headroom::results::Verdict;
using headroom::studies::Cell;
using headroom::studies::CellState;
using headroom::studies::Sentence;
using headroom::studies::sentence;
using headroom::studies::statement;

namespace {

/// Limits: shaft upper (momentary), shaft lower (momentary), speed (allows 60 s).
std::shared_ptr<const studies::Snapshot> threeLimits() {
    auto tree = small::projectTree();
    const auto low = small::object(
        {{"level", small::object({{"at", small::words("Shaft")},
                                  {"min_m", small::object({{"normal", small::number(90)}})}})}});
    const auto timed = small::object(
        {{"opening", small::object({{"at", small::words("U1")},
                                    {"max_pct", small::object({{"normal", small::number(80)}})}})},
         {"time", small::object({{"continuous",
                                  small::object({{"allowed_s", small::number(60)}})}})}});
    tree = tree.with({"limits", "Shaft, lowest"}, low).with({"limits", "Gate, longest"}, timed);
    return small::snapshot(tree);
}

Verdict verdict(int limit, Mark mark, double margin) {
    Verdict made;
    made.limit = limit;
    made.mark = mark;
    made.place = {results::Thing::chamber, 0};
    made.upper = limit != 1;
    made.bound = limit == 1 ? 90.0 : 111.0;
    made.extreme = made.bound - (made.upper ? margin : -margin);
    made.margin = margin;
    made.share = margin / 20.0;
    made.uncertainty = 0.41;
    made.time_s = 151.3;
    if (limit == 2) {
        made.measure = Measure::opening;
        made.place = {results::Thing::unit, 0};
        made.bound = 0.8;
    }
    return made;
}

Cell cell(int study, CellState state, std::vector<Verdict> verdicts) {
    Cell made;
    made.study = study;
    made.state = state;
    made.verdicts = std::move(verdicts);
    return made;
}

} // namespace

TEST_CASE("sentence: option, study, what, how much, when", "[studies][messages]") {
    const auto snapshot = threeLimits();
    const std::vector<Cell> choice{
        cell(0, CellState::done, {verdict(0, Mark::held, 8.0), verdict(1, Mark::broken, -1.94)}),
        cell(1, CellState::done, {verdict(0, Mark::tight, 0.9)})};
    const auto made = sentence(*snapshot, choice);
    CHECK(made.kind == Sentence::Kind::verdict);
    CHECK(made.limitName == "Shaft, lowest");
    CHECK(made.text == "As built – Trip: the level in Shaft falls 1.9 ± 0.5\u2009m below its limit "
                       "of 90.0\u2009m, 151\u2009s in.");
    CHECK(made.due == 0);
}

TEST_CASE("sentence: each mark has its own words", "[studies][messages]") {
    const auto snapshot = threeLimits();
    const auto& variant = snapshot->variant(-1);
    const auto said = [&](int limit, Mark mark, double margin) {
        return statement(variant, verdict(limit, mark, margin));
    };
    CHECK(said(0, Mark::broken, -0.03) == "the level in Shaft rises 0.03 ± 0.5\u2009m above its "
                                          "limit of 111.0\u2009m, 151\u2009s in");
    CHECK(said(0, Mark::undecided, 0.2) == "the level in Shaft rises to 0.2 ± 0.5\u2009m below its "
                                           "limit of 111.0\u2009m, 151\u2009s in: undecided");
    CHECK(said(1, Mark::undecided, -0.2) == "the level in Shaft falls to 0.2 ± 0.5\u2009m below "
                                            "its limit of 90.0\u2009m, 151\u2009s in: undecided");
    CHECK(said(1, Mark::tight, 1.29) == "the level in Shaft stays 1.2 ± 0.5\u2009m above its limit "
                                        "of 90.0\u2009m, 151\u2009s in: tight");
    CHECK(said(0, Mark::held, 3.69) == "the level in Shaft stays 3.6 ± 0.5\u2009m below its limit "
                                       "of 111.0\u2009m, 151\u2009s in: held");
    auto atRest = verdict(0, Mark::broken, -2.0);
    atRest.alreadyBrokenAtRest = true;
    CHECK_THAT(statement(variant, atRest), ContainsSubstring("already at rest"));
}

TEST_CASE("sentence: a limit that allows a time speaks of time", "[studies][messages]") {
    const auto snapshot = threeLimits();
    const auto& variant = snapshot->variant(-1);
    auto timed = verdict(2, Mark::broken, -0.1);
    timed.outside_s = 82.4;
    CHECK(statement(variant, timed) == "the gate of U1 stays above its limit of 80.0\u2009% for "
                                       "82.4\u2009s, with 60.0\u2009s allowed");
    timed.mark = Mark::held;
    timed.outside_s = 0.0;
    CHECK(statement(variant, timed) ==
          "the gate of U1 never goes above its limit of 80.0\u2009%: held");
}

TEST_CASE("sentence: what is not run is said and does not hide what is", "[studies][messages]") {
    const auto snapshot = threeLimits();
    Verdict notRun;
    notRun.limit = 0;
    const std::vector<Cell> some{cell(0, CellState::outdated, {notRun}),
                                 cell(1, CellState::done, {verdict(0, Mark::held, 3.69)})};
    const auto made = sentence(*snapshot, some);
    CHECK(made.study == 1);
    CHECK(made.due == 1);
    CHECK_THAT(made.text, ContainsSubstring("1 of 2 chosen cells are not run."));

    const std::vector<Cell> none{cell(0, CellState::notRun, {notRun})};
    CHECK(sentence(*snapshot, none).kind == Sentence::Kind::notRun);
    CHECK(sentence(*snapshot, none).text ==
          "As built – Trip: not run for the present inputs.");
    CHECK(sentence(*snapshot, {}).kind == Sentence::Kind::noStudy);
}

TEST_CASE("sentence: a run that failed, and one without limits", "[studies][messages]") {
    const auto snapshot = threeLimits();
    auto failed = cell(0, CellState::cutShort, {});
    Finding why;
    why.message = &studies::repeatStopped;
    failed.reason = why;
    const std::vector<Cell> one{failed};
    CHECK(sentence(*snapshot, one).kind == Sentence::Kind::failed);
    CHECK_THAT(sentence(*snapshot, one).text, ContainsSubstring("its repeat"));
    const std::vector<Cell> empty{cell(0, CellState::done, {})};
    CHECK(sentence(*snapshot, empty).kind == Sentence::Kind::noLimit);
    const auto bare = small::snapshot(small::projectTree().without({"studies"}));
    CHECK(sentence(*bare, {}).text == "This project has no study yet.");
}
