// SPDX-License-Identifier: GPL-3.0-or-later
// Included once by each elastic_sweep_<set>.cpp, inside its own namespace, so that every set has
// loops of its own. No library function may be called here: an inline function compiled for wide
// registers could be picked by the linker for the whole program.

/// ρ|w| up to which the series below is exact to rounding: the next term is 132 ρ|w|⁶ < 1.2e-16.
constexpr double seriesLimit = 1.0 / 1024.0;
constexpr std::size_t block = 512;

inline double sizeOf(double x) {
    return __builtin_fabs(x);
}

/// Share of w that the quadratic loss takes, (w − bQ)/w of bQ + rQ|Q| = w, as a function of
/// ξ = r|w|/b²: 1 − 2/(1 + √(1 + 4ξ)) = ξ − 2ξ² + 5ξ³ − 14ξ⁴ + 42ξ⁵ − … (Catalan numbers).
inline double seriesShare(double xi) {
    return xi * (1.0 - xi * (2.0 - xi * (5.0 - xi * (14.0 - xi * 42.0))));
}

/// The same without the series' limit.
inline double rootShare(double xi) {
    const double root = __builtin_sqrt(1.0 + 4.0 * xi);
    return 4.0 * xi / ((1.0 + root) * (1.0 + root));
}

/// Second look at nodes where the series does not reach.
void sweepByRoot(const SweepArrays& a, std::size_t begin, std::size_t end) {
    for (std::size_t i = begin; i < end; ++i) {
        const double fromLeft = a.right[i - 1];
        const double fromRight = a.left[i + 1];
        const double w = fromLeft - fromRight;
        const double xi = a.curvature[i] * sizeOf(w);
        if (xi > seriesLimit) {
            const double loss = w * (a.share[i] + (1.0 - a.share[i]) * rootShare(xi));
            a.nextRight[i] = fromLeft - loss;
            a.nextLeft[i] = fromRight + loss;
            a.nextFlow[i] = (w - loss) * a.conductance[i];
        }
    }
}

/// `count` nodes; true if one of them needs `sweepByRoot`. `right` and `left` begin at the
/// neighbours, the others at the first node. Pointers are parameters of a function that is not
/// inlined, because only so does the compiler keep that they do not overlap.
__attribute__((noinline)) bool sweepBlock(
    const double* __restrict right, const double* __restrict left,
    const double* __restrict curvature, const double* __restrict share,
    const double* __restrict conductance, double* __restrict nextRight, double* __restrict nextLeft,
    double* __restrict head, double* __restrict nextFlow, std::size_t count) {
    double beyond = 0.0;
    for (std::size_t i = 0; i < count; ++i) {
        const double fromLeft = right[i];
        const double fromRight = left[i];
        const double w = fromLeft - fromRight;
        const double xi = curvature[i] * sizeOf(w);
        const double loss = w * (share[i] + (1.0 - share[i]) * seriesShare(xi));
        nextRight[i] = fromLeft - loss;
        nextLeft[i] = fromRight + loss;
        nextFlow[i] = (w - loss) * conductance[i];
        head[i] = 0.5 * (fromLeft + fromRight);
        beyond = xi > seriesLimit ? 1.0 : beyond;
    }
    return beyond != 0.0;
}

void sweep(const SweepArrays& arrays, std::size_t begin, std::size_t end) {
    for (std::size_t from = begin; from < end; from += block) {
        const std::size_t to = end - from < block ? end : from + block;
        if (sweepBlock(arrays.right + from - 1, arrays.left + from + 1, arrays.curvature + from,
                       arrays.share + from, arrays.conductance + from, arrays.nextRight + from,
                       arrays.nextLeft + from, arrays.head + from, arrays.nextFlow + from,
                       to - from)) {
            sweepByRoot(arrays, from, to);
        }
    }
}

void widen(const double* __restrict value, double* __restrict lowest, double* __restrict highest,
           std::size_t count) {
    for (std::size_t i = 0; i < count; ++i) {
        const double v = value[i];
        lowest[i] = v < lowest[i] ? v : lowest[i];
        highest[i] = v > highest[i] ? v : highest[i];
    }
}

/// See `SweepLoops::track`.
bool track(const double* __restrict value, double* __restrict highest, double* __restrict highestAt,
           double* __restrict lowest, double* __restrict lowestAt, double now, std::size_t count) {
    const double settled = now - 2.0;
    long long due = 0;
    for (std::size_t i = 0; i < count; ++i) {
        const double v = value[i];
        const double top = highest[i];
        const double bottom = lowest[i];
        const double topAt = v > top ? now : highestAt[i];
        const double bottomAt = v < bottom ? now : lowestAt[i];
        highest[i] = v > top ? v : top;
        lowest[i] = v < bottom ? v : bottom;
        highestAt[i] = topAt;
        lowestAt[i] = bottomAt;
        due |= topAt == settled ? 1 : 0;
        due |= bottomAt == settled ? 1 : 0;
    }
    return due != 0;
}
