// SPDX-License-Identifier: GPL-3.0-or-later
// How a run behaves: cancelling, same bits, what it keeps, events, what it says when it leaves its
// range.
#include "simulation/messages.h"
#include "support/catch.h"
#include "units/text.h"

#include <chrono>
#include <cmath>
#include <cstdio>
#include <cstring>
#include <set>
#include <thread>

#include "plants.h"

using namespace headroom;
using namespace headroom::tests;
using plant::Collection;

namespace {

Case rejected(double until_s) {
    Case made = dorvane(512.0, 100e6);
    made.at(2.0037, plant::RejectLoad{}); // inside a step
    made.study.until_s = until_s;
    return made;
}

std::shared_ptr<const simulation::Model> compiled(const Case& made) {
    auto model = simulation::compile(made.site, made.plant, made.study, made.settings);
    REQUIRE(model);
    return *model;
}

bool sameBits(double a, double b) {
    return std::memcmp(&a, &b, sizeof a) == 0;
}

bool sameRun(const results::Run& a, const results::Run& b) {
    bool same = a.channels.size() == b.channels.size();
    for (std::size_t i = 0; same && i < a.channels.size(); ++i) {
        const auto& x = a.channels[i];
        const auto& y = b.channels[i];
        same = sameBits(x.atEnd, y.atEnd) && sameBits(x.least.value, y.least.value)
               && sameBits(x.greatest.value, y.greatest.value)
               && sameBits(x.greatest.time_s, y.greatest.time_s)
               && x.trace.last.size() == y.trace.last.size()
               && std::memcmp(x.trace.last.data(), y.trace.last.data(),
                              x.trace.last.size() * sizeof(float))
                      == 0;
    }
    for (std::size_t i = 0; same && i < a.envelopes.size(); ++i) {
        for (std::size_t k = 0; same && k < a.envelopes[i].least_m.size(); ++k) {
            same = sameBits(a.envelopes[i].least_m[k], b.envelopes[i].least_m[k])
                   && sameBits(a.envelopes[i].greatest_m[k], b.envelopes[i].greatest_m[k]);
        }
    }
    return same;
}

} // namespace

TEST_CASE("run: a 10-hour run is cancelled within 0.2 s", "[simulation][run]") {
    Case made = rejected(36000.0);
    made.settings.keepTraces = false;
    made.settings.keepLines = false;
    const auto model = compiled(made);
    double longest = 0.0;
    for (int i = 0; i < 10; ++i) {
        std::stop_source source;
        results::Run run;
        std::thread worker([&] { run = simulation::run(*model, source.get_token()); });
        std::this_thread::sleep_for(std::chrono::milliseconds(20 + 17 * ((i * 7) % 10)));
        const auto asked = std::chrono::steady_clock::now();
        source.request_stop();
        worker.join();
        const std::chrono::duration<double> waited = std::chrono::steady_clock::now() - asked;
        longest = std::max(longest, waited.count());
        CHECK(run.status.reason == results::EndReason::cancelled);
        CHECK(run.status.reached_s < 36000.0);
    }
    std::printf("    longest answer to a stop request: %.1f ms\n", 1e3 * longest);
    CHECK(longest < 0.2);
}

TEST_CASE("run: a cancelled run keeps what it has", "[simulation][run]") {
    const auto model = compiled(rejected(3600.0));
    std::stop_source source;
    const auto run = simulation::run(*model, source.get_token(), [&](double share) {
        if (share > 0.002) {
            source.request_stop();
        }
    });
    CHECK(run.status.reason == results::EndReason::cancelled);
    CHECK(run.status.reached_s > 0.0);
    CHECK(!run.channels.empty());
    CHECK(!run.channels.front().trace.last.empty());
}

TEST_CASE("run: the same bits for any instruction set and any thread", "[simulation][run]") {
    Case made = rejected(60.0);
    std::vector<results::Run> runs;
    for (const char* set : {"baseline", "avx2", "avx512"}) {
        made.settings.instructions = set;
        runs.push_back(made.run());
    }
    made.settings.instructions.clear();
    const auto model = compiled(made);
    std::vector<results::Run> others(4);
    std::vector<std::thread> threads;
    for (auto& other : others) {
        threads.emplace_back([&] { other = simulation::run(*model); });
    }
    for (auto& thread : threads) {
        thread.join();
    }
    for (const auto& run : runs) {
        CHECK(sameRun(runs.front(), run));
    }
    for (const auto& run : others) {
        CHECK(sameRun(runs.front(), run));
    }
}

