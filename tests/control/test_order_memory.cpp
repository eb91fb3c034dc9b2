// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "control/order_memory.h"
#include "support/catch.h"

using headroom::control::OrderMemory;

TEST_CASE("Order memory: straight between knots, two values at a jump", "[orderMemory][analytic]") {
    OrderMemory memory(0.4, 1.0, 0.1);
    memory.push(0.0, 0.4);
    memory.push(1.0, 0.6);
    memory.push(1.0, 0.1);
    memory.push(2.0, 0.2);
    CHECK(memory.after(-5.0) == 0.4);
    CHECK_THAT(memory.after(0.5), WithinAbs(0.5, 1e-15));
    CHECK_THAT(memory.before(1.0), WithinAbs(0.6, 1e-15));
    CHECK_THAT(memory.after(1.0), WithinAbs(0.1, 1e-15));
    CHECK_THAT(memory.before(1.5), WithinAbs(0.15, 1e-15));
    CHECK(memory.after(9.0) == 0.2);
    CHECK(memory.nextKnot(0.2, 5.0) == 1.0);
    CHECK(memory.nextKnot(0.2, 0.7) == 0.7);
    CHECK(memory.nextKnot(2.0, 5.0) == 5.0);
    CHECK(memory.last() == 0.2);
}

TEST_CASE("Order memory: forgets only what cannot be felt", "[orderMemory][limit]") {
    OrderMemory memory(0.0, 1.0, 0.1);
    for (int n = 0; n < 10000; ++n) { // wraps many times; the span stays one second
        memory.push(0.1 * n, 0.01 * n);
        memory.forget(0.1 * n - 1.0);
    }
    CHECK_THAT(memory.after(998.95), WithinAbs(99.895, 1e-9));
    CHECK_THAT(memory.after(0.1 * 9999), WithinAbs(99.99, 1e-12));
}

TEST_CASE("Order memory: refuses to go back in time", "[orderMemory][limit]") {
    OrderMemory memory(0.0, 0.0, 0.1);
    memory.push(1.0, 0.5);
    memory.push(1.0 - 1e-15, 0.5); // another sum of the same counted steps
    CHECK_THROWS_AS(memory.push(0.5, 0.1), headroom::Bug);
}
