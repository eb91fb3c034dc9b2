// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include <set>

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::dorvane;
using support::json;
using support::smallPlant;

namespace {

std::string of(const Tree& tree, const std::string& study = "", int option = -1) {
    const auto bound = bind(tree);
    INFO(support::texts(bound.findings));
    REQUIRE(bound.usable());
    const auto& project = bound.project;
    const int index = study.empty() ? 0 : project.studies.indexOf(study);
    return fingerprint(variant(project, option), project.studies[index], project.numerics, 1)
        .text();
}

Tree with(std::string_view path, std::string_view value) {
    return dorvane().with(split(path), json(value));
}

} // namespace

TEST_CASE("fingerprint: 32 hex digits, different for every cell of the demo",
          "[plant][invariant]") {
    const auto project = bind(dorvane()).project;
    std::set<std::string> all;
    for (int option = -1; option < project.options.size(); ++option) {
        const auto plant = variant(project, option);
        for (const auto& study : project.studies) {
            for (const int refinement : {1, 2}) {
                const auto text =
                    fingerprint(plant, study.second, project.numerics, refinement).text();
                CHECK(text.size() == 32);
                CHECK(text.find_first_not_of("0123456789abcdef") == std::string::npos);
                all.insert(text);
            }
        }
    }
    CHECK(all.size()
          == static_cast<std::size_t>((project.options.size() + 1) * project.studies.size() * 2));
}

TEST_CASE("fingerprint: what cannot change a number is not in it", "[plant][invariant]") {
    const auto before = of(dorvane());
    CHECK(of(with("title", R"("Another title")")) == before);
    CHECK(of(with("plant/units/U1/note", R"("seen")")) == before);
    CHECK(of(with("plant/units/U1/servo/source/author", R"("N. N.")")) == before);
    CHECK(of(with("limits/Shaft, lowest/level/min_m/normal", "461")) == before);
    CHECK(of(with("options/Flywheel/cost_M", "9")) == before);
    CHECK(of(with("ground", "[[0, 500], [1, 501]]")) == before);
    CHECK(of(with("site/datum", R"("sea")")) == before);
    CHECK(of(with("studies/Full rejection/about", R"("else")")) == before);
    CHECK(of(with("studies/Full rejection/class", R"("extreme")")) == before);
    CHECK(of(with("studies/Runaway/until_s", "400")) == before);
    CHECK(of(with("plant/units/U1/turbine/francis/chart/fromRatedData/speedUncertainty_pu", "0.05"))
          == before);
    // Written defaults and other ways to say the same number.
    CHECK(of(with("plant/units/U1/drive/synchronous/locked", "false")) == before);
    CHECK(of(with("plant/units/U1/interlocks", R"({"synchroniseHold_s": 1})")) == before);
    CHECK(of(with("plant/units/U1/servo/closing_s", "9.0000")) == before);
}

TEST_CASE("fingerprint: what can change a number is in it", "[plant][invariant]") {
    const auto before = of(dorvane());
    for (const auto& [path, value] : std::vector<std::pair<const char*, const char*>>{
             {"site/gravity_mps2", "9.8100001"},
             {"site/velocityHeads", "false"},
             {"plant/points/Intake/elevation_m", "475.1"},
             {"plant/reservoirs/Tailwater/level_m", "270.5"},
             {"plant/conduits/Headrace/axis", "[[1800, 466.8], [3600, 458.4]]"},
             {"plant/conduits/Headrace/model", R"("rigid")"},
             {"plant/conduits/Headrace/losses/bends/reverse", "0.4"},
             {"plant/chambers/Surge shaft/shape/throttled/lossIn_s2m5", "0.0066"},
             {"plant/units/U1/interlocks/reloadNotBefore_s", "10"},
             {"plant/units/U1/governor/pid/droopOnPower", "true"},
             {"plant/units/U1/drive/synchronous/locked", "true"},
             {"plant/units/U1/turbine/francis/chart/fromRatedData/flowByStroke",
              "[[0, 0], [100, 100]]"},
             {"plant/grid", R"({"imposed": {}})"},
             {"numerics/longestStep_s", "0.02"},
             {"studies/Full rejection/start/levels_m/Upper Dorvane", "511"},
             {"studies/Full rejection/events/trip/at_s", "11"},
             {"studies/Full rejection/until_s", "601"}}) {
        INFO(path);
        Tree tree = with(path, value);
        if (std::string(path) == "plant/grid") {
            tree = tree.without(split("studies/Loss of 650 MW"));
        }
        CHECK(of(tree) != before);
    }
}

TEST_CASE("fingerprint: a shaft as a diameter is a kind of its own, its search range is not",
          "[plant][invariant]") {
    const auto reload = of(dorvane(), "Reject, then reload");
    CHECK(
        of(with("studies/Reject, then reload/events/reload/after_s", "102"), "Reject, then reload")
        == reload);
    CHECK(
        of(with("studies/Reject, then reload/events/reload/after_s", "103"), "Reject, then reload")
        != reload);
}

TEST_CASE("fingerprint: a kind with the same numbers is another plant", "[plant][invariant]") {
    const Tree open = smallPlant();
    const Tree throttled = open.with(
        split("plant/chambers/Shaft/shape"),
        json(
            R"({"throttled": {"areaByLevel": [[82, 20], [120, 20]], "lossIn_s2m5": 0, "lossOut_s2m5": 0}})"));
    CHECK(of(open) != of(throttled));
}

TEST_CASE("fingerprint: an unchanged option keeps the base's", "[plant][invariant]") {
    const Tree same = dorvane().with(split("options/Nothing"), json(R"({"changes": {}})"));
    const auto project = bind(same).project;
    CHECK(of(same, "Runaway", project.options.indexOf("Nothing")) == of(same, "Runaway"));
}
