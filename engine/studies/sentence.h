// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

#include <span>
#include <string>

namespace headroom::studies {

/// The answer of a choice of cells in one sentence, with its parts as data.
struct Sentence {
    enum class Kind {
        noStudy,   ///< the project has nothing to run
        notRun,    ///< no chosen cell has a result for its inputs
        failed,    ///< the worst cell could not be computed
        noLimit,   ///< run, and no limit can be judged
        verdict,   ///< `verdict` governs
    };
    Kind kind = Kind::noStudy;
    int option = -1, study = -1;              ///< of the governing cell, if any
    std::string optionName, studyName, limitName;
    std::optional<results::Verdict> verdict;
    int due = 0;                              ///< chosen cells that are not run or outdated
    std::string statement;                    ///< what, how much ± U, when
    std::string text;                         ///< option, study and statement; one whole sentence
};

/// The worst verdict of these cells. A cell that is not run does not hide what others show, but
/// is counted in `due` and said.
Sentence sentence(const Snapshot& snapshot, std::span<const Cell> choice,
                  const NumberStyle& style = {});

/// "the level in Surge shaft falls 1.9 ± 0.5 m below its limit of 458.0 m, 151 s in": one verdict,
/// begun small and without full stop. Only for verdicts that have values.
std::string statement(const plant::Variant& variant, const results::Verdict& verdict,
                      const NumberStyle& style = {});

} // namespace headroom::studies