TEST_CASE("run: recorded intervals lose no peak", "[simulation][run]") {
    Case made = rejected(400.0);
    const auto run = made.run();
    CHECK(run.recordInterval_s > 1.5 * run.resolution.step_s); // several steps an interval
    for (const auto& item : run.channels) {
        REQUIRE(!item.trace.last.empty());
        CHECK(item.trace.last.size() <= 30001);
        float low = item.trace.low.front(), high = item.trace.high.front();
        for (std::size_t i = 0; i < item.trace.last.size(); ++i) {
            low = std::min(low, item.trace.low[i]);
            high = std::max(high, item.trace.high[i]);
        }
        // Traces are single precision; a pressure head is a difference of two such numbers.
        const double rounding = 1e-6 * std::max(600.0, std::fabs(item.greatest.value));
        CHECK_THAT(static_cast<double>(low), WithinAbs(item.least.value, rounding));
        CHECK_THAT(static_cast<double>(high), WithinAbs(item.greatest.value, rounding));
        CHECK(item.greatest.around[2] == item.greatest.value);
        CHECK(item.least.around[2] == item.least.value);
    }
    for (const auto& envelope : run.envelopes) {
        CHECK(envelope.chainage_m.size() <= 45);
        CHECK(envelope.line_m.size() % envelope.chainage_m.size() == 0);
        CHECK(envelope.line_m.size() / envelope.chainage_m.size() <= 2001);
        for (std::size_t i = 0; i < envelope.rest_m.size(); ++i) {
            CHECK(envelope.least_m[i] <= envelope.rest_m[i] + 1e-9);
            CHECK(envelope.greatest_m[i] >= envelope.rest_m[i] - 1e-9);
        }
    }
}

TEST_CASE("run: the instant of a trip inside a step counts", "[simulation][run]") {
    // Peak speed as a function of the trip's instant must not step with the grid of the run.
    const auto peak = [](double time_s, int refinement) {
        Case made = dorvane(512.0, 100e6);
        made.at(time_s, plant::RejectLoad{});
        made.study.until_s = 30.0;
        made.settings.refinement = refinement;
        return channel(made.run(), Measure::speed, unitPlace()).greatest;
    };
    const auto coarse = peak(2.0037, 1);
    const auto fine = peak(2.0037, 8);
    CHECK_THAT(coarse.value, WithinAbs(fine.value, 1e-5));
    CHECK_THAT(coarse.time_s, WithinAbs(fine.time_s, 0.02));
}

TEST_CASE("run: loss of generation moves the area and the governor answers", "[simulation][run]") {
    // Initial rate f₀ΔP/(2E_k): 50·650/(2·45 000) = 0.36 Hz/s; definition.
    Case made = dorvane(505.0, 87.7e6);
    made.at(10.0, plant::LossOfGeneration{650e6});
    made.study.until_s = 60.0;
    const auto run = made.run();
    CHECK_THAT(channel(run, Measure::frequencyRate, {results::Thing::grid, -1, 0.0}).least.value,
               WithinRel(-0.36, 0.03));
    CHECK(channel(run, Measure::opening, unitPlace()).greatest.value
          > channel(run, Measure::opening, unitPlace()).atRest + 0.02);
    CHECK(channel(run, Measure::frequency, {results::Thing::grid, -1, 0.0}).least.value < 49.8);
}

TEST_CASE("run: a study may impose a frequency on an area", "[simulation][run]") {
    Case made = dorvane(505.0, 87.7e6);
    made.at(5.0, plant::ImposedFrequency{{{0.0, 50.0}, {5.0, 49.8}, {20.0, 49.8}}});
    made.study.until_s = 30.0;
    const auto run = made.run();
    const results::Place grid{results::Thing::grid, -1, 0.0};
    CHECK_THAT(valueAt(run, Measure::frequency, grid, 20.0), WithinAbs(49.8, 1e-4));
    CHECK_THAT(valueAt(run, Measure::frequency, grid, 7.5), WithinAbs(49.9, 1e-3));
    CHECK_THAT(valueAt(run, Measure::speed, unitPlace(), 25.0), WithinAbs(0.996, 1e-4));
}

