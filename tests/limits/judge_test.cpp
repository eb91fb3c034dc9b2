// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/judge.h"

#include "limits/messages.h"

#include "hand_made.h"
#include "support/catch.h"

#include <limits>

using namespace headroom;
using headroom::limits::judge;
using headroom::plant::LoadClass;
using headroom::plant::TimeRule;
using headroom::results::EndReason;
using headroom::results::Mark;
using headroom::results::Thing;
using headroom::results::Verdict;

namespace {

constexpr Message emptied{"test.emptied", Severity::warning, "The shaft emptied.", "Widen it."};

plant::Limit lowest(double bound) {
    auto made = hand_made::shaftLevel();
    made.least[0] = bound;
    return made;
}

/// The verdict of one limit on a run and its repeat with the given levels.
Verdict judged(const plant::Limit& limit, const std::vector<double>& run,
               const std::vector<double>& repeat, LoadClass loadClass = LoadClass::normal) {
    const auto coarse = hand_made::shaftRun(run);
    const auto fine = hand_made::shaftRun(repeat);
    const auto verdicts = judge(hand_made::variant({{"Shaft", limit}}), hand_made::study(loadClass),
                                &coarse, &fine);
    REQUIRE(verdicts.size() == 1);
    return verdicts.front();
}

} // namespace

TEST_CASE("judge: value of the finer run, uncertainty from both and from what is declared",
          "[limits][analytic]") {
    auto limit = lowest(458.0);
    limit.modelUncertainty = 0.4;
    limit.reserve = 1.0;
    auto coarse = hand_made::shaftRun({490.0, 456.2, 480.0});
    auto fine = hand_made::shaftRun({490.0, 456.1, 480.0});
    fine.channels[0].least.largestStep = 0.2;
    const auto verdict = judge(hand_made::variant({{"Shaft", limit}}), hand_made::study(), &coarse,
                               &fine)
                             .front();
    CHECK(verdict.extreme == 456.1);
    CHECK(verdict.time_s == 1.0);
    CHECK_THAT(verdict.margin, WithinAbs(-1.9, 1e-9));
    CHECK_THAT(verdict.numerical, WithinAbs(0.3, 1e-9));
    CHECK_THAT(verdict.uncertainty, WithinAbs(0.5, 1e-9)); // 3-4-5
    CHECK(verdict.mark == Mark::broken);
    CHECK_FALSE(verdict.upper);
    CHECK_THAT(verdict.share, WithinAbs(-1.9 / 32.0, 1e-9));
    CHECK(verdict.outside_s > 0.0);
    CHECK(verdict.outsideLeast_s < verdict.outside_s);
    CHECK(verdict.outside_s < verdict.outsideMost_s);
    CHECK_FALSE(verdict.unsignedLimit);
    CHECK_FALSE(verdict.reason.has_value());
}

TEST_CASE("judge: the four marks on one limit", "[limits][limit]") {
    auto limit = lowest(458.0);
    limit.modelUncertainty = 0.5;
    limit.reserve = 1.0;
    CHECK(judged(limit, {490, 457.0}, {490, 457.0}).mark == Mark::broken);
    CHECK(judged(limit, {490, 457.5}, {490, 457.5}).mark == Mark::undecided);
    CHECK(judged(limit, {490, 458.25}, {490, 458.25}).mark == Mark::undecided);
    CHECK(judged(limit, {490, 458.5}, {490, 458.5}).mark == Mark::tight);
    CHECK(judged(limit, {490, 459.5}, {490, 459.5}).mark == Mark::held);
}

TEST_CASE("judge: of two sides the worse one governs", "[limits][limit]") {
    auto limit = lowest(458.0);
    limit.greatest[0] = 534.0;
    const auto low = judged(limit, {490, 457, 500}, {490, 457, 500});
    CHECK_FALSE(low.upper);
    CHECK(low.mark == Mark::broken);
    const auto high = judged(limit, {490, 460, 533}, {490, 460, 533});
    CHECK(high.upper);
    CHECK(high.mark == Mark::held);
    CHECK(high.extreme == 533.0);
}

TEST_CASE("judge: a class without value takes the milder one; none is not applicable",
          "[limits][limit]") {
    auto limit = lowest(460.0);
    limit.least[2] = 455.5;
    CHECK(judged(limit, {490, 458}, {490, 458}, LoadClass::exceptional).mark == Mark::broken);
    CHECK(judged(limit, {490, 458}, {490, 458}, LoadClass::extreme).mark == Mark::held);
    CHECK(judged(limit, {490, 458}, {490, 458}, LoadClass::catastrophic).boundClass == 2);
    auto extremeOnly = hand_made::shaftLevel();
    extremeOnly.least[2] = 455.5;
    const auto verdict = judged(extremeOnly, {490, 450}, {490, 450});
    CHECK(verdict.mark == Mark::notApplicable);
    CHECK(verdict.reason->message == &limits::classMissing);
}

