// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/runner.h"

#include "base/ensure.h"
#include "small_project.h"

#include "support/catch.h"

#include <atomic>
#include <chrono>
#include <condition_variable>
#include <map>
#include <mutex>
#include <thread>

using namespace headroom;
using headroom::plant::Tree;
using headroom::studies::CellState;
using headroom::studies::judgeCell;
using headroom::studies::makeMemoryStore;
using headroom::studies::Runner;

namespace {

using Clock = std::chrono::steady_clock;
using News = Runner::News;

/// Counts the news of a runner.
class Listening {
public:
    Runner::Listener listener() {
        return [this](const News& news) {
            const std::lock_guard lock(mutex_);
            ++count_[news.kind];
            if (news.kind == News::Kind::progress) {
                falls_ += news.progress < last_[news.fingerprint];
                last_[news.fingerprint] = news.progress;
            }
        };
    }
    int operator[](News::Kind kind) const {
        const std::lock_guard lock(mutex_);
        const auto found = count_.find(kind);
        return found == count_.end() ? 0 : found->second;
    }
    int falls() const { return falls_; }

private:
    mutable std::mutex mutex_;
    std::map<News::Kind, int> count_;
    std::map<plant::Fingerprint, double> last_;
    int falls_ = 0;
};

/// A simulator whose runs wait at a gate until it is opened, or until they are told to stop.
class Gate {
public:
    studies::Simulate simulate() {
        return [this](const studies::Job& job, std::stop_token stop,
                      const studies::Progress& progress) -> Result<results::Run> {
            ++entered_;
            double share = 0.0;
            while (!open_ && !stop.stop_requested()) {
                share = std::min(0.9, share + 0.001);
                progress(share);
                std::this_thread::sleep_for(std::chrono::milliseconds(1));
            }
            return small::fakeRun(job, (open_ ? 1.0 : share) * job.study.until_s);
        };
    }
    void open() { open_ = true; }
    int entered() const { return entered_; }
    void waitForEntries(int wanted) const {
        const auto until = Clock::now() + std::chrono::seconds(10);
        while (entered_ < wanted && Clock::now() < until) {
            std::this_thread::sleep_for(std::chrono::milliseconds(1));
        }
        REQUIRE(entered_ >= wanted);
    }

private:
    std::atomic<bool> open_{false};
    std::atomic<int> entered_{0};
};

double secondsSince(Clock::time_point start) {
    return std::chrono::duration<double>(Clock::now() - start).count();
}

} // namespace

TEST_CASE("runner: runs and repeats what is wanted, keeps it, tells it", "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    Listening news;
    {
        Runner runner(*store, 2, news.listener(), small::simulateAtOnce);
        runner.want(snapshot, small::allCells(*snapshot));
        runner.waitUntilIdle();
        CHECK(runner.load().finished == 6);
        CHECK(runner.load().doneSeconds == runner.load().wantedSeconds);
    }
    CHECK(store->count() == 6);
    CHECK(news[News::Kind::started] == 6);
    CHECK(news[News::Kind::finished] == 6);
    CHECK(news.falls() == 0);
    for (const auto& cell : small::allCells(*snapshot)) {
        const auto stored = store->find(snapshot->inputs(cell.option, cell.study).fingerprint);
        REQUIRE(stored != nullptr);
        CHECK(stored->run->resolution.refinement == 1);
        CHECK(stored->repeat->resolution.refinement == 2);
        CHECK(judgeCell(*snapshot, cell.option, cell.study, *store).state == CellState::done);
    }
}