TEST_CASE("run: a stuck gate runs the unit away", "[simulation][run]") {
    Case made = dorvane(512.0, 119.7e6);
    made.at(9.0, plant::GateStuck{made.ref(Collection::units, "Unit 1")});
    made.at(10.0, plant::RejectLoad{});
    made.study.until_s = 120.0;
    const auto run = made.run();
    CHECK_THAT(channel(run, Measure::opening, unitPlace()).atEnd,
               WithinAbs(channel(run, Measure::opening, unitPlace()).atRest, 1e-9));
    CHECK(channel(run, Measure::speed, unitPlace()).greatest.value > 1.6);
    CHECK(channel(run, Measure::speed, unitPlace()).greatest.value < 1.9);
}

TEST_CASE("run: overspeed protection shuts the unit down", "[simulation][run]") {
    Case made = dorvane(512.0, 100e6);
    made.plant.units[0].protection.overspeed_pu = 1.2;
    made.at(5.0, plant::RejectLoad{});
    made.study.until_s = 200.0;
    const auto run = made.run();
    bool said = false;
    for (const auto& incident : run.incidents) {
        said = said || incident.message == &simulation::overspeedTrip;
    }
    CHECK(said);
    CHECK_THAT(channel(run, Measure::opening, unitPlace()).atEnd, WithinAbs(0.0, 1e-12));
}

TEST_CASE("run: chambers that fill or empty end what is valid", "[simulation][run]") {
    for (const bool full : {true, false}) {
        Case made = surgeCase(5.0);
        made.plant.chambers[0].shape.areaByLevel = full
                                                       ? plant::Rows{{-35.0, 100.0}, {10.0, 100.0}}
                                                       : plant::Rows{{-10.0, 100.0}, {60.0, 100.0}};
        made.at(0.0,
                plant::FlowOrder{made.ref(Collection::units, "Unit"), {{0.0, 0.0}, {1.0, 0.0}}});
        made.study.until_s = 250.0;
        const auto run = made.run();
        REQUIRE(run.status.invalid.size() == 1);
        const auto& invalid = run.status.invalid.front();
        CHECK(invalid.why.message == (full ? &simulation::chamberFull : &simulation::chamberEmpty));
        const double reached = valueAt(run, Measure::level, chamberPlace(), invalid.from_s);
        CHECK_THAT(reached, WithinAbs(full ? 10.0 : -10.0, 0.1));
        CHECK(run.status.reason == results::EndReason::completed);
    }
}

TEST_CASE("run: boiling water along a conduit is found", "[simulation][run]") {
    Case made;
    const auto intake = made.point("Intake", 0.0, 0.0);
    const auto inlet = made.point("Inlet", 1200.0, 0.0);
    made.reservoir("Upper", intake, 60.0);
    const auto tail = made.reservoir("Tail", {}, 0.0);
    made.conduit("Pipe", intake, inlet, 1200.0, 4.0, 1200.0, plant::ConduitModel::elastic);
    made.unit("Unit", inlet, tail, plant::OrificeUnit{60.0, 4.0, 1.0, {}});
    const auto unit = made.ref(Collection::units, "Unit");
    made.study.start.opening = {{unit, 1.0}};
    made.at(1.0, plant::OpeningOrder{unit, {{0.0, 1.0}, {0.5, 0.0}}});
    made.study.until_s = 8.0;
    const auto run = made.run();
    REQUIRE(run.status.invalid.size() == 1);
    const auto& invalid = run.status.invalid.front();
    CHECK(invalid.why.message == &simulation::boilsInConduit);
    // The negative wave leaves the shut gate 2 s after the closing began, at the latest at 3.5 s.
    CHECK(invalid.from_s > 2.0);
    CHECK(invalid.from_s < 3.6);
    CHECK(invalid.stillValid.size() == 4);
}