TEST_CASE("judge: a place that is not there is not applicable, run or not", "[limits][limit]") {
    auto limit = lowest(458.0);
    limit.at.thing.index = -1;
    limit.at.thing.name = "Old shaft";
    const auto verdict = judged(limit, {490, 450}, {490, 450});
    CHECK(verdict.mark == Mark::notApplicable);
    CHECK(verdict.reason->message == &limits::placeMissing);
    const auto notRun = judge(hand_made::variant({{"x", limit}, {"y", lowest(458.0)}}),
                              hand_made::study(), nullptr, nullptr);
    REQUIRE(notRun.size() == 2);
    CHECK(notRun[0].mark == Mark::notApplicable);
    CHECK(notRun[1].mark == Mark::notRun);
    CHECK(notRun[1].bound == 458.0);
    CHECK(notRun[1].reason->message == &limits::notRun);
}

TEST_CASE("judge: what the run does not compute is said, with measure and place",
          "[limits][limit]") {
    auto limit = hand_made::limit(Measure::speed,
                                  hand_made::reference("U1", plant::Collection::units, 0));
    limit.greatest[0] = 1.5;
    const auto verdict = judged(limit, {490, 450}, {490, 450});
    CHECK(verdict.mark == Mark::notApplicable);
    CHECK(verdict.reason->message == &limits::notRecorded);
}

TEST_CASE("judge: without the repeat there is a margin and no mark", "[limits][limit]") {
    const auto run = hand_made::shaftRun({490, 450, 480});
    const auto variant = hand_made::variant({{"Shaft", lowest(458.0)}});
    const auto alone = judge(variant, hand_made::study(), &run, nullptr).front();
    CHECK(alone.mark == Mark::notRun);
    CHECK(alone.reason->message == &limits::repeatMissing);
    CHECK(alone.margin == -8.0);
    CHECK(alone.extreme == 450.0);
    CHECK(alone.time_s == 1.0);
    auto stopped = run;
    stopped.status.reason = EndReason::cancelled;
    CHECK(judge(variant, hand_made::study(), &run, &stopped).front().mark == Mark::notRun);
}

TEST_CASE("judge: a run that left its range is not valid unless broken before",
          "[limits][limit]") {
    Finding why;
    why.message = &emptied;
    auto run = hand_made::shaftRun({490, 470, 459.5, 459, 459.5, 460, 440});
    run.status.invalid = {{5.5, why, {Thing::unit}}};
    const auto study = hand_made::study();

    const auto notYet = judge(hand_made::variant({{"Shaft", lowest(458.0)}}), study, &run, &run).front();
    CHECK(notYet.mark == Mark::notValid);
    CHECK(notYet.reason->message == &emptied);
    CHECK(notYet.extreme == 459.0); // of the time before
    CHECK(notYet.margin == 1.0);

    const auto before = judge(hand_made::variant({{"Shaft", lowest(480.0)}}), study, &run, &run).front();
    CHECK(before.mark == Mark::broken);
    CHECK(before.extreme == 459.0);

    run.status.invalid[0].stillValid = {Thing::chamber};
    const auto spared = judge(hand_made::variant({{"Shaft", lowest(458.0)}}), study, &run, &run).front();
    CHECK(spared.mark == Mark::broken);
    CHECK(spared.extreme == 440.0);
}

TEST_CASE("judge: a run cut short says what was broken until then, and no more",
          "[limits][limit]") {
    auto run = hand_made::shaftRun({490, 459, 470});
    run.status.reason = EndReason::failed;
    run.duration_s = 900.0;
    Finding why;
    why.message = &emptied;
    run.status.why = why;
    const auto study = hand_made::study();
    CHECK(judge(hand_made::variant({{"s", lowest(458.0)}}), study, &run, &run).front().mark ==
          Mark::notValid);
    CHECK(judge(hand_made::variant({{"s", lowest(480.0)}}), study, &run, &run).front().mark ==
          Mark::broken);
    run.channels.clear();
    const auto empty = judge(hand_made::variant({{"s", lowest(458.0)}}), study, &run, nullptr).front();
    CHECK(empty.mark == Mark::notValid);
    CHECK(empty.reason->message == &emptied);
}

TEST_CASE("judge: already broken at rest is said, and sorts first", "[limits][limit]") {
    const auto verdict = judged(lowest(495.0), {490, 489}, {490, 489});
    CHECK(verdict.alreadyBrokenAtRest);
    CHECK(verdict.mark == Mark::broken);
    auto other = verdict;
    other.alreadyBrokenAtRest = false;
    other.share = -100.0;
    CHECK(limits::worse(verdict, other));
}

