// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/checks.h"
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

TEST_CASE("checks: conduits have length, corners in order, reaches to the end",
          "[plant][messages]") {
    CHECK(has(findingsWith(smallPlant(), "plant/points/Foot/chainage_m", "0"), "plant.no-length",
              "plant/conduits/Tunnel"));
    CHECK(has(findingsWith(smallPlant(), "plant/points/Foot/chainage_m", "-5"), "plant.no-length"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/axis", "[[1300, 50]]"),
              "plant.corner-outside"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/axis", "[[1150, 50], [1100, 40]]"),
              "plant.table-order"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/reaches", "{}"), "plant.no-reach",
              "plant/conduits/Pipe"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/reaches/upper/to_m", "1300"),
              "plant.reach-end"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/reaches/lower/to_m", "1150"),
              "plant.reaches-short"));
    CHECK(
        bind(smallPlant().with(split("plant/conduits/Pipe/reaches/lower/to_m"), Tree::number(1200)))
            .usable());
    CHECK(has(findingsWithout(smallPlant(), "plant/conduits/Pipe/reaches/upper/to_m"),
              "plant.reach-open"));
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Pipe/losses/bend/chainage_m", "900"),
              "plant.place-outside"));
}

TEST_CASE("checks: surveyed and drawn length agree within half a per cent", "[plant][messages]") {
    // Drawn: 1000 m across and 10 m down, 1000.05 m.
    CHECK(findingsWith(smallPlant(), "plant/conduits/Tunnel/length_m", "1005").empty());
    const auto hits = found(findingsWith(smallPlant(), "plant/conduits/Tunnel/length_m", "1005.1"),
                            "plant.length-differs");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().severity() == Severity::warning);
    CHECK(has(findingsWith(smallPlant(), "plant/conduits/Tunnel/length_m", "900"),
              "plant.length-too-short"));
}

TEST_CASE("checks: waters lie where water can be", "[plant][messages]") {
    CHECK(has(findingsWith(smallPlant(), "plant/reservoirs/Lake/level_m", "89"),
              "plant.level-below-intake"));
    CHECK(has(findingsWith(smallPlant(), "plant/reservoirs/Lake/lowest_m", "89"),
              "plant.level-below-intake", "plant/reservoirs/Lake/lowest_m"));
    CHECK(has(findingsWith(smallPlant(), "plant/reservoirs/Lake/level_m", "102"),
              "plant.level-outside"));
    CHECK(has(findingsWith(smallPlant(), "plant/chambers/Shaft/shape",
                           R"({"open": {"diameter_m": 5, "floor_m": 120, "rim_m": 82}})"),
              "plant.floor-above-rim"));
    CHECK(has(findingsWith(smallPlant(), "plant/chambers/Shaft/shape",
                           R"({"open": {"diameter_m": 5, "floor_m": 79, "rim_m": 120}})"),
              "plant.floor-below-axis"));
    const auto offPoint = smallPlant().with(
        split("plant/points/Off"), support::json(R"({"chainage_m": 9, "elevation_m": 9})"));
    CHECK(has(bind(offPoint.with(split("plant/chambers/Shaft/at"), Tree::text("Off"))).findings,
              "plant.not-on-conduit", "plant/chambers/Shaft/at"));
    CHECK(has(bind(offPoint).findings, "plant.unused-point", "plant/points/Off"));
    CHECK(bind(offPoint).usable());
}

TEST_CASE("checks: the network hangs together", "[plant][messages]") {
    const auto pond =
        found(findingsWith(smallPlant(), "plant/reservoirs/Pond", R"({"level_m": 5})"),
              "plant.unused-reservoir");
    REQUIRE(pond.size() == 1);
    CHECK(pond.front().severity() == Severity::note);
    const auto offPoint = smallPlant().with(
        split("plant/points/Off"), support::json(R"({"chainage_m": 9, "elevation_m": 9})"));
    CHECK(has(bind(offPoint.with(split("plant/units/U1/from"), Tree::text("Off"))).findings,
              "plant.unit-not-connected", "plant/units/U1/from"));
    const auto apart =
        offPoint
            .with(split("plant/points/Far"),
                  support::json(R"({"chainage_m": 90, "elevation_m": 9})"))
            .with(
                split("plant/conduits/Dry"),
                support::json(
                    R"({"from": "Off", "to": "Far", "reaches": {"r": {"diameter_m": 1, "darcy": 0.01, "waveSpeed_mps": 1000}}})"));
    const auto hits = found(bind(apart).findings, "plant.disconnected");
    REQUIRE(hits.size() == 1);
    CHECK(hits.front().subject == "plant/conduits/Dry");
    CHECK(has(bind(support::json(R"({"headroom": 1, "plant": {}})")).findings, "plant.empty"));
}

