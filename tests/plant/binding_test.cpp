// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "support/catch.h"
#include "units/text.h"

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::dorvane;
using support::findingsWith;
using support::findingsWithout;
using support::found;
using support::has;
using support::smallPlant;

TEST_CASE("bind: the demo becomes plain SI values", "[plant][invariant]") {
    const auto bound = bind(dorvane());
    INFO(support::texts(bound.findings));
    REQUIRE(bound.usable());
    CHECK(bound.findings.empty());
    const auto& project = bound.project;
    CHECK(project.baseName == "As built");
    CHECK_THAT(project.site.airPressure_Pa, WithinRel(95400.0, 1e-14));

    const auto& headrace = project.plant.conduits[0];
    CHECK(project.plant.points.name(headrace.from.index) == "Intake");
    CHECK(std::get<Strickler>(headrace.reaches[0].friction).number == 34.0);
    CHECK(std::get<GivenWaveSpeed>(headrace.reaches[0].wall).speed_mps == 1100.0);
    const auto& steel = project.plant.conduits[1].reaches[0];
    CHECK_THAT(steel.area_m2, WithinRel(constants::pi / 4.0 * 3.9 * 3.9, 1e-14));
    CHECK_THAT(steel.hydraulicRadius_m, WithinRel(3.9 / 4.0, 1e-14));

    const auto& shape = project.plant.chambers[0].shape;
    CHECK(shape.throttled);
    CHECK(shape.floor_m() == 455.0);
    CHECK(shape.rim_m() == 536.0);
    CHECK_THAT(shape.areaByLevel[0].second, WithinRel(constants::pi * 16.0, 1e-14));

    const auto& unit = project.plant.units[0];
    const auto& francis = std::get<FrancisTurbine>(unit.turbine);
    CHECK_THAT(francis.ratedSpeed_rads, WithinRel(333.33 * constants::pi / 30.0, 1e-14));
    CHECK_THAT(francis.ratedPower_W, WithinRel(121.5e6, 1e-14));
    CHECK_THAT(francis.flowByStroke[1].second, WithinRel(0.12, 1e-14));
    CHECK(unit.to.collection == Collection::reservoirs);
    CHECK_THAT(unit.inertia_kgm2.value(), WithinRel(700e3, 1e-14));
    CHECK(std::get<PidGovernor>(*unit.governor).gains.kp == 2.2);
    CHECK_THAT(unit.servo->cushionBelow, WithinRel(0.12, 1e-14));
    CHECK_THAT(std::get<GridArea>(project.plant.grid).storedEnergy_J, WithinRel(45e9, 1e-14));
}

TEST_CASE("bind: limits carry measure, place, classes and rule", "[plant][invariant]") {
    const auto project = bind(dorvane()).project;
    const auto& spiral = *project.limits.find("Spiral head, highest");
    CHECK(spiral.measure == Measure::head);
    CHECK(spiral.at.thing.name == "U1 inlet");
    CHECK(spiral.at.thing.collection == Collection::points);
    CHECK(spiral.greatest[1] == 600.0);
    CHECK_FALSE(spiral.least[0]);
    CHECK_THAT(spiral.allowance.shareOfHead, WithinRel(0.05, 1e-14));
    CHECK(spiral.reserve == 3.0);
    const auto& bend = *project.limits.find("Top bend, lowest head");
    CHECK(bend.at.alongConduit);
    CHECK(bend.at.thing.name == "Penstock");
    CHECK(bend.at.chainage_m == 5030.0);
    const auto& rate = *project.limits.find("Tunnel, rate of pressure");
    CHECK_THAT(*rate.greatest[0], WithinRel(10.0 / 60.0, 1e-14));
    CHECK(rate.timeRule == TimeRule::continuous);
    CHECK(rate.allowed_s == 120.0);
    CHECK(project.limits.find("Shaft, lowest")->modelUncertainty == 0.5);
}

TEST_CASE("bind: studies carry start and events", "[plant][invariant]") {
    const auto project = bind(dorvane()).project;
    const auto& reload = *project.studies.find("Reject, then reload");
    CHECK(reload.loadClass == LoadClass::exceptional);
    CHECK(reload.start.level_m[0].second == 488.0);
    CHECK_THAT(reload.start.output_W[0].second, WithinRel(105.5e6, 1e-14));
    REQUIRE(reload.events.size() == 2);
    const auto& event = reload.events[1];
    CHECK(event.time.after_s == 102.0);
    CHECK(event.time.search_s->second == 300.0);
    CHECK(event.time.of.index == 0);
    CHECK(std::get<LoadOrder>(event.kind).unit.index == 0);
    CHECK(std::get<RejectLoad>(reload.events[0].kind).units.size() == 1);
    const auto all = bind(smallPlant().with(split("studies/Close/events/first"),
                                            support::json(R"({"at_s": 1, "rejectLoad": {}})")));
    CHECK(std::get<RejectLoad>(all.project.studies[0].events[0].kind).units.empty());
}

