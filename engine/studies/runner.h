// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"
#include "studies/simulate.h"

#include <functional>
#include <memory>
#include <vector>

namespace headroom::studies {

/// One runner, one queue of fingerprints. Nothing starts unasked; a finished run is kept in the
/// store, then announced by fingerprint. Waiting runs that nobody wants any more are dropped,
/// running ones finish and are kept unless cancelled.
class Runner {
public:
    /// What happened, told from a worker thread: the receiver passes it on to its own.
    struct News {
        enum class Kind { started, progress, finished, cancelled, failed } kind;
        plant::Fingerprint fingerprint;
        double progress = 0.0; ///< 0…1 over run and repeat
    };
    using Listener = std::function<void(const News&)>;

    struct Wanted {
        int option = -1;
        int study = 0;
    };

    /// `simulate` computes one run; the product's is `simulateStudy`, tests hand in their own.
    Runner(RunStore& store, int threads, Listener listener, Simulate simulate = simulateStudy);
    ~Runner(); ///< cancels and waits
    Runner(const Runner&) = delete;
    Runner& operator=(const Runner&) = delete;

    /// Replaces the queue of waiting runs by what these cells need and the store lacks.
    void want(std::shared_ptr<const Snapshot> snapshot, const std::vector<Wanted>& cells);
    /// Drops the waiting and asks the running to stop, without waiting for them: they do so
    /// within 0.2 s and are kept as cut short.
    void cancel();
    /// Stops one run; its partial traces are kept as cut short.
    void cancel(const plant::Fingerprint& fingerprint);
    /// Blocks until nothing waits or runs and all news is told (batch program, tests).
    /// A fault of ours in a worker is thrown on from here, or from the next `want`.
    void waitUntilIdle();

    struct Load {
        int waiting = 0, running = 0, finished = 0;
        /// Simulated time since the queue was last empty, for "time left"; a second of a repeat
        /// counts as `repeatCost` because that much more is computed for it. Done is never above
        /// wanted.
        double doneSeconds = 0, wantedSeconds = 0;
    };
    Load load() const;
    /// State of one fingerprint in the queue: waiting, running with its progress, or neither.
    std::optional<std::pair<CellState, double>> stateOf(const plant::Fingerprint&) const;

private:
    struct Hidden;
    std::unique_ptr<Hidden> hidden_;
};

/// What a repeat costs against its first run: twice the cells, twice the steps, while what is
/// done once a step (clusters, machines) doubles only.
inline constexpr double repeatCost = 3.0;

/// Workers of the window: all cores but one, at least one.
int windowThreads();
int batchThreads();

} // namespace headroom::studies