TEST_CASE("judge: an allowance is added on the side of the bound", "[limits][analytic]") {
    auto limit = hand_made::limit(Measure::head,
                                  hand_made::reference("Inlet", plant::Collection::points, 2));
    limit.greatest[0] = 590.0;
    limit.allowance.shareOfHead = 0.05; // of 242 m of static head
    limit.allowance.shareOfRise = 0.10; // of 64.2 m of rise
    limit.reserve = 3.0;
    auto coarse = hand_made::run({hand_made::channel(Measure::head, {Thing::point, 2},
                                                     {512.0, 576.2, 500.0}, 1.0)}, 2.0);
    const auto verdict = judge(hand_made::variant({{"Spiral", limit}}), hand_made::study(), &coarse,
                               &coarse).front();
    CHECK_THAT(verdict.allowance, WithinAbs(12.1 + 6.42, 1e-9));
    CHECK_THAT(verdict.extreme, WithinAbs(576.2 + 18.52, 1e-9));
    CHECK_THAT(verdict.margin, WithinAbs(-4.72, 1e-9));
    CHECK(verdict.model == 0.4); // beside a chart made from rated data
    CHECK(verdict.mark == Mark::broken);

    auto speed = hand_made::limit(Measure::speed,
                                  hand_made::reference("U1", plant::Collection::units, 0));
    speed.greatest[0] = 1.5;
    speed.allowance.shareOfHead = 0.05;
    coarse.channels.push_back(hand_made::channel(Measure::speed, {Thing::unit, 0}, {1.0, 1.4}, 1.0));
    const auto odd = judge(hand_made::variant({{"Speed", speed}}), hand_made::study(), &coarse,
                           &coarse).front();
    CHECK(odd.mark == Mark::notApplicable);
    CHECK(odd.reason->message == &limits::noStaticHead);
}

TEST_CASE("judge: a timed limit by the time it allows", "[limits][analytic]") {
    // Derived here: level falls 10 m in 10 s and comes back; below 485 m for 10 s.
    std::vector<double> levels;
    for (int i = 0; i <= 20; ++i) {
        levels.push_back(490.0 - (i <= 10 ? i : 20 - i));
    }
    auto limit = lowest(485.0);
    limit.timeRule = TimeRule::continuous;
    limit.allowed_s = 12.0;
    const auto held = judged(limit, levels, levels);
    CHECK(held.mark == Mark::held);
    CHECK_THAT(held.outside_s, WithinAbs(10.0, 1e-4));
    CHECK_THAT(held.margin, WithinAbs(1.0, 1e-4)); // below 486 m for just 12 s
    // The worse of the distance share 1/5 and the time share 2/12.
    CHECK_THAT(held.share, WithinAbs(2.0 / 12.0, 1e-4));

    limit.modelUncertainty = 1.5; // below 486.5 m for 13 s
    const auto unsure = judged(limit, levels, levels);
    CHECK(unsure.mark == Mark::undecided);
    CHECK_THAT(unsure.outsideMost_s, WithinAbs(13.0, 1e-4));
    CHECK_THAT(unsure.outsideLeast_s, WithinAbs(7.0, 1e-4));
    limit.modelUncertainty = 0.0;
    limit.allowed_s = 8.0;
    const auto broken = judged(limit, levels, levels);
    CHECK(broken.mark == Mark::broken);
    CHECK_THAT(broken.margin, WithinAbs(-1.0, 1e-4));
    CHECK_THAT(broken.share, WithinAbs(-0.25, 1e-4)); // time share (8 − 10)/8, distance −1/5
}

TEST_CASE("judge: two excursions count each alone or together", "[limits][limit]") {
    const std::vector<double> levels{490, 480, 490, 480, 490};
    auto limit = lowest(485.0); // 1 s below each time
    limit.allowed_s = 1.5;
    limit.timeRule = TimeRule::continuous;
    CHECK(judged(limit, levels, levels).mark == Mark::held);
    limit.timeRule = TimeRule::cumulative;
    CHECK(judged(limit, levels, levels).mark == Mark::broken);
    limit.timeRule = TimeRule::momentary;
    CHECK(judged(limit, levels, levels).mark == Mark::broken);
}

TEST_CASE("judge: how long outside cannot be told without a trace", "[limits][limit]") {
    auto run = hand_made::shaftRun({490, 480, 490});
    run.channels[0].trace = {};
    auto limit = lowest(485.0);
    const auto momentary = judge(hand_made::variant({{"s", limit}}), hand_made::study(), &run, &run).front();
    CHECK(momentary.mark == Mark::broken);
    CHECK_FALSE(momentary.outsideKnown);
    limit.timeRule = TimeRule::continuous;
    limit.allowed_s = 5.0;
    const auto timed = judge(hand_made::variant({{"s", limit}}), hand_made::study(), &run, &run).front();
    CHECK(timed.mark == Mark::notValid);
    CHECK(timed.reason->message == &limits::noTrace);
}

TEST_CASE("judge: what is not a number is never held", "[limits][invariant]") {
    auto run = hand_made::shaftRun({490, 480});
    run.channels[0].least.value = std::numeric_limits<double>::quiet_NaN();
    const auto verdict = judge(hand_made::variant({{"s", lowest(485.0)}}), hand_made::study(), &run,
                               &run).front();
    CHECK(verdict.mark == Mark::notValid);
    CHECK(verdict.reason->message == &limits::notFinite);
}

TEST_CASE("judge: a limit without author and document is unsigned", "[limits][limit]") {
    auto limit = lowest(458.0);
    limit.source = {};
    CHECK(judged(limit, {490, 480}, {490, 480}).unsignedLimit);
}
