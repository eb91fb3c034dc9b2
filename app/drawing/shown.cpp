// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/shown.h"

#include "limits/judge.h"

namespace headroom::drawing {

namespace {

bool judged(const results::Verdict& verdict) {
    return verdict.mark != results::Mark::notRun && verdict.mark != results::Mark::notApplicable;
}

} // namespace

Shown shown(const studies::Snapshot& snapshot, const studies::Cell* inHand,
            const Selection& selection) {
    const CellId wanted =
        inHand != nullptr ? CellId{inHand->option, inHand->study} : selection.inHand();
    Shown out;
    out.option = wanted.option >= -1 && wanted.option < snapshot.options() ? wanted.option : -1;
    out.variant = snapshot.variants[static_cast<std::size_t>(out.option + 1)];
    if (wanted.study >= 0 && wanted.study < snapshot.studies()) {
        out.study = &snapshot.project().studies[wanted.study];
        out.loadClass = out.study->loadClass;
    }
    if (inHand != nullptr && inHand->stored != nullptr && inHand->stored->run != nullptr) {
        out.run = inHand->stored->run;
        out.verdicts = inHand->verdicts;
    }
    return out;
}

std::vector<double> Shown::level_m() const {
    std::vector<double> out;
    for (const auto& [name, reservoir] : variant->plant.reservoirs) {
        out.push_back(reservoir.level_m);
    }
    if (study != nullptr) {
        for (const auto& [reservoir, level] : study->start.level_m) {
            if (reservoir.index >= 0 && static_cast<std::size_t>(reservoir.index) < out.size()) {
                out[static_cast<std::size_t>(reservoir.index)] = level;
            }
        }
    }
    return out;
}

const results::Verdict* Shown::verdict(int limit) const {
    for (const auto& verdict : verdicts) {
        if (verdict.limit == limit) {
            return &verdict;
        }
    }
    return nullptr;
}

const results::Verdict* Shown::leading(int chosenLimit) const {
    const auto* chosen = verdict(chosenLimit);
    if (chosen == nullptr) {
        chosen = limits::worst(verdicts);
    }
    return chosen != nullptr && judged(*chosen) ? chosen : nullptr;
}

} // namespace headroom::drawing
