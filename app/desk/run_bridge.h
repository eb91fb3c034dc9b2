// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/run_traces.h"
#include "studies/runner.h"

#include <QObject>
#include <QTimer>
#include <map>
#include <set>

namespace headroom::desk {

/// Owns the runs behind the window: the store and the runner. What workers tell is carried to the
/// window's thread and handed on at most thirty times a second.
class RunBridge final : public QObject {
    Q_OBJECT
public:
    using Fingerprints = std::set<plant::Fingerprint>;

    explicit RunBridge(int threads = studies::windowThreads());
    ~RunBridge() override;

    const studies::RunStore& store() const { return *store_; }
    studies::Runner& runner() { return *runner_; }
    const studies::Runner& runner() const { return *runner_; }

    void want(std::shared_ptr<const studies::Snapshot> snapshot,
              const std::vector<studies::Runner::Wanted>& cells);
    void cancel();
    void cancel(const plant::Fingerprint& fingerprint);

    /// Traces of a stored run; made here if no worker did.
    std::shared_ptr<const RunTraces> traces(const studies::StoredRun& stored);

    bool busy() const;
    /// "about 4 min left"; empty while nothing runs or no speed is known yet.
    QString timeLeft() const;

signals:
    /// Runs whose state changed since the last signal.
    void changed(const headroom::desk::RunBridge::Fingerprints& fingerprints);

private:
    using News = studies::Runner::News;
    void hear(const News& news); // on a worker's thread
    void take(const News& news, std::shared_ptr<const RunTraces> traces);
    void tell();

    std::unique_ptr<studies::RunStore> store_;
    Fingerprints pending_;
    std::map<plant::Fingerprint, std::shared_ptr<const RunTraces>> traces_;
    QTimer teller_;
    qint64 batchStart_ms_ = 0; // when the queue was last filled from empty
    std::unique_ptr<studies::Runner> runner_; // last: its workers use all of the above
};

} // namespace headroom::desk
