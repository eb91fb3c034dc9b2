// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/definitions.h"

#include "hand_made.h"
#include "support/catch.h"

#include <algorithm>

using namespace headroom;

TEST_CASE("definitions: every word a reader may ask about is there", "[limits][messages]") {
    auto pressure = hand_made::limit(Measure::head, {});
    pressure.allowance.shareOfHead = 0.05;
    auto variant = hand_made::variant({{"Spiral, highest", pressure}});
    variant.site.datum = "local 2011";
    const auto sheet = limits::definitions(variant);
    const auto textOf = [&](const std::string& term) {
        const auto found = std::find_if(sheet.begin(), sheet.end(),
                                        [&](const auto& row) { return row.term == term; });
        return found == sheet.end() ? std::string() : found->text;
    };
    for (const char* term : {"Net head", "Static head", "Percent rise", "Momentary overspeed",
                             "Power", "Gate", "Uncertainty", "Marks", "Share"}) {
        CAPTURE(term);
        CHECK_FALSE(textOf(term).empty());
    }
    CHECK_THAT(textOf("Datum"), ContainsSubstring("local 2011"));
    CHECK_THAT(textOf("Allowance in \"Spiral, highest\""),
               ContainsSubstring("5.0\u2009% of the static head"));
}
