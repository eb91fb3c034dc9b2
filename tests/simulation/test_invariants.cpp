// SPDX-License-Identifier: GPL-3.0-or-later
// What must hold without any reference: rest, balance, symmetry, limits of the chamber, order.
#include "support/catch.h"
#include "units/text.h"

#include <cmath>
#include <cstdio>
#include <random>

#include "plants.h"

using namespace headroom;
using namespace headroom::tests;
using plant::Collection;

namespace {

double levelAt(const results::Run& run, double time_s) {
    return valueAt(run, Measure::level, chamberPlace(), time_s);
}

void stop(Case& made) {
    made.at(0.0, plant::FlowOrder{made.ref(Collection::units, "Unit"), {{0.0, 0.0}, {1.0, 0.0}}});
}

} // namespace

TEST_CASE("invariants: the rest does not depend on the step", "[simulation][invariant]") {
    auto fine = dorvane(505.0, 80e6);
    auto coarse = fine;
    fine.settings.longestStep_s = 0.002;
    const auto a = fine.rest();
    const auto b = coarse.rest();
    REQUIRE(a.rows.size() == b.rows.size());
    for (std::size_t i = 0; i < a.rows.size(); ++i) {
        CHECK_THAT(a.rows[i].value,
                   WithinAbs(b.rows[i].value, 1e-9 * (1.0 + std::fabs(b.rows[i].value))));
    }
    CHECK(a.residual < 1e-9);
    CHECK(b.residual < 1e-9);
}

TEST_CASE("invariants: a run without events stays at rest for 1000 s", "[simulation][invariant]") {
    auto made = dorvane(512.0, 100e6);
    made.study.until_s = 1000.0;
    const auto run = made.run();
    for (const auto& item : run.channels) {
        if (item.measure == Measure::head || item.measure == Measure::level) {
            CHECK_THAT(item.greatest.value, WithinAbs(item.atRest, 1e-6));
            CHECK_THAT(item.least.value, WithinAbs(item.atRest, 1e-6));
        }
    }
    CHECK(run.balance.worstResidual_share < 1e-10);
}

TEST_CASE("invariants: reversed flow and mirrored levels mirror the swing",
          "[simulation][invariant]") {
    Case up = surgeCase(5.0);
    stop(up);
    up.study.until_s = 300.0;
    Case down = surgeCase(5.0);
    down.plant.units[0].turbine = plant::FlowUnit{-50.0};
    stop(down);
    down.study.until_s = 300.0;
    const auto a = up.run();
    const auto b = down.run();
    for (double t = 0.0; t < 300.0; t += 7.0) {
        CHECK_THAT(levelAt(a, t), WithinAbs(-levelAt(b, t), 1e-5));
    }
}

TEST_CASE("invariants: a pipe cut in two, or doubled in parallel, is the same pipe",
          "[simulation][invariant]") {
    const auto closing = [](int kind) {
        Case made;
        const auto intake = made.point("Intake", 0.0);
        const auto inlet = made.point("Inlet", 1200.0);
        made.reservoir("Upper", intake, 600.0);
        const auto tail = made.reservoir("Tail", {}, 0.0);
        const auto model = plant::ConduitModel::elastic;
        if (kind == 0) {
            made.conduit("Pipe", intake, inlet, 1200.0, 4.0, 1200.0, model);
        } else if (kind == 1) {
            const auto middle = made.point("Middle", 600.0);
            made.conduit("First", intake, middle, 600.0, 4.0, 1200.0, model);
            made.conduit("Second", middle, inlet, 600.0, 4.0, 1200.0, model);
        } else {
            made.conduit("Left", intake, inlet, 1200.0, 2.0, 1200.0, model);
            made.conduit("Right", intake, inlet, 1200.0, 2.0, 1200.0, model);
        }
        made.unit("Unit", inlet, tail, plant::OrificeUnit{600.0, 16.0, 1.0, {}});
        const auto unit = made.ref(Collection::units, "Unit");
        made.study.start.opening = {{unit, 1.0}};
        made.at(0.0, plant::OpeningOrder{unit, {{0.0, 1.0}, {1.7, 0.1}}});
        made.study.until_s = 20.0;
        return made.run();
    };
    const auto one = closing(0);
    const auto two = closing(1);
    const auto pair = closing(2);
    for (double t = 0.0; t < 20.0; t += 0.37) {
        const double head = valueAt(one, Measure::head, pointPlace(1), t);
        CHECK_THAT(valueAt(two, Measure::head, pointPlace(1), t), WithinAbs(head, 2e-4));
        CHECK_THAT(valueAt(pair, Measure::head, pointPlace(1), t), WithinAbs(head, 2e-4));
    }
}

