// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/findings_output.h"

#include "batch/text_table.h"
#include "units/text.h"

#include <fmt/format.h>

#include <cstdio>

namespace headroom::batch {

namespace {

using plant::Tree;

std::string_view severityName(Severity severity) {
    switch (severity) {
    case Severity::note: return "note";
    case Severity::warning: return "warning";
    case Severity::error: return "error";
    }
    return "";
}

/// Longest part of a line that is shown around the place, in bytes.
constexpr std::size_t shownBefore = 70, shownAfter = 50;

/// First byte of a character at or after `at`.
std::size_t wholeCharacter(std::string_view text, std::size_t at) {
    while (at < text.size() && (static_cast<unsigned char>(text[at]) & 0xC0U) == 0x80U) {
        ++at;
    }
    return std::min(at, text.size());
}

std::string_view lineOf(std::string_view text, int number) {
    for (int line = 1; line < number; ++line) {
        const auto end = text.find('\n');
        if (end == std::string_view::npos) {
            return {};
        }
        text.remove_prefix(end + 1);
    }
    return text.substr(0, text.find('\n'));
}

std::string excerpt(const FilePlace& place, std::string_view text) {
    const auto line = lineOf(text, place.line);
    const auto column = static_cast<std::size_t>(std::max(0, place.column - 1));
    if (line.empty() || column > line.size()) {
        return {};
    }
    const auto from = wholeCharacter(line, column > shownBefore ? column - shownBefore : 0);
    const auto to = wholeCharacter(line, std::min(line.size(), column + shownAfter));
    const auto before = line.substr(from, column - from);
    return fmt::format("    {}\n    {:>{}}\n", line.substr(from, to - from), '^',
                       displayWidth(before) + 1);
}

Tree orNull(const std::optional<double>& number) {
    return number ? Tree::number(*number) : Tree{};
}

} // namespace

std::string findingText(const Finding& finding, std::string_view fileText,
                        const std::string& about) {
    std::string out;
    if (finding.place) {
        out += fmt::format("{}:{}:{}: ", finding.place->file, finding.place->line,
                           finding.place->column);
    }
    out += fmt::format("{}: ", severityName(finding.severity()));
    if (!about.empty()) {
        out += fmt::format("{}: ", about);
    }
    out += fmt::format("{} [{}]\n", text(finding), finding.message->code);
    if (finding.place && !fileText.empty()) {
        out += excerpt(*finding.place, fileText);
    }
    return out;
}

void tell(const Findings& findings, std::string_view fileText, const std::string& about) {
    for (const auto& finding : findings) {
        const auto words = findingText(finding, fileText, about);
        std::fwrite(words.data(), 1, words.size(), stderr);
    }
}

Tree findingTree(const Finding& finding) {
    const auto& place = finding.place;
    return Tree::object({
        {"severity", Tree::text(std::string(severityName(finding.severity())))},
        {"code", Tree::text(std::string(finding.message->code))},
        {"subject", Tree::text(finding.subject)},
        {"what", Tree::text(whatText(finding))},
        {"mend", Tree::text(mendText(finding))},
        {"file", place ? Tree::text(place->file) : Tree{}},
        {"line", place ? Tree::number(place->line) : Tree{}},
        {"column", place ? Tree::number(place->column) : Tree{}},
        {"time_s", orNull(finding.time_s)},
    });
}

Tree findingTrees(const Findings& findings) {
    std::vector<Tree> trees;
    for (const auto& finding : findings) {
        trees.push_back(findingTree(finding));
    }
    return Tree::array(std::move(trees));
}

} // namespace headroom::batch
