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
    std::optional<Finding> refused;             ///< why there is no model to run; then no run

    /// Whether nothing more can be learned by running these inputs again.
    bool complete() const { return refused.has_value() || (run != nullptr && repeat != nullptr); }
};

/// Where finished runs are kept. The engine knows no database; floors above implement this.
class RunStore {
public:
    virtual ~RunStore() = default;
    virtual std::shared_ptr<const StoredRun> find(const plant::Fingerprint& fingerprint) const = 0;
    virtual void keep(std::shared_ptr<const StoredRun> stored) = 0;
    virtual std::size_t count() const = 0;      ///< runs ever kept, for tests and the status line;
                                                ///< a repeat added to a kept run is no new one
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

struct CellInputs;

struct Cell {
    int option = -1;  ///< -1: the base
    int study = 0;
    CellState state = CellState::notRun;
    double progress = 0.0;                       ///< 0…1 over run and repeat
    plant::Fingerprint fingerprint;
    std::shared_ptr<const StoredRun> stored;     ///< of this fingerprint, or nullptr
    std::vector<results::Verdict> verdicts;      ///< one a limit, also when not run
    std::optional<Finding> reason;
    std::shared_ptr<const CellInputs> inputs;    ///< of the snapshot it was judged in
};

/// Fingerprints that a cell had before its present one, the latest first.
struct Earlier {
    plant::Fingerprint fingerprint;
    std::shared_ptr<const Earlier> before;
    int depth = 0; ///< older ones behind this
};

/// What one cell would run: the study with its references resolved in the option's plant.
struct CellInputs {
    std::shared_ptr<const plant::Study> study;
    plant::Fingerprint fingerprint;          ///< zero if blocked
    std::optional<Finding> blocked;          ///< why this option cannot run this study
    std::shared_ptr<const Earlier> earlier;
};

/// An immutable snapshot of a project with all its variants bound once; cheap to make after an
/// edit, because unchanged variants and cells are shared.
struct Snapshot {
    std::shared_ptr<const plant::Bound> bound;
    std::vector<std::shared_ptr<const plant::Variant>> variants; ///< [0] base, [1 + i] option i
    std::vector<std::shared_ptr<const CellInputs>> cells;        ///< see `inputs`

    const plant::Project& project() const { return bound->project; }
    const plant::Variant& variant(int option) const {
        return *variants[static_cast<std::size_t>(option + 1)];
    }
    int options() const { return static_cast<int>(variants.size()) - 1; }
    int studies() const { return project().studies.size(); }
    const std::shared_ptr<const CellInputs>& sharedInputs(int option, int study) const {
        return cells[static_cast<std::size_t>((option + 1) * studies() + study)];
    }
    const CellInputs& inputs(int option, int study) const { return *sharedInputs(option, study); }
    const std::string& optionName(int option) const { return variant(option).name; }
    const std::string& studyName(int study) const { return project().studies.name(study); }
};
std::shared_ptr<const Snapshot> makeSnapshot(plant::Bound bound,
                                             const Snapshot* previous = nullptr);

/// Judges one cell from what the store has. Does not run anything. Where inputs, limits and stored
/// run are those of `before`, its verdicts are taken over instead of made again.
Cell judgeCell(const Snapshot& snapshot, int option, int study, const RunStore& store,
               const Cell* before = nullptr);

} // namespace headroom::studies
