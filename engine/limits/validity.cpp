// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/validity.h"

#include "limits/messages.h"
#include "units/text.h"

#include <algorithm>

namespace headroom::limits {

namespace {

using results::EndReason;
using results::Run;

/// Why a run ended before its time.
Finding endOf(const Run& run, const std::string& subject) {
    if (run.status.reason == EndReason::failed && run.status.why) {
        return *run.status.why;
    }
    const bool failed = run.status.reason == EndReason::failed;
    auto why = finding(failed ? runFailed : cutShort, subject);
    why.arguments = {{"reached", amount(Quantity::time, run.status.reached_s)}};
    if (!failed) {
        why.arguments.emplace_back("wanted", amount(Quantity::time, run.duration_s));
    }
    return why;
}

} // namespace

Finding finding(const Message& message, const std::string& subject) {
    Finding made;
    made.message = &message;
    made.subject = subject;
    return made;
}

Until usable(const Run& run, const results::Place& place, const std::string& subject) {
    Until until;
    for (const auto& invalid : run.status.invalid) {
        const auto& valid = invalid.stillValid;
        const bool spared = std::find(valid.begin(), valid.end(), place.thing) != valid.end();
        if (!spared && invalid.from_s < until.time_s) {
            until = {invalid.from_s, invalid.why};
            until.why->time_s = invalid.from_s;
        }
    }
    const bool ended = run.status.reason != EndReason::completed;
    if (ended && run.status.reached_s < until.time_s) {
        until = {run.status.reached_s, endOf(run, subject)};
    }
    return until;
}

Until usable(const Run& run, const Run* repeat, const results::Place& place,
             const std::string& subject) {
    auto until = usable(run, place, subject);
    if (repeat != nullptr) {
        auto other = usable(*repeat, place, subject);
        if (other.time_s < until.time_s) {
            return other;
        }
    }
    return until;
}

} // namespace headroom::limits