TEST_CASE("checks: GD² entered as J is asked about", "[plant][messages]") {
    // Demo A of the trade: clerks wrote GD² = 2 800 t·m² where J = 700 t·m² belongs.
    const auto hits = found(findingsWith(dorvane(), "plant/units/U1/inertia/j_tm2", "2800"),
                            "plant.inertia-is-gd2");
    REQUIRE(hits.size() >= 1);
    CHECK(hits.front().severity() == Severity::warning);
    CHECK_THAT(text(hits.front()), ContainsSubstring("700.0"));
    CHECK_FALSE(has(findingsWith(dorvane(), "plant/units/U1/inertia/j_tm2", "910"),
                    "plant.inertia-unusual"));
    CHECK(has(findingsWith(dorvane(), "plant/units/U1/inertia/j_tm2", "70"),
              "plant.inertia-unusual"));
}

TEST_CASE("checks: the inertia trend of built machines", "[plant][reference]") {
    // Three machines of common practice, no source: 135 MVA at 333.33 rpm 722 t·m², 95 MVA at
    // 500 rpm 218 t·m², 105 MVA at 250 rpm 905 t·m².
    const auto trend = [](double rated_MVA, double speed_rpm) {
        return usualInertia_kgm2(rated_MVA * 1e6, toSi(Quantity::rotation, speed_rpm)) / 1e3;
    };
    CHECK_THAT(trend(135, 333.33), WithinRel(722.0, 0.003));
    CHECK_THAT(trend(95, 500), WithinRel(218.0, 0.003));
    CHECK_THAT(trend(105, 250), WithinRel(905.0, 0.003));
}

TEST_CASE("checks: units are complete for what they are", "[plant][messages]") {
    CHECK(has(findingsWithout(dorvane(), "plant/units/U1/inertia"), "plant.turning-needs",
              "plant/units/U1"));
    CHECK(has(findingsWith(dorvane(), "plant/units/U1/turbine/francis/ratedPower_MW", "140"),
              "plant.power-not-rated"));
    const auto staged = dorvane()
                            .without(split("plant/units/U1/servo/closing_s"))
                            .with(split("plant/units/U1/servo/closingStages"),
                                  support::json("[[50, 8], [10, 12]]"));
    CHECK(has(bind(staged).findings, "plant.stage-not-to-closed"));
}

TEST_CASE("checks: events happen, once, before the end", "[plant][messages]") {
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/first/at_s", "201"),
              "plant.event-after-end", "studies/Close/events/first"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/second/after_s", "196"),
              "plant.event-after-end", "studies/Close/events/second"));
    const auto circle = smallPlant().with(
        split("studies/Close/events/first"),
        support::json(
            R"({"after_s": 1, "of": "second", "opening": {"unit": "U1", "opening": [[0, 1], [1, 0]]}})"));
    const auto hits = found(bind(circle).findings, "plant.event-circle");
    REQUIRE(hits.size() == 1);
    CHECK_THAT(text(hits.front()), ContainsSubstring("first") && ContainsSubstring("second"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/second/of", R"("second")"),
              "plant.event-circle"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/first", R"({"at_s": 1})"),
              "plant.missing-form"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/first",
                           R"({"at_s": 1, "lossOfGeneration": {"power_MW": 5}})"),
              "plant.wrong-event"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/events/first",
                           R"({"at_s": 1, "flow": {"unit": "U1", "flow": [[0, 1], [1, 0]]}})"),
              "plant.wrong-event"));
}