TEST_CASE("run: short conduits keep their storage and a long one is not stretched",
          "[simulation][run]") {
    Case made = dorvane(512.0, 100e6);
    made.plant.conduits[1].length_m = 10.0; // 8 ms
    made.study.until_s = 1.0;
    const auto run = made.run();
    CHECK(run.resolution.cellsByConduit[1] == 0);
    CHECK(run.resolution.cellsByConduit[0] > 400);
    for (const double stretch : run.resolution.stretchByConduit) {
        CHECK(std::fabs(stretch) <= 0.005 + 1e-9);
    }
    bool said = false;
    for (const auto& note : run.resolution.notes) {
        said = said || note.message == &simulation::shortElementChosen;
    }
    CHECK(said);
    Case finer = made;
    finer.settings.refinement = 3;
    const auto repeat = finer.run();
    CHECK(repeat.resolution.cellsByConduit[1] == 0); // the choice stays
    CHECK(repeat.resolution.cellsByConduit[0] == 3 * run.resolution.cellsByConduit[0]);
    CHECK_THAT(repeat.resolution.step_s, WithinRel(run.resolution.step_s / 3.0, 1e-12));
}

TEST_CASE("run: a plant without an answer ends with the place and the time", "[simulation][run]") {
    // Constant power while the reservoir runs dry: the less head, the more water it asks for.
    Case made;
    const auto intake = made.point("Intake", 0.0, 0.0);
    const auto tee = made.point("Tee", 1000.0, 0.0);
    made.reservoir("Upper", intake, 100.0);
    const auto tail = made.reservoir("Tail", {}, 0.0);
    made.conduit("Pipe", intake, tee, 1000.0, 10.0, 1200.0, plant::ConduitModel::rigid);
    made.chamber("Chamber", tee, 5.0, -500.0, 200.0);
    made.unit("Unit", tee, tail, plant::PowerUnit{1000.0 * 9.81 * 10.0 * 100.0});
    made.at(1.0, plant::LevelOrder{made.ref(Collection::reservoirs, "Upper"),
                                   {{0.0, 100.0}, {5.0, -50.0}}});
    made.study.until_s = 200.0;
    const auto model = compiled(made);
    const auto run = simulation::run(*model);
    REQUIRE(run.status.reason == results::EndReason::failed);
    REQUIRE(run.status.why.has_value());
    CHECK(run.status.why->message == &simulation::clusterUnsolved);
    REQUIRE(run.status.why->time_s.has_value());
    CHECK(*run.status.why->time_s > 1.0);
    CHECK(!run.status.why->related.empty());
    for (const auto& item : run.channels) {
        CHECK(std::isfinite(item.atEnd));
    }
}

TEST_CASE("run: faults of a study are said with their place", "[simulation][messages]") {
    const auto codeOf = [](const Case& made) {
        const auto model = simulation::compile(made.site, made.plant, made.study, made.settings);
        REQUIRE(!model);
        return std::string(model.findings().front().message->code);
    };
    Case flow = dorvane(512.0, 50e6);
    flow.at(0.0, plant::FlowOrder{flow.ref(Collection::units, "Unit 1"), {{0.0, 1.0}, {1.0, 2.0}}});
    CHECK(codeOf(flow) == "simulation.flow-needs-flow-unit");
    Case both = dorvane(512.0, 50e6);
    both.study.start.opening = {{both.ref(Collection::units, "Unit 1"), 0.5}};
    CHECK(codeOf(both) == "simulation.output-and-opening");
    Case loop = dorvane(512.0, 50e6);
    plant::Event event;
    event.kind = plant::RejectLoad{};
    event.time.after_s = 1.0;
    event.time.of = {"itself", Collection::events, 0};
    loop.study.events.add("itself", event);
    CHECK(codeOf(loop) == "simulation.event-without-time");
    Case two = dorvane(512.0, 50e6);
    two.reservoir("Second", two.ref(Collection::points, "Intake"), 500.0);
    CHECK(codeOf(two) == "simulation.two-reservoirs");
    Case chart = dorvane(512.0, 50e6);
    std::get<plant::FrancisTurbine>(chart.plant.units[0].turbine).ratedPower_W = 190e6;
    const auto refused = simulation::compile(chart.site, chart.plant, chart.study, chart.settings);
    REQUIRE(!refused);
    CHECK_THAT(refused.findings().front().subject, ContainsSubstring("Unit 1"));
}

TEST_CASE("run: messages of this floor are complete", "[simulation][messages]") {
    std::set<std::string> codes;
    for (const Message* message : simulation::messages()) {
        CHECK(codes.insert(std::string(message->code)).second);
        CHECK(!message->what.empty());
        CHECK((message->severity == Severity::note || !message->mend.empty()));
        CHECK(std::string(message->code).rfind("simulation.", 0) == 0);
    }
}
