// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/elastic_sweep_loops.h"

namespace headroom::hydraulics::baseline {
namespace {

#include "hydraulics/elastic_sweep_body.h"

} // namespace

const SweepLoops& loops() {
    static constexpr SweepLoops all{sweep, widen, track};
    return all;
}

} // namespace headroom::hydraulics::baseline
