// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cmath>

/// The law that every branch of a node cluster has: discharge as an increasing function of the
/// head that drives it.
namespace headroom::hydraulics {

/// Discharge [m³/s] of a branch and its derivative by the driving head [m²/s].
template <class Number>
struct BranchFlow {
    Number flow_m3s;
    Number slope_m2s;
};

/// A branch's constants for one step: w = linear·Q + quadratic·Q|Q|.
/// linear ≥ 0 [s/m²], quadratic [s²/m⁵], not both zero.
struct BranchLaw {
    double linear_sm2 = 0.0;
    double quadratic_s2m5 = 0.0;
};

namespace detail {

/// √(b² + p) for p ≥ 0 without losing b where b² would underflow.
template <class Number>
Number discriminantRoot(const Number& b, const Number& p) {
    using std::sqrt;
    constexpr double safelySquared = 1e-290; // below this a product has lost digits
    const Number sum = b * b + p;
    if (sum > safelySquared) {
        return sqrt(sum);
    }
    const Number root = sqrt(p);
    const Number large = b > root ? b : root;
    const Number small = b > root ? root : b;
    if (!(large > 0.0)) {
        return large;
    }
    const Number ratio = small / large;
    return large * sqrt(1.0 + ratio * ratio);
}

/// For r < 0 (a velocity head gained along the branch) the law rises only up to Q = b/(2|r|).
/// From half of that flow on it is continued by its tangent, so that it stays increasing and
/// Newton finds its way back; a solution there has `lawHolds` false.
template <class Number>
BranchFlow<Number> solveGaining(const Number& b, const Number& r, const Number& w) {
    using std::sqrt;
    const Number size = w < 0.0 ? Number(-w) : Number(w);
    const Number discriminant = b * b + 4.0 * r * size;
    if (discriminant > 0.25 * b * b) {
        const Number root = sqrt(discriminant);
        return {2.0 * w / (b + root), 1.0 / root};
    }
    const Number kink = b / (-4.0 * r);           // flow where the tangent begins
    const Number driving = kink * (b + r * kink); // head there
    const Number slope = 2.0 / b;                 // dQ/dw there
    const Number flow = kink + slope * (size - driving);
    return {w < 0.0 ? Number(-flow) : flow, slope};
}

} // namespace detail

/// Solves b Q + r Q|Q| = w for Q; exact, no iteration.
///
///     Q = 2w / (b + √(b² + 4r|w|)),   dQ/dw = 1 / √(b² + 4r|w|)
///
/// b ≥ 0 [s/m²], r [s²/m⁵]. b = r = 0 is no branch and is the caller's fault. With b = 0 the
/// derivative at w = 0 is infinite, as it must be. For r < 0 see `lawHolds`.
/// Derivation: resources/theory/waterway.md, section "Branches".
template <class Number>
BranchFlow<Number> solveBranch(const Number& b, const Number& r, const Number& w) {
    if (r < 0.0) {
        return detail::solveGaining(b, r, w);
    }
    const Number size = w < 0.0 ? Number(-w) : Number(w);
    const Number root = detail::discriminantRoot(b, Number(4.0 * r * size));
    const Number sum = b + root;
    if (!(sum > 0.0)) {
        return {Number(0.0 * w), 1.0 / root}; // w = 0 with b = 0
    }
    return {2.0 * w / sum, 1.0 / root};
}

inline BranchFlow<double> solveBranch(const BranchLaw& law, double driving_m) {
    return solveBranch(law.linear_sm2, law.quadratic_s2m5, driving_m);
}

/// False where a gaining branch (quadratic < 0) is beyond the half of its rising range, so that
/// `solveBranch` answered with the tangent: flow speeds of half the wave speed.
inline bool lawHolds(const BranchLaw& law, double driving_m) {
    const double b = law.linear_sm2;
    return law.quadratic_s2m5 >= 0.0
           || b * b + 4.0 * law.quadratic_s2m5 * std::fabs(driving_m) > 0.25 * b * b;
}

} // namespace headroom::hydraulics