TEST_CASE("bind: the small plant is good", "[plant][invariant]") {
    const auto bound = bind(smallPlant());
    INFO(support::texts(bound.findings));
    CHECK(bound.findings.empty());
}

TEST_CASE("bind: all faults come at once", "[plant][messages]") {
    const auto tree =
        smallPlant()
            .without(split("plant/reservoirs/Lake/level_m"))
            .with(split("plant/conduits/Tunnel/reaches/rock/diameter_m"), Tree::number(-3))
            .with(split("plant/units/U1/servo/opening_s"), Tree::text("ten"))
            .with(split("plant/chambers/Shaft/at"), Tree::text("Fool"));
    const auto findings = bind(tree).findings;
    INFO(support::texts(findings));
    CHECK(has(findings, "plant.missing", "plant/reservoirs/Lake/level_m"));
    CHECK(has(findings, "plant.out-of-range", "plant/conduits/Tunnel/reaches/rock/diameter_m"));
    CHECK(has(findings, "plant.mistyped", "plant/units/U1/servo/opening_s"));
    CHECK(has(findings, "plant.undeclared-near", "plant/chambers/Shaft/at"));
}

TEST_CASE("bind: a slip of the pen gets the nearest key", "[plant][messages]") {
    const auto findings = findingsWith(smallPlant(), "plant/reservoirs/Lake/levl_m", "100");
    const auto hits = found(findings, "plant.unknown-key-near");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject == "plant/reservoirs/Lake/levl_m");
    CHECK_THAT(text(hits.front()), ContainsSubstring("“level_m”"));
    CHECK(has(findingsWith(smallPlant(), "plant/reservoirs/Lake/zzzzzzzzzz", "1"),
              "plant.unknown-key"));
    CHECK(bind(smallPlant().with(split("plant/reservoirs/Lake/x-mine"), Tree::number(1)))
              .findings.empty());
    CHECK(bind(smallPlant().with(split("plant/reservoirs/Lake/note"), Tree::text("old")))
              .findings.empty());
    CHECK(bind(smallPlant().with(split("plant/reservoirs/Lake/source/document"), Tree::text("a")))
              .findings.empty());
}

TEST_CASE("bind: exactly one kind, exactly one form", "[plant][messages]") {
    CHECK(has(
        findingsWith(
            smallPlant(), "plant/chambers/Shaft/shape/throttled",
            R"({"diameter_m": 5, "floor_m": 82, "rim_m": 120, "lossIn_s2m5": 0, "lossOut_s2m5": 0})"),
        "plant.two-kinds", "plant/chambers/Shaft/shape/throttled"));
    CHECK(has(findingsWith(smallPlant(), "plant/chambers/Shaft/shape", "{}"), "plant.no-kind"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Tunnel/reaches/rock/darcy", "0.02"),
              "plant.two-kinds", "plant/conduits/Tunnel/reaches/rock/darcy"));
    CHECK(has(findingsWithout(smallPlant(), "plant/conduits/Tunnel/reaches/rock/strickler"),
              "plant.missing-form", "plant/conduits/Tunnel/reaches/rock"));
    CHECK(has(findingsWith(smallPlant(), "plant/chambers/Shaft/shape/open", R"({"diameter_m": 5})"),
              "plant.missing", "plant/chambers/Shaft/shape/open/floor_m"));
}

TEST_CASE("bind: null means something only in an option", "[plant][messages]") {
    const auto findings = findingsWith(smallPlant(), "plant/reservoirs/Lake/lowest_m", "null");
    CHECK(has(findings, "plant.null", "plant/reservoirs/Lake/lowest_m"));
    CHECK(
        has(findingsWith(smallPlant(), "plant/units/U1", "null"), "plant.null", "plant/units/U1"));
}

TEST_CASE("bind: numbers out of their usual range are a warning with its source",
          "[plant][messages]") {
    const auto bound = bind(smallPlant().with(split("plant/conduits/Tunnel/reaches/rock/strickler"),
                                              Tree::number(120)));
    const auto hits = found(bound.findings, "plant.unusual");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().severity() == Severity::warning);
    CHECK_THAT(text(hits.front()), ContainsSubstring("shotcrete"));
    CHECK(bound.usable());
}

