// SPDX-License-Identifier: GPL-3.0-or-later
#include "results/verdict.h"

#include "base/ensure.h"

namespace headroom::results {

std::string_view name(Mark mark) {
    switch (mark) {
    case Mark::held: return "held";
    case Mark::tight: return "tight";
    case Mark::undecided: return "undecided";
    case Mark::broken: return "broken";
    case Mark::notValid: return "notValid";
    case Mark::notRun: return "notRun";
    case Mark::notApplicable: return "notApplicable";
    }
    throw Bug("a mark has a name");
}

} // namespace headroom::results
