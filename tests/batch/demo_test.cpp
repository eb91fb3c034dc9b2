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

} // namespace

TEST_CASE("demo: the whole matrix, the same bytes for any number of jobs", "[batch][run]") {
    const program::Folder folder;
    const auto one = folder.path() / "one";
    const auto four = folder.path() / "four";
    const auto answer = call({"run", demo, "--out", one.string(), "--jobs", "1"});
    CAPTURE(answer.err);
    REQUIRE(answer.exit == 0);
    CHECK_THAT(answer.err, ContainsSubstring("s left"));
    REQUIRE(call({"run", demo, "--out", four.string(), "--jobs", "4"}).exit == 0);
    CHECK(program::readAll(one / "verdicts.json") == program::readAll(four / "verdicts.json"));
    CHECK(program::readAll(one / "summary.txt") == program::readAll(four / "summary.txt"));
    for (const auto& entry : std::filesystem::directory_iterator(one / "traces")) {
        CAPTURE(entry.path());
        CHECK(program::readAll(entry.path()) ==
              program::readAll(four / "traces" / entry.path().filename()));
    }

    // One row for each limit of each cell.
    const auto project = files::openProject(demo).bound.project;
    const auto list = verdictsOf(one);
    CHECK(list.items().size() >= static_cast<std::size_t>((project.options.size() + 1) *
                                                          project.studies.size() *
                                                          project.limits.size()));
    std::map<std::string, int> marks;
    for (const auto& row : list.items()) {
        if (row.find("option")->asText() == project.baseName) {
            ++marks[row.find("verdict")->asText()];
        }
    }
    for (const char* mark : {"held", "tight", "undecided", "broken"}) {
        CAPTURE(mark);
        CHECK(marks[mark] > 0);
    }
    CHECK(marks["notRun"] == 0);

    // A trace file: a heading with units, then rows of as many cells.
    const auto path = one / list.items().front().find("trace")->asText();
    const auto rows = lines(program::readAll(path));
    REQUIRE(rows.size() > 100);
    CHECK(rows.front().rfind("time [s],", 0) == 0);
    CHECK(rows.front().back() == '\r');
    const auto commas = std::count(rows[1].begin(), rows[1].end(), ',');
    CHECK(commas > 5);
    CHECK(std::count(rows.back().begin(), rows.back().end(), ',') == commas);

    // With --strict a broken limit shows in the exit status; parts make up the whole.
    const auto strict = folder.path() / "strict";
    std::multiset<std::string> all, parts;
    for (const auto& row : list.items()) {
        all.insert(row.find("option")->asText() + row.find("study")->asText() +
                   row.find("limit")->asText() + row.find("verdict")->asText());
    }
    std::set<int> exits;
    for (const char* part : {"1/2", "2/2"}) {
        exits.insert(
            call({"run", demo, "--out", strict.string(), "--strict", "--part", part}).exit);
        for (const auto& row : verdictsOf(strict).items()) {
            parts.insert(row.find("option")->asText() + row.find("study")->asText() +
                         row.find("limit")->asText() + row.find("verdict")->asText());
        }
    }
    CHECK(all == parts);
    CHECK(exits.count(1) == 1);
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
