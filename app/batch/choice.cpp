// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/choice.h"

#include "base/near_miss.h"
#include "batch/messages.h"
#include "plant/report.h"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <optional>

namespace headroom::batch {

namespace {

Finding unknown(const std::string& name, const std::vector<std::string>& known,
                const Message& plain, const Message& near) {
    Finding finding;
    if (const auto nearest = nearMiss(name, known)) {
        finding.message = &near;
        finding.arguments = {{"name", name}, {"near", *nearest}};
    } else {
        finding.message = &plain;
        finding.arguments = {{"name", name}, {"known", plant::listed(known)}};
    }
    return finding;
}

/// Positions of the wanted names among the known ones, in the known order; all if none is wanted.
std::vector<int> positions(const std::vector<std::string>& wanted,
                           const std::vector<std::string>& known, const Message& plain,
                           const Message& near, Findings& findings) {
    std::vector<int> found;
    for (int i = 0; i < static_cast<int>(known.size()); ++i) {
        const auto& name = known[static_cast<std::size_t>(i)];
        if (wanted.empty() || std::find(wanted.begin(), wanted.end(), name) != wanted.end()) {
            found.push_back(i);
        }
    }
    for (const auto& name : wanted) {
        if (std::find(known.begin(), known.end(), name) == known.end()) {
            findings.push_back(unknown(name, known, plain, near));
        }
    }
    return found;
}

struct Part {
    int index = 1, count = 1;
};

std::optional<int> wholeNumber(std::string_view text) {
    int value = 0;
    const auto [end, fault] = std::from_chars(text.data(), text.data() + text.size(), value);
    const bool all = fault == std::errc{} && end == text.data() + text.size();
    return all ? std::optional(value) : std::nullopt;
}

std::optional<Part> partOf(const std::string& text) {
    if (text.empty()) {
        return Part{};
    }
    const auto slash = text.find('/');
    if (slash == std::string::npos) {
        return std::nullopt;
    }
    const auto index = wholeNumber(std::string_view(text).substr(0, slash));
    const auto count = wholeNumber(std::string_view(text).substr(slash + 1));
    if (!index || !count || *index < 1 || *index > *count) {
        return std::nullopt;
    }
    return Part{*index, *count};
}

} // namespace

Result<Cells> chosenCells(const Call& call, const studies::Snapshot& snapshot) {
    std::vector<std::string> options;
    for (int i = -1; i < snapshot.options(); ++i) {
        options.push_back(snapshot.optionName(i));
    }
    const auto names = snapshot.project().studies.names();
    Findings findings;
    if (names.empty()) {
        findings.push_back({.message = &noStudy});
    }
    const auto chosenOptions =
        positions(call.options, options, unknownOption, unknownOptionNear, findings);
    const auto chosenStudies = names.empty() ? std::vector<int>{}
                                             : positions(call.studies, names, unknownStudy,
                                                         unknownStudyNear, findings);
    const auto part = partOf(call.part);
    if (!part) {
        findings.push_back({.message = &badPart, .arguments = {{"part", call.part}}});
    }
    if (!findings.empty()) {
        return findings;
    }
    Cells cells;
    int number = 0;
    for (const int option : chosenOptions) {
        for (const int study : chosenStudies) {
            if (number++ % part->count == part->index - 1) {
                cells.emplace_back(option - 1, study); // the base is the first of the names
            }
        }
    }
    return cells;
}

std::string cellName(const studies::Snapshot& snapshot, int option, int study) {
    return fmt::format("{} – {}", snapshot.optionName(option), snapshot.studyName(study));
}

} // namespace headroom::batch
