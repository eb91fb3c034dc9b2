// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/words.h"
#include "support/catch.h"

#include <cmath>

#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

TEST_CASE("Words: numbers keep unit, thin space and true minus", "[drawing][messages]") {
    CHECK(numberText(Quantity::elevation, -3.94).toStdString() == "−3.9\u2009m");
    CHECK(amountOf(Quantity::elevation, 456.13, 458.0).toStdString() == "456.1 of 458.0\u2009m");
    CHECK(wholeAmount(Quantity::chainage, 5000.0).toStdString() == "5\u2009000\u2009m");
    CHECK(wholeAmount(Quantity::chainage, 12345.0).toStdString() == "12\u2009345\u2009m");
    CHECK(wholeAmount(Quantity::count, -12345.0).toStdString() == "−12\u2009345");
    CHECK(timeWords(151.2).toStdString() == "151\u2009s");
    CHECK(timeWords(9.44).toStdString() == "9.4\u2009s");
}

TEST_CASE("Words: a share never rounds to the other side of the limit", "[drawing][invariant]") {
    CHECK(percent(-0.0001).toStdString() == "−1");
    CHECK(percent(0.0099).toStdString() == "0");
    CHECK(percent(-0.064).toStdString() == "−6");
    CHECK(percent(0.18).toStdString() == "18");
    CHECK(percent(1.0).toStdString() == "100");
    CHECK(percent(std::nan("")).toStdString() == "–");
}

TEST_CASE("Words: letters of limits go on after z and follow the name over options",
          "[drawing][invariant]") {
    plant::Project project;
    plant::Variant variant;
    for (int i = 0; i < 60; ++i) {
        project.limits.add("limit " + std::to_string(i));
    }
    variant.limits = project.limits;
    CHECK(limitLetter(project, variant, 0).toStdString() == "a");
    CHECK(limitLetter(project, variant, 25).toStdString() == "z");
    CHECK(limitLetter(project, variant, 26).toStdString() == "aa");
    CHECK(limitLetter(project, variant, 53).toStdString() == "bb");
    plant::Variant fewer;
    fewer.limits.add("own", {});
    fewer.limits.add("limit 3", {});
    CHECK(limitLetter(project, fewer, 1).toStdString() == "d");
    CHECK(limitLetter(project, fewer, 0).toStdString() == "bi"); // after the sixty of the project
    CHECK(limitLetter(project, fewer, 7).isEmpty());
}
