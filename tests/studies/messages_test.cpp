// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/messages.h"

#include "units/text.h"

#include "support/catch.h"

using namespace headroom;

TEST_CASE("studies: every message renders and ends as a sentence", "[studies][messages]") {
    for (const Message* message : studies::messages()) {
        Finding finding;
        finding.message = message;
        finding.arguments = {{"reached", amount(Quantity::time, 84.2)},
                             {"wanted", amount(Quantity::time, 900.0)}};
        const auto sentence = text(finding);
        CAPTURE(sentence);
        CHECK(message->code.substr(0, 8) == "studies.");
        CHECK(sentence.find('{') == std::string::npos);
        CHECK(sentence.back() == '.');
    }
}
