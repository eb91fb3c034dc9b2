// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"
#include "plant/project.h"
#include "results/run.h"
#include "results/verdict.h"

#include <vector>

/// The judges: limits against results. They read results and limits and nothing else.
namespace headroom::limits {

/// Judges every limit of a variant on a run. `repeat` is the run with divided cells; without it
/// (or after a cavity) no numerical uncertainty can be claimed and the row says notRun with the
/// reason "repeat missing", but margin, extreme and time are filled. One verdict a limit, in the
/// order of the variant's limits; the reported extreme is that of the finer run.
std::vector<results::Verdict> judge(const plant::Variant& variant, const plant::Study& study,
                                    const results::Run* run, const results::Run* repeat);

/// The mark alone, from margin, uncertainty and reserve [one unit]; `U, R ≥ 0`.
results::Mark mark(double margin, double uncertainty, double reserve);

/// Worst first: broken at rest, broken, not valid, undecided, tight, held (by share within each),
/// then not run, not applicable.
bool worse(const results::Verdict& a, const results::Verdict& b);
/// The governing verdict of a cell: the worst; nullptr if there is none.
const results::Verdict* worst(const std::vector<results::Verdict>& verdicts);

} // namespace headroom::limits
