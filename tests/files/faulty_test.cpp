// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/project_file.h"
#include "support/catch.h"
#include "units/text.h"

#include <set>

#include "folder.h"

using namespace headroom;
using namespace headroom::files;
namespace fs = std::filesystem;

namespace {

const fs::path faulty = HEADROOM_SOURCE_DIR "/tests/files/faulty";

std::string all(const Findings& findings) {
    std::string out;
    for (const auto& finding : findings) {
        out += std::string(finding.message->code) + " "
               + (finding.place ? std::to_string(finding.place->line) : "-") + " " + text(finding)
               + "\n";
    }
    return out;
}

plant::Tree index() {
    const auto text = readFile(faulty / "index.json");
    REQUIRE(text);
    return parseJson(*text, "index.json").tree;
}

} // namespace

TEST_CASE("faulty projects: each ends in its finding at its place", "[files][messages]") {
    const auto list = index();
    CHECK(list.items().size() >= 80);
    std::set<std::string> codes;
    for (const auto& entry : list.items()) {
        const auto file = entry.find("file")->asText();
        const auto opened = openProject(faulty / file);
        INFO(file << "\n" << all(opened.findings()));
        CHECK_FALSE(opened.usable());
        bool hit = false;
        for (const auto& finding : opened.findings()) {
            hit = hit
                  || (finding.message->code == entry.find("code")->asText()
                      && finding.severity() == Severity::error && finding.place
                      && finding.place->line == static_cast<int>(entry.find("line")->asNumber())
                      && (entry.find("subject") == nullptr
                          || finding.subject == entry.find("subject")->asText()));
        }
        CHECK(hit);
        codes.insert(entry.find("code")->asText());
        for (const auto& finding : opened.findings()) { // what is shown can be shown
            CHECK_FALSE(text(finding, {',', false}).empty());
        }
    }
    CHECK(codes.size() >= 45);
}

TEST_CASE("faulty projects: the one they were made from is sound", "[files][invariant]") {
    const auto opened = openProject(faulty / "sound.headroom.json");
    INFO(all(opened.findings()));
    CHECK(opened.usable());
    CHECK(opened.findings().empty());
}

TEST_CASE("faulty projects: no file is left out of the index", "[files][invariant]") {
    std::set<std::string> listed{"sound.headroom.json"};
    const auto list = index();
    for (const auto& entry : list.items()) {
        listed.insert(entry.find("file")->asText());
    }
    for (const auto& entry : fs::directory_iterator(faulty)) {
        const auto name = entry.path().filename().string();
        if (name.ends_with(".headroom.json")) {
            INFO(name);
            CHECK(listed.count(name) == 1);
        }
    }
}

TEST_CASE("faulty projects: one cut at any byte ends in findings", "[files][invariant]") {
    const auto text = readFile(faulty / "sound.headroom.json");
    REQUIRE(text);
    const std::size_t step = static_cast<std::size_t>(testCount(7, 1));
    for (std::size_t length = 0; length + 2 < text->size(); length += step) {
        const auto opened = openText(text->substr(0, length), ".", "cut");
        if (opened.usable() || opened.findings().size() != 1
            || opened.findings().front().message->code != "files.truncated") {
            INFO(length << "\n" << all(opened.findings()));
            REQUIRE(false);
        }
    }
}

TEST_CASE("faulty projects: one with any line left out never throws", "[files][invariant]") {
    const auto text = readFile(faulty / "sound.headroom.json");
    REQUIRE(text);
    for (std::size_t start = 0; start < text->size();) {
        const auto end = text->find('\n', start) + 1;
        const auto opened = openText(text->substr(0, start) + text->substr(end), ".", "cut");
        CHECK((opened.usable() || anyError(opened.findings())));
        start = end;
    }
}

TEST_CASE("faulty projects: a file of more than 64 MB is not read", "[files][limit]") {
    const support::Folder folder;
    folder.write("big.headroom.json", "{");
    fs::resize_file(folder.path() / "big.headroom.json", 70U << 20U); // a hole, no real bytes
    const auto opened = openProject(folder.path() / "big.headroom.json");
    REQUIRE(opened.findings().size() == 1);
    CHECK(opened.findings().front().message->code == "files.too-large");
}
