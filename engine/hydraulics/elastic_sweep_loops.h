// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "hydraulics/elastic_sweep.h"

/// The loops of each build, private to this folder; reached through `sweepLoops`.
namespace headroom::hydraulics {

namespace baseline {
const SweepLoops& loops();
}
namespace avx2 {
const SweepLoops& loops();
}
namespace avx512 {
const SweepLoops& loops();
}

} // namespace headroom::hydraulics
