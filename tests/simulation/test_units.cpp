// SPDX-License-Identifier: GPL-3.0-or-later
// Units: rejection of an ideal turbine, and the demo plant's studies against their windows.
#include "support/catch.h"
#include "units/text.h"

#include <cmath>
#include <cstdio>

#include "plants.h"

using namespace headroom;
using namespace headroom::tests;
using plant::Collection;

namespace {

/// Head-driven unit of constant efficiency below a frictionless penstock: L 600 m, A 7 m²,
/// 250 m, 30 m³/s, 333.333 rpm, T_a 8 s, disconnected at t = 0, gate linear to shut.
Case idealRejection(plant::ConduitModel model, double closing_s, double step) {
    Case made;
    const auto intake = made.point("Intake", 0.0);
    const auto inlet = made.point("Inlet", 600.0);
    made.reservoir("Upper", intake, 250.0);
    const auto tail = made.reservoir("Tail", {}, 0.0);
    made.conduit("Penstock", intake, inlet, 600.0, 7.0, 1200.0, model);
    auto& unit =
        made.unit("Unit", inlet, tail,
                  plant::OrificeUnit{250.0, 30.0, 0.92, 333.333 * 3.14159265358979 / 30.0});
    unit.inertia_kgm2 = 444419.758;
    const auto reference = made.ref(Collection::units, "Unit");
    made.study.start.opening = {{reference, 1.0}};
    made.at(0.0, plant::RejectLoad{});
    made.at(0.0, plant::OpeningOrder{reference, {{0.0, 1.0}, {closing_s, 0.0}}});
    made.settings.longestStep_s = step;
    made.study.until_s = closing_s + 0.5;
    return made;
}

constexpr double rated_rpm = 333.333;

} // namespace

TEST_CASE("units: rejection of an ideal unit below a rigid column", "[units][analytic]") {
    // Rigid closed form, derived here: 284.982819205 m, speed ratio 1.480129523.
    const auto run = idealRejection(plant::ConduitModel::rigid, 8.0, 0.005).run();
    CHECK_THAT(channel(run, Measure::speed, unitPlace()).greatest.value,
               WithinRel(1.480129523, 1e-5));
    CHECK_THAT(valueAt(run, Measure::head, pointPlace(1), 7.0), WithinAbs(284.982819, 1e-3));
    CHECK(run.balance.worstEnergyResidual_share < 1e-10);
}

TEST_CASE("units: rejection of an ideal unit below an elastic column", "[units][analytic]") {
    // Allievi chain and quadrature, derived here, recomputed two ways. Tolerance of the list 0.1 %.
    const auto run = idealRejection(plant::ConduitModel::elastic, 8.0, 0.005).run();
    const double rows[][4] = {{1, 284.716135909, 28.013369123, 373.883539406},
                              {2, 285.004399445, 24.023611487, 409.040513217},
                              {3, 284.979295686, 20.018794533, 436.521372301},
                              {4, 284.983731925, 16.015160278, 457.786852322},
                              {6, 284.982991417, 8.007569735, 484.689991075}};
    for (const auto& row : rows) {
        CHECK_THAT(valueAt(run, Measure::head, pointPlace(1), row[0]), WithinAbs(row[1], 1e-4));
        CHECK_THAT(valueAt(run, Measure::discharge, unitPlace(), row[0]), WithinAbs(row[2], 1e-5));
        CHECK_THAT(valueAt(run, Measure::speed, unitPlace(), row[0]) * rated_rpm,
                   WithinAbs(row[3], 2e-3));
    }
    const auto& head = channel(run, Measure::head, pointPlace(1));
    CHECK_THAT(head.greatest.value, WithinAbs(285.647800, 2e-4));
    CHECK_THAT(head.greatest.time_s, WithinAbs(1.5617, 0.006));
    CHECK_THAT(channel(run, Measure::speed, unitPlace()).greatest.value,
               WithinRel(1.479995466, 1e-5));
    CHECK(run.balance.worstEnergyResidual_share < 1e-10);
    CHECK(run.balance.worstResidual_share < 1e-10);
    struct Row {
        double closing, head, speed;
    };
    for (const Row& row : {Row{6.0, 299.134731, 464.085235}, Row{12.0, 273.015061, 546.952651}}) {
        const auto other = idealRejection(plant::ConduitModel::elastic, row.closing, 0.005).run();
        CHECK_THAT(channel(other, Measure::head, pointPlace(1)).greatest.value,
                   WithinAbs(row.head, 5e-4));
        CHECK_THAT(channel(other, Measure::speed, unitPlace()).greatest.value * rated_rpm,
                   WithinAbs(row.speed, 6e-3));
    }
}

