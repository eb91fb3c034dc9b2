// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/near_miss.h"

#include "support/catch.h"

#include <array>
#include <string>

using headroom::nearMiss;

TEST_CASE("nearMiss: finds the likely slip and nothing far-fetched", "[base][limit]") {
    const std::array<std::string, 4> known{"diameter_m", "hydraulicRadius_m", "strickler", "area_m2"};
    CHECK(nearMiss("diamter_m", known) == "diameter_m");
    CHECK(nearMiss("Strickler", known) == "strickler"); // case does not count
    CHECK(nearMiss("area_m", known) == "area_m2");
    CHECK_FALSE(nearMiss("governor", known));
    CHECK_FALSE(nearMiss("", std::span<const std::string>{}));
}

TEST_CASE("nearMiss: of two candidates the nearer wins", "[base][limit]") {
    const std::array<std::string, 2> known{"Surge shaft 1", "Surge shaft 12"};
    CHECK(nearMiss("Surge shaft 13", known) == "Surge shaft 1");
    CHECK(nearMiss("Surge shaft 12", known) == "Surge shaft 12");
}