TEST_CASE("invariants: limits of the chamber element", "[simulation][invariant]") {
    const auto closing = [](double area_m2, double loss) {
        Case made;
        const auto intake = made.point("Intake", 0.0);
        const auto tee = made.point("Tee", 600.0);
        const auto inlet = made.point("Inlet", 1200.0);
        made.reservoir("Upper", intake, 600.0);
        const auto tail = made.reservoir("Tail", {}, 0.0);
        made.conduit("First", intake, tee, 600.0, 4.0, 1200.0, plant::ConduitModel::elastic);
        made.conduit("Second", tee, inlet, 600.0, 4.0, 1200.0, plant::ConduitModel::elastic);
        if (area_m2 > 0.0) {
            auto& chamber = made.chamber("Chamber", tee, area_m2, 0.0, 5000.0);
            chamber.shape.throttled = true;
            chamber.shape.lossIn_s2m5 = chamber.shape.lossOut_s2m5 = loss;
        }
        made.unit("Unit", inlet, tail, plant::OrificeUnit{600.0, 16.0, 1.0, {}});
        const auto unit = made.ref(Collection::units, "Unit");
        made.study.start.opening = {{unit, 1.0}};
        made.at(0.0, plant::OpeningOrder{unit, {{0.0, 1.0}, {1.7, 0.0}}});
        made.study.until_s = 10.0;
        return made.run();
    };
    const auto none = closing(0.0, 0.0);
    const auto tiny = closing(1e-7, 0.0); // next to no water: the wave passes through
    const auto vast = closing(1e9, 0.0);  // never moves: the wave is thrown back
    const auto shut = closing(50.0, 1e9); // throttle without passage: as if it were not there
    for (double t = 0.1; t < 10.0; t += 0.31) {
        const double head = valueAt(none, Measure::head, pointPlace(2), t);
        CHECK_THAT(valueAt(tiny, Measure::head, pointPlace(2), t), WithinAbs(head, 0.05));
        CHECK_THAT(valueAt(shut, Measure::head, pointPlace(2), t), WithinAbs(head, 0.2));
        CHECK_THAT(valueAt(vast, Measure::head, pointPlace(1), t), WithinAbs(600.0, 1e-4));
    }
}

namespace {

/// Observed order from three steps: the largest change of the values at the ends of runs of several
/// lengths (ends are kept in double precision), in shares of each quantity's swing.
double orderOf(const Case& base, double step, const std::vector<double>& ends,
               const std::vector<std::pair<Measure, results::Place>>& watched) {
    double coarse = 0.0, fine = 0.0;
    for (const double end : ends) {
        std::vector<results::Run> runs;
        for (const int divide : {1, 2, 4}) {
            Case made = base;
            made.study.until_s = end;
            made.settings.longestStep_s = step;
            made.settings.refinement = divide;
            made.settings.keepTraces = made.settings.keepLines = false;
            runs.push_back(made.run());
        }
        for (const auto& [measure, place] : watched) {
            const auto& last = channel(runs[2], measure, place);
            const double scale = last.greatest.value - last.least.value;
            if (!(scale > 1e-3 * std::max(1.0, std::fabs(last.atRest)))) {
                continue; // hardly moves: its differences are rounding
            }
            const double a = channel(runs[0], measure, place).atEnd;
            const double b = channel(runs[1], measure, place).atEnd;
            coarse = std::max(coarse, std::fabs(a - b) / scale);
            fine = std::max(fine, std::fabs(b - last.atEnd) / scale);
        }
    }
    return std::log2(coarse / fine);
}

} // namespace

TEST_CASE("invariants: order two on a smooth run with governor", "[simulation][order]") {
    // A slow dip of the grid's frequency: nothing switches and no rate limit acts.
    Case made = dorvane(505.0, 80e6);
    made.site.velocityHeads = true;
    made.plant.grid = plant::ImposedGrid{50.0};
    makeTunnelRigid(made);
    made.plant.units[0].servo->cushionBelow = 0.0;
    made.plant.units[0].servo->deadTime_s = 0.0;
    plant::Rows dip;
    for (int i = 0; i <= 40000; ++i) { // rows so close that the table's kinks do not count
        const double t = 0.001 * i;
        dip.emplace_back(t, 50.0 - 0.05 * std::pow(std::sin(3.14159265358979 * t / 40.0), 4.0));
    }
    made.at(0.0, plant::ImposedFrequency{dip});
    made.study.until_s = 40.0;
    const std::vector<std::pair<Measure, results::Place>> watched{
        {Measure::opening, unitPlace()},
        {Measure::discharge, unitPlace()},
        {Measure::level, chamberPlace()},
        {Measure::head, pointPlace(3)},
        {Measure::shaftPower, unitPlace()}};
    const double order = orderOf(made, 0.04, {16.0, 40.0}, watched);
    std::printf("    order with governor %.3f\n", order);
    CHECK_THAT(order, WithinAbs(2.0, 0.1));
}

