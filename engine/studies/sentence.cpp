// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/sentence.h"

#include "limits/judge.h"
#include "limits/place.h"
#include "limits/rounded.h"
#include "units/text.h"

#include <fmt/format.h>

#include <cctype>

namespace headroom::studies {

namespace {

using results::Mark;
using results::Verdict;

/// The same text with its first letter made small or large.
std::string begun(std::string text, int (*letter)(int)) {
    if (!text.empty()) {
        text[0] = static_cast<char>(letter(static_cast<unsigned char>(text[0])));
    }
    return text;
}

std::string subjectOf(const plant::Variant& variant, const Verdict& verdict) {
    const auto place = limits::nameOf(verdict.place, variant.plant);
    switch (verdict.measure) {
    case Measure::level: return fmt::format("the level in {}", place);
    case Measure::head: return fmt::format("the head at {}", place);
    case Measure::pressureHead: return fmt::format("the pressure head in {}", place);
    case Measure::pressureRate: return fmt::format("the rate of pressure at {}", place);
    case Measure::frequency: return "the frequency of the grid";
    case Measure::frequencyRate: return "the rate of the grid's frequency";
    default:
        return fmt::format("the {} of {}",
                           begun(std::string(info(verdict.measure).label), std::tolower), place);
    }
}

bool timed(const plant::Limit& limit) {
    return limit.timeRule != plant::TimeRule::momentary && limit.allowed_s > 0.0;
}

/// "stays above its limit of … for 12 s, with 60 s allowed": a limit that allows time outside.
std::string timedStatement(const plant::Limit& limit, const Verdict& verdict,
                           const std::string& bound, const NumberStyle& style) {
    const char* side = verdict.upper ? "above" : "below";
    if (verdict.outside_s == 0.0) {
        return fmt::format("never goes {} its limit of {}", side, bound);
    }
    return fmt::format("stays {} its limit of {} for {}, with {} allowed", side, bound,
                       print(Quantity::time, verdict.outside_s, style),
                       print(Quantity::time, limit.allowed_s, style));
}

/// "falls 1.9 ± 0.5 m below its limit of 458.0 m".
std::string momentaryStatement(const Verdict& verdict, const std::string& margin,
                               const std::string& bound) {
    const char* towards = verdict.upper ? "rises" : "falls";
    const char* beyond = verdict.upper ? "above" : "below";
    const char* inside = verdict.upper ? "below" : "above";
    switch (verdict.mark) {
    case Mark::broken:
        return verdict.alreadyBrokenAtRest
                   ? fmt::format("lies {} its limit of {} already at rest and {} to {} {} it",
                                 beyond, bound, towards, margin, beyond)
                   : fmt::format("{} {} {} its limit of {}", towards, margin, beyond, bound);
    case Mark::undecided:
        return fmt::format("{} to {} {} its limit of {}", towards, margin,
                           verdict.margin < 0.0 ? beyond : inside, bound);
    default:
        return fmt::format("stays {} {} its limit of {}", margin, inside, bound);
    }
}

std::string when(const Verdict& verdict, const NumberStyle& style) {
    return fmt::format("{}\u2009s in", printNumber(Quantity::time, verdict.time_s, style,
                                                   verdict.time_s < 10.0 ? 1 : 0));
}

std::string ending(Mark mark) {
    switch (mark) {
    case Mark::undecided: return ": undecided";
    case Mark::tight: return ": tight";
    case Mark::held: return ": held";
    default: return {};
    }
}

bool hasValue(const Verdict& verdict) {
    return verdict.mark == Mark::broken || verdict.mark == Mark::undecided ||
           verdict.mark == Mark::tight || verdict.mark == Mark::held;
}

/// Runs that tell something stand before those that do not.
bool due(const Cell& cell) {
    switch (cell.state) {
    case CellState::notRun:
    case CellState::outdated:
    case CellState::waiting:
    case CellState::running:
        return true;
    default:
        return false;
    }
}

struct Governing {
    const Cell* cell = nullptr;
    const Verdict* verdict = nullptr;
};

Governing governing(std::span<const Cell> choice) {
    Governing worst;
    for (const auto& cell : choice) {
        if (due(cell) || cell.state == CellState::notApplicable) {
            continue;
        }
        const auto* verdict = limits::worst(cell.verdicts);
        const bool first = worst.cell == nullptr || (verdict != nullptr && worst.verdict == nullptr);
        if (first || (verdict != nullptr && worst.verdict != nullptr &&
                      limits::worse(*verdict, *worst.verdict))) {
            worst = {&cell, verdict};
        }
    }
    return worst;
}

std::string dueText(int due, std::size_t all) {
    if (due == 0) {
        return {};
    }
    return fmt::format(" {} of {} chosen cells are not run.", due, all);
}

std::string whole(const Sentence& made, int due, std::size_t all) {
    return fmt::format("{} – {}: {}{}", begun(made.optionName, std::toupper), made.studyName,
                       made.statement, dueText(due, all));
}

Sentence withoutResult(const Snapshot& snapshot, std::span<const Cell> choice, Sentence made) {
    if (snapshot.studies() == 0 || choice.empty()) {
        made.kind = Sentence::Kind::noStudy;
        made.text = made.statement = snapshot.studies() == 0
                                         ? "This project has no study yet."
                                         : "No run is chosen.";
        return made;
    }
    const auto& cell = choice.front();
    made.option = cell.option;
    made.study = cell.study;
    made.optionName = snapshot.optionName(cell.option);
    made.studyName = snapshot.studyName(cell.study);
    const bool impossible = made.due == 0;
    made.kind = impossible ? Sentence::Kind::failed : Sentence::Kind::notRun;
    made.statement = impossible ? cell.reason ? whatText(*cell.reason) : "it cannot be run."
                                : "not run for the present inputs.";
    made.text = whole(made, 0, choice.size());
    return made;
}

} // namespace

std::string statement(const plant::Variant& variant, const Verdict& verdict,
                      const NumberStyle& style) {
    const auto& limit = variant.limits[verdict.limit];
    const auto quantity = info(verdict.measure).quantity;
    const auto bound = print(quantity, verdict.bound, style);
    const auto subject = subjectOf(variant, verdict);
    if (timed(limit)) {
        return fmt::format("{} {}{}", subject, timedStatement(limit, verdict, bound, style),
                           ending(verdict.mark));
    }
    const auto margin = limits::marginAndUncertainty(limits::differenceOf(quantity),
                                                     verdict.margin, verdict.uncertainty, style);
    return fmt::format("{} {}, {}{}", subject, momentaryStatement(verdict, margin, bound),
                       when(verdict, style), ending(verdict.mark));
}

Sentence sentence(const Snapshot& snapshot, std::span<const Cell> choice,
                  const NumberStyle& style) {
    Sentence made;
    for (const auto& cell : choice) {
        made.due += due(cell);
    }
    const auto [cell, verdict] = governing(choice);
    if (cell == nullptr) {
        return withoutResult(snapshot, choice, std::move(made));
    }
    made.option = cell->option;
    made.study = cell->study;
    made.optionName = snapshot.optionName(cell->option);
    made.studyName = snapshot.studyName(cell->study);
    const auto& variant = snapshot.variant(cell->option);
    if (verdict != nullptr && hasValue(*verdict)) {
        made.kind = Sentence::Kind::verdict;
        made.verdict = *verdict;
        made.limitName = variant.limits.name(verdict->limit);
        made.statement = fmt::format("{}.", statement(variant, *verdict, style));
    } else if (cell->state == CellState::failed || cell->state == CellState::cutShort) {
        made.kind = Sentence::Kind::failed;
        made.statement = cell->reason ? whatText(*cell->reason, style) : "The run ended early.";
    } else if (verdict != nullptr && verdict->mark == Mark::notValid) {
        made.kind = Sentence::Kind::verdict;
        made.verdict = *verdict;
        made.limitName = variant.limits.name(verdict->limit);
        made.statement = fmt::format("\"{}\" is not valid. {}", made.limitName,
                                     verdict->reason ? whatText(*verdict->reason, style) : "");
    } else {
        made.kind = Sentence::Kind::noLimit;
        made.statement = "no limit can be judged.";
    }
    made.text = whole(made, made.due, choice.size());
    return made;
}

} // namespace headroom::studies
