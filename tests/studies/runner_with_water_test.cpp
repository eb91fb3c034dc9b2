// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/runner.h"

#include "small_project.h"

#include "support/catch.h"

#include <algorithm>
#include <chrono>
#include <thread>

using namespace headroom;
using headroom::studies::CellState;
using headroom::studies::judgeCell;
using headroom::studies::makeMemoryStore;
using headroom::studies::Runner;

namespace {

using Clock = std::chrono::steady_clock;

/// The small project with a gate that closes, because its ideal unit has no load to lose.
plant::Tree closing(double until_s) {
    const auto row = [](double time_s, double opening_pct) {
        return plant::Tree::array({small::number(time_s), small::number(opening_pct)});
    };
    const auto order = small::object(
        {{"unit", small::words("U1")},
         {"opening", plant::Tree::array({row(0, 60), row(5, 10)})}});
    const auto event = small::object({{"at_s", small::number(1)}, {"opening", order}});
    auto tree = small::projectTree();
    for (const char* study : {"Trip", "Long trip"}) {
        tree = tree.with({"studies", study, "events"}, small::object({{"close", event}}))
                   .with({"studies", study, "until_s"}, small::number(until_s));
        until_s *= 1.5;
    }
    return tree;
}

/// Every tracked number of every cell, in one row.
std::vector<double> numbersOf(const studies::Snapshot& snapshot, const studies::RunStore& store) {
    std::vector<double> numbers;
    for (const auto& cell : small::allCells(snapshot)) {
        const auto stored = store.find(snapshot.inputs(cell.option, cell.study).fingerprint);
        REQUIRE(stored != nullptr);
        REQUIRE(stored->complete());
        for (const auto& run : {stored->run, stored->repeat}) {
            for (const auto& channel : run->channels) {
                numbers.insert(numbers.end(),
                               {channel.least.value, channel.least.time_s, channel.greatest.value,
                                channel.greatest.largestStep, channel.atEnd});
            }
        }
    }
    return numbers;
}

} // namespace

TEST_CASE("runner with water: the same bits for one, two and four threads", "[studies][run]") {
    const auto snapshot = small::snapshot(closing(10.0));
    std::vector<double> first;
    for (const int threads : {1, 2, 4}) {
        const auto store = makeMemoryStore();
        Runner runner(*store, threads, {});
        runner.want(snapshot, small::allCells(*snapshot));
        runner.waitUntilIdle();
        const auto numbers = numbersOf(*snapshot, *store);
        if (threads == 1) {
            first = numbers;
            CHECK(first.size() > 500);
        }
        CHECK(numbers == first);
    }
    const auto store = makeMemoryStore();
    Runner runner(*store, 2, {});
    runner.want(snapshot, {{-1, 0}});
    runner.waitUntilIdle();
    const auto cell = judgeCell(*snapshot, -1, 0, *store);
    CHECK(cell.state == CellState::done);
    CHECK(cell.verdicts.front().numerical > 0.0);
}

TEST_CASE("runner with water: stopping two runs of ten hours, each keeping its part",
          "[studies][run]") {
    const auto snapshot = small::snapshot(closing(36000.0));
    double quickest_s = 1e9; // of three: says what the program needs, not who else computes
    for (int i = 0; i < 3; ++i) {
        const auto store = makeMemoryStore();
        Runner runner(*store, 2, {});
        runner.want(snapshot, {{-1, 0}, {0, 0}});
        std::this_thread::sleep_for(std::chrono::milliseconds(40 + 30 * i));
        const auto start = Clock::now();
        runner.cancel();
        runner.waitUntilIdle();
        const std::chrono::duration<double> took = Clock::now() - start;
        quickest_s = std::min(quickest_s, took.count());
        CHECK(judgeCell(*snapshot, -1, 0, *store).state != CellState::done);
    }
    INFO("quickest answer " << quickest_s << " s");
    CHECK(quickest_s < 0.2);
}
