// SPDX-License-Identifier: GPL-3.0-or-later
#include "results/verdict.h"

#include "support/catch.h"

#include <set>
#include <string>

using namespace headroom::results;

TEST_CASE("Mark: the names are those of the file, each its own", "[results][files]") {
    const std::set<std::string> wanted{"held",     "tight",  "undecided",    "broken",
                                       "notValid", "notRun", "notApplicable"};
    std::set<std::string> names;
    for (const Mark mark : {Mark::held, Mark::tight, Mark::undecided, Mark::broken, Mark::notValid,
                            Mark::notRun, Mark::notApplicable}) {
        names.insert(std::string(name(mark)));
    }
    CHECK(names == wanted);
}

TEST_CASE("Verdict: a fresh one claims nothing", "[results][invariant]") {
    const Verdict fresh;
    CHECK(fresh.mark == Mark::notRun);
    CHECK(fresh.limit == -1);
}
