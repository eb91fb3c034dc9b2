// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "numerics/minmax_pyramid.h"
#include "results/run.h"

#include <memory>
#include <vector>

namespace headroom::desk {

/// A run with the extents that the lanes draw from; made by the worker that finished the run.
struct RunTraces {
    std::shared_ptr<const results::Run> run;
    std::vector<numerics::MinMaxPyramid> extents; ///< one a channel, empty where no trace is kept

    /// Position of a channel, or −1.
    int indexOf(Measure measure, const results::Place& place) const;
    /// Value at a time, straight between instants; the rest value where no trace is kept.
    double valueAt(int channel, double time_s) const;
};

std::shared_ptr<const RunTraces> makeRunTraces(std::shared_ptr<const results::Run> run);

} // namespace headroom::desk
