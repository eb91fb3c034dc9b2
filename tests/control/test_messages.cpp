// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/messages.h"
#include "machines/messages.h"
#include "support/catch.h"

#include <set>
#include <string>

using namespace headroom;

TEST_CASE("Messages of controls and machines: own codes, each with its mending",
          "[control][messages]") {
    std::set<std::string_view> seen;
    const auto walk = [&](std::span<const Message* const> all, std::string_view floor) {
        for (const Message* message : all) {
            CAPTURE(std::string(message->code));
            CHECK(message->code.substr(0, floor.size()) == floor);
            CHECK(seen.insert(message->code).second);
            CHECK_FALSE(message->what.empty());
            CHECK_FALSE(message->mend.empty());
        }
    };
    walk(control::messages(), "control.");
    walk(machines::messages(), "machines.");
    CHECK(seen.size() == 23);
}
