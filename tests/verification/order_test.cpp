// SPDX-License-Identifier: GPL-3.0-or-later
// Order of the whole scheme, measured on the product: the step and every cell divided by 1, 2, 4.
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <random>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using plant::Collection;
using tests::chamberPlace;
using tests::pointPlace;
using tests::unitPlace;

namespace {

using Watched = std::vector<std::pair<Measure, results::Place>>;

const double pi = std::acos(-1.0);

/// sin⁴ has three steady derivatives where it starts and ends.
double bump(double time_s, double period_s) {
    const double s = std::sin(pi * time_s / period_s);
    return s * s * s * s;
}

/// Log2 of the ratio of the differences between the three runs, each the root of the mean square
/// over the instants, in shares of the range the quantity runs through.
struct Order {
    double value = 0.0;
    double range = 0.0;  ///< that the quantity runs through
    double finest = 0.0; ///< difference between the two finest, share of range
};
Order orderOf(const Case& base, const std::pair<Measure, results::Place>& what,
              const std::vector<Course>& runs) {
    (void)base;
    const auto channel = runs[0].find(what.first, what.second);
    double coarse = 0.0, fine = 0.0, low = 1e300, high = -1e300;
    const std::size_t count = runs[0].rows.size();
    for (std::size_t i = 0; i < count; ++i) {
        const double a = runs[0].rows[i][channel], b = runs[1].rows[i][channel];
        const double c = runs[2].rows[i][channel];
        coarse += (a - b) * (a - b);
        fine += (b - c) * (b - c);
        low = std::min(low, c);
        high = std::max(high, c);
    }
    const double range = high - low;
    return {0.5 * std::log2(coarse / fine), range,
            std::sqrt(fine / static_cast<double>(count)) / std::max(1e-12, range)};
}

std::vector<Course> threeRuns(const Case& base, double step_s) {
    std::vector<Course> runs;
    for (const int divide : {1, 2, 4}) {
        Case made = base;
        made.settings.longestStep_s = step_s;
        made.settings.refinement = divide;
        runs.push_back(course(made, divide));
        REQUIRE_THAT(runs.back().step_s, WithinRel(runs.front().step_s, 1e-12));
    }
    return runs;
}

} // namespace

TEST_CASE("Order: a smooth run with governor is of second order", "[verification][order]") {
    // A slow dip of the grid's frequency: nothing switches, no rate limit acts. Order 2.0 ± 0.1.
    for (const bool elastic : {false, true}) {
        Case made = tests::dorvane(505.0, 80e6);
        made.plant.grid = plant::ImposedGrid{50.0};
        if (!elastic) {
            tests::makeTunnelRigid(made);
            for (auto& conduit : made.plant.conduits) {
                conduit.second.model = plant::ConduitModel::rigid;
            }
        }
        made.plant.units[0].servo->cushionBelow = 0.0;
        made.plant.units[0].servo->deadTime_s = 0.0;
        made.study.until_s = 40.0;
        plant::Rows dip; // a row at every step of the finest run and more
        for (int i = 0; i <= 40000; ++i) {
            dip.emplace_back(0.001 * i, 50.0 - 0.5 * bump(0.001 * i, 40.0));
        }
        made.at(0.0, plant::ImposedFrequency{dip});
        const auto runs = threeRuns(made, 0.04);
        const std::pair<const char*, std::pair<Measure, results::Place>> watched[] = {
            {"level", {Measure::level, chamberPlace()}},
            {"flow", {Measure::discharge, unitPlace()}},
            {"speed", {Measure::speed, unitPlace()}},
            {"opening", {Measure::opening, unitPlace()}},
            {"head", {Measure::head, pointPlace(3)}}};
        for (const auto& [name, what] : watched) {
            const auto order = orderOf(made, what, runs);
            std::printf("    %s waterway, %-8s order %.3f, finest difference %.1e of range\n",
                        elastic ? "elastic" : "rigid", name, order.value, order.finest);
            hold(std::string("order with governor, ") + name, order.value, 2.0, 0.1);
        }
    }
}

