// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/board_model.h"

#include <algorithm>

namespace headroom::desk {

namespace {

using studies::Cell;
using studies::CellState;

CellId idOf(const Cell& cell) { return {cell.option, cell.study}; }

bool ended(const Cell& cell) {
    return cell.state == CellState::done || cell.state == CellState::failed;
}

} // namespace

BoardModel::BoardModel(RunBridge& runs) : runs_(runs) {
    snapshot_ = studies::makeSnapshot(plant::Bound{});
    connect(&runs_, &RunBridge::changed, this, &BoardModel::refresh);
}

void BoardModel::setSnapshot(std::shared_ptr<const studies::Snapshot> snapshot) {
    const auto before = std::exchange(snapshot_, std::move(snapshot));
    const auto oldCells = std::exchange(cells_, {});
    const auto count = static_cast<std::size_t>((snapshot_->options() + 1) * snapshot_->studies());
    cells_.resize(count);
    for (std::size_t i = 0; i < count; ++i) {
        const int option = static_cast<int>(i) / snapshot_->studies() - 1;
        const int study = static_cast<int>(i) % snapshot_->studies();
        const bool same = i < oldCells.size() && i < before->cells.size() &&
                          before->studies() == snapshot_->studies() &&
                          before->cells[i] == snapshot_->cells[i] &&
                          before->variants[static_cast<std::size_t>(option + 1)] ==
                              snapshot_->variants[static_cast<std::size_t>(option + 1)];
        cells_[i].option = option;
        cells_[i].study = study;
        if (same) {
            cells_[i] = oldCells[i];
            overlayQueue(cells_[i]);
        } else {
            judge(i);
        }
    }
    emit replaced();
    if (!wanted_.empty()) {
        want({}); // what waits and no cell wants any more is dropped
    }
}

bool BoardModel::holds(CellId id) const { return cell(id) != nullptr; }

const Cell* BoardModel::cell(CellId id) const {
    if (id.option < -1 || id.option >= snapshot_->options() || id.study < 0 ||
        id.study >= snapshot_->studies()) {
        return nullptr;
    }
    return &cells_[static_cast<std::size_t>((id.option + 1) * snapshot_->studies() + id.study)];
}

std::shared_ptr<const studies::StoredRun> BoardModel::latestRun(CellId id) const {
    const Cell* at = cell(id);
    if (at == nullptr || (at->stored && at->stored->run)) {
        return at == nullptr ? nullptr : at->stored;
    }
    const auto& inputs = snapshot_->inputs(id.option, id.study);
    for (auto earlier = inputs.earlier; earlier; earlier = earlier->before) {
        const auto stored = runs_.store().find(earlier->fingerprint);
        if (stored && stored->run) {
            return stored;
        }
    }
    return nullptr;
}

std::vector<CellId> BoardModel::due() const {
    std::vector<CellId> ids;
    for (const auto& cell : cells_) {
        const bool open = cell.state == CellState::notRun || cell.state == CellState::outdated ||
                          cell.state == CellState::cutShort || cell.state == CellState::waiting ||
                          cell.state == CellState::running;
        if (open) {
            ids.push_back(idOf(cell));
        }
    }
    return ids;
}

void BoardModel::want(const std::vector<CellId>& cells) {
    const auto wants = [this](CellId id) {
        const Cell* at = cell(id);
        const bool open = at != nullptr && at->state != CellState::notApplicable && !ended(*at);
        return open && !(at->stored && at->stored->complete());
    };
    std::erase_if(wanted_, [&](CellId id) { return !wants(id); });
    for (const auto id : cells) {
        if (wants(id) && std::find(wanted_.begin(), wanted_.end(), id) == wanted_.end()) {
            wanted_.push_back(id);
        }
    }
    std::vector<studies::Runner::Wanted> asked;
    for (const auto id : wanted_) {
        asked.push_back({id.option, id.study});
    }
    runs_.want(snapshot_, asked);
    std::vector<CellId> touched;
    for (auto& cell : cells_) {
        const auto before = cell.state;
        overlayQueue(cell);
        if (cell.state != before) {
            touched.push_back(idOf(cell));
        }
    }
    emit judged(touched);
}

void BoardModel::cancel(CellId id) {
    std::erase(wanted_, id);
    if (const Cell* at = cell(id)) {
        runs_.cancel(at->fingerprint);
    }
    want({});
}

void BoardModel::judge(std::size_t index) {
    auto& cell = cells_[index];
    cell = studies::judgeCell(*snapshot_, cell.option, cell.study, runs_.store());
    overlayQueue(cell);
}

/// Shows a waiting or running cell as such, and one that no longer is by what the store knows.
void BoardModel::overlayQueue(Cell& cell) const {
    const auto queued = runs_.runner().stateOf(cell.fingerprint);
    if (queued && cell.state != CellState::notApplicable) {
        cell.state = queued->first;
        cell.progress = queued->second;
    } else if (cell.state == CellState::waiting || cell.state == CellState::running) {
        cell = studies::judgeCell(*snapshot_, cell.option, cell.study, runs_.store());
    }
}

void BoardModel::refresh(const RunBridge::Fingerprints& fingerprints) {
    std::vector<CellId> touched;
    for (std::size_t i = 0; i < cells_.size(); ++i) {
        const auto before = cells_[i].state;
        const bool news = fingerprints.contains(cells_[i].fingerprint);
        const bool goesOn = before == CellState::running &&
                            runs_.runner().stateOf(cells_[i].fingerprint).has_value();
        if (news && !goesOn) {
            judge(i);
        } else if (before == CellState::waiting || before == CellState::running) {
            overlayQueue(cells_[i]);
        }
        if (cells_[i].state != before) {
            touched.push_back(idOf(cells_[i]));
        }
        if (ended(cells_[i])) {
            std::erase(wanted_, idOf(cells_[i]));
        }
    }
    if (!runs_.busy()) {
        wanted_.clear();
    }
    if (touched.empty()) {
        emit progressed();
    } else {
        emit judged(touched);
    }
}

int BoardModel::done() const {
    return static_cast<int>(std::count_if(cells_.begin(), cells_.end(), ended));
}

int BoardModel::applicable() const {
    return static_cast<int>(std::count_if(cells_.begin(), cells_.end(), [](const Cell& cell) {
        return cell.state != CellState::notApplicable;
    }));
}

QString BoardModel::progressWords() const {
    const int all = applicable(), finished = done();
    if (all == 0) {
        return tr("nothing to run");
    }
    if (runs_.busy()) {
        const auto left = runs_.timeLeft();
        const auto words = tr("%1 of %2 run").arg(finished).arg(all);
        return left.isEmpty() ? words : words + QStringLiteral(", ") + left;
    }
    if (finished == all) {
        return tr("all %1 run").arg(all);
    }
    return tr("%1 of %2 run, %3 due").arg(finished).arg(all).arg(static_cast<int>(due().size()));
}

double BoardModel::progressShare() const {
    const int all = applicable();
    double sum = 0.0;
    for (const auto& cell : cells_) {
        sum += ended(cell) ? 1.0 : cell.state == CellState::running ? cell.progress : 0.0;
    }
    return all > 0 ? std::min(1.0, sum / all) : 0.0;
}

} // namespace headroom::desk