namespace {

std::string named(char kind, int number) {
    std::string name(1, kind);
    name += std::to_string(number);
    return name;
}

/// A random tree of conduits with chambers and flow units whose discharge moves smoothly.
Case randomNetwork(unsigned seed) {
    std::mt19937 random(seed);
    const auto between = [&](double low, double high) {
        return low + (high - low) * (static_cast<double>(random()) / 4294967296.0);
    };
    Case made;
    std::vector<plant::Reference> points{made.point("P0", 0.0)};
    made.reservoir("Upper", points[0], 300.0);
    const auto tail = made.reservoir("Tail", {}, 0.0);
    const int count = 3 + static_cast<int>(random() % 4);
    for (int i = 1; i <= count; ++i) {
        const std::string name = named('P', i);
        points.push_back(made.point(name, 1000.0 * i));
        const auto& from = points[random() % static_cast<unsigned>(i)];
        const bool elastic = random() % 3 != 0;
        const double area = between(4.0, 30.0);
        auto& conduit = made.conduit(
            named('C', i), from, points.back(),
            elastic ? 120.0 * (2 + static_cast<int>(random() % 8)) : between(200.0, 4000.0), area,
            1200.0, elastic ? plant::ConduitModel::elastic : plant::ConduitModel::rigid);
        conduit.reaches[0].friction = plant::DarcyFactor{between(0.01, 0.03)};
        if (random() % 2 == 0 || i == count) {
            auto& chamber = made.chamber(named('S', i), points.back(),
                                         between(20.0, 200.0), 100.0, 500.0);
            chamber.shape.throttled = true;
            chamber.shape.lossIn_s2m5 = between(0.001, 0.02);
            chamber.shape.lossOut_s2m5 = between(0.001, 0.02);
        }
    }
    for (int i = 1; i <= count; ++i) {
        if (i == count || random() % 3 == 0) {
            const double flow = between(2.0, 20.0);
            const std::string name = named('U', i);
            made.unit(name, points[static_cast<std::size_t>(i)], tail, plant::FlowUnit{flow});
            plant::Rows rows;
            const double swing = between(-0.5, 0.5) * flow, period = between(30.0, 60.0);
            for (int k = 0; k <= 6400; ++k) { // every step of every run meets a row
                const double t = 0.00625 * k;
                const double s = std::sin(3.14159265358979 * t / period);
                rows.emplace_back(t, flow + swing * s * s * s * s);
            }
            made.at(0.0, plant::FlowOrder{made.ref(Collection::units, name), rows});
        }
    }
    made.study.until_s = 40.0;
    return made;
}

} // namespace

TEST_CASE("invariants: order two on random networks", "[simulation][order]") {
    const int count = testCount(20, 200);
    double least = 9.0, greatest = 0.0, sum = 0.0;
    int outside = 0;
    for (int seed = 1; seed <= count; ++seed) {
        const Case made = randomNetwork(static_cast<unsigned>(seed));
        std::vector<std::pair<Measure, results::Place>> watched;
        for (int i = 0; i < made.plant.chambers.size(); ++i) {
            watched.push_back({Measure::level, chamberPlace(i)});
            watched.push_back({Measure::discharge, chamberPlace(i)});
        }
        for (int i = 1; i < made.plant.points.size(); ++i) {
            watched.push_back({Measure::head, pointPlace(i)});
        }
        const double order = orderOf(made, 0.025, {12.0, 24.0, 40.0}, watched);
        outside += order > 1.9 && order < 2.1 ? 0 : 1;
        least = std::min(least, order);
        greatest = std::max(greatest, order);
        sum += order;
    }
    // Where the leading errors of two places nearly cancel, three steps do not show the order; of 200
    // networks one did not. None may in the small count.
    CHECK(outside <= count / 100);
    CHECK_THAT(sum / count, WithinAbs(2.0, 0.02));
    std::printf("    %d random networks: order %.3f to %.3f, mean %.3f\n", count, least, greatest,
                sum / count);
}

TEST_CASE("invariants: volume balance is an identity in random networks",
          "[simulation][invariant]") {
    for (int seed = 100; seed < 100 + testCount(10, 200); ++seed) {
        const auto run = randomNetwork(static_cast<unsigned>(seed)).run();
        CHECK(run.balance.worstResidual_share < 1e-10);
    }
}
