// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/messages.h"
#include "support/catch.h"

#include <set>
#include <string>

using namespace headroom;

TEST_CASE("Waterway messages: whole sentences, own codes", "[hydraulics][messages]") {
    std::set<std::string_view> codes;
    for (const Message* message : hydraulics::messages()) {
        CAPTURE(message->code);
        CHECK(message->code.substr(0, 11) == "hydraulics.");
        CHECK(codes.insert(message->code).second);
        CHECK(message->what.back() == '.');
        CHECK(message->mend.back() == '.');
        CHECK(message->what.find('!') == std::string_view::npos);
    }
    CHECK(codes.size() == 19);
}
