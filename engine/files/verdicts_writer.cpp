// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/verdicts_writer.h"

#include "files/json_writer.h"
#include "limits/bounds.h"
#include "limits/place.h"
#include "units/text.h"

namespace headroom::files {

namespace {

using plant::Tree;
using results::Mark;
using results::Verdict;

/// Whether extreme and margin of a row mean something.
bool hasMargin(const Verdict& verdict) {
    switch (verdict.mark) {
    case Mark::held:
    case Mark::tight:
    case Mark::undecided:
    case Mark::broken:
        return true;
    case Mark::notValid:
    case Mark::notRun: // the repeat is missing, and the first run's margin is known
        return verdict.margin != 0.0 || verdict.extreme != 0.0;
    case Mark::notApplicable:
        return false;
    }
    return false;
}

Tree known(bool holds, double value) {
    return holds ? Tree::number(value) : Tree{};
}

std::string placeName(const plant::Variant& variant, const Verdict& verdict) {
    const auto& limit = variant.limits[verdict.limit];
    const bool placed = verdict.place.thing == results::Thing::grid || verdict.place.index >= 0;
    if (!placed || (limit.at.thing.given() && !limit.at.thing.resolved())) {
        return limit.at.thing.name;
    }
    return limits::nameOf(verdict.place, variant.plant);
}

/// Differences of a quantity in its file unit, without the offset that a position may have.
double difference(Quantity quantity, double si) {
    return si / info(quantity).toSi;
}

Tree row(const studies::Snapshot& snapshot, const studies::Cell& cell, const Verdict& verdict,
         const std::string& trace) {
    const auto& variant = snapshot.variant(cell.option);
    const auto quantity = info(verdict.measure).quantity;
    const auto& study = snapshot.project().studies[cell.study];
    const bool margin = hasMargin(verdict);
    const bool bound = verdict.mark != Mark::notApplicable;
    const auto size = [&](double si) { return known(margin, difference(quantity, si)); };
    const auto time = [&](bool holds, double value) { return known(margin && holds, value); };
    return Tree::object({
        {"option", Tree::text(snapshot.optionName(cell.option))},
        {"study", Tree::text(snapshot.studyName(cell.study))},
        {"limit", Tree::text(variant.limits.name(verdict.limit))},
        {"quantity", Tree::text(std::string(info(verdict.measure).key))},
        {"at", Tree::text(placeName(variant, verdict))},
        {"class", Tree::text(std::string(limits::name(study.loadClass)))},
        {"boundClass", bound ? Tree::text(std::string(limits::name(
                                   static_cast<plant::LoadClass>(verdict.boundClass))))
                             : Tree{}},
        {"side", bound ? Tree::text(verdict.upper ? "max" : "min") : Tree{}},
        {"bound", known(bound, fromSi(quantity, verdict.bound))},
        {"extreme", known(margin, fromSi(quantity, verdict.extreme))},
        {"allowance", size(verdict.allowance)},
        {"rest", known(margin, fromSi(quantity, verdict.rest))},
        {"time_s", time(true, verdict.time_s)},
        {"margin", size(verdict.margin)},
        {"share", known(margin, verdict.share)},
        {"uncertainty", size(verdict.uncertainty)},
        {"numerical", size(verdict.numerical)},
        {"model", size(verdict.model)},
        {"reserve", Tree::number(difference(quantity, verdict.reserve))},
        {"outside_s", time(verdict.outsideKnown, verdict.outside_s)},
        {"unit", Tree::text(std::string(info(quantity).symbol))},
        {"verdict", Tree::text(std::string(results::name(verdict.mark)))},
        {"alreadyBrokenAtRest", Tree::boolean(verdict.alreadyBrokenAtRest)},
        {"unsigned", Tree::boolean(verdict.unsignedLimit)},
        {"reason", verdict.reason ? Tree::text(text(*verdict.reason)) : Tree{}},
        {"trace", trace.empty() ? Tree{} : Tree::text(trace)},
    });
}

} // namespace

std::string writeVerdicts(const studies::Snapshot& snapshot,
                          const std::vector<studies::Cell>& cells,
                          const std::function<std::string(const studies::Cell&)>& tracePath) {
    std::vector<Tree> rows;
    for (const auto& cell : cells) {
        const auto trace = tracePath(cell);
        for (const auto& verdict : cell.verdicts) {
            rows.push_back(row(snapshot, cell, verdict, trace));
        }
    }
    return writeJson(Tree::array(std::move(rows)));
}

} // namespace headroom::files
