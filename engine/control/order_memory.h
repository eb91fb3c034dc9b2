// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <vector>

namespace headroom::control {

/// Orders already given but not yet felt: knots joined by straight lines, two at one instant for
/// a jump. Sized once for a dead time and a step; pushing never allocates unless steps come out
/// more than four times shorter than announced.
class OrderMemory {
public:
    OrderMemory() = default;
    /// `order` since ever; `span_s` ≥ 0 of memory, for steps of `step_s` > 0.
    OrderMemory(double order, double span_s, double step_s);

    /// The order from the last knot on runs straight to `order` at `time_s`, not before that knot;
    /// the same time again is a jump.
    void push(double time_s, double order);
    /// Forgets what no instant from `time_s` on can feel.
    void forget(double time_s);
    double after(double time_s) const;  ///< just after `time_s`; held outside the knots
    double before(double time_s) const; ///< just before `time_s`
    /// The first knot after `time_s`, or `limit_s` if none comes before it.
    double nextKnot(double time_s, double limit_s) const;
    double last() const; ///< the newest order

private:
    struct Knot {
        double time_s = 0.0;
        double order = 0.0;
    };
    const Knot& knot(std::size_t index) const { return ring_[(first_ + index) % ring_.size()]; }
    void grow();

    std::vector<Knot> ring_;
    std::size_t first_ = 0, count_ = 0;
};

} // namespace headroom::control