TEST_CASE("runner: nothing starts unasked, and what is known is not run again",
          "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    std::atomic<int> calls{0};
    const auto counted = [&](const studies::Job& job, std::stop_token stop,
                             const studies::Progress& progress) {
        ++calls;
        return small::simulateAtOnce(job, std::move(stop), progress);
    };
    Runner runner(*store, 2, {}, counted);
    runner.waitUntilIdle();
    CHECK(calls == 0);
    runner.want(first, small::allCells(*first));
    runner.waitUntilIdle();
    CHECK(calls == 12);
    const auto mark = judgeCell(*first, -1, 0, *store).verdicts[0].mark;

    // An edit and its undo: the old marks are back, and nothing was run for them.
    const auto edited = small::snapshot(tree.with(small::shaftDiameter, small::number(9)), first.get());
    CHECK(judgeCell(*edited, -1, 0, *store).state == CellState::outdated);
    const auto undone = small::snapshot(tree, edited.get());
    CHECK(judgeCell(*undone, -1, 0, *store).verdicts[0].mark == mark);
    runner.want(undone, small::allCells(*undone));
    runner.waitUntilIdle();
    CHECK(calls == 12);

    // A changed limit judges again and runs nothing.
    const auto laxer = small::snapshot(tree.with(small::shaftBound, small::number(130)), undone.get());
    runner.want(laxer, small::allCells(*laxer));
    runner.waitUntilIdle();
    CHECK(calls == 12);
    CHECK(store->count() == 6);
    CHECK(judgeCell(*laxer, -1, 0, *store).verdicts[0].mark == results::Mark::held);
    CHECK(mark == results::Mark::broken);

    // The edit itself is run once asked for: the base's two cells only.
    runner.want(edited, small::allCells(*edited));
    runner.waitUntilIdle();
    CHECK(calls == 16);
}

TEST_CASE("runner: two cells that need the same run share it", "[studies][run]") {
    auto tree = small::projectTree();
    tree = tree.with({"options", "Same as base", "changes"}, Tree::object({}));
    const auto snapshot = small::snapshot(tree);
    const auto store = makeMemoryStore();
    Runner runner(*store, 2, {}, small::simulateAtOnce);
    runner.want(snapshot, {{-1, 0}, {2, 0}});
    runner.waitUntilIdle();
    CHECK(store->count() == 1);
    CHECK(judgeCell(*snapshot, 2, 0, *store).state == CellState::done);
}

TEST_CASE("runner: the same results for one, two and four threads", "[studies][run]") {
    const auto snapshot = small::snapshot(small::projectTree());
    std::vector<std::vector<double>> extremes;
    for (const int threads : {1, 2, 4}) {
        const auto store = makeMemoryStore();
        Runner runner(*store, threads, {}, small::simulateAtOnce);
        runner.want(snapshot, small::allCells(*snapshot));
        runner.waitUntilIdle();
        auto& values = extremes.emplace_back();
        for (const auto& cell : small::allCells(*snapshot)) {
            const auto verdict =
                judgeCell(*snapshot, cell.option, cell.study, *store).verdicts.front();
            values.insert(values.end(), {verdict.extreme, verdict.margin, verdict.uncertainty});
        }
    }
    CHECK(extremes[0] == extremes[1]);
    CHECK(extremes[0] == extremes[2]);
}

TEST_CASE("runner: what nobody wants any more is dropped, what runs is finished and kept",
          "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto tree = small::projectTree();
    const auto first = small::snapshot(tree);
    Gate gate;
    Runner runner(*store, 1, {}, gate.simulate());
    runner.want(first, small::allCells(*first));
    gate.waitForEntries(1);
    CHECK(runner.load().running == 1);
    CHECK(runner.load().waiting == 5);
    const auto runs = first->inputs(-1, 0).fingerprint;
    CHECK(runner.stateOf(runs)->first == CellState::running);
    CHECK(runner.stateOf(first->inputs(1, 1).fingerprint)->first == CellState::waiting);

    const auto edited = small::snapshot(tree.with(small::shaftDiameter, small::number(9)), first.get());
    runner.want(edited, {{-1, 0}});
    CHECK(runner.load().waiting == 1);
    CHECK_FALSE(runner.stateOf(first->inputs(1, 1).fingerprint).has_value());
    gate.open();
    runner.waitUntilIdle();
    CHECK(store->count() == 2);
    CHECK(store->find(runs)->complete());
    CHECK(store->find(edited->inputs(-1, 0).fingerprint)->complete());
    CHECK_FALSE(runner.stateOf(runs).has_value());
}

