// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/messages.h"

#include "units/text.h"

#include "support/catch.h"

#include <set>
#include <string>

using namespace headroom;

TEST_CASE("limits: every message renders and ends as a sentence", "[limits][messages]") {
    std::set<std::string> codes;
    for (const Message* message : limits::messages()) {
        CAPTURE(std::string(message->code));
        CHECK(message->code.substr(0, 7) == "limits.");
        CHECK(codes.insert(std::string(message->code)).second);
        Finding finding;
        finding.message = message;
        finding.subject = "limits/Shaft, lowest";
        finding.arguments = {{"reached", amount(Quantity::time, 84.2)},
                             {"wanted", amount(Quantity::time, 900.0)},
                             {"place", std::string("Surge shaft")},
                             {"class", std::string("normal")},
                             {"measure", std::string("Water level")}};
        for (const char sign : {'.', ','}) {
            NumberStyle style;
            style.decimalSign = sign;
            const auto sentence = text(finding, style);
            CHECK(sentence.find('{') == std::string::npos);
            CHECK(sentence.back() == '.');
        }
    }
}
