// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/judge.h"

#include "limits/allowance.h"
#include "limits/bounds.h"
#include "limits/evidence.h"
#include "limits/messages.h"
#include "limits/place.h"
#include "limits/share.h"
#include "limits/static_head.h"
#include "limits/time_outside.h"
#include "limits/uncertainty.h"
#include "limits/validity.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::limits {

namespace {

using results::EndReason;
using results::Mark;
using results::Place;
using results::Run;
using results::Verdict;

/// What is judged, and on what.
struct Case {
    const plant::Variant& variant;
    const plant::Study& study;
    const plant::Limit& limit;
    const Run& run;
    const Run* repeat; ///< nullptr: missing or cancelled
    Place place;
    double staticHead_m = 0.0; ///< only where the allowance asks for it
};

// --- one side -----------------------------------------------------------------------------------

/// Time outside and, for a limit that allows some, the margin and share that follow from it.
/// False if the bound is passed and nothing tells for how long.
bool judgeTime(Verdict& verdict, const Case& the, const Evidence& traced, const Added& added,
               double until_s) {
    const auto& limit = the.limit;
    const bool timed = limit.timeRule != plant::TimeRule::momentary && limit.allowed_s > 0.0;
    const bool neverOut = verdict.margin - verdict.uncertainty >= 0.0;
    if (traced.trace == nullptr) {
        verdict.outsideKnown = neverOut;
        return !timed || neverOut;
    }
    if (!timed && neverOut) {
        return true;
    }
    const double inward = verdict.uncertainty * (verdict.upper ? -1.0 : 1.0);
    const auto outside_s = [&](double bound) {
        return timeOutside(traced, added.side, added.from(bound), until_s)
            .counted_s(limit.timeRule);
    };
    verdict.outside_s = outside_s(verdict.bound);
    verdict.outsideLeast_s = outside_s(verdict.bound - inward);
    verdict.outsideMost_s = outside_s(verdict.bound + inward);
    if (timed) {
        const double spent = added.to(valueExceededFor(traced, added.side, limit.timeRule,
                                                       limit.allowed_s, until_s));
        verdict.margin = added.sign() * (verdict.bound - spent);
    }
    return true;
}

void judgeShare(Verdict& verdict, const Case& the) {
    const double span =
        spanOf(the.limit, the.variant.plant, the.study, the.place, verdict.bound);
    verdict.share = marginShare(verdict.margin, verdict.bound, verdict.rest, span);
    if (the.limit.timeRule != plant::TimeRule::momentary && the.limit.allowed_s > 0.0) {
        const double left = (the.limit.allowed_s - verdict.outside_s) / the.limit.allowed_s;
        verdict.share = std::min(verdict.share, left);
    }
}

void giveMark(Verdict& verdict, const Until& until, bool hasNumerical, const std::string& subject) {
    if (hasNumerical) {
        verdict.mark = mark(verdict.margin, verdict.uncertainty, verdict.reserve);
        if (until.whole() || verdict.mark == Mark::broken) {
            return;
        }
    }
    if (until.whole()) {
        verdict.mark = Mark::notRun;
        verdict.reason = finding(repeatMissing, subject);
    } else {
        verdict.mark = Mark::notValid;
        verdict.reason = until.why;
    }
}

Verdict notValid(Verdict verdict, Finding why) {
    verdict.mark = Mark::notValid;
    verdict.reason = std::move(why);
    return verdict;
}

bool finite(const Evidence& evidence) {
    return std::isfinite(evidence.extreme) && std::isfinite(evidence.rest) &&
           std::isfinite(evidence.largestStep);
}

Verdict judgeSide(Verdict verdict, const Case& the, Side side, const Bound& bound,
                  const std::string& subject) {
    verdict.upper = side == Side::upper;
    verdict.bound = bound.value;
    verdict.boundClass = static_cast<int>(bound.from);
    const auto until = usable(the.run, the.repeat, the.place, subject);
    const auto& plant = the.variant.plant;
    const auto coarse = evidence(the.limit, the.place, side, the.run, plant, until.time_s);
    const auto fine = the.repeat == nullptr
                          ? std::nullopt
                          : evidence(the.limit, the.place, side, *the.repeat, plant, until.time_s);
    if (!coarse) {
        return notValid(verdict, until.why.value_or(finding(noTrace, subject)));
    }
    const auto& reported = fine ? *fine : *coarse;
    if (!finite(reported) || !finite(*coarse)) {
        return notValid(verdict, finding(notFinite, subject));
    }
    const Added added{side, the.limit.allowance.shareOfHead * the.staticHead_m,
                      the.limit.allowance.shareOfRise, reported.rest};
    verdict.place = reported.place;
    verdict.rest = reported.rest;
    verdict.time_s = reported.time_s;
    verdict.extreme = added.to(reported.extreme);
    verdict.allowance = verdict.extreme - reported.extreme;
    verdict.margin = added.sign() * (bound.value - verdict.extreme);
    verdict.alreadyBrokenAtRest = added.sign() * (added.to(reported.rest) - bound.value) > 0.0;
    Uncertainty parts;
    if (fine) {
        const double step = coarse->tracked != nullptr && fine->tracked != nullptr
                                ? fine->scale * stepNear(the.limit.measure, *coarse->tracked,
                                                         *fine->tracked)
                                : fine->largestStep;
        parts.numerical = numericalUncertainty(coarse->extreme, fine->extreme, step) *
                          added.slope(fine->extreme);
    }
    parts.model = modelUncertainty(the.limit, plant, the.place);
    verdict.numerical = parts.numerical;
    verdict.model = parts.model;
    verdict.uncertainty = parts.total();
    const bool timeKnown = judgeTime(verdict, the, *coarse, added, until.time_s);
    judgeShare(verdict, the);
    if (!timeKnown) {
        return notValid(verdict, finding(noTrace, subject));
    }
    giveMark(verdict, until, fine.has_value(), subject);
    return verdict;
}

// --- one limit ----------------------------------------------------------------------------------

Verdict withReason(Verdict verdict, Mark mark, Finding why) {
    verdict.mark = mark;
    verdict.reason = std::move(why);
    return verdict;
}

bool measuredInHead(Measure measure) {
    switch (measure) {
    case Measure::level:
    case Measure::head:
    case Measure::pressureHead:
    case Measure::netHead:
    case Measure::draftPressureHead:
        return true;
    default:
        return false;
    }
}

Verdict judgeRun(const Verdict& start, const Case& given, const std::string& subject) {
    Case the = given;
    const auto& plant = the.variant.plant;
    if (!recorded(the.limit, the.place, the.run, plant)) {
        if (the.run.status.reason != EndReason::completed) {
            return notValid(start, *usable(the.run, the.place, subject).why);
        }
        auto why = finding(notRecorded, subject);
        why.arguments = {{"measure", std::string(info(the.limit.measure).label)},
                         {"place", nameOf(the.place, plant)}};
        return withReason(start, Mark::notApplicable, std::move(why));
    }
    if (the.limit.allowance.shareOfHead > 0.0) {
        const auto head_m = measuredInHead(the.limit.measure)
                                ? staticHead_m(plant, the.study, the.place)
                                : std::nullopt;
        if (!head_m) {
            return withReason(start, Mark::notApplicable, finding(noStaticHead, subject));
        }
        the.staticHead_m = std::max(0.0, *head_m);
    }
    std::optional<Verdict> governing;
    const auto judgeWith = [&](Side side, const plant::ClassValues& values) {
        if (const auto bound = boundFor(values, the.study.loadClass)) {
            auto verdict = judgeSide(start, the, side, *bound, subject);
            if (!governing || worse(verdict, *governing)) {
                governing = std::move(verdict);
            }
        }
    };
    judgeWith(Side::lower, the.limit.least);
    judgeWith(Side::upper, the.limit.greatest);
    return *governing;
}

Verdict judgeLimit(const plant::Variant& variant, const plant::Study& study, int index,
                   const Run* run, const Run* repeat) {
    const auto& limit = variant.limits[index];
    const std::string subject = plant::join({"limits", variant.limits.name(index)});
    Verdict verdict;
    verdict.limit = index;
    verdict.measure = limit.measure;
    verdict.reserve = limit.reserve;
    verdict.unsignedLimit = !limit.source.given();
    const auto place = placeOf(limit, variant.plant);
    if (!place) {
        auto why = finding(placeMissing, subject);
        why.arguments = {{"place", limit.at.thing.name}};
        return withReason(std::move(verdict), Mark::notApplicable, std::move(why));
    }
    verdict.place = *place;
    const auto lower = boundFor(limit.least, study.loadClass);
    const auto upper = boundFor(limit.greatest, study.loadClass);
    if (!lower && !upper) {
        auto why = finding(classMissing, subject);
        why.arguments = {{"class", std::string(name(study.loadClass))}};
        return withReason(std::move(verdict), Mark::notApplicable, std::move(why));
    }
    const auto& shown = upper ? *upper : *lower;
    verdict.upper = upper.has_value();
    verdict.bound = shown.value;
    verdict.boundClass = static_cast<int>(shown.from);
    if (run == nullptr) {
        return withReason(std::move(verdict), Mark::notRun, finding(notRun, subject));
    }
    const bool repeatUsable =
        repeat != nullptr && repeat->status.reason != EndReason::cancelled;
    return judgeRun(verdict,
                    {variant, study, limit, *run, repeatUsable ? repeat : nullptr, *place},
                    subject);
}

} // namespace

std::vector<Verdict> judge(const plant::Variant& variant, const plant::Study& study,
                           const Run* run, const Run* repeat) {
    std::vector<Verdict> verdicts;
    for (int i = 0; i < variant.limits.size(); ++i) {
        verdicts.push_back(judgeLimit(variant, study, i, run, repeat));
    }
    return verdicts;
}

} // namespace headroom::limits
