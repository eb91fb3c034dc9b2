// SPDX-License-Identifier: GPL-3.0-or-later
#include "demo.h"
#include "svg_plot.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <fstream>
#include <iostream>

using namespace headroom;

namespace {

/// A smooth event on the demo plant: the surge after a level offset, with the governor at work.
plant::Study smoothStudy() {
    plant::Study study = bench::demoStudy("Full rejection", 60.0);
    study.events = {};
    plant::Reference unit{"U1", plant::Collection::units, 0};
    study.start.output_W = {{unit, 80e6}};
    plant::Reference shaft{"Surge shaft", plant::Collection::chambers, 0};
    study.start.chamberLevel_m = {{shaft, 500.0}};
    return study;
}

struct Watched {
    Measure measure;
    results::Place place;
    std::string name;
    double scale;
};

double difference(const results::Run& coarse, const results::Run& fine, const Watched& watched) {
    const auto* a = coarse.find(watched.measure, watched.place);
    const auto* b = fine.find(watched.measure, watched.place);
    double worst = 0.0;
    for (std::size_t i = 1; i < a->trace.last.size(); ++i) {
        const auto k = static_cast<std::size_t>(std::llround(
            static_cast<double>(i) * coarse.recordInterval_s / fine.recordInterval_s));
        if (k < b->trace.last.size()) {
            worst = std::max(worst, std::abs(static_cast<double>(a->trace.last[i]) -
                                             static_cast<double>(b->trace.last[k])));
        }
    }
    return worst / watched.scale;
}

} // namespace

int main(int count, char* words[]) {
    const std::string target = count > 1 ? words[1] : "order.svg";
    const auto plant = bench::demoPlant(plant::ConduitModel::elastic);
    const auto study = smoothStudy();
    const auto at = [&](int refinement) {
        return simulation::run(*bench::compiled(plant, study, {.longestStep_s = 0.04, .refinement = refinement}));
    };
    const std::array<Watched, 3> watched{
        Watched{Measure::level, {results::Thing::chamber, 0, 0.0}, "shaft level [m]", 1.0},
        Watched{Measure::opening, {results::Thing::unit, 0, 0.0}, "gate [-]", 1.0},
        Watched{Measure::speed, {results::Thing::unit, 0, 0.0}, "speed [-]", 1.0}};
    const auto finest = at(16);
    bench::LogPlot plot{"Error against the finest step, smooth governor event", "step [s]",
                        "largest error", {}, 2.0};
    for (const auto& one : watched) {
        plot.curves.push_back({one.name, {}});
    }
    for (const int refinement : {1, 2, 4}) {
        const auto run = at(refinement);
        for (std::size_t i = 0; i < watched.size(); ++i) {
            const double error = difference(run, finest, watched[i]);
            plot.curves[i].points.emplace_back(run.resolution.step_s, error);
            std::cout << fmt::format("step {:.5f} s  {}  {:.3e}\n", run.resolution.step_s,
                                     watched[i].name, error);
        }
    }
    for (const auto& curve : plot.curves) {
        const auto& [h1, e1] = curve.points[0];
        const auto& [h2, e2] = curve.points[1];
        std::cout << fmt::format("{}: order {:.3f}\n", curve.name, std::log(e1 / e2) / std::log(h1 / h2));
    }
    std::ofstream(target) << bench::svg(plot);
    return 0;
}
