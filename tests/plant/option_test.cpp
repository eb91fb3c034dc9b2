// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"
#include "units/text.h"

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::dorvane;
using support::found;
using support::has;
using support::json;
using support::smallPlant;

namespace {

Findings withChanges(const char* changes) {
    return bind(smallPlant().with(split("options/Rough/changes"), json(changes))).findings;
}

} // namespace

TEST_CASE("options: each of the demo changes what it says", "[plant][invariant]") {
    const auto project = bind(dorvane()).project;
    REQUIRE(project.options.size() == 5);
    const auto two = variant(project, project.options.indexOf("Two-stage closing"));
    REQUIRE(two.usable());
    CHECK_FALSE(two.plant.units[0].servo->closing_s);
    REQUIRE(two.plant.units[0].servo->closingStages.size() == 2);
    CHECK(two.plant.units[0].servo->closingStages[1].second == 14.0);
    const auto wide = variant(project, project.options.indexOf("Wider shaft"));
    CHECK(wide.plant.chambers[0].shape.diameter_m == 10.0);
    CHECK_THAT(wide.plant.chambers[0].shape.areaByLevel[0].second, WithinAbs(78.54, 0.001));
    const auto throttle = variant(project, project.options.indexOf("Larger throttle"));
    // Loss over the fourth power of the diameter, 2.35 m to 2.9 m; derived here.
    const double share = std::pow(2.35 / 2.9, 4);
    CHECK_THAT(throttle.plant.chambers[0].shape.lossIn_s2m5, WithinRel(0.0065 * share, 1e-4));
    CHECK_THAT(throttle.plant.chambers[0].shape.lossOut_s2m5, WithinRel(0.00455 * share, 1e-4));
    const auto late = variant(project, project.options.indexOf("Reload not before 300 s"));
    CHECK(late.plant.units[0].interlocks.reloadNotBefore_s == 300.0);
    const auto base = variant(project, -1);
    CHECK(base.name == "As built");
    CHECK(base.plant.chambers[0].shape.diameter_m == 8.0);
    CHECK(base.limits.size() == project.limits.size());
}

TEST_CASE("options: a forgotten null is explained with the line to add", "[plant][messages]") {
    const auto kinds = withChanges(R"({"plant": {"chambers": {"Shaft": {"shape": {"throttled":
        {"diameter_m": 5, "floor_m": 82, "rim_m": 120, "lossIn_s2m5": 0.01, "lossOut_s2m5": 0.01}}}}}})");
    const auto hits = found(kinds, "plant.forgotten-null");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject == "options/Rough/changes/plant/chambers/Shaft/shape/throttled");
    CHECK_THAT(text(hits.front()), ContainsSubstring("\"open\": null"));
    const auto forms = withChanges(
        R"({"plant": {"conduits": {"Tunnel": {"reaches": {"rock": {"roughness_mm": 1}}}}}})");
    const auto form = found(forms, "plant.forgotten-null");
    REQUIRE(form.size() == 1);
    CHECK_THAT(text(form.front()), ContainsSubstring("\"strickler\": null"));
    CHECK(
        withChanges(
            R"({"plant": {"conduits": {"Tunnel": {"reaches": {"rock": {"strickler": null, "roughness_mm": 1}}}}}})")
            .empty());
}

TEST_CASE("options: changes of what is not there", "[plant][messages]") {
    const auto lost = withChanges(R"({"plant": {"units": {"U2": {"servo": {"closing_s": 20}}}}})");
    INFO(support::texts(lost));
    const auto hits = found(lost, "plant.patch-of-nothing-near");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject == "options/Rough/changes/plant/units/U2");
    CHECK_THAT(text(hits.front()), ContainsSubstring("“U1”") && ContainsSubstring("turbine"));
    CHECK_FALSE(has(lost, "plant.missing"));
    CHECK(has(withChanges(R"({"plant": {"reservoirs": {"Ocean deep": {"lowest_m": 3}}}})"),
              "plant.patch-of-nothing"));
    CHECK(has(withChanges(R"({"plant": {"units": {"U7": null}}})"), "plant.nothing-to-remove"));
    CHECK(has(withChanges(R"({"plant": {"unitz": {"U1": null}}})"), "plant.unknown-key-near",
              "options/Rough/changes/plant/unitz"));
    CHECK(has(withChanges(R"({"studies": {}})"), "plant.unknown-key"));
    CHECK(has(withChanges(R"({"plant": 5})"), "plant.mistyped", "options/Rough/changes/plant"));
}