TEST_CASE("runner: cancelling under load answers within 0.2 s and keeps the part",
          "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    Gate gate;
    Listening news;
    Runner runner(*store, 2, news.listener(), gate.simulate());
    runner.want(snapshot, small::allCells(*snapshot));
    gate.waitForEntries(2);
    std::this_thread::sleep_for(std::chrono::milliseconds(20));
    const auto start = Clock::now();
    runner.cancel();
    runner.waitUntilIdle();
    CHECK(secondsSince(start) < 0.2);
    CHECK(news[News::Kind::cancelled] == 2);
    CHECK(news[News::Kind::started] == 2);
    CHECK(runner.load().doneSeconds == 0.0);
    CHECK(runner.load().wantedSeconds == 0.0);
    const auto cell = judgeCell(*snapshot, -1, 0, *store);
    CHECK(cell.state == CellState::cutShort);
    CHECK(cell.stored->run->status.reached_s > 0.0);

    // Wanted again, it runs anew and becomes whole.
    gate.open();
    runner.want(snapshot, {{-1, 0}});
    runner.waitUntilIdle();
    CHECK(judgeCell(*snapshot, -1, 0, *store).state == CellState::done);
}

TEST_CASE("runner: a stopped repeat keeps the run, and only the repeat is made up for",
          "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    std::atomic<bool> repeatWaits{true};
    std::atomic<int> firsts{0};
    std::atomic<int> repeats{0};
    const auto simulate = [&](const studies::Job& job, std::stop_token stop,
                              const studies::Progress&) -> Result<results::Run> {
        if (job.refinement == 1) {
            ++firsts;
            CHECK(job.keepTraces);
            return small::fakeRun(job, job.study.until_s);
        }
        ++repeats;
        while (repeatWaits && !stop.stop_requested()) {
            std::this_thread::sleep_for(std::chrono::milliseconds(1));
        }
        return small::fakeRun(job, repeatWaits ? 0.0 : job.study.until_s);
    };
    Runner runner(*store, 1, {}, simulate);
    runner.want(snapshot, {{-1, 0}});
    while (repeats == 0) {
        std::this_thread::sleep_for(std::chrono::milliseconds(1));
    }
    runner.cancel(snapshot->inputs(-1, 0).fingerprint);
    runner.waitUntilIdle();
    auto cell = judgeCell(*snapshot, -1, 0, *store);
    CHECK(cell.state == CellState::cutShort);
    CHECK(cell.stored->run->status.reason == results::EndReason::completed);
    repeatWaits = false;
    runner.want(snapshot, {{-1, 0}});
    runner.waitUntilIdle();
    CHECK(judgeCell(*snapshot, -1, 0, *store).state == CellState::done);
    CHECK(firsts == 1);
    CHECK(repeats == 2);
    CHECK(store->count() == 1);
}

TEST_CASE("runner: a run that left its range is repeated with traces", "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    std::atomic<int> withTraces{0};
    const auto simulate = [&](const studies::Job& job, std::stop_token,
                              const studies::Progress&) -> Result<results::Run> {
        auto run = small::fakeRun(job, job.study.until_s);
        run.status.invalid.emplace_back();
        withTraces += job.refinement == 2 && job.keepTraces;
        return run;
    };
    Runner runner(*store, 1, {}, simulate);
    runner.want(snapshot, {{-1, 0}});
    runner.waitUntilIdle();
    CHECK(withTraces == 1);
}

