// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/choices.h"

#include "limits/judge.h"

#include <algorithm>

namespace headroom::desk {

namespace {

using results::Mark;

constexpr std::size_t comparedUnasked = 3;

bool judged(const results::Verdict& verdict) {
    return verdict.mark != Mark::notRun && verdict.mark != Mark::notApplicable;
}

bool held(const studies::Cell& cell) {
    const auto* worst = limits::worst(cell.verdicts);
    return cell.state == studies::CellState::done && worst != nullptr && worst->mark == Mark::held;
}

/// Limit and time of a verdict; a verdict without a run leaves the time.
void follow(Selection& next, const results::Verdict& verdict) {
    next.limit = verdict.limit;
    if (judged(verdict)) {
        next.time_s = verdict.time_s;
    }
}

/// What stays compared when a cell comes into the hand. The old one gives way, but the base stays
/// beside an option; options compared on one study go along to another study.
std::vector<CellId> comparedWith(const Selection& now, CellId cell) {
    const CellId old = now.inHand();
    const bool oneStudy = std::all_of(now.shown.begin(), now.shown.end(),
                                      [&](CellId id) { return id.study == old.study; });
    std::vector<CellId> kept;
    for (auto id : now.shown) {
        const bool givesWay = id == old && !(id.option == -1 && cell.option != -1);
        if (oneStudy) {
            id.study = cell.study;
        }
        if (id != cell && !givesWay) {
            kept.push_back(id);
        }
    }
    return kept;
}

} // namespace

const results::Verdict* verdictOf(const BoardModel& board, const Selection& now) {
    const auto* cell = board.cell(now.inHand());
    if (cell == nullptr || now.limit < 0) {
        return nullptr;
    }
    for (const auto& verdict : cell->verdicts) {
        if (verdict.limit == now.limit) {
            return &verdict;
        }
    }
    return nullptr;
}

Selection withCell(const BoardModel& board, const Selection& now, CellId cell) {
    Selection next = now;
    next.shown = comparedWith(now, cell);
    next.shown.insert(next.shown.begin(), cell);
    const auto* at = board.cell(cell);
    if (at != nullptr && now.limit >= static_cast<int>(at->verdicts.size())) {
        next.limit = at->verdicts.empty() ? -1 : 0;
    }
    return withWorst(board, std::move(next));
}

Selection withWorst(const BoardModel& board, Selection now) {
    const auto* at = board.cell(now.inHand());
    const auto* worst = at == nullptr ? nullptr : limits::worst(at->verdicts);
    if (worst != nullptr && judged(*worst)) {
        follow(now, *worst);
    }
    return now;
}

Selection withLimit(const BoardModel& board, const Selection& now, int limit) {
    Selection next = now;
    next.limit = limit;
    if (const auto* verdict = verdictOf(board, next)) {
        follow(next, *verdict);
    }
    return next;
}

Selection toggled(const Selection& now, CellId cell) {
    Selection next = now;
    if (std::find(next.shown.begin(), next.shown.end(), cell) == next.shown.end()) {
        next.shown.push_back(cell);
    } else if (next.shown.size() > 1) {
        std::erase(next.shown, cell);
    }
    return next;
}

Selection withOption(const BoardModel& board, const Selection& now, int option) {
    return withCell(board, now, {option, now.inHand().study});
}

CellId nextProblem(const BoardModel& board, CellId from) {
    const int options = board.snapshot().options() + 1, studies = board.snapshot().studies();
    const int count = options * studies;
    for (int step = 1; step <= count; ++step) {
        // Row by row, as one reads the Board.
        const int place = (from.study * options + from.option + 1 + step) % count;
        const CellId id{place % options - 1, place / options};
        const auto* cell = board.cell(id);
        if (cell != nullptr && !held(*cell) && cell->state != studies::CellState::notApplicable) {
            return id;
        }
    }
    return from;
}

std::optional<CellId> worstCell(const BoardModel& board) {
    const studies::Cell* found = nullptr;
    const results::Verdict* foundVerdict = nullptr;
    for (const auto& cell : board.cells()) {
        const auto* worst = limits::worst(cell.verdicts);
        const bool counts = worst != nullptr && judged(*worst) &&
                            (found == nullptr || cell.option == found->option);
        if (counts && (found == nullptr || limits::worse(*worst, *foundVerdict))) {
            found = &cell;
            foundVerdict = worst;
        }
    }
    return found == nullptr ? std::nullopt
                            : std::optional<CellId>(CellId{found->option, found->study});
}

Selection unasked(const BoardModel& board, const Selection& now) {
    const auto worst = worstCell(board);
    if (!worst) {
        return fitted(board, now);
    }
    Selection next = now;
    next.shown = {*worst};
    std::vector<std::pair<double, CellId>> others; // by what is left of their worst limit
    for (int option = 0; option < board.snapshot().options(); ++option) {
        const auto* cell = board.cell({option, worst->study});
        const auto* verdict = cell == nullptr ? nullptr : limits::worst(cell->verdicts);
        if (verdict != nullptr && cell->state == studies::CellState::done && option != worst->option) {
            others.emplace_back(-verdict->share, CellId{option, worst->study});
        }
    }
    std::stable_sort(others.begin(), others.end(),
                     [](const auto& a, const auto& b) { return a.first < b.first; });
    for (const auto& [share, cell] : others) {
        if (next.shown.size() < comparedUnasked) {
            next.shown.push_back(cell);
        }
    }
    return withCell(board, next, *worst);
}

Selection fitted(const BoardModel& board, Selection now) {
    std::erase_if(now.shown, [&](CellId id) { return !board.holds(id); });
    if (now.shown.empty() && board.holds({-1, 0})) {
        now.shown = {CellId{-1, 0}};
    }
    const auto* cell = board.cell(now.inHand());
    const int limits = cell == nullptr ? 0 : static_cast<int>(cell->verdicts.size());
    if (now.limit >= limits || (now.limit < 0 && limits > 0)) {
        now.limit = limits - 1 < 0 ? -1 : 0;
    }
    return now;
}

} // namespace headroom::desk
