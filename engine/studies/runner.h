// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

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

    Runner(RunStore& store, int threads, Listener listener);
    ~Runner(); ///< cancels and waits
    Runner(const Runner&) = delete;
    Runner& operator=(const Runner&) = delete;

    /// Replaces the queue of waiting runs by what these cells need and the store lacks.
    void want(std::shared_ptr<const Snapshot> snapshot, const std::vector<Wanted>& cells);
    /// Drops the waiting and stops the running; answers within 0.2 s.
    void cancel();
    /// Stops one run; its partial traces are kept as cut short.
    void cancel(const plant::Fingerprint& fingerprint);
    /// Blocks until nothing waits or runs (batch program, tests).
    void waitUntilIdle();

    struct Load {
        int waiting = 0, running = 0, finished = 0;
        double doneSeconds = 0, wantedSeconds = 0; ///< simulated time, for "time left"
    };
    Load load() const;
    /// State of one fingerprint in the queue: waiting, running with its progress, or neither.
    std::optional<std::pair<CellState, double>> stateOf(const plant::Fingerprint&) const;

private:
    struct Hidden;
    std::unique_ptr<Hidden> hidden_;
};

/// Workers of the window: all cores but one, at least one.
int windowThreads();
int batchThreads();

} // namespace headroom::studies
