// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/bounds.h"

#include "support/catch.h"

using headroom::limits::boundFor;
using headroom::limits::name;
using headroom::plant::ClassValues;
using headroom::plant::LoadClass;

TEST_CASE("boundFor: the study's own class, else the next milder one, never a laxer one",
          "[limits][limit]") {
    const ClassValues values{460.0, std::nullopt, 455.5, std::nullopt};
    CHECK(boundFor(values, LoadClass::normal)->value == 460.0);
    CHECK(boundFor(values, LoadClass::exceptional)->value == 460.0);
    CHECK(boundFor(values, LoadClass::exceptional)->from == LoadClass::normal);
    CHECK(boundFor(values, LoadClass::extreme)->value == 455.5);
    CHECK(boundFor(values, LoadClass::catastrophic)->value == 455.5);
    CHECK(boundFor(values, LoadClass::catastrophic)->from == LoadClass::extreme);

    const ClassValues onlyExtreme{std::nullopt, std::nullopt, 455.5, std::nullopt};
    CHECK_FALSE(boundFor(onlyExtreme, LoadClass::normal).has_value());
    CHECK_FALSE(boundFor(onlyExtreme, LoadClass::exceptional).has_value());
    CHECK_FALSE(boundFor({}, LoadClass::catastrophic).has_value());
}

TEST_CASE("LoadClass: the names are those of the file", "[limits][files]") {
    CHECK(name(LoadClass::normal) == "normal");
    CHECK(name(LoadClass::exceptional) == "exceptional");
    CHECK(name(LoadClass::extreme) == "extreme");
    CHECK(name(LoadClass::catastrophic) == "catastrophic");
}
