// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/json_writer.h"
#include "files/project_file.h"
#include "files/schema.h"
#include "program.h"

#include <fstream>

using namespace headroom;
using program::call;
using program::demo;

namespace {

/// The demo with one value changed, as a file in `folder`.
std::string changedDemo(const program::Folder& folder, const plant::Path& path,
                        plant::Tree value) {
    const auto tree = files::openProject(demo).tree.with(path, std::move(value));
    const auto file = folder.path() / "Changed.headroom.json";
    std::ofstream(file, std::ios::binary) << files::writeProject(tree);
    return file.string();
}

std::string firstStudy() {
    return files::openProject(demo).bound.project.studies.name(0);
}

} // namespace

TEST_CASE("calls: what is missing or not known ends with 2 and a word of help", "[batch][messages]") {
    CHECK(call({}).exit == 2);
    CHECK(call({"rum", demo}).exit == 2);
    CHECK(call({"run"}).exit == 2);
    CHECK(call({"run", demo, "--nonsense"}).exit == 2);
    CHECK(call({"run", demo, "--out", "x", "--jobs", "0"}).exit == 2);
    const auto nowhere = call({"run", demo});
    CHECK(nowhere.exit == 2);
    CHECK_THAT(nowhere.err, ContainsSubstring("[batch.no-output]"));
    const auto noFile = call({"check", "no such file.headroom.json"});
    CHECK(noFile.exit == 2);
    CHECK_THAT(noFile.err, ContainsSubstring("[files.not-found]"));
    CHECK(call({"--help"}).exit == 0);
    CHECK_THAT(call({"run", "--help"}).out, ContainsSubstring("--part"));
}

TEST_CASE("calls: an unknown option names the nearest", "[batch][messages]") {
    const auto name = files::openProject(demo).bound.project.options.name(0);
    auto slip = name;
    slip.back() = '?';
    const program::Folder folder;
    const auto out = folder.path() / "results";
    const auto answer = call({"run", demo, "--option", slip, "--out", out.string()});
    CHECK(answer.exit == 2);
    CHECK_THAT(answer.err, ContainsSubstring(name));
    CHECK_FALSE(std::filesystem::exists(out));
}

TEST_CASE("calls: the schema is the one that lies in the resources", "[batch][files]") {
    const auto answer = call({"schema"});
    CHECK(answer.exit == 0);
    CHECK(answer.err.empty());
    CHECK(answer.out == files::projectSchemaText());
}

TEST_CASE("calls: the state at rest as text and as data", "[batch][run]") {
    const auto text = call({"rest", demo, "--option", "As built", "--study", firstStudy()});
    CHECK(text.exit == 0);
    CHECK_THAT(text.out, ContainsSubstring("Surge shaft"));
    CHECK_THAT(text.out, ContainsSubstring("m³/s"));
    const auto data =
        call({"rest", demo, "--option", "As built", "--study", firstStudy(), "--json"});
    const auto parsed = files::parseJson(data.out, "out");
    REQUIRE(parsed.findings.empty());
    REQUIRE(parsed.tree.items().size() == 1);
    const auto& first = parsed.tree.items().front();
    CHECK(first.find("study")->asText() == firstStudy());
    CHECK(first.find("values")->items().size() > 10);
    for (const auto& row : first.find("values")->items()) {
        CHECK(row.find("unit") != nullptr);
    }
}

TEST_CASE("calls: the plausibility sheet", "[batch][run]") {
    const auto answer = call({"check", demo});
    CAPTURE(answer.err);
    CHECK(answer.exit == 0);
    for (const char* row : {"Water starting time", "Machine starting time", "Reflection time",
                            "Surge period", "Area over Thoma's", "Velocity", "Loss of head"}) {
        CHECK_THAT(answer.out, ContainsSubstring(row));
    }
}

TEST_CASE("calls: what only the models show is found before anything is run", "[batch][files]") {
    const program::Folder folder;
    // More power than the water can give: the rest cannot be reached.
    const auto greedy = changedDemo(
        folder, {"studies", firstStudy(), "start", "output_MW", "U1"}, plant::Tree::number(400));
    const auto out = folder.path() / "results";
    const auto answer = call({"run", greedy, "--out", out.string()});
    CAPTURE(answer.err);
    CHECK(answer.exit == 2);
    CHECK_THAT(answer.err, ContainsSubstring("[simulation."));
    CHECK_THAT(answer.err, ContainsSubstring(firstStudy()));
    CHECK_FALSE(std::filesystem::exists(out));

    // Rated data that no chart can meet.
    const auto chart = changedDemo(folder,
                                   {"plant", "units", "U1", "turbine", "francis", "chart",
                                    "fromRatedData", "runaway_pu"},
                                   plant::Tree::number(1.21));
    const auto refused = call({"run", chart, "--out", out.string()});
    CAPTURE(refused.err);
    CHECK(refused.exit == 2);
    CHECK_THAT(refused.err, ContainsSubstring("[machines."));
    CHECK_THAT(refused.err, ContainsSubstring("Changed.headroom.json:"));
    CHECK_FALSE(std::filesystem::exists(out));
}

TEST_CASE("calls: results that cannot be written end with 2", "[batch][files]") {
    const program::Folder folder;
    const auto file = folder.path() / "a file";
    std::ofstream(file) << "in the way";
    const auto answer = call({"run", demo, "--option", "As built", "--study", firstStudy(),
                              "--out", (file / "results").string()});
    CHECK(answer.exit == 2);
    CHECK_THAT(answer.err, ContainsSubstring("[batch.folder-not-made]"));
}
