// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/report.h"

#include "plant/fields.h"

namespace headroom::plant {

namespace {

/// How many keys of `path` exist in `tree`.
std::size_t depthIn(const Tree& tree, const Path& path) {
    const Tree* here = &tree;
    std::size_t depth = 0;
    for (const auto& key : path) {
        here = here->find(key);
        if (here == nullptr) {
            break;
        }
        ++depth;
    }
    return depth;
}

} // namespace

Report::Report(Places places, std::optional<OptionInHand> option)
    : places_(std::move(places)), option_(std::move(option)) {}

Path Report::subjectOf(const Path& at) const {
    if (!option_) {
        return at;
    }
    const bool said = option_->changes->at(at) != nullptr;
    if (!said && depthIn(*option_->changes, at) <= depthIn(*option_->base, at)) {
        return at;
    }
    Path path = pathOf(Collection::options);
    path.push_back(option_->name);
    path.emplace_back(changesKey());
    path.insert(path.end(), at.begin(), at.end());
    return path;
}

void Report::add(const Message& message, const Path& at, Arguments arguments,
                 std::vector<Path> related) {
    Finding finding;
    finding.message = &message;
    const Path subject = subjectOf(at);
    finding.subject = join(subject);
    finding.arguments = std::move(arguments);
    finding.place = placeOf(places_, subject);
    for (const auto& path : related) {
        const Path other = subjectOf(path);
        finding.related.push_back(join(other));
        if (!finding.otherPlace) {
            finding.otherPlace = placeOf(places_, other);
        }
    }
    if (option_) {
        Path owner = pathOf(Collection::options);
        owner.push_back(option_->name);
        finding.related.push_back(join(owner));
    }
    findings_.push_back(std::move(finding));
}

std::optional<FilePlace> placeOf(const Places& places, Path path) {
    while (places) {
        if (auto place = places(path)) {
            return place;
        }
        if (path.empty()) {
            break;
        }
        path.pop_back();
    }
    return std::nullopt;
}

std::string listed(const std::vector<std::string>& names, std::size_t most) {
    std::string out;
    for (std::size_t i = 0; i < names.size() && i < most; ++i) {
        out += (i > 0 ? ", " : "") + names[i];
    }
    return names.size() > most ? out + " (+" + std::to_string(names.size() - most) + ")" : out;
}

std::string_view nameOf(Collection collection) {
    switch (collection) {
    case Collection::none:
        return "things";
    case Collection::points:
        return "points";
    case Collection::reservoirs:
        return "reservoirs";
    case Collection::conduits:
        return "conduits";
    case Collection::chambers:
        return "chambers";
    case Collection::units:
        return "units";
    case Collection::limits:
        return "limits";
    case Collection::options:
        return "options";
    case Collection::studies:
        return "studies";
    case Collection::events:
        return "events";
    }
    throw Bug("a collection has a name");
}

} // namespace headroom::plant
