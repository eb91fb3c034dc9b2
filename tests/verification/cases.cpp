// SPDX-License-Identifier: GPL-3.0-or-later
#include "cases.h"

#include "simulation/advance.h"
#include "simulation/channels.h"
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <map>

namespace headroom::verification {

using plant::Collection;

Case barePipe(const Pipe& pipe, plant::ConduitModel model, double step_s) {
    Case made;
    const auto intake = made.point("Intake", 0.0);
    const auto inlet = made.point("Inlet", pipe.length_m);
    made.reservoir("Upper", intake, pipe.head_m);
    made.reservoir("Tail", {}, 0.0);
    made.conduit("Pipe", intake, inlet, pipe.length_m, pipe.area_m2, pipe.waveSpeed_mps, model);
    made.settings.longestStep_s = step_s;
    return made;
}

Case orificePipe(const Pipe& pipe, double step_s, double opening, plant::ConduitModel model) {
    Case made = barePipe(pipe, model, step_s);
    made.unit("Unit", made.ref(Collection::points, "Inlet"),
              made.ref(Collection::reservoirs, "Tail"),
              plant::OrificeUnit{pipe.head_m, pipe.flow_m3s(), 1.0, {}});
    made.study.start.opening = {{made.ref(Collection::units, "Unit"), opening}};
    return made;
}

Case flowPipe(const Pipe& pipe, double step_s) {
    Case made = barePipe(pipe, plant::ConduitModel::elastic, step_s);
    made.unit("Unit", made.ref(Collection::points, "Inlet"),
              made.ref(Collection::reservoirs, "Tail"), plant::FlowUnit{pipe.flow_m3s()});
    return made;
}

void cutPipe(Case& made, double share) {
    const plant::Conduit whole = made.plant.conduits[0];
    const double from_m = made.plant.points[whole.from.index].chainage_m;
    const double to_m = made.plant.points[whole.to.index].chainage_m;
    const auto middle = made.point("Cut", from_m + share * (to_m - from_m));
    plant::Conduit rest = whole;
    rest.from = middle;
    rest.length_m = (1.0 - share) * *whole.length_m;
    made.plant.conduits[0].to = middle;
    made.plant.conduits[0].length_m = share * *whole.length_m;
    made.plant.conduits.add("Rest of the pipe", rest);
}

Case surge(double loss_m, double from_m3s, double to_m3s, double throttle_m) {
    Case made = tests::surgeCase(loss_m);
    if (throttle_m > 0.0) {
        auto& shape = made.plant.chambers[0].shape;
        shape.throttled = true;
        shape.lossIn_s2m5 = shape.lossOut_s2m5 = throttle_m / (50.0 * 50.0);
    }
    made.plant.units[0].turbine = plant::FlowUnit{from_m3s};
    flows(made, {{0.0, to_m3s}});
    made.study.until_s = 300.0;
    return made;
}

void openings(Case& made, plant::Rows rows) {
    made.at(0.0, plant::OpeningOrder{made.ref(Collection::units, "Unit"), std::move(rows)});
}

void flows(Case& made, plant::Rows rows) {
    made.at(0.0, plant::FlowOrder{made.ref(Collection::units, "Unit"), std::move(rows)});
}

Crest crest(const results::Run& run, Measure measure, const results::Place& place, double from_s,
            double to_s, int sign) {
    const auto& trace = tests::channel(run, measure, place).trace;
    const auto& values = sign > 0 ? trace.high : trace.low;
    const auto first =
        static_cast<std::size_t>(std::max(0.0, std::ceil(from_s / run.recordInterval_s)));
    const auto last = static_cast<std::size_t>(to_s / run.recordInterval_s);
    REQUIRE(last < values.size());
    Crest best{static_cast<double>(values[first]), from_s};
    for (std::size_t i = first; i <= last; ++i) {
        const auto value = static_cast<double>(values[i]);
        if (sign * (value - best.value) > 0.0) {
            best = {value, static_cast<double>(i) * run.recordInterval_s};
        }
    }
    return best;
}

std::size_t Course::find(Measure measure, const results::Place& place) const {
    for (std::size_t i = 0; i < measures.size(); ++i) {
        if (measures[i] == measure && places[i] == place) {
            return i;
        }
    }
    FAIL("no such channel");
    return 0;
}

double Course::at(std::size_t channel, double time_s) const {
    const double position = time_s / step_s;
    const double whole = std::round(position);
    CAPTURE(time_s, step_s);
    REQUIRE(std::fabs(position - whole) < 1e-6); // an instant of the run, no interpolation
    return rows.at(static_cast<std::size_t>(whole))[channel];
}

Course course(const Case& made, int every) {
    const auto model = simulation::compile(made.site, made.plant, made.study, made.settings);
    REQUIRE(model);
    simulation::Channels channels(**model);
    Course out;
    for (const auto& item : channels.items()) {
        out.measures.push_back(item.measure);
        out.places.push_back(item.place);
    }
    out.step_s = (*model)->grid.step_s * every;
    simulation::Advance advance(**model);
    REQUIRE(!advance.begin());
    std::vector<double> row(channels.width());
    while (advance.state().step < (*model)->grid.steps) {
        REQUIRE(advance.step());
        if (advance.state().step % every == 0) {
            channels.fill(advance.state(), row.data());
            out.rows.emplace_back(row.begin(),
                                  row.begin() + static_cast<std::ptrdiff_t>(out.measures.size()));
        }
    }
    return out;
}

namespace {

/// Prints, when the program ends, how much of each tolerance was used.
class Ledger {
public:
    Ledger() = default;
    Ledger(const Ledger&) = delete;
    Ledger& operator=(const Ledger&) = delete;
    ~Ledger() {
        if (std::getenv("HEADROOM_FIGURES") == nullptr) {
            return;
        }
        for (const auto& [check, entry] : entries_) {
            std::printf("%-44s %6d values, largest error %.3g of %.3g\n", check.c_str(),
                        entry.count, entry.error, entry.tolerance);
        }
    }
    void note(const std::string& check, double error, double tolerance) {
        Entry& entry = entries_[check];
        ++entry.count;
        if (entry.count == 1 || error * entry.tolerance > entry.error * tolerance) {
            entry.error = error;
            entry.tolerance = tolerance;
        }
    }

private:
    struct Entry {
        int count = 0;
        double error = 0.0, tolerance = 0.0;
    };
    std::map<std::string, Entry> entries_;
};

Ledger& ledger() {
    static Ledger one;
    return one;
}

} // namespace

void hold(const std::string& check, double value, double expected, double tolerance) {
    ledger().note(check, std::fabs(value - expected), tolerance);
    INFO(check);
    CHECK_THAT(value, WithinAbs(expected, tolerance));
}

} // namespace headroom::verification
