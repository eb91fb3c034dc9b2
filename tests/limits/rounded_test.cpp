// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/rounded.h"

#include "support/catch.h"

using namespace headroom;
using namespace headroom::limits;

TEST_CASE("margins are cut towards the limit and never read as zero", "[limits][messages]") {
    CHECK(marginNumber(Quantity::head, 3.69) == "3.6");
    CHECK(marginNumber(Quantity::head, -1.97) == "1.9");
    CHECK(marginNumber(Quantity::head, 460.0 - 458.1) == "1.9"); // not quite 1.9 in binary
    CHECK(marginNumber(Quantity::head, 0.0) == "0.0");
    CHECK(marginNumber(Quantity::head, -0.04) == "0.04");
    CHECK(marginNumber(Quantity::head, -0.0032) == "0.003");
    CHECK(marginNumber(Quantity::head, 1e-9) == "less than 0.000001");
    CHECK(marginNumber(Quantity::power, 2.59e6) == "2.5");
}

TEST_CASE("uncertainties are rounded up", "[limits][messages]") {
    CHECK(uncertaintyNumber(Quantity::head, 0.41) == "0.5");
    CHECK(uncertaintyNumber(Quantity::head, 0.5) == "0.5");
    CHECK(uncertaintyNumber(Quantity::head, 0.0) == "0.0");
    CHECK(uncertaintyNumber(Quantity::speedRatio, 0.0071) == "0.008");
    CHECK(marginAndUncertainty(Quantity::head, -1.94, 0.5) == "1.9 ± 0.5\u2009m");
}

TEST_CASE("an extreme never reads as its bound unless it is", "[limits][messages]") {
    CHECK(extremeText(Quantity::elevation, 456.13, 458.0) == "456.1\u2009m");
    CHECK(extremeText(Quantity::elevation, 457.97, 458.0) == "457.97\u2009m");
    CHECK(extremeText(Quantity::elevation, 458.0, 458.0) == "458.0\u2009m");
    NumberStyle comma;
    comma.decimalSign = ',';
    CHECK(extremeText(Quantity::elevation, 457.97, 458.0, comma) == "457,97\u2009m");
}

TEST_CASE("levels differ by a head", "[limits][messages]") {
    CHECK(differenceOf(Quantity::elevation) == Quantity::head);
    CHECK(differenceOf(Quantity::speedRatio) == Quantity::speedRatio);
}
