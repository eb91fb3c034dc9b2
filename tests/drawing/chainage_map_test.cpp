// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/chainage_map.h"
#include "support/catch.h"

#include <cmath>

#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

ChainageMap mapOf(const plant::Project& project, double width, Scales scales = Scales::three) {
    return chainageMap(project.plant, 52.0, 52.0 + width, 0.065 * width, scales);
}

} // namespace

TEST_CASE("ChainageMap: there and back again, inside and beyond", "[drawing][invariant]") {
    for (const auto& project :
         {test::sampleProject(), test::branchedProject(), test::startedProject()}) {
        for (const double width : {300.0, 866.0, 3800.0}) {
            for (const Scales scales : {Scales::three, Scales::one}) {
                const auto map = mapOf(project, width, scales);
                double before = -1e300;
                for (double chainage = -900.0; chainage < 9000.0; chainage += 37.0) {
                    const double x = map.x_px(chainage);
                    CHECK(x > before);
                    before = x;
                    // Two roundings of numbers up to 1e4.
                    CHECK_THAT(map.chainage_m(x), WithinAbs(chainage, 1e-8));
                }
            }
        }
    }
}

TEST_CASE("ChainageMap: usual shares of the width after the lead", "[drawing][analytic]") {
    const auto map = mapOf(test::sampleProject(), 1000.0);
    const double rest = 1000.0 - 65.0;
    REQUIRE(map.spans().size() == 4);
    CHECK_THAT(map.to_px(1) - map.from_px(1), WithinAbs(headraceShare * rest, 1e-9));
    CHECK_THAT(map.to_px(2) - map.from_px(2), WithinAbs(pressureShare * rest, 1e-9));
    CHECK_THAT(map.to_px(3) - map.from_px(3), WithinAbs(bayShare * rest, 1e-9));
    CHECK_THAT(map.x_px(0.0), WithinAbs(52.0 + 65.0, 1e-9));
    CHECK_THAT(map.x_px(5000.0), WithinAbs(52.0 + 65.0 + headraceShare * rest, 1e-9));
    CHECK_THAT(map.right_px(), WithinAbs(1052.0, 1e-9));
}

TEST_CASE("ChainageMap: no span is narrower than 60 px while there is room", "[drawing][limit]") {
    for (const double width : {330.0, 420.0, 900.0}) {
        const auto map = mapOf(test::branchedProject(), width);
        for (int i = 0; i < static_cast<int>(map.spans().size()); ++i) {
            if (map.spans()[static_cast<std::size_t>(i)].kind != Span::Kind::lead) {
                CAPTURE(width, i);
                CHECK(map.to_px(i) - map.from_px(i) >= leastSpan_px - 1e-9);
            }
        }
    }
    // Less room than that: shared out, still rising.
    const auto tiny = mapOf(test::branchedProject(), 20.0);
    CHECK(tiny.right_px() > tiny.left_px());
}

TEST_CASE("ChainageMap: the compression is said in words and marked", "[drawing][messages]") {
    const auto map = mapOf(test::sampleProject(), 866.0);
    // 5000 m on 0.46 against 579 m on 0.40 of the width: (5000 / 0.46) / (579 / 0.40) = 7.5.
    CHECK(map.compressionWords(1).toStdString() == "drawn 7.5× shorter than Penstock");
    CHECK(map.compressionWords(2).isEmpty());
    CHECK(map.compressionWords(3).toStdString() == "not to scale");
    REQUIRE(map.breaks_px().size() == 1);
    CHECK(map.spanAt(map.breaks_px().front()) == 1);

    const auto one = mapOf(test::sampleProject(), 866.0, Scales::one);
    CHECK(one.breaks_px().empty());
    CHECK(one.compressionWords(1).isEmpty());
    CHECK_THAT((one.x_px(5000) - one.x_px(0)) / (one.x_px(5579) - one.x_px(5000)),
               WithinRel(5000.0 / 579.0, 1e-9));
}

TEST_CASE("ChainageMap: a plant without anything still has a map", "[drawing][limit]") {
    const auto map = chainageMap({}, 0.0, 100.0, 0.0);
    CHECK(std::isfinite(map.x_px(12.0)));
    CHECK(map.right_px() == 100.0);
}
