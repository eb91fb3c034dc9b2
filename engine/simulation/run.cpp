// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/run.h"

#include "simulation/advance.h"
#include "simulation/assemble.h"
#include "simulation/balance.h"
#include "simulation/messages.h"
#include "simulation/validity.h"

#include <algorithm>
#include <chrono>
#include <ctime>

namespace headroom::simulation {
namespace {

constexpr std::int64_t stepsBetweenPolls = 64;

double threadTime_s() {
#ifdef CLOCK_THREAD_CPUTIME_ID
    timespec now{};
    if (clock_gettime(CLOCK_THREAD_CPUTIME_ID, &now) == 0) {
        return static_cast<double>(now.tv_sec) + 1e-9 * static_cast<double>(now.tv_nsec);
    }
#endif
    return static_cast<double>(std::clock()) / CLOCKS_PER_SEC;
}

/// At most about 50 reports a second of wall time.
class Reporter {
public:
    explicit Reporter(const Progress& progress) : progress_(progress) {}
    void report(double share) {
        const auto now = std::chrono::steady_clock::now();
        if (progress_ && now - last_ >= std::chrono::milliseconds(20)) {
            last_ = now;
            progress_(share);
        }
    }

private:
    const Progress& progress_;
    std::chrono::steady_clock::time_point last_{};
};

/// Everything that looks at a run while it goes.
class Observers {
public:
    explicit Observers(const Model& model)
        : model_(model), loops_(hydraulics::sweepLoops(model.instructions)), channels_(model),
          watch_(channels_.width(), loops_),
          record_({channels_.items().size(), channels_.stations().size(), model.grid.steps,
                   model.recordEvery, model.lineEvery, model.settings.keepTraces,
                   model.settings.keepLines},
                  loops_),
          balance_(model), validity_(model) {}

    /// The rest, before anything has moved.
    void begin(const State& state) {
        atRest_.resize(channels_.width());
        channels_.fill(state, atRest_.data());
    }

    void take(const State& state, bool jumped) {
        double* const row = watch_.row(state.step);
        channels_.fill(state, row);
        watch_.take(state.step);
        record_.take(state.step, row);
        if (state.step == 0) {
            balance_.begin(state);
        } else {
            balance_.take(state, jumped);
        }
        if (state.step % model_.recordEvery == 0) {
            balance_.compare(state);
        }
        validity_.take(state);
    }

    void assemble(const State& state, results::Run& out) {
        const std::int64_t last = state.step;
        if (last < 0) {
            return; // not even the first instant was reached
        }
        watch_.finish(last);
        record_.finish();
        out.channels =
            assembleChannels(model_, channels_, watch_, record_, atRest_, watch_.row(last));
        out.envelopes = assembleEnvelopes(model_, channels_, watch_, record_, atRest_);
        out.balance = balance_.balance();
        out.status.invalid = validity_.found();
    }

private:
    const Model& model_;
    const hydraulics::SweepLoops& loops_;
    Channels channels_;
    Watch watch_;
    Record record_;
    BalanceKeeper balance_;
    Validity validity_;
    std::vector<double> atRest_;
};

void fail(results::Run& out, Finding why) {
    out.status.reason = results::EndReason::failed;
    out.status.why = std::move(why);
}

void loop(const Model& model, Advance& advance, Observers& observers, const std::stop_token& stop,
          const Progress& progress, results::Run& out) {
    Reporter reporter(progress);
    while (advance.state().step < model.grid.steps) {
        if (!advance.step()) {
            return fail(out, advance.failure());
        }
        const State& state = advance.state();
        if (!advance.finite()) {
            return fail(out,
                        {.message = &valueNotFinite, .subject = "plant", .time_s = state.time_s});
        }
        observers.take(state, advance.jumped());
        if (state.step % stepsBetweenPolls == 0) {
            reporter.report(static_cast<double>(state.step)
                            / static_cast<double>(model.grid.steps));
            if (stop.stop_requested()) {
                out.status.reason = results::EndReason::cancelled;
                return;
            }
        }
    }
}

} // namespace

results::Run run(const Model& model, std::stop_token stop, const Progress& progress) {
    const double before = threadTime_s();
    results::Run out;
    out.resolution = model.resolution;
    out.duration_s = model.duration_s;
    out.recordInterval_s = static_cast<double>(model.recordEvery) * model.grid.step_s;
    out.lineInterval_s = static_cast<double>(model.lineEvery) * model.grid.step_s;
    Advance advance(model);
    if (auto finding = advance.begin()) {
        fail(out, std::move(*finding));
        return out;
    }
    Observers observers(model);
    observers.begin(advance.state());
    loop(model, advance, observers, stop, progress, out);
    observers.assemble(advance.state(), out);
    out.status.reached_s = std::max(0.0, advance.state().time_s);
    out.incidents = advance.state().incidents;
    out.cpu_s = threadTime_s() - before;
    return out;
}

} // namespace headroom::simulation