TEST_CASE("checks: starts lie within the plant", "[plant][messages]") {
    CHECK(has(findingsWith(smallPlant(), "studies/Close/start/levels_m", R"({"Lake": 102})"),
              "plant.start-outside"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/start/levels_m", R"({"Lake": 80})"),
              "plant.level-below-intake", "studies/Close/start/levels_m/Lake"));
    CHECK(
        has(findingsWith(smallPlant(), "studies/Close/start/chamberLevels_m", R"({"Shaft": 121})"),
            "plant.chamber-outside"));
    CHECK(has(findingsWith(smallPlant(), "studies/Close/start/output_MW", R"({"U1": 3})"),
              "plant.output-twice"));
}

TEST_CASE("checks: limits have values in order, and an owner", "[plant][messages]") {
    const auto level = [](const char* value) {
        return findingsWith(smallPlant(), "limits/Shaft, highest/level", value);
    };
    CHECK(has(level(R"({"at": "Shaft"})"), "plant.limit-without-value", "limits/Shaft, highest"));
    CHECK(has(level(R"({"at": "Shaft", "max_m": {}})"), "plant.limit-without-value"));
    CHECK(has(level(R"({"at": "Shaft", "min_m": {"normal": 110}, "max_m": {"normal": 100}})"),
              "plant.least-above-greatest"));
    const auto order = found(level(R"({"at": "Shaft", "max_m": {"normal": 118, "extreme": 117}})"),
                             "plant.class-order");
    REQUIRE(order.size() == 1);
    CHECK(order.front().severity() == Severity::warning);
    CHECK(has(level(R"({"at": "Shaft", "min_m": {"normal": 84, "extreme": 85}})"),
              "plant.class-order"));
    CHECK(level(R"({"at": "Shaft", "min_m": {"normal": 85, "extreme": 84}})").empty());
    const auto nobody = found(findingsWithout(smallPlant(), "limits/Shaft, highest/source"),
                              "plant.unsigned-limit");
    REQUIRE(nobody.size() == 1);
    CHECK(nobody.front().severity() == Severity::note);
    CHECK(has(
        findingsWith(
            smallPlant(), "limits/Far",
            R"({"head": {"at": {"conduit": "Pipe", "chainage_m": 900}, "max_m": {"normal": 150}}})"),
        "plant.place-outside", "limits/Far/head/at/chainage_m"));
    CHECK(has(
        findingsWith(
            smallPlant(), "limits/Two",
            R"({"head": {"at": "Foot", "max_m": {"normal": 150}}, "level": {"at": "Shaft", "max_m": {"normal": 150}}})"),
        "plant.two-kinds"));
}

TEST_CASE("checks: every finding names something that can exist", "[plant][invariant]") {
    // Paths in checks are written by hand; a wrong one would point nowhere.
    const auto tree =
        smallPlant()
            .with(split("plant/conduits/Tunnel/length_m"), Tree::number(10))
            .with(split("plant/conduits/Pipe/axis"), support::json("[[1300, 5]]"))
            .with(split("plant/conduits/Pipe/losses/bend/chainage_m"), Tree::number(0))
            .with(split("plant/conduits/Pipe/reaches/upper/to_m"), Tree::number(5))
            .with(split("plant/reservoirs/Lake/level_m"), Tree::number(10))
            .with(split("plant/chambers/Shaft/shape"),
                  support::json(R"({"open": {"diameter_m": 5, "floor_m": 70, "rim_m": 60}})"))
            .with(
                split("studies/Close/start"),
                support::json(
                    R"({"levels_m": {"Lake": 1}, "opening_pct": {"U1": 5}, "output_MW": {"U1": 5}, "chamberLevels_m": {"Shaft": 1}})"))
            .with(split("studies/Close/events/first/at_s"), Tree::number(300));
    const auto findings = bind(tree).findings;
    CHECK(findings.size() > 9);
    for (const auto& finding : findings) {
        INFO(text(finding));
        CHECK(fieldAt(split(finding.subject)) != nullptr);
    }
}