TEST_CASE("options: what still names a removed thing is listed once", "[plant][messages]") {
    const auto findings = withChanges(R"({"plant": {"points": {"Foot": null}}})");
    INFO(support::texts(findings));
    const auto hits = found(findings, "plant.removed-but-used");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject == "options/Rough/changes/plant/points/Foot");
    CHECK_THAT(text(hits.front()), ContainsSubstring("plant/conduits/Tunnel/to")
                                       && ContainsSubstring("plant/chambers/Shaft/at"));
    CHECK_FALSE(has(findings, "plant.undeclared"));
    CHECK_FALSE(has(findings, "plant.undeclared-near"));
}

TEST_CASE("options: a limit at a place that is gone is not a fault", "[plant][invariant]") {
    const auto bound = bind(smallPlant().with(split("options/Rough/changes"),
                                              json(R"({"plant": {"chambers": {"Shaft": null}}})")));
    INFO(support::texts(bound.findings));
    CHECK(bound.findings.empty());
    const auto without = variant(bound.project, 0);
    REQUIRE(without.limits.size() == 1);
    CHECK_FALSE(without.limits[0].at.thing.resolved());
    CHECK(without.limits[0].at.thing.name == "Shaft");
    CHECK(variant(bound.project, -1).limits[0].at.thing.resolved());
}

TEST_CASE("options: a study may name what only an option has", "[plant][invariant]") {
    const auto tree =
        smallPlant()
            .with(split("options/Rough/changes"),
                  json(R"({"plant": {"units": {"U0": {"from": "Inlet", "to": "River",
            "turbine": {"orifice": {"ratedHead_m": 75, "ratedFlow_m3s": 1}}}}}})"))
            .with(split("studies/Close/start/opening_pct"), json(R"({"U1": 100, "U0": 50})"));
    const auto bound = bind(tree);
    INFO(support::texts(bound.findings));
    REQUIRE(bound.findings.empty());
    const auto& study = bound.project.studies[0];
    const auto inBase = studyIn(variant(bound.project, -1), study);
    REQUIRE_FALSE(inBase);
    CHECK(inBase.findings().front().message->code == "plant.lacking-here");
    CHECK(inBase.findings().front().subject == "plant/units/U0");
    const auto inOption = studyIn(variant(bound.project, 0), study);
    REQUIRE(inOption);
    CHECK(inOption->start.opening[1].first.index == 1);
    CHECK(inOption->events[1].time.of.index == 0);
}

TEST_CASE("options: a fault of the base is told once", "[plant][messages]") {
    const auto findings =
        bind(smallPlant().with(split("plant/conduits/Pipe/to"), Tree::text("Inlt"))).findings;
    CHECK(found(findings, "plant.undeclared-near").size() == 1);
}

TEST_CASE("options: their faults point into their changes", "[plant][messages]") {
    const auto findings = withChanges(
        R"({"plant": {"conduits": {"Tunnel": {"reaches": {"rock": {"strickler": 3000}}}}}})");
    const auto hits = found(findings, "plant.out-of-range");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject
          == "options/Rough/changes/plant/conduits/Tunnel/reaches/rock/strickler");
    CHECK(hits.front().related.back() == "options/Rough");
}

TEST_CASE("options: one that changes nothing is the base", "[plant][invariant]") {
    for (const auto* option : {R"({})", R"({"changes": {}})", R"({"about": "later"})"}) {
        const auto bound = bind(smallPlant().with(split("options/Rough"), json(option)));
        CHECK(bound.findings.empty());
        const auto same = variant(bound.project, 0);
        CHECK(same.usable());
        CHECK(same.tree == variant(bound.project, -1).tree);
    }
}
