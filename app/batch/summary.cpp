// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/summary.h"

#include "batch/choice.h"
#include "batch/text_table.h"
#include "limits/bounds.h"
#include "limits/definitions.h"
#include "limits/judge.h"
#include "limits/place.h"
#include "limits/rounded.h"
#include "studies/sentence.h"
#include "units/text.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace headroom::batch {

namespace {

using results::Mark;
using results::Verdict;
using studies::Cell;
using studies::CellState;
using studies::Snapshot;

std::string_view markWords(Mark mark) {
    switch (mark) {
    case Mark::held: return "held";
    case Mark::tight: return "tight";
    case Mark::undecided: return "undecided";
    case Mark::broken: return "BROKEN";
    case Mark::notValid: return "not valid";
    case Mark::notRun: return "not run";
    case Mark::notApplicable: return "not applicable";
    }
    return "";
}

bool hasMargin(const Verdict& verdict) {
    return verdict.mark == Mark::held || verdict.mark == Mark::tight ||
           verdict.mark == Mark::undecided || verdict.mark == Mark::broken;
}

/// Share in whole per cent; what is broken never reads as 0 or more.
std::string shareText(const Verdict& verdict) {
    const double percent = verdict.share * 100.0;
    const double shown = percent < 0.0 ? std::min(-1.0, std::round(percent)) : std::floor(percent);
    return fmt::format("{}\u2009%", printNumber(Quantity::factor, shown, {}, 0));
}

std::string cellText(const Cell* cell) {
    if (cell == nullptr) {
        return ""; // not asked for
    }
    const auto* worst = limits::worst(cell->verdicts);
    if (cell->state == CellState::failed || cell->state == CellState::cutShort) {
        const bool broken = worst != nullptr && worst->mark == Mark::broken;
        const char* how = cell->state == CellState::failed ? "run failed" : "cut short";
        return broken ? fmt::format("BROKEN, {}", how) : how;
    }
    if (worst == nullptr) {
        return cell->state == CellState::notApplicable ? "not applicable" : "no limit";
    }
    return hasMargin(*worst) ? fmt::format("{} {}", markWords(worst->mark), shareText(*worst))
                             : std::string(markWords(worst->mark));
}

const Cell* find(const std::vector<Cell>& cells, int option, int study) {
    for (const auto& cell : cells) {
        if (cell.option == option && cell.study == study) {
            return &cell;
        }
    }
    return nullptr;
}

/// Studies down, options across; only rows and columns that were asked for.
std::string board(const Snapshot& snapshot, const std::vector<Cell>& cells) {
    std::vector<int> options, wanted;
    for (const auto& cell : cells) {
        if (std::find(options.begin(), options.end(), cell.option) == options.end()) {
            options.push_back(cell.option);
        }
        if (std::find(wanted.begin(), wanted.end(), cell.study) == wanted.end()) {
            wanted.push_back(cell.study);
        }
    }
    std::sort(options.begin(), options.end());
    std::sort(wanted.begin(), wanted.end());
    std::vector<std::vector<std::string>> rows{{"study"}};
    for (const int option : options) {
        rows[0].push_back(snapshot.optionName(option));
    }
    for (const int study : wanted) {
        auto& row = rows.emplace_back(std::vector<std::string>{snapshot.studyName(study)});
        for (const int option : options) {
            row.push_back(cellText(find(cells, option, study)));
        }
    }
    return textTable(rows);
}

std::vector<std::string> verdictRow(const plant::Variant& variant, const Verdict& verdict) {
    const auto quantity = info(verdict.measure).quantity;
    const auto& limit = variant.limits[verdict.limit];
    std::string name = variant.limits.name(verdict.limit);
    name.append(verdict.unsignedLimit ? " (unsigned)" : "");
    if (!hasMargin(verdict)) {
        return {name, std::string(markWords(verdict.mark)), "", "", "", "", "",
                verdict.reason ? text(*verdict.reason) : ""};
    }
    const bool timed = limit.timeRule != plant::TimeRule::momentary && limit.allowed_s > 0.0;
    std::string note = verdict.alreadyBrokenAtRest ? "already broken at rest" : "";
    if (timed) {
        note += fmt::format("{}outside for {} of {} allowed", note.empty() ? "" : "; ",
                            print(Quantity::time, verdict.outside_s),
                            print(Quantity::time, limit.allowed_s));
    }
    const auto margin = limits::marginAndUncertainty(limits::differenceOf(quantity),
                                                     verdict.margin, verdict.uncertainty);
    const char* sign = verdict.margin < 0.0 ? "−" : "";
    return {name,
            std::string(markWords(verdict.mark)),
            limits::extremeText(quantity, verdict.extreme, verdict.bound),
            fmt::format("{} {} ({})", verdict.upper ? "≤" : "≥", print(quantity, verdict.bound),
                        limits::name(static_cast<plant::LoadClass>(verdict.boundClass))),
            fmt::format("{}{}", sign, margin),
            shareText(verdict),
            print(Quantity::time, verdict.time_s),
            note};
}

std::string cellSection(const Snapshot& snapshot, const Cell& cell) {
    const auto& variant = snapshot.variant(cell.option);
    std::string out = fmt::format("{}\n", cellName(snapshot, cell.option, cell.study));
    if (cell.reason) {
        out += fmt::format("{}\n", text(*cell.reason));
    }
    auto verdicts = cell.verdicts;
    std::stable_sort(verdicts.begin(), verdicts.end(), limits::worse);
    std::vector<std::vector<std::string>> rows{
        {"limit", "verdict", "extreme", "bound", "margin", "share", "at", "remark"}};
    for (const auto& verdict : verdicts) {
        rows.push_back(verdictRow(variant, verdict));
    }
    if (rows.size() > 1) {
        out += fmt::format("\n{}", textTable(rows, {2, 4, 5, 6}));
    }
    if (cell.stored != nullptr && cell.stored->run != nullptr) {
        for (const auto& incident : cell.stored->run->incidents) {
            out += fmt::format("  {}\n", text(incident));
        }
    }
    return out + "\n";
}

std::string unsignedLimits(const Snapshot& snapshot) {
    std::string names;
    for (const auto& [name, limit] : snapshot.variant(-1).limits) {
        if (!limit.source.given()) {
            names += fmt::format("  {}\n", name);
        }
    }
    return names.empty() ? "Every limit names its document or author.\n"
                         : fmt::format("Limits without owner; results using them are marked:\n{}",
                                       names);
}

std::string heading(const std::string& title) {
    return fmt::format("{}\n{}\n\n", title, std::string(displayWidth(title), '='));
}

} // namespace

std::string summaryText(const Snapshot& snapshot, const std::vector<Cell>& cells) {
    const auto& title = snapshot.project().title;
    std::string out = heading(title.empty() ? "Results" : title);
    out += fmt::format("{}\n\n", studies::sentence(snapshot, cells).text);
    out += fmt::format("{}\n{}\n", board(snapshot, cells), unsignedLimits(snapshot));
    out += heading("Verdicts, worst first");
    for (const auto& cell : cells) {
        out += cellSection(snapshot, cell);
    }
    out += heading("Definitions");
    for (const auto& [term, words] : limits::definitions(snapshot.variant(-1))) {
        out += fmt::format("{}: {}\n", term, words);
    }
    return out + fmt::format("\n{}\n", caution);
}

} // namespace headroom::batch
