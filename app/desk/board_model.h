// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/run_bridge.h"
#include "drawing/selection.h"
#include "studies/board.h"

#include <QObject>

namespace headroom::desk {

using drawing::CellId;

/// What each cell of the present snapshot says; judged again only where something changed.
class BoardModel final : public QObject {
    Q_OBJECT
public:
    explicit BoardModel(RunBridge& runs);

    void setSnapshot(std::shared_ptr<const studies::Snapshot> snapshot);
    const studies::Snapshot& snapshot() const { return *snapshot_; }
    std::shared_ptr<const studies::Snapshot> shared() const { return snapshot_; }

    const std::vector<studies::Cell>& cells() const { return cells_; }
    bool holds(CellId id) const;
    const studies::Cell* cell(CellId id) const; ///< nullptr if there is no such cell
    /// Run of the cell, or the latest one of earlier inputs if it is outdated; nullptr if none.
    std::shared_ptr<const studies::StoredRun> latestRun(CellId id) const;

    /// Cells that can run and have not been run for their present inputs.
    std::vector<CellId> due() const;
    /// Asks for these cells and for those that wait already.
    void want(const std::vector<CellId>& cells);
    void runDue() { want(due()); }
    void cancel(CellId id);

    int done() const;       ///< cells with final verdicts, or that ended otherwise
    int applicable() const; ///< cells that can run at all
    /// "17 of 45 run, about 4 min left"; "all 45 run"; "45 to run".
    QString progressWords() const;
    double progressShare() const;

signals:
    void replaced();                                              ///< another snapshot
    void judged(const std::vector<headroom::drawing::CellId>& cells); ///< these say something else now
    void progressed();                                            ///< queue and progress only

private:
    void judge(std::size_t index);
    void overlayQueue(studies::Cell& cell) const;
    void refresh(const RunBridge::Fingerprints& fingerprints);

    RunBridge& runs_;
    std::shared_ptr<const studies::Snapshot> snapshot_;
    std::vector<studies::Cell> cells_; // option by option, study by study
    std::vector<CellId> wanted_;       // asked for and perhaps not finished
};

} // namespace headroom::desk
