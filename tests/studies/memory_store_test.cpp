// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/board.h"

#include "support/catch.h"

#include <thread>
#include <vector>

using namespace headroom;
using headroom::studies::makeMemoryStore;
using headroom::studies::StoredRun;

namespace {

std::shared_ptr<StoredRun> stored(std::uint64_t number) {
    auto made = std::make_shared<StoredRun>();
    made->fingerprint = {number, number};
    made->run = std::make_shared<const results::Run>();
    return made;
}

} // namespace

TEST_CASE("memory store: gives back what was kept, and nothing else", "[studies][invariant]") {
    const auto store = makeMemoryStore();
    CHECK(store->find({1, 1}) == nullptr);
    const auto first = stored(1);
    store->keep(first);
    CHECK(store->find({1, 1}) == first);
    CHECK(store->find({1, 2}) == nullptr);
    CHECK(store->count() == 1);
}

TEST_CASE("memory store: a repeat added to a run is no new run, a new run is",
          "[studies][invariant]") {
    const auto store = makeMemoryStore();
    const auto first = stored(1);
    CHECK_FALSE(first->complete());
    store->keep(first);
    auto whole = std::make_shared<StoredRun>(*first);
    whole->repeat = std::make_shared<const results::Run>();
    store->keep(whole);
    CHECK(store->count() == 1);
    CHECK(store->find({1, 1})->complete());
    store->keep(stored(1)); // the same inputs computed once more
    CHECK(store->count() == 2);
}

TEST_CASE("memory store: several threads keep and find", "[studies][run]") {
    const auto store = makeMemoryStore();
    std::vector<int> missing(4, 0);
    {
        std::vector<std::jthread> threads;
        for (std::uint64_t t = 0; t < 4; ++t) {
            threads.emplace_back([&, t] {
                for (std::uint64_t i = 0; i < 200; ++i) {
                    store->keep(stored(1000 * t + i));
                    missing[t] += store->find({1000 * t + i, 1000 * t + i}) == nullptr;
                }
            });
        }
    }
    CHECK(missing == std::vector<int>(4, 0));
    CHECK(store->count() == 800);
}
