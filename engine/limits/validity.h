// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "results/run.h"

#include <limits>
#include <optional>
#include <string>

namespace headroom::limits {

/// Until when values at a place count, and what ended that.
struct Until {
    double time_s = std::numeric_limits<double>::infinity();
    std::optional<Finding> why;
    bool whole() const { return !why.has_value(); }
};

/// A run counts until it left the model's range (unless the place stays valid then) or stopped
/// short of its end. `subject` is the limit's path, for the finding.
Until usable(const results::Run& run, const results::Place& place, const std::string& subject);
/// The same for a run and its repeat (nullptr: none): the earlier end.
Until usable(const results::Run& run, const results::Run* repeat, const results::Place& place,
             const std::string& subject);

/// A finding of this floor about one limit.
Finding finding(const Message& message, const std::string& subject);

} // namespace headroom::limits
