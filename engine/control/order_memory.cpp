// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/order_memory.h"

#include "base/ensure.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::control {

namespace {

constexpr std::size_t spare = 16;
/// Two knots a step at most (a jump each step), and room for steps cut in two by events.
constexpr double knotsPerStep = 4.0;

} // namespace

OrderMemory::OrderMemory(double order, double span_s, double step_s)
    : ring_(spare + static_cast<std::size_t>(std::ceil(knotsPerStep * span_s / step_s))) {
    ring_[0] = {-std::numeric_limits<double>::infinity(), order};
    count_ = 1;
}

void OrderMemory::push(double time_s, double order) {
    ensure(count_ > 0, "an order memory is made at rest");
    const Knot newest = knot(count_ - 1);
    constexpr double rounding_s = 1e-6; // counted instants reach here by different sums
    ensure(time_s > newest.time_s - rounding_s, "orders are given in rising time");
    time_s = std::max(time_s, newest.time_s);
    if (time_s == newest.time_s && order == newest.order) {
        return;
    }
    if (count_ == ring_.size()) {
        grow();
    }
    ring_[(first_ + count_) % ring_.size()] = {time_s, order};
    ++count_;
}

void OrderMemory::grow() {
    std::vector<Knot> larger(2 * ring_.size());
    for (std::size_t i = 0; i < count_; ++i) {
        larger[i] = knot(i);
    }
    ring_ = std::move(larger);
    first_ = 0;
}

void OrderMemory::forget(double time_s) {
    // The newest knot before `time_s` is still needed, as the left end of its line.
    while (count_ > 1 && knot(1).time_s < time_s) {
        first_ = (first_ + 1) % ring_.size();
        --count_;
    }
}

double OrderMemory::last() const {
    return knot(count_ - 1).order;
}

double OrderMemory::after(double time_s) const {
    std::size_t left = 0;
    while (left + 1 < count_ && knot(left + 1).time_s <= time_s) {
        ++left;
    }
    if (left + 1 == count_ || std::isinf(knot(left).time_s)) {
        return knot(left).order;
    }
    const Knot& a = knot(left);
    const Knot& b = knot(left + 1);
    return a.order + (b.order - a.order) * (time_s - a.time_s) / (b.time_s - a.time_s);
}

double OrderMemory::before(double time_s) const {
    std::size_t right = 0;
    while (right < count_ && knot(right).time_s < time_s) {
        ++right;
    }
    if (right == count_) {
        return knot(count_ - 1).order;
    }
    if (right == 0 || std::isinf(knot(right - 1).time_s)) {
        return knot(right == 0 ? 0 : right - 1).order;
    }
    const Knot& a = knot(right - 1);
    const Knot& b = knot(right);
    return a.order + (b.order - a.order) * (time_s - a.time_s) / (b.time_s - a.time_s);
}

double OrderMemory::nextKnot(double time_s, double limit_s) const {
    for (std::size_t i = 0; i < count_; ++i) {
        if (knot(i).time_s > time_s) {
            return knot(i).time_s < limit_s ? knot(i).time_s : limit_s;
        }
    }
    return limit_s;
}

} // namespace headroom::control
