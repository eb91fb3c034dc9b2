// SPDX-License-Identifier: GPL-3.0-or-later
// Nothing is allocated while a run steps. The counting operators live in this source alone.
#include "support/catch.h"

#include <atomic>
#include <cstdlib>
#include <new>

#include "plants.h"

namespace {
std::atomic<long> allocations{0};
}

// GCC's own check of matched operators does not see that these are the global ones.
#pragma GCC diagnostic ignored "-Wmismatched-new-delete"

void* operator new(std::size_t size) {
    allocations.fetch_add(1, std::memory_order_relaxed);
    if (void* memory = std::malloc(size == 0 ? 1 : size)) {
        return memory;
    }
    throw std::bad_alloc();
}
void operator delete(void* memory) noexcept {
    std::free(memory);
}
void operator delete(void* memory, std::size_t) noexcept {
    std::free(memory);
}

using namespace headroom;
using namespace headroom::tests;

TEST_CASE("run: no allocation in the step", "[simulation][run]") {
    // Two runs of different length must allocate the same number of times: what a run needs is taken
    // before its first step and after its last. 1000 steps more, an event in both.
    const auto count = [](double until_s) {
        Case made = dorvane(512.0, 100e6);
        made.at(1.0, plant::RejectLoad{});
        made.study.until_s = until_s;
        const auto model = simulation::compile(made.site, made.plant, made.study, made.settings);
        REQUIRE(model);
        static_cast<void>(simulation::run(**model)); // fills what is filled once
        const long before = allocations.load();
        const auto run = simulation::run(**model);
        const long after = allocations.load();
        REQUIRE(run.resolution.steps > 0);
        return std::pair(after - before, run.resolution.steps);
    };
    const auto shortRun = count(20.0);
    const auto longRun = count(30.0);
    CHECK(longRun.second - shortRun.second >= 1000);
    CHECK(longRun.first == shortRun.first);
}
