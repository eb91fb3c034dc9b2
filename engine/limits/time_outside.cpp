// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/time_outside.h"

#include <algorithm>
#include <cmath>

namespace headroom::limits {

namespace {

/// Adds up the time in which a piecewise straight line is above zero.
class Clock {
public:
    explicit Clock(double first) : before_(first) {}

    void goTo(double next, double duration_s) {
        const bool wasOut = before_ > 0.0;
        const bool isOut = next > 0.0;
        if (wasOut && isOut) {
            add(duration_s);
        } else if (wasOut != isOut) {
            const double share = before_ / (before_ - next); // of the piece, until the crossing
            add(wasOut ? share * duration_s : 0.0);
            if (wasOut) {
                current_s_ = 0.0;
            } else {
                add((1.0 - share) * duration_s);
            }
        }
        before_ = next;
    }
    Outside result() const { return outside_; }

private:
    void add(double duration_s) {
        current_s_ += duration_s;
        outside_.total_s += duration_s;
        outside_.longest_s = std::max(outside_.longest_s, current_s_);
    }

    double before_;
    double current_s_ = 0.0;
    Outside outside_;
};

} // namespace

Outside timeOutside(const Evidence& evidence, Side side, double bound, double until_s) {
    const auto& trace = *evidence.trace;
    const double sign = side == Side::upper ? 1.0 : -1.0;
    const auto beyond = [&](float value) {
        return sign * (evidence.scale * static_cast<double>(value) + evidence.offset - bound);
    };
    const auto& peaks = side == Side::upper ? trace.high : trace.low;
    Clock clock(beyond(trace.last.front()));
    double from = beyond(trace.last.front());
    for (std::size_t i = 1; i < trace.last.size(); ++i) {
        if (static_cast<double>(i) * evidence.interval_s > until_s) {
            break;
        }
        const double to = beyond(trace.last[i]);
        const double peak = beyond(peaks[i]);
        if (peak > std::max(from, to)) {
            clock.goTo(peak, 0.5 * evidence.interval_s);
            clock.goTo(to, 0.5 * evidence.interval_s);
        } else {
            clock.goTo(to, evidence.interval_s);
        }
        from = to;
    }
    return clock.result();
}

double valueExceededFor(const Evidence& evidence, Side side, plant::TimeRule rule,
                        double allowed_s, double until_s) {
    const auto [low, high] =
        std::minmax_element(evidence.trace->last.begin(), evidence.trace->last.end());
    const double mildest = static_cast<double>(side == Side::upper ? *low : *high);
    double mild = evidence.scale * mildest + evidence.offset; // outside it for the longest time
    double severe = evidence.extreme; // outside it for no time
    const auto spent_s = [&](double value) {
        return timeOutside(evidence, side, value, until_s).counted_s(rule);
    };
    if (spent_s(mild) <= allowed_s) {
        return mild;
    }
    // A trace is in single precision; 24 halvings of its range go below that.
    constexpr int halvings = 24;
    for (int i = 0; i < halvings; ++i) {
        const double middle = 0.5 * (mild + severe);
        (spent_s(middle) <= allowed_s ? severe : mild) = middle;
    }
    return severe;
}

} // namespace headroom::limits
