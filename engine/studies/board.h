// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "results/run.h"
#include "results/verdict.h"

#include <memory>
#include <optional>
#include <string>
#include <vector>

/// Option × study: which run each cell wants, what is known of it, what it says.
namespace headroom::studies {

/// A stored run with its repeat, found by fingerprint.
struct StoredRun {
    plant::Fingerprint fingerprint;
    std::shared_ptr<const results::Run> run;    ///< first resolution, with traces
    std::shared_ptr<const results::Run> repeat; ///< cells divided by two; nullptr: not yet run
};

/// Where finished runs are kept. The engine knows no database; floors above implement this.
class RunStore {
public:
    virtual ~RunStore() = default;
    virtual std::shared_ptr<const StoredRun> find(const plant::Fingerprint& fingerprint) const = 0;
    virtual void keep(std::shared_ptr<const StoredRun> stored) = 0;
    virtual std::size_t count() const = 0;      ///< runs ever kept, for tests and the status line
};

/// Keeps runs in memory, safe to use from several threads.
std::unique_ptr<RunStore> makeMemoryStore();

enum class CellState {
    notApplicable, ///< the option's plant cannot be bound or compiled: `reason` says why
    notRun,        ///< never computed for these inputs, nothing older either
    outdated,      ///< not computed for these inputs, but was for earlier ones
    waiting,       ///< in the queue
    running,
    done,          ///< run and repeat are there: verdicts are final
    cutShort,      ///< cancelled; partial traces are kept
    failed,        ///< the run ended early: `reason` says why
};

struct Cell {
    int option = -1;  ///< -1: the base
    int study = 0;
    CellState state = CellState::notRun;
    double progress = 0.0;                       ///< 0…1 over run and repeat
    plant::Fingerprint fingerprint;
    std::shared_ptr<const StoredRun> stored;     ///< of this fingerprint, or nullptr
    std::vector<results::Verdict> verdicts;      ///< one a limit, also when not run
    std::optional<Finding> reason;
};

/// An immutable snapshot of a project with all its variants bound once; cheap to make after an
/// edit, because unchanged variants are shared.
struct Snapshot {
    std::shared_ptr<const plant::Bound> bound;
    std::vector<std::shared_ptr<const plant::Variant>> variants; ///< [0] base, [1 + i] option i

    const plant::Project& project() const { return bound->project; }
    const plant::Variant& variant(int option) const {
        return *variants[static_cast<std::size_t>(option + 1)];
    }
    int options() const { return static_cast<int>(variants.size()) - 1; }
    int studies() const { return project().studies.size(); }
};
std::shared_ptr<const Snapshot> makeSnapshot(plant::Bound bound,
                                             const Snapshot* previous = nullptr);

/// Judges one cell from what the store has. Does not run anything.
Cell judgeCell(const Snapshot& snapshot, int option, int study, const RunStore& store);

} // namespace headroom::studies