namespace {

double highest(const results::Run& run, Measure measure, const results::Place& place) {
    return channel(run, measure, place).greatest.value;
}
double lowest(const results::Run& run, Measure measure, const results::Place& place) {
    return channel(run, measure, place).least.value;
}

Case reject(double level, double output_W) {
    Case made = dorvane(level, output_W);
    made.at(10.0, plant::RejectLoad{});
    made.study.until_s = 400.0;
    return made;
}

void say(const char* what, double value) {
    std::printf("    %-46s %10.3f\n", what, value);
}

constexpr int inletPoint = 3;
/// 121.5 MW at the shaft.
constexpr double full_W = 121.5e6 * 0.985;
/// Just below what the gate allows at 488 m: 107.5 MW at the shaft.
constexpr double fullAtLowest_W = 105.8e6;
constexpr double staticHead_m = 242.0; // 512 − 270

} // namespace

TEST_CASE("units: Dorvane, full rejection", "[units][reference]") {
    // Windows of the demo's own regression; invented plant, no source.
    const auto run = reject(512.0, full_W).run();
    const double speed = highest(run, Measure::speed, unitPlace());
    const double rise = highest(run, Measure::head, pointPlace(inletPoint)) - 512.0;
    const double shaft = highest(run, Measure::level, chamberPlace());
    say("full rejection: speed 1.39 to 1.50", speed);
    say("rise 17 to 23 % of 242 m [m]", rise);
    say("shaft 530.84 +- 0.7 m", shaft);
    CHECK(speed > 1.39);
    CHECK(speed < 1.50);
    CHECK(rise / staticHead_m > 0.17);
    CHECK(rise / staticHead_m < 0.23);
    CHECK_THAT(shaft, WithinAbs(530.84, 0.7));
    CHECK(run.balance.worstResidual_share < 1e-10);
    CHECK(run.balance.worstEnergyResidual_share < 1e-10);
    CHECK(run.status.invalid.empty());
}

TEST_CASE("units: Dorvane, rejection of part loads peaks at 20 to 30 %", "[units][reference]") {
    const double loads[] = {15e6, 30e6, 45e6, 60e6, 90e6};
    double rises[5] = {};
    for (int i = 0; i < 5; ++i) {
        const auto run = reject(512.0, loads[i]).run();
        rises[i] = highest(run, Measure::head, pointPlace(inletPoint)) - 512.0;
        say("rise at 15/30/45/60/90 MW [m]", rises[i]);
        CHECK(highest(run, Measure::speed, unitPlace()) < 1.40);
    }
    for (const int i : {0, 2, 3, 4}) {
        CHECK(rises[1] > rises[i]);
    }
}

TEST_CASE("units: Dorvane, loading at the lowest reservoir", "[units][reference]") {
    struct Row {
        double over_s, least;
    };
    for (const Row& row :
         {Row{10.0, 463.7}, Row{20.0, 463.7}, Row{60.0, 465.5}, Row{120.0, 473.3}}) {
        Case made = dorvane(488.0, 0.0);
        made.at(10.0, plant::LoadOrder{made.ref(Collection::units, "Unit 1"), fullAtLowest_W,
                                       row.over_s});
        made.study.until_s = 400.0;
        const auto run = made.run();
        const double level = lowest(run, Measure::level, chamberPlace());
        say("loading in 10/20/60/120 s: shaft 463.7 … [m]", level);
        CHECK_THAT(level, WithinAbs(row.least, 0.8));
    }
}

TEST_CASE("units: Dorvane, accept then reject at the worst moment", "[units][reference]") {
    double worst = 0.0, at = 0.0, speed = 0.0;
    for (double delay = 95.0; delay <= 145.0; delay += 5.0) {
        Case made = dorvane(512.0, 0.0);
        made.at(10.0, plant::LoadOrder{made.ref(Collection::units, "Unit 1"), full_W, 20.0});
        made.at(10.0 + delay, plant::RejectLoad{});
        made.study.until_s = 400.0;
        const auto run = made.run();
        const double level = highest(run, Measure::level, chamberPlace());
        if (level > worst) {
            worst = level;
            at = delay;
            speed = highest(run, Measure::speed, unitPlace());
        }
    }
    say("accept then reject: shaft 533.4 m", worst);
    say("worst delay 105 to 135 s", at);
    say("speed 1.486", speed);
    CHECK(at >= 105.0);
    CHECK(at <= 135.0);
    CHECK_THAT(worst, WithinAbs(533.4, 0.8));
}

namespace {

/// Full load at 488 m rejected, reloaded after a delay within a ramp.
results::Run reload(double delay_s, double ramp_s, std::optional<double> notBefore_s) {
    Case made = dorvane(488.0, fullAtLowest_W);
    made.plant.units[0].interlocks.reloadNotBefore_s = notBefore_s;
    made.at(10.0, plant::RejectLoad{});
    made.at(10.0 + delay_s,
            plant::LoadOrder{made.ref(Collection::units, "Unit 1"), fullAtLowest_W, ramp_s});
    made.study.until_s = 700.0;
    return made.run();
}

} // namespace

