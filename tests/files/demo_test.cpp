// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/project_file.h"
#include "plant/checks.h"
#include "support/catch.h"
#include "units/text.h"

#include <cmath>

using namespace headroom;
using namespace headroom::files;

namespace {

const plant::Project& dorvane() {
    static const Opened opened =
        openProject(HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json");
    return opened.bound.project;
}

} // namespace

TEST_CASE("Dorvane: opens without a finding", "[files][run]") {
    const auto opened = openProject(HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json");
    std::string all;
    for (const auto& finding : opened.findings()) {
        all += text(finding) + "\n";
    }
    INFO(all);
    CHECK(opened.findings().empty());
    CHECK(opened.usable());
    CHECK(dorvane().options.size() >= 4);
    CHECK(dorvane().studies.size() >= 7);
    CHECK(dorvane().limits.size() >= 8);
    CHECK(dorvane().ground.size() > 10);
}

TEST_CASE("Dorvane: the numbers of the plant's description", "[files][reference]") {
    // An invented plant; its description gives 5 000 m of tunnel with 32.0 m², 650 m of pipe,
    // a velocity of 1.88 m/s and 5.02 m/s at 60 m³/s, and Ta = 7.11 s. Common practice, no source.
    const auto& plant = dorvane().plant;
    double length_m = 0.0;
    const auto axis = plant::axisOf(plant, plant.conduits[1]);
    for (std::size_t i = 1; i < axis.size(); ++i) {
        length_m +=
            std::hypot(axis[i].first - axis[i - 1].first, axis[i].second - axis[i - 1].second);
    }
    CHECK_THAT(length_m, WithinAbs(650.0, 0.5));
    CHECK_THAT(60.0 / plant.conduits[0].reaches[0].area_m2, WithinAbs(1.88, 0.006));
    CHECK_THAT(60.0 / plant.conduits[1].reaches[0].area_m2, WithinAbs(5.02, 0.006));
    const auto& unit = plant.units[0];
    const auto& francis = std::get<plant::FrancisTurbine>(unit.turbine);
    const double ta_s =
        *unit.inertia_kgm2 * francis.ratedSpeed_rads * francis.ratedSpeed_rads / 120e6;
    CHECK_THAT(ta_s, WithinAbs(7.11, 0.01));
    CHECK_THAT(francis.ratedPower_W / (1000 * 9.81 * francis.ratedHead_m * francis.ratedFlow_m3s),
               WithinAbs(0.930, 0.001));
}

TEST_CASE("Dorvane: limits and numbers name who answers for them", "[files][invariant]") {
    for (const auto& [name, limit] : dorvane().limits) {
        INFO(name);
        CHECK_FALSE(limit.source.document.empty());
        CHECK_FALSE(limit.source.author.empty());
        CHECK_FALSE(limit.consequence.empty());
    }
    CHECK(dorvane().limits.find("Shaft, lowest")->modelUncertainty == 0.5);
}

TEST_CASE("Dorvane: every option has a plant of its own that is sound", "[files][invariant]") {
    for (int option = -1; option < dorvane().options.size(); ++option) {
        const auto variant = plant::variant(dorvane(), option);
        INFO(variant.name);
        CHECK(variant.findings.empty());
        for (const auto& study : dorvane().studies) {
            CHECK(plant::studyIn(variant, study.second));
        }
    }
}
