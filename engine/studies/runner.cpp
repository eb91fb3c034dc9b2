// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/runner.h"

#include "base/ensure.h"

#include <algorithm>
#include <condition_variable>
#include <deque>
#include <exception>
#include <map>
#include <mutex>
#include <thread>
#include <utility>

namespace headroom::studies {

namespace {

using plant::Fingerprint;
using results::EndReason;
using results::Run;

/// One fingerprint to be run; keeps alive what it reads.
struct Task {
    Fingerprint fingerprint;
    std::shared_ptr<const Snapshot> snapshot;
    int option = -1;
    int study = 0;

    const plant::Study& what() const { return *snapshot->inputs(option, study).study; }
    /// Simulated seconds of run and repeat, see `Runner::Load`.
    double seconds() const { return what().until_s * (1.0 + repeatCost); }
    Job job(int refinement, bool keepTraces) const {
        const auto& variant = snapshot->variant(option);
        return {variant.site, variant.plant, what(),
                snapshot->project().numerics.longestStep_s, refinement, keepTraces};
    }
};

struct Running {
    Task task;
    std::stop_source stop;
    double progress = 0.0;
};

/// Whether a run is whole and stayed in the model's range.
bool clean(const Run& run) {
    return run.status.reason == EndReason::completed && run.status.invalid.empty();
}

} // namespace

struct Runner::Hidden {
    RunStore& store;
    Listener listener;
    Simulate simulate;

    mutable std::mutex mutex;
    std::condition_variable changed;
    std::deque<Task> waiting;
    std::map<Fingerprint, Running> running;
    int finished = 0;
    double finishedSeconds = 0.0;
    int announcing = 0;               ///< workers between the end of a task and its news
    bool closing = false;
    std::exception_ptr fault;         ///< a fault of ours in a worker, thrown on at the next call
    std::vector<std::jthread> workers; ///< last: they end before what they use

    Hidden(RunStore& keptIn, Listener told, Simulate with)
        : store(keptIn), listener(std::move(told)), simulate(std::move(with)) {}

    void tell(News::Kind kind, const Fingerprint& fingerprint, double progress) const {
        if (listener) {
            listener({kind, fingerprint, progress});
        }
    }

    /// The first waiting task whose fingerprint is not still being stopped.
    std::deque<Task>::iterator next() {
        return std::find_if(waiting.begin(), waiting.end(), [&](const Task& task) {
            return running.count(task.fingerprint) == 0;
        });
    }

    void work() {
        while (true) {
            Task task;
            std::stop_source stop;
            {
                std::unique_lock lock(mutex);
                changed.wait(lock, [&] { return closing || next() != waiting.end(); });
                if (closing) {
                    return;
                }
                const auto first = next();
                task = std::move(*first);
                waiting.erase(first);
                running[task.fingerprint] = {task, stop, 0.0};
            }
            tell(News::Kind::started, task.fingerprint, 0.0);
            end(task, computeSafely(task, stop.get_token()));
        }
    }

    void end(const Task& task, News::Kind kind) {
        {
            const std::lock_guard lock(mutex);
            running.erase(task.fingerprint);
            ++announcing;
            if (kind != News::Kind::cancelled) {
                ++finished;
                finishedSeconds += task.seconds();
            }
        }
        changed.notify_all();
        tell(kind, task.fingerprint, 1.0);
        {
            const std::lock_guard lock(mutex);
            --announcing;
        }
        changed.notify_all();
    }

    News::Kind computeSafely(const Task& task, const std::stop_token& stop) {
        try {
            return compute(task, stop);
        } catch (...) {
            const std::lock_guard lock(mutex);
            if (!fault) {
                fault = std::current_exception();
            }
            return News::Kind::failed;
        }
    }

    /// Throws a worker's fault on to the caller. The lock is held.
    void throwFault() {
        if (fault) {
            std::rethrow_exception(std::exchange(fault, nullptr));
        }
    }

    /// Runs, repeats and keeps; says how it ended.
    News::Kind compute(const Task& task, const std::stop_token& stop) {
        auto stored = std::make_shared<StoredRun>();
        stored->fingerprint = task.fingerprint;
        if (const auto before = store.find(task.fingerprint);
            before != nullptr && before->run != nullptr &&
            before->run->status.reason != EndReason::cancelled) {
            stored->run = before->run; // only the repeat is missing
        }
        const double first = 1.0 / (1.0 + repeatCost);
        if (stored->run == nullptr) {
            auto run = simulate(task.job(1, true), stop, progressOf(task, 0.0, first));
            if (!run) {
                stored->refused = firstErrorOf(run.findings());
                store.keep(stored);
                return News::Kind::failed;
            }
            stored->run = std::make_shared<const Run>(std::move(run).value());
            store.keep(stored);
        }
        if (stored->run->status.reason == EndReason::cancelled || stop.stop_requested()) {
            return News::Kind::cancelled;
        }
        // A run that left its range is judged on the time before, for which the repeat needs traces.
        auto repeat = simulate(task.job(2, !clean(*stored->run)), stop,
                               progressOf(task, first, 1.0 - first));
        ensure(static_cast<bool>(repeat), "a plant that compiles once compiles with divided cells");
        if (repeat->status.reason == EndReason::cancelled) {
            return News::Kind::cancelled;
        }
        auto whole = std::make_shared<StoredRun>(*stored);
        whole->repeat = std::make_shared<const Run>(std::move(repeat).value());
        const bool failed = whole->run->status.reason == EndReason::failed;
        store.keep(std::move(whole));
        return failed ? News::Kind::failed : News::Kind::finished;
    }

