// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/board.h"

#include "limits/judge.h"
#include "studies/messages.h"
#include "units/text.h"

namespace headroom::studies {

namespace {

using results::EndReason;

bool ranEarlier(const CellInputs& inputs, const RunStore& store) {
    for (auto at = inputs.earlier; at != nullptr; at = at->before) {
        const auto stored = store.find(at->fingerprint);
        if (stored != nullptr && stored->run != nullptr) {
            return true;
        }
    }
    return false;
}

/// A note of this floor about a study's run.
Finding note(const Message& message, const Snapshot& snapshot, int study,
             const results::Run& run) {
    Finding made;
    made.message = &message;
    made.subject = plant::join({"studies", snapshot.studyName(study)});
    made.arguments = {{"reached", amount(Quantity::time, run.status.reached_s)},
                      {"wanted", amount(Quantity::time, run.duration_s)}};
    return made;
}

/// State and reason from what is stored.
void describe(Cell& cell, const Snapshot& snapshot) {
    const auto& stored = *cell.stored;
    if (stored.refused) {
        cell.state = CellState::notApplicable;
        cell.reason = stored.refused;
    } else if (stored.run->status.reason == EndReason::failed) {
        cell.state = CellState::failed;
        cell.reason = stored.run->status.why;
    } else if (stored.run->status.reason == EndReason::cancelled) {
        cell.state = CellState::cutShort;
        cell.reason = note(stopped, snapshot, cell.study, *stored.run);
    } else if (stored.repeat == nullptr) {
        cell.state = CellState::cutShort;
        cell.reason = note(repeatStopped, snapshot, cell.study, *stored.run);
    } else {
        cell.state = CellState::done;
        cell.progress = 1.0;
    }
}

/// Whether what was judged before still holds: the same inputs (which are shared only with the
/// same variant, limits included) and the same stored run.
bool stillHolds(const Cell& before, const std::shared_ptr<const CellInputs>& inputs,
                const RunStore& store) {
    return before.inputs == inputs && before.stored != nullptr &&
           before.stored == store.find(inputs->fingerprint);
}

/// Every limit as not applicable, for a cell that has nothing to run.
void refuseAll(Cell& cell) {
    for (auto& verdict : cell.verdicts) {
        verdict.mark = results::Mark::notApplicable;
        verdict.reason = cell.reason;
    }
}

} // namespace

Cell judgeCell(const Snapshot& snapshot, int option, int study, const RunStore& store,
               const Cell* before) {
    const auto& shared = snapshot.sharedInputs(option, study);
    const auto& inputs = *shared;
    const auto& variant = snapshot.variant(option);
    Cell cell;
    if (before != nullptr && stillHolds(*before, shared, store)) {
        cell = *before;
        cell.option = option;
        cell.study = study;
        return cell;
    }
    cell.inputs = shared;
    cell.option = option;
    cell.study = study;
    cell.fingerprint = inputs.fingerprint;
    if (inputs.blocked) {
        cell.state = CellState::notApplicable;
        cell.reason = inputs.blocked;
        // What is bound of a faulty plant is not fit to be judged: a bare row for each limit.
        for (int i = 0; i < variant.limits.size(); ++i) {
            results::Verdict row;
            row.limit = i;
            row.measure = variant.limits[i].measure;
            row.unsignedLimit = !variant.limits[i].source.given();
            cell.verdicts.push_back(row);
        }
        refuseAll(cell);
        return cell;
    }
    cell.stored = store.find(inputs.fingerprint);
    if (cell.stored == nullptr) {
        cell.state = ranEarlier(inputs, store) ? CellState::outdated : CellState::notRun;
        cell.verdicts = limits::judge(variant, *inputs.study, nullptr, nullptr);
        return cell;
    }
    describe(cell, snapshot);
    cell.verdicts = limits::judge(variant, *inputs.study, cell.stored->run.get(),
                                  cell.stored->repeat.get());
    if (cell.state == CellState::notApplicable) {
        refuseAll(cell);
    }
    return cell;
}

} // namespace headroom::studies
