// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/project_file.h"
#include "program.h"

using namespace headroom;

namespace {

plant::Tree index() {
    return files::parseJson(program::readAll(program::faulty / "index.json"), "index.json").tree;
}

} // namespace

TEST_CASE("faulty projects: each call ends with 2, says what and where, and writes nothing",
          "[batch][files]") {
    const auto list = index();
    REQUIRE(list.items().size() >= 45);
    const program::Folder folder;
    // Every file for `run`; `check` shares its reading and is called on every fifth.
    for (std::size_t i = 0; i < list.items().size(); ++i) {
        const auto& entry = list.items()[i];
        const auto file = entry.find("file")->asText();
        const auto project = (program::faulty / file).string();
        const auto out = folder.path() / "results";
        const auto answer = program::call({"run", project, "--out", out.string()});
        CAPTURE(file, answer.out, answer.err);
        CHECK(answer.exit == 2);
        CHECK(answer.out.empty());
        CHECK_THAT(answer.err, ContainsSubstring("[" + entry.find("code")->asText() + "]"));
        CHECK_THAT(answer.err,
                   ContainsSubstring(
                       file + ":" +
                       std::to_string(static_cast<int>(entry.find("line")->asNumber())) + ":"));
        CHECK_FALSE(std::filesystem::exists(out));
        if (i % 5 == 0) {
            const auto checked = program::call({"check", project});
            CHECK(checked.exit == 2);
            CHECK(checked.err == answer.err);
        }
    }
}

TEST_CASE("faulty projects: the findings as data", "[batch][files]") {
    const auto entry = index().items().front();
    const auto file = entry.find("file")->asText();
    const auto answer = program::call({"check", (program::faulty / file).string(), "--json"});
    CHECK(answer.exit == 2);
    const auto parsed = files::parseJson(answer.out, "out");
    REQUIRE(parsed.findings.empty());
    const auto* findings = parsed.tree.find("findings");
    REQUIRE(findings != nullptr);
    CHECK(findings->items().front().find("code")->asText() == entry.find("code")->asText());
    CHECK(findings->items().front().find("line")->asNumber() == entry.find("line")->asNumber());
}