namespace {

/// Repeatable numbers, the same on every machine.
class Dice {
public:
    explicit Dice(unsigned seed) : random_(seed) {}
    double between(double low, double high) {
        return low + (high - low) * (static_cast<double>(random_()) / 4294967296.0);
    }
    unsigned below(unsigned count) { return static_cast<unsigned>(random_()) % count; }

private:
    std::mt19937 random_;
};

/// "C", 3 as "C3". (The sum of a literal and a short text trips a false warning of GCC 12.)
std::string named(const char* kind, int number) {
    std::string name(kind);
    name += std::to_string(number);
    return name;
}

void addConduit(Case& made, Dice& dice, int i, const plant::Reference& from,
                const plant::Reference& to) {
    const bool elastic = dice.below(3) != 0;
    const double length_m = elastic ? 120.0 * (2 + dice.below(8)) : dice.between(200.0, 4000.0);
    auto& conduit =
        made.conduit(named("C", i), from, to, length_m, dice.between(4.0, 30.0), 1200.0,
                     elastic ? plant::ConduitModel::elastic : plant::ConduitModel::rigid);
    conduit.reaches[0].friction = plant::DarcyFactor{dice.between(0.01, 0.03)};
}

/// A random network: a tree of conduits, now and then a loop, chambers, and discharges and a
/// reservoir level that move smoothly. Steps of 0.05 s divide every elastic conduit
/// into four cells at least.
Case randomNetwork(unsigned seed) {
    Dice dice(seed);
    Case made;
    std::vector<plant::Reference> points{made.point("P0", 0.0)};
    made.reservoir("Upper", points[0], 0.0);
    const auto tail = made.reservoir("Tail", {}, -300.0);
    const int count = 3 + static_cast<int>(dice.below(4));
    for (int i = 1; i <= count; ++i) {
        points.push_back(made.point(named("P", i), 1000.0 * i, -200.0));
        addConduit(made, dice, i, points[dice.below(static_cast<unsigned>(i))], points.back());
        if (dice.below(2) == 0 || i == count) {
            auto& chamber =
                made.chamber(named("S", i), points.back(), dice.between(20.0, 200.0), -150.0, 60.0);
            chamber.shape.throttled = true;
            chamber.shape.lossIn_s2m5 = dice.between(0.001, 0.02);
            chamber.shape.lossOut_s2m5 = dice.between(0.001, 0.02);
        }
    }
    if (dice.below(3) == 0) { // a loop
        addConduit(made, dice, count + 1, points[1], points.back());
    }
    for (int i = 1; i <= count; ++i) {
        if (i != count && dice.below(3) != 0) {
            continue;
        }
        const std::string name = named("U", i);
        const double flow = dice.between(2.0, 20.0), move = dice.between(-0.5, 0.5) * flow;
        const double period_s = dice.between(30.0, 60.0);
        made.unit(name, points[static_cast<std::size_t>(i)], tail, plant::FlowUnit{flow});
        plant::Rows rows;
        for (int k = 0; k <= 2400; ++k) {
            rows.emplace_back(0.0125 * k, flow + move * bump(0.0125 * k, period_s));
        }
        made.at(0.0, plant::FlowOrder{made.ref(Collection::units, name), rows});
    }
    plant::Rows levels;
    const double rise_m = dice.between(-3.0, 3.0), period_s = dice.between(30.0, 60.0);
    for (int k = 0; k <= 2400; ++k) {
        levels.emplace_back(0.0125 * k, rise_m * bump(0.0125 * k, period_s));
    }
    made.at(0.0, plant::LevelOrder{made.ref(Collection::reservoirs, "Upper"), levels});
    made.study.until_s = 30.0;
    return made;
}

} // namespace

TEST_CASE("Order: random networks are of second order", "[verification][order]") {
    const int count = testCount(20, 400);
    double least = 9.0, greatest = 0.0, sum = 0.0;
    int figures = 0;
    for (int seed = 1; seed <= count; ++seed) {
        const Case made = randomNetwork(static_cast<unsigned>(seed));
        const auto runs = threeRuns(made, 0.05);
        CAPTURE(seed);
        hold("H103 balance of random networks, share", made.run().balance.worstResidual_share, 0.0,
             1e-10); // an identity of the scheme
        Watched watched;
        for (int i = 0; i < made.plant.chambers.size(); ++i) {
            watched.push_back({Measure::level, chamberPlace(i)});
        }
        for (int i = 0; i < made.plant.conduits.size(); ++i) {
            const auto& conduit = made.plant.conduits[i];
            watched.push_back(
                {Measure::discharge,
                 {results::Thing::conduit, i, made.plant.points[conduit.from.index].chainage_m}});
        }
        for (const auto& what : watched) {
            const auto order = orderOf(made, what, runs);
            if (order.range < 1e-6 || order.finest < 1e-10) {
                continue; // a dead end, or as prescribed: nothing differs but by rounding
            }
            CAPTURE(seed, static_cast<int>(what.first), what.second.index, order.range,
                    order.finest);
            hold("order of random networks", order.value, 2.0, 0.1);
            least = std::min(least, order.value);
            greatest = std::max(greatest, order.value);
            sum += order.value;
            ++figures;
        }
    }
    REQUIRE(figures > count);
    std::printf("    %d random networks, %d quantities: order %.3f to %.3f, mean %.3f\n", count,
                figures, least, greatest, sum / figures);
}

TEST_CASE("Order: a kink counts once", "[verification][order]") {
    // Gate of an ideal unit that starts, turns and seats between steps: three kinks and a switching.
    // Each kink bends the discharge by at most ½ r dt² (gate rate r < 0.18 1/s) for the time of a
    // water start T_w ~ 1 s, which moves the speed by no more than r dt² T_w/T_a · 1.5 ~ 0.033 dt²;
    // three of them 0.1 dt² (1/s²). An error of first order would be sixty times that at 5 ms. The
    // reference is the run with a step 8 times finer than the finest judged.
    Case made =
        orificePipe({600.0, 7.0, 1200.0, 250.0, 30.0 / 7.0}, 0.0, 1.0, plant::ConduitModel::rigid);
    auto& unit = made.plant.units[0];
    unit.turbine = plant::OrificeUnit{250.0, 30.0, 0.92, 34.9};
    unit.inertia_kgm2 = 444419.758;
    made.at(0.5137, plant::RejectLoad{});
    openings(made, {{0.0, 1.0}, {0.5137, 1.0}, {4.0071, 0.4}, {9.0033, 0.0}});
    made.study.until_s = 12.0;
    const auto endSpeed = [&](double step_s) {
        Case one = made;
        one.settings.longestStep_s = step_s;
        return tests::channel(one.run(), Measure::speed, unitPlace()).atEnd;
    };
    const double reference = endSpeed(0.000625);
    for (const double step_s : {0.04, 0.02, 0.01, 0.005}) {
        const double error = std::fabs(endSpeed(step_s) - reference);
        std::printf("    kinks: step %.4f s, speed error %.2e, over step² %.2e 1/s²\n", step_s,
                    error, error / (step_s * step_s));
        hold("kinks, speed error over step², 1/s²", error / (step_s * step_s), 0.0, 0.1);
    }
}