    static Finding firstErrorOf(const Findings& findings) {
        for (const auto& finding : findings) {
            if (finding.severity() == Severity::error) {
                return finding;
            }
        }
        return findings.front();
    }

    Progress progressOf(const Task& task, double from, double span) {
        return [this, fingerprint = task.fingerprint, from, span](double share) {
            double progress = 0.0;
            {
                const std::lock_guard lock(mutex);
                auto& known = running.at(fingerprint).progress;
                known = std::max(known, from + span * std::clamp(share, 0.0, 1.0));
                progress = known;
            }
            tell(News::Kind::progress, fingerprint, progress);
        };
    }

    bool wanted(const Fingerprint& fingerprint) const {
        const auto same = [&](const Task& task) { return task.fingerprint == fingerprint; };
        const auto found = running.find(fingerprint);
        const bool runs = found != running.end() && !found->second.stop.stop_requested();
        return runs || std::any_of(waiting.begin(), waiting.end(), same);
    }
};

Runner::Runner(RunStore& store, int threads, Listener listener, Simulate simulate)
    : hidden_(std::make_unique<Hidden>(store, std::move(listener), std::move(simulate))) {
    for (int i = 0; i < std::max(1, threads); ++i) {
        hidden_->workers.emplace_back([hidden = hidden_.get()] { hidden->work(); });
    }
}

Runner::~Runner() {
    cancel();
    {
        const std::lock_guard lock(hidden_->mutex);
        hidden_->closing = true;
    }
    hidden_->changed.notify_all();
    hidden_->workers.clear(); // joins
}

void Runner::want(std::shared_ptr<const Snapshot> snapshot, const std::vector<Wanted>& cells) {
    {
        auto& the = *hidden_;
        const std::lock_guard lock(the.mutex);
        the.throwFault();
        the.waiting.clear();
        if (the.running.empty()) {
            the.finished = 0;
            the.finishedSeconds = 0.0;
        }
        for (const auto& cell : cells) {
            const auto& inputs = snapshot->inputs(cell.option, cell.study);
            if (inputs.blocked || the.wanted(inputs.fingerprint)) {
                continue;
            }
            const auto stored = the.store.find(inputs.fingerprint);
            if (stored == nullptr || !stored->complete()) {
                the.waiting.push_back({inputs.fingerprint, snapshot, cell.option, cell.study});
            }
        }
    }
    hidden_->changed.notify_all();
}

void Runner::cancel() {
    {
        const std::lock_guard lock(hidden_->mutex);
        hidden_->waiting.clear();
        for (auto& [fingerprint, running] : hidden_->running) {
            running.stop.request_stop();
        }
    }
    hidden_->changed.notify_all();
}

void Runner::cancel(const plant::Fingerprint& fingerprint) {
    {
        const std::lock_guard lock(hidden_->mutex);
        auto& waiting = hidden_->waiting;
        const auto same = [&](const Task& task) { return task.fingerprint == fingerprint; };
        waiting.erase(std::remove_if(waiting.begin(), waiting.end(), same), waiting.end());
        const auto found = hidden_->running.find(fingerprint);
        if (found != hidden_->running.end()) {
            found->second.stop.request_stop();
        }
    }
    hidden_->changed.notify_all();
}

void Runner::waitUntilIdle() {
    std::unique_lock lock(hidden_->mutex);
    hidden_->changed.wait(lock, [&] {
        return hidden_->waiting.empty() && hidden_->running.empty() && hidden_->announcing == 0;
    });
    hidden_->throwFault();
}

Runner::Load Runner::load() const {
    const std::lock_guard lock(hidden_->mutex);
    Load load;
    load.waiting = static_cast<int>(hidden_->waiting.size());
    load.running = static_cast<int>(hidden_->running.size());
    load.finished = hidden_->finished;
    load.doneSeconds = load.wantedSeconds = hidden_->finishedSeconds;
    for (const auto& task : hidden_->waiting) {
        load.wantedSeconds += task.seconds();
    }
    for (const auto& [fingerprint, running] : hidden_->running) {
        load.wantedSeconds += running.task.seconds();
        load.doneSeconds += running.progress * running.task.seconds();
    }
    return load;
}

std::optional<std::pair<CellState, double>>
Runner::stateOf(const plant::Fingerprint& fingerprint) const {
    const std::lock_guard lock(hidden_->mutex);
    const auto found = hidden_->running.find(fingerprint);
    if (found != hidden_->running.end()) {
        return std::pair{CellState::running, found->second.progress};
    }
    for (const auto& task : hidden_->waiting) {
        if (task.fingerprint == fingerprint) {
            return std::pair{CellState::waiting, 0.0};
        }
    }
    return std::nullopt;
}

int batchThreads() {
    return std::max(1, static_cast<int>(std::thread::hardware_concurrency()));
}

int windowThreads() {
    return std::max(1, batchThreads() - 1);
}

} // namespace headroom::studies
