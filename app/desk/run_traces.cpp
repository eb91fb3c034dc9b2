// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/run_traces.h"

#include <algorithm>
#include <cmath>

namespace headroom::desk {

int RunTraces::indexOf(Measure measure, const results::Place& place) const {
    for (std::size_t i = 0; i < run->channels.size(); ++i) {
        if (run->channels[i].measure == measure && run->channels[i].place == place) {
            return static_cast<int>(i);
        }
    }
    return -1;
}

double RunTraces::valueAt(int channel, double time_s) const {
    const auto& from = run->channels[static_cast<std::size_t>(channel)];
    const auto& values = from.trace.last;
    if (values.empty() || !(run->recordInterval_s > 0.0)) {
        return from.atRest;
    }
    const double last = static_cast<double>(values.size() - 1);
    const double place = std::clamp(time_s / run->recordInterval_s, 0.0, last);
    const auto before = static_cast<std::size_t>(place);
    const auto after = std::min(before + 1, values.size() - 1);
    const double share = place - static_cast<double>(before);
    return static_cast<double>(values[before]) * (1.0 - share) +
           static_cast<double>(values[after]) * share;
}

std::shared_ptr<const RunTraces> makeRunTraces(std::shared_ptr<const results::Run> run) {
    auto traces = std::make_shared<RunTraces>();
    for (const auto& channel : run->channels) {
        const auto& trace = channel.trace;
        const bool both = !trace.low.empty() && trace.low.size() == trace.high.size();
        traces->extents.push_back(both ? numerics::MinMaxPyramid(trace.low, trace.high)
                                       : numerics::MinMaxPyramid(trace.last, trace.last));
    }
    traces->run = std::move(run);
    return traces;
}

} // namespace headroom::desk
