// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/elastic_sweep.h"

#include "base/ensure.h"
#include "hydraulics/elastic_sweep_loops.h"

namespace headroom::hydraulics {

bool available(InstructionSet set) {
    switch (set) {
    case InstructionSet::baseline:
        return true;
#ifdef HEADROOM_WIDE_SWEEPS
    case InstructionSet::avx2:
        return __builtin_cpu_supports("avx2") != 0;
    case InstructionSet::avx512:
        return __builtin_cpu_supports("avx512f") != 0 && __builtin_cpu_supports("avx512dq") != 0
               && __builtin_cpu_supports("avx512vl") != 0;
#else
    case InstructionSet::avx2:
    case InstructionSet::avx512:
        return false;
#endif
    }
    return false;
}

InstructionSet bestInstructionSet() {
    if (available(InstructionSet::avx512)) {
        return InstructionSet::avx512;
    }
    return available(InstructionSet::avx2) ? InstructionSet::avx2 : InstructionSet::baseline;
}

std::string_view nameOf(InstructionSet set) {
    switch (set) {
    case InstructionSet::baseline:
        return "baseline";
    case InstructionSet::avx2:
        return "avx2";
    case InstructionSet::avx512:
        return "avx512";
    }
    return "";
}

const SweepLoops& sweepLoops(InstructionSet set) {
    ensure(available(set), "this machine runs the chosen instruction set");
#ifdef HEADROOM_WIDE_SWEEPS
    if (set == InstructionSet::avx2) {
        return avx2::loops();
    }
    if (set == InstructionSet::avx512) {
        return avx512::loops();
    }
#endif
    return baseline::loops();
}

} // namespace headroom::hydraulics
