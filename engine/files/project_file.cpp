// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/project_file.h"

#include "files/json_reader.h"
#include "files/json_writer.h"
#include "files/messages.h"
#include "files/migration.h"
#include "files/outer_tables.h"
#include "files/replace_file.h"
#include "plant/messages.h"

#include <algorithm>
#include <cerrno>
#include <cstring>
#include <fstream>

namespace headroom::files {

namespace {

namespace fs = std::filesystem;

Finding fault(const Message& message, const fs::path& path, std::string reason) {
    Finding finding;
    finding.message = &message;
    finding.arguments = {{"file", path.filename().string()}, {"reason", std::move(reason)}};
    finding.place = FilePlace{path.string(), 1, 1};
    return finding;
}

Finding notAProject(const plant::Tree& tree, const std::string& name) {
    Finding finding;
    finding.message = &say::notAProject;
    finding.arguments = {{"found", std::string(tree.isArray()    ? "a list"
                                               : tree.isText()   ? "a text"
                                               : tree.isNumber() ? "a number"
                                                                 : "one word")}};
    finding.place = FilePlace{name, 1, 1};
    return finding;
}

/// Errors first stay where they are in the file: by line, then column; without a place, last.
void sortByPlace(Findings& findings) {
    const auto key = [](const Finding& finding) {
        return finding.place ? std::pair(finding.place->line, finding.place->column)
                             : std::pair(1 << 30, 0);
    };
    std::stable_sort(findings.begin(), findings.end(),
                     [&](const Finding& a, const Finding& b) { return key(a) < key(b); });
}

/// A table that could not be read is told by its file; that it is not attached says no more.
void dropEchoes(Findings& findings, const Findings& early) {
    std::erase_if(findings, [&](const Finding& finding) {
        return finding.message == &plant::say::tableNotLoaded
               && std::any_of(early.begin(), early.end(), [&](const Finding& other) {
                      return other.subject == finding.subject;
                  });
    });
}

} // namespace

Result<std::string> readFile(const fs::path& path) {
    std::error_code failed;
    if (!fs::exists(path, failed)) {
        return fault(say::notFound, path, "");
    }
    if (!fs::is_regular_file(path, failed)) {
        return fault(say::notReadable, path, "it is not a file");
    }
    const auto size = fs::file_size(path, failed);
    if (!failed && size > largestFile_bytes) {
        Finding finding = fault(say::tooLarge, path, "");
        finding.arguments = {{"size", static_cast<std::int64_t>(size >> 20U)},
                             {"most", static_cast<std::int64_t>(largestFile_bytes >> 20U)}};
        return finding;
    }
    std::ifstream in(path, std::ios::binary);
    std::string text((std::istreambuf_iterator<char>(in)), std::istreambuf_iterator<char>());
    if (!in && !in.eof()) {
        return fault(say::notReadable, path, std::strerror(errno));
    }
    return text;
}

Opened openText(std::string text, const fs::path& folder, const std::string& name) {
    Opened opened;
    opened.text = std::move(text);
    auto parsed = parseJson(opened.text, name);
    opened.places = std::move(parsed.places);
    opened.bound.findings = std::move(parsed.findings);
    if (!parsed.complete) {
        return opened;
    }
    if (!parsed.tree.isObject()) {
        opened.bound.findings.push_back(notAProject(parsed.tree, name));
        return opened;
    }
    auto migrated = migrate(parsed.tree, migrations(), newestFormat);
    for (auto& finding : migrated.findings) {
        finding.place = opened.places(plant::split(finding.subject));
        opened.bound.findings.push_back(std::move(finding));
    }
    if (!migrated.usable) {
        return opened; // what a newer format means is not known here
    }
    Findings early = std::move(opened.bound.findings);
    opened.tree = withOuterTables(migrated.tree, folder, opened.places, early);
    opened.bound = plant::bind(opened.tree, opened.places);
    auto& all = opened.bound.findings;
    dropEchoes(all, early);
    all.insert(all.begin(), early.begin(), early.end());
    sortByPlace(all);
    return opened;
}

Opened openProject(const fs::path& path) {
    auto text = readFile(path);
    if (!text) {
        Opened opened;
        opened.path = path;
        opened.bound.findings = text.findings();
        return opened;
    }
    auto opened = openText(std::move(text).value(), path.parent_path(), path.filename().string());
    opened.path = path;
    return opened;
}

Result<plant::Tree> saveProject(const plant::Tree& tree, const fs::path& path) {
    plant::Tree saved = plant::ordered(tree);
    auto findings = replaceFile(path, writeProject(saved));
    if (!findings.empty()) {
        return findings;
    }
    return saved;
}

plant::Bound rebind(const plant::Tree& tree) {
    return plant::bind(tree);
}

} // namespace headroom::files