TEST_CASE("runner: what cannot be compiled is told once and not tried again", "[studies][run]") {
    static constexpr Message refusal{"test.refusal", Severity::error, "No chart.", "Mend it."};
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    std::atomic<int> calls{0};
    Listening news;
    Runner runner(*store, 1, news.listener(),
                  [&](const studies::Job&, std::stop_token,
                      const studies::Progress&) -> Result<results::Run> {
                      ++calls;
                      Finding why;
                      why.message = &refusal;
                      return why;
                  });
    for (int i = 0; i < 2; ++i) {
        runner.want(snapshot, {{-1, 0}});
        runner.waitUntilIdle();
    }
    CHECK(calls == 1);
    CHECK(news[News::Kind::failed] == 1);
    const auto cell = judgeCell(*snapshot, -1, 0, *store);
    CHECK(cell.state == CellState::notApplicable);
    CHECK(cell.reason->message == &refusal);
}

TEST_CASE("runner: progress only grows, and what is done never exceeds what is wanted",
          "[studies][invariant]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    const auto slow = [](const studies::Job& job, std::stop_token,
                         const studies::Progress& progress) -> Result<results::Run> {
        for (int i = 1; i <= 20; ++i) {
            progress(0.05 * i);
            std::this_thread::sleep_for(std::chrono::microseconds(200));
        }
        return small::fakeRun(job, job.study.until_s);
    };
    Listening news;
    Runner runner(*store, 2, news.listener(), slow);
    runner.want(snapshot, small::allCells(*snapshot));
    double done = 0.0;
    while (runner.load().waiting + runner.load().running > 0) {
        const auto load = runner.load();
        REQUIRE(load.doneSeconds <= load.wantedSeconds);
        REQUIRE(load.doneSeconds >= done);
        done = load.doneSeconds;
        std::this_thread::sleep_for(std::chrono::microseconds(100));
    }
    CHECK(news.falls() == 0);
}

TEST_CASE("runner: leaving while runs go on stops them", "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    Gate gate;
    const auto start = Clock::now();
    {
        Runner runner(*store, 2, {}, gate.simulate());
        runner.want(snapshot, small::allCells(*snapshot));
        gate.waitForEntries(2);
    }
    CHECK(secondsSince(start) < 5.0);
    CHECK(gate.entered() == 2);
}

TEST_CASE("runner: a fault of ours in a worker reaches the caller", "[studies][run]") {
    const auto store = makeMemoryStore();
    const auto snapshot = small::snapshot(small::projectTree());
    Runner runner(*store, 1, {},
                  [](const studies::Job&, std::stop_token,
                     const studies::Progress&) -> Result<results::Run> { throw Bug("broken"); });
    runner.want(snapshot, {{-1, 0}});
    CHECK_THROWS_AS(runner.waitUntilIdle(), Bug);
    CHECK_NOTHROW(runner.waitUntilIdle());
}

TEST_CASE("runner: edits, wants and cancels from outside while workers are busy",
          "[studies][run]") {
    const auto store = makeMemoryStore();
    auto tree = small::projectTree();
    auto snapshot = small::snapshot(tree);
    Listening news;
    Runner runner(*store, 3, news.listener(), small::simulateAtOnce);
    for (int i = 0; i < 40; ++i) {
        tree = tree.with(small::shaftDiameter, small::number(6.0 + 0.1 * (i % 8)));
        snapshot = small::snapshot(tree, snapshot.get());
        runner.want(snapshot, small::allCells(*snapshot));
        if (i % 5 == 0) {
            runner.cancel();
        }
        if (i % 7 == 0) {
            runner.cancel(snapshot->inputs(-1, 0).fingerprint);
        }
        CHECK(judgeCell(*snapshot, 0, 0, *store).verdicts.size() == 1);
    }
    runner.want(snapshot, small::allCells(*snapshot));
    runner.waitUntilIdle();
    for (const auto& cell : small::allCells(*snapshot)) {
        CHECK(judgeCell(*snapshot, cell.option, cell.study, *store).state == CellState::done);
    }
}