TEST_CASE("bind: names are 1 to 80 printable letters, each once over the plant",
          "[plant][messages]") {
    const auto named = [](const std::string& name) {
        return bind(smallPlant().with({"plant", "points", name},
                                      support::json(R"({"chainage_m": 1, "elevation_m": 1})")))
            .findings;
    };
    CHECK(has(named(""), "plant.name-empty"));
    CHECK(has(named(std::string(81, 'a')), "plant.name-too-long"));
    CHECK_FALSE(has(named(std::string(80, 'a')), "plant.name-too-long"));
    std::string wide;
    for (int i = 0; i < 80; ++i) {
        wide += "ö";
    }
    CHECK_FALSE(has(named(wide), "plant.name-too-long"));
    CHECK(has(named("two\nlines"), "plant.name-not-printable"));
    CHECK(has(named("hidden\u200Bspace"), "plant.name-not-printable"));
    CHECK(has(named(" Foot 2"), "plant.name-blanks"));
    CHECK(has(named("FOOT"), "plant.name-differs-in-case"));
    CHECK(has(named("Tunnel"), "plant.name-twice"));
    CHECK(has(named("shaft"), "plant.name-differs-in-case"));
    CHECK(has(bind(smallPlant().with(split("limits/shaft, HIGHEST"),
                                     *smallPlant().at(split("limits/Shaft, highest"))))
                  .findings,
              "plant.name-differs-in-case"));
}

TEST_CASE("bind: references name what there is", "[plant][messages]") {
    const auto near = found(findingsWith(smallPlant(), "plant/conduits/Pipe/to", R"("Inlt")"),
                            "plant.undeclared-near");
    REQUIRE(near.size() == 1);
    CHECK_THAT(text(near.front()), ContainsSubstring("“Inlet”"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/to", R"("Somewhere else")"),
              "plant.undeclared"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/to", R"("Lake")"),
              "plant.wrong-collection"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/start/opening_pct", R"({"U2": 50})"),
              "plant.undeclared-near", "studies/Close/start/opening_pct/U2"));
    CHECK(has(findingsWith(smallPlant(), "limits/Shaft, highest/level/at", R"("Shaftt")"),
              "plant.undeclared-near"));
    CHECK(has(findingsWith(smallPlant(), "limits/Shaft, highest/level/at", R"("Foot")"),
              "plant.wrong-collection"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/second/of", R"("frist")"),
              "plant.undeclared-near"));
}

TEST_CASE("bind: tables are whole, in order and within range", "[plant][messages]") {
    const auto area = [](const char* value) {
        return findingsWith(smallPlant(), "plant/chambers/Shaft/shape/open/areaByLevel", value);
    };
    CHECK(has(area("[[82, 20]]"), "plant.table-too-short"));
    CHECK(has(area("[[82, 20], [120]]"), "plant.table-row"));
    CHECK(has(area(R"([[82, 20], [120, "x"]])"), "plant.table-row"));
    CHECK(has(area("[[82, 20], [82, 20]]"), "plant.table-order",
              "plant/chambers/Shaft/shape/open/areaByLevel/1"));
    CHECK(has(area("[[82, 20], [120, -4]]"), "plant.table-range"));
    CHECK(has(area(R"({"csv": "area.csv"})"), "plant.table-not-loaded"));
    CHECK(has(area(R"({"cvs": "area.csv"})"), "plant.mistyped"));
    std::vector<Tree> rows;
    for (int i = 0; i <= longestInlineTable; ++i) {
        rows.push_back(Tree::array({Tree::number(82 + 0.001 * i), Tree::number(20)}));
    }
    CHECK(has(bind(smallPlant().with(split("plant/chambers/Shaft/shape/open/areaByLevel"),
                                     Tree::array(rows)))
                  .findings,
              "plant.table-too-long"));
    rows.pop_back();
    CHECK(bind(smallPlant().with(split("plant/chambers/Shaft/shape/open/areaByLevel"),
                                 Tree::array(rows)))
              .usable());
}

TEST_CASE("bind: a search range holds the delay now used", "[plant][messages]") {
    const auto after = [](const char* value) {
        return findingsWith(smallPlant(), "studies/Close/events/second/after_s", value);
    };
    CHECK(after(R"({"search": [40, 100], "now": 50})").empty());
    CHECK(has(after(R"({"search": [40, 100], "now": 120})"), "plant.now-outside-search"));
    CHECK(has(after(R"({"search": [100, 40], "now": 50})"), "plant.interval-reversed"));
    CHECK(has(after(R"({"search": [40, 100]})"), "plant.missing"));
    CHECK(has(after("-1"), "plant.out-of-range"));
}

TEST_CASE("bind: places of findings come from the file", "[plant][files]") {
    const auto opened = files::openText("{\"headroom\": 1,\n \"plant\": {\n  \"points\": {\n   "
                                        "\"A\": {\"chainage_m\": 0, \"elevation_m\": \"x\"}}}}",
                                        ".", "four.json");
    const auto hits = found(opened.findings(), "plant.mistyped");
    REQUIRE(hits.size() == 1);
    REQUIRE(hits.front().place);
    CHECK(hits.front().place->file == "four.json");
    CHECK(hits.front().place->line == 4);
    CHECK(hits.front().place->column == 27);
}
