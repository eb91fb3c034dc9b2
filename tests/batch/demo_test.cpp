// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/project_file.h"
#include "program.h"

#include <algorithm>
#include <map>
#include <set>

using namespace headroom;
using program::call;
using program::demo;

namespace {

plant::Tree verdictsOf(const std::filesystem::path& folder) {
    const auto parsed = files::parseJson(program::readAll(folder / "verdicts.json"), "verdicts");
    REQUIRE(parsed.findings.empty());
    return parsed.tree;
}

std::vector<std::string> lines(const std::string& text) {
    std::vector<std::string> out;
    std::istringstream stream(text);
    for (std::string line; std::getline(stream, line);) {
        out.push_back(line);
    }
    return out;
}

std::vector<std::string> with(std::vector<std::string> words, std::vector<std::string> more) {
    words.insert(words.end(), more.begin(), more.end());
    return words;
}

/// A part of the matrix that is quick to run; the whole of it in the long tests.
std::vector<std::string> someCells(const plant::Project& project) {
    if (testCount(0, 1) == 1) {
        return {};
    }
    return {"--option", project.baseName,        "--option", project.options.name(0),
            "--study",  project.studies.name(0), "--study",  project.studies.name(1)};
}

std::string keyOf(const plant::Tree& row) {
    std::string key;
    for (const char* part : {"option", "study", "limit", "verdict"}) {
        key += row.find(part)->asText();
        key += "|";
    }
    return key;
}

} // namespace

TEST_CASE("demo: the same bytes for any number of jobs, and parts make up the whole",
          "[batch][run]") {
    const auto project = files::openProject(demo).bound.project;
    const auto some = someCells(project);
    const program::Folder folder;
    const auto one = folder.path() / "one";
    const auto four = folder.path() / "four";
    const auto answer = call(with({"run", demo, "--out", one.string(), "--jobs", "1"}, some));
    CAPTURE(answer.err);
    REQUIRE(answer.exit == 0);
    CHECK_THAT(answer.err, ContainsSubstring("s left"));
    REQUIRE(call(with({"run", demo, "--out", four.string(), "--jobs", "4"}, some)).exit == 0);
    CHECK(program::readAll(one / "verdicts.json") == program::readAll(four / "verdicts.json"));
    CHECK(program::readAll(one / "summary.txt") == program::readAll(four / "summary.txt"));
    int traces = 0;
    for (const auto& entry : std::filesystem::directory_iterator(one / "traces")) {
        CAPTURE(entry.path());
        CHECK(program::readAll(entry.path()) ==
              program::readAll(four / "traces" / entry.path().filename()));
        ++traces;
    }
    CHECK(traces >= 4);

    const auto list = verdictsOf(one);
    std::multiset<std::string> all, parts;
    for (const auto& row : list.items()) {
        all.insert(keyOf(row));
        CHECK(std::filesystem::exists(one / row.find("trace")->asText()));
    }
    for (const char* part : {"1/2", "2/2"}) {
        REQUIRE(call(with({"run", demo, "--out", four.string(), "--part", part}, some)).exit == 0);
        const auto partial = verdictsOf(four);
        for (const auto& row : partial.items()) {
            parts.insert(keyOf(row));
        }
    }
    CHECK(all == parts);
}

TEST_CASE("demo: as built, held, tight, undecided and broken all occur", "[batch][run]") {
    const auto project = files::openProject(demo).bound.project;
    const program::Folder folder;
    const auto answer = call({"run", demo, "--out", folder.path().string(), "--strict", "--option",
                              project.baseName});
    CAPTURE(answer.err);
    CHECK(answer.exit == 1); // --strict and a broken limit
    const auto list = verdictsOf(folder.path());
    CHECK(list.items().size() ==
          static_cast<std::size_t>(project.studies.size() * project.limits.size()));
    std::map<std::string, int> marks;
    for (const auto& row : list.items()) {
        ++marks[row.find("verdict")->asText()];
    }
    for (const char* mark : {"held", "tight", "undecided", "broken"}) {
        CAPTURE(mark);
        CHECK(marks[mark] > 0);
    }
    CHECK(marks["notRun"] == 0);

    const auto rows = lines(program::readAll(folder.path() / list.items().front().find("trace")->asText()));
    REQUIRE(rows.size() > 100);
    CHECK(rows.size() <= 6001);
    CHECK(rows.front().rfind("time [s],", 0) == 0);
    CHECK(rows.front().back() == '\r');
    const auto commas = std::count(rows[1].begin(), rows[1].end(), ',');
    CHECK(commas > 5);
    CHECK(std::count(rows.back().begin(), rows.back().end(), ',') == commas);
}

TEST_CASE("demo: one cell as data on standard output writes no file", "[batch][run]") {
    const auto project = files::openProject(demo).bound.project;
    const auto answer = call({"run", demo, "--option", project.baseName, "--study",
                              project.studies.name(0), "--json"});
    CHECK(answer.exit == 0);
    const auto parsed = files::parseJson(answer.out, "out");
    REQUIRE(parsed.findings.empty());
    CHECK(parsed.tree.items().size() == static_cast<std::size_t>(project.limits.size()));
    for (const auto& row : parsed.tree.items()) {
        CHECK(row.find("trace")->isNull());
    }
}
