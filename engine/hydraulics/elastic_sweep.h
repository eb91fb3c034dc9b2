// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <string_view>

/// The innermost loops, built once for each width of vector registers and chosen at run time.
/// All builds give the same bits: they do the same + − × ÷ √ for each node, without contraction.
namespace headroom::hydraulics {

enum class InstructionSet { baseline, avx2, avx512 };

/// Can this machine run it, and was it built?
bool available(InstructionSet set);
/// The widest that is available.
InstructionSet bestInstructionSet();
/// "baseline", "avx2" or "avx512".
std::string_view nameOf(InstructionSet set);

/// Arrays of one sweep over nodes begin … end − 1; neighbours begin − 1 and end must exist.
struct SweepArrays {
    const double* right;       ///< F at the present time
    const double* left;        ///< G
    const double* curvature;   ///< ρ = r/b², b = 2B + k
    const double* share;       ///< k/b
    const double* conductance; ///< 1/(2B)
    double* nextRight;
    double* nextLeft;
    double* head;
    double* nextFlow;
};

struct SweepLoops {
    void (*sweep)(const SweepArrays& arrays, std::size_t begin, std::size_t end);
    void (*widen)(const double* value, double* lowest, double* highest, std::size_t count);
    /// Extremes with the count of the step at which they were met; true if one of them was met two
    /// steps before `now` and not since, so that what surrounds it is complete.
    bool (*track)(const double* value, double* highest, double* highestAt, double* lowest,
                  double* lowestAt, double now, std::size_t count);
};
/// The loops of an available set.
const SweepLoops& sweepLoops(InstructionSet set);

} // namespace headroom::hydraulics
