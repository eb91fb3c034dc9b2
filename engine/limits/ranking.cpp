// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/judge.h"

#include "base/ensure.h"

#include <cmath>

namespace headroom::limits {

namespace {

using results::Mark;
using results::Verdict;

/// Worst first.
int rank(const Verdict& verdict) {
    if (verdict.alreadyBrokenAtRest) {
        return 0;
    }
    switch (verdict.mark) {
    case Mark::broken: return 1;
    case Mark::notValid: return 2;
    case Mark::undecided: return 3;
    case Mark::tight: return 4;
    case Mark::held: return 5;
    case Mark::notRun: return 6;
    case Mark::notApplicable: return 7;
    }
    throw Bug("a mark has a rank");
}

} // namespace

Mark mark(double margin, double uncertainty, double reserve) {
    ensure(std::isfinite(margin) && uncertainty >= 0.0 && reserve >= 0.0,
           "a mark is made of a finite margin and of U, R >= 0");
    if (margin + uncertainty < 0.0) {
        return Mark::broken;
    }
    if (margin - uncertainty < 0.0) {
        return Mark::undecided;
    }
    return margin - uncertainty < reserve ? Mark::tight : Mark::held;
}

bool worse(const Verdict& a, const Verdict& b) {
    const int rankA = rank(a);
    const int rankB = rank(b);
    return rankA != rankB ? rankA < rankB : a.share < b.share;
}

const Verdict* worst(const std::vector<Verdict>& verdicts) {
    const Verdict* found = nullptr;
    for (const auto& verdict : verdicts) {
        if (found == nullptr || worse(verdict, *found)) {
            found = &verdict;
        }
    }
    return found;
}

} // namespace headroom::limits
