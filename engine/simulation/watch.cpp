// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/watch.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::simulation {
namespace {

results::Extreme extreme(double value, double step, const std::array<double, 5>& around,
                         double step_s) {
    results::Extreme out{value, step * step_s, around, 0.0};
    for (std::size_t i = 1; i < around.size(); ++i) {
        out.largestStep = std::max(out.largestStep, std::fabs(around[i] - around[i - 1]));
    }
    return out;
}

} // namespace

Watch::Watch(std::size_t width, const hydraulics::SweepLoops& loops)
    : width_(width), loops_(loops), ring_(depth * width, 0.0),
      highest_(width, -std::numeric_limits<double>::infinity()), highestAt_(width, -10.0),
      lowest_(width, std::numeric_limits<double>::infinity()), lowestAt_(width, -10.0),
      aroundHighest_(width), aroundLowest_(width) {}

void Watch::capture(std::int64_t centre, std::int64_t last, std::size_t index, Around& around) {
    const std::int64_t first = std::max<std::int64_t>(0, last - depth + 1);
    for (std::int64_t k = 0; k < depth; ++k) {
        const std::int64_t n = std::clamp(centre - 2 + k, first, last);
        around[static_cast<std::size_t>(k)] = row(n)[index];
    }
}

void Watch::take(std::int64_t n) {
    const auto now = static_cast<double>(n);
    if (!loops_.track(row(n), highest_.data(), highestAt_.data(), lowest_.data(), lowestAt_.data(),
                      now, width_)) {
        return;
    }
    for (std::size_t i = 0; i < width_; ++i) {
        if (highestAt_[i] == now - 2.0) {
            capture(n - 2, n, i, aroundHighest_[i]);
        }
        if (lowestAt_[i] == now - 2.0) {
            capture(n - 2, n, i, aroundLowest_[i]);
        }
    }
}

void Watch::finish(std::int64_t last) {
    for (std::size_t i = 0; i < width_; ++i) {
        if (const auto n = static_cast<std::int64_t>(highestAt_[i]); n >= 0 && n > last - 2) {
            capture(n, last, i, aroundHighest_[i]);
        }
        if (const auto n = static_cast<std::int64_t>(lowestAt_[i]); n >= 0 && n > last - 2) {
            capture(n, last, i, aroundLowest_[i]);
        }
    }
}

results::Extreme Watch::least(std::size_t index, double step_s) const {
    return extreme(lowest_[index], lowestAt_[index], aroundLowest_[index], step_s);
}

results::Extreme Watch::greatest(std::size_t index, double step_s) const {
    return extreme(highest_[index], highestAt_[index], aroundHighest_[index], step_s);
}

} // namespace headroom::simulation
