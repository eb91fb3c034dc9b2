// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/messages.h"
#include "plant/project.h"
#include "units/text.h"

#include <string>
#include <utility>
#include <vector>

namespace headroom::plant {

using Arguments = std::vector<std::pair<std::string, Argument>>;

/// The option whose plant is looked at, so that a finding can point into its changes.
struct OptionInHand {
    std::string name;
    const Tree* changes = nullptr; ///< merge patch
    const Tree* base = nullptr;    ///< the project's tree before the patch
};

/// Collects findings with their subject and place.
class Report {
public:
    explicit Report(Places places, std::optional<OptionInHand> option = {});

    /// `at` is a path of the plant as looked at; inside an option it is turned into the path of
    /// the option's changes when the option is what says it.
    void add(const Message& message, const Path& at, Arguments arguments = {},
             std::vector<Path> related = {});

    const std::optional<OptionInHand>& option() const { return option_; }
    Findings& findings() { return findings_; }
    Path subjectOf(const Path& at) const;

private:
    Places places_;
    std::optional<OptionInHand> option_;
    Findings findings_;
};

/// Place of a path, or of the nearest thing around it that has one.
std::optional<FilePlace> placeOf(const Places& places, Path path);

/// "a, b, c", cut after `most` with the count of the rest.
std::string listed(const std::vector<std::string>& names, std::size_t most = 12);

/// What a collection is called in a sentence, "points".
std::string_view nameOf(Collection collection);

} // namespace headroom::plant