TEST_CASE("units: Dorvane, reject then reload", "[units][reference]") {
    double worst = 1e9, at = 0.0;
    for (double delay = 80.0; delay <= 120.0; delay += 4.0) {
        const double level = lowest(reload(delay, 20.0, {}), Measure::level, chamberPlace());
        if (level < worst) {
            worst = level;
            at = delay;
        }
    }
    say("reload in 20 s: shaft 455.3 to 457.0 m", worst);
    say("worst delay, about 102 s", at);
    CHECK(worst > 455.3);
    CHECK(worst < 457.0);
    const double slow = lowest(reload(80.0, 60.0, {}), Measure::level, chamberPlace());
    say("reload in 60 s: shaft 457.6 to 459.3 m", slow);
    CHECK(slow > 457.6);
    CHECK(slow < 459.3);
    const auto inhibited = reload(102.0, 20.0, 300.0);
    const double held = lowest(inhibited, Measure::level, chamberPlace());
    say("reload in 20 s, not before 300 s: 459.8 to 461.4", held);
    CHECK(held > 459.8);
    CHECK(held < 461.4);
    bool back = false;
    for (const auto& incident : inhibited.incidents) {
        back = back || incident.message->code == "simulation.held-back";
    }
    CHECK(back);
}

TEST_CASE("units: Dorvane, two-stage closing trades pressure for speed", "[units][reference]") {
    // Gate wide open (129 MW); 8 s down to 55 %, then 14 s: −8 m for about equal speed.
    const auto wide = [](bool stages) {
        Case made = dorvane(512.0, 0.0);
        made.study.start.output_W.clear();
        made.study.start.opening = {{made.ref(Collection::units, "Unit 1"), 1.0}};
        if (stages) {
            made.plant.units[0].servo->closing_s.reset();
            made.plant.units[0].servo->closingStages = {{0.55, 8.0}, {0.0, 14.0}};
        }
        made.at(10.0, plant::RejectLoad{});
        made.study.until_s = 200.0;
        return made.run();
    };
    const auto one = wide(false);
    const auto two = wide(true);
    const double rise1 = highest(one, Measure::head, pointPlace(inletPoint)) - 512.0;
    const double rise2 = highest(two, Measure::head, pointPlace(inletPoint)) - 512.0;
    say("one stage: speed 1.515", highest(one, Measure::speed, unitPlace()));
    say("one stage: rise 49.5 m", rise1);
    say("two stages: speed 1.512", highest(two, Measure::speed, unitPlace()));
    say("two stages: rise 41.5 m", rise2);
    CHECK(rise1 - rise2 > 3.0);
    CHECK_THAT(highest(two, Measure::speed, unitPlace()),
               WithinAbs(highest(one, Measure::speed, unitPlace()), 0.02));
}

TEST_CASE("units: Dorvane, a fast rise of the set-point goes the wrong way first",
          "[units][reference]") {
    Case made = dorvane(505.0, 87.7e6);
    made.at(10.0, plant::LoadOrder{made.ref(Collection::units, "Unit 1"), 108.4e6, 4.0});
    made.study.until_s = 120.0;
    const auto run = made.run();
    const double first = valueAt(run, Measure::gridPower, unitPlace(), 11.0) - 87.7e6;
    say("power after 1 s, below zero [MW]", first * 1e-6);
    say("power after 7.5 s [MW]",
        (valueAt(run, Measure::gridPower, unitPlace(), 17.5) - 87.7e6) * 1e-6);
    CHECK(first < 0.0);
    CHECK(valueAt(run, Measure::gridPower, unitPlace(), 17.5) > 87.7e6);
}

TEST_CASE("units: what an output at a low reservoir cannot reach is said", "[units][messages]") {
    const auto made = dorvane(488.0, full_W);
    const auto model = simulation::compile(made.site, made.plant, made.study, made.settings);
    REQUIRE(model);
    const auto rest = simulation::rest(**model);
    REQUIRE(!rest);
    CHECK(rest.findings().front().message->code == "simulation.output-stopped-by-gate");
    const std::string said = text(rest.findings().front());
    std::printf("    %s\n", said.c_str());
    CHECK_THAT(said, ContainsSubstring("488"));
    CHECK_THAT(said, ContainsSubstring("105.9")); // at the terminals; 107.5 MW at the shaft
    const auto run = simulation::run(**model);
    CHECK(run.status.reason == results::EndReason::failed);
}

TEST_CASE("units: Dorvane stands still", "[units][invariant]") {
    // 1e-6 m and 1e-6 of rated flow over 100 s.
    for (const double output : {0.0, 50e6, full_W}) {
        const auto rest = dorvane(512.0, output).rest();
        CHECK(rest.residual < 1e-9);
        CHECK(rest.standsStill);
        for (const auto& finding : rest.findings) {
            std::printf("    %s\n", text(finding).c_str());
        }
    }
}
