// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/csv_writer.h"
#include "files/json_reader.h"
#include "files/json_writer.h"
#include "files/outer_tables.h"
#include "files/project_file.h"
#include "support/catch.h"
#include "units/text.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <limits>

#include "folder.h"

using namespace headroom;
using namespace headroom::files;
namespace fs = std::filesystem;
using support::Folder;

namespace {

std::string codeOf(const Findings& findings) {
    return findings.empty() ? "" : std::string(findings.front().message->code);
}

CsvTable read(const Folder& folder, std::string_view text) {
    folder.write("t.csv", text);
    return readCsvTable(folder.path() / "t.csv", "t.csv", 2);
}

/// The demo with its ground line in a file of this name.
Opened demoWithGround(const Folder& folder, const std::string& name) {
    const auto demo = openProject(HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json");
    const auto tree =
        demo.tree.with({"ground"}, plant::Tree::object({{"csv", plant::Tree::text(name)}}));
    folder.write("p.headroom.json", writeProject(tree));
    return openProject(folder.path() / "p.headroom.json");
}

} // namespace

TEST_CASE("readCsvTable: names on top or not, any line end, blanks and quotes",
          "[files][reference]") {
    const Folder folder;
    for (const auto* text :
         {"level [m],area [m²]\r\n455,50.27\r\n536,50.27\r\n", "455,50.27\n536,50.27",
          "\"level, above datum\",area\n 455 , \"50.27\" \n\n536,50.27\n\n"}) {
        const auto csv = read(folder, text);
        INFO(text);
        REQUIRE(csv.table);
        CHECK(csv.table->rows() == 2);
        CHECK(csv.table->values == std::vector<double>{455, 50.27, 536, 50.27});
    }
    CHECK(read(folder, "").table->rows() == 0);
}

TEST_CASE("readCsvTable: a bad line is told by its number", "[files][messages]") {
    const Folder folder;
    for (const auto* text : {"1,2\n3\n", "1,2\n3,4,5\n", "1,2\n3,x\n", "1,2\n3,nan\n",
                             "1,2\n3,inf\n", "1,2\n3;4\n", "1,2\n1e999,4\n"}) {
        const auto csv = read(folder, text);
        INFO(text);
        CHECK_FALSE(csv.table);
        REQUIRE(codeOf(csv.findings) == "files.table-row");
        CHECK_THAT(headroom::text(csv.findings.front()), ContainsSubstring("Line 2"));
        CHECK(csv.findings.front().place->line == 2);
    }
    CHECK(codeOf(readCsvTable(folder.path() / "no.csv", "no.csv", 2).findings)
          == "files.table-not-found");
    CHECK(codeOf(readCsvTable(folder.path(), "folder", 2).findings) == "files.table-not-found");
    CHECK(codeOf(read(folder, "1,2\n" + std::string(100'000, '7')).findings) == "files.table-row");
}

TEST_CASE("readCsvTable: a table beyond all measure ends in a finding", "[files][limit]") {
    const Folder folder;
    const long rows = testCount(static_cast<int>(longestOuterTable) + 10, 10'000'000);
    std::string text;
    text.reserve(static_cast<std::size_t>(rows) * 4);
    for (long i = 0; i < rows; ++i) {
        text += "1,2\n";
    }
    const auto start = std::chrono::steady_clock::now();
    const auto csv = read(folder, text);
    const std::chrono::duration<double> took = std::chrono::steady_clock::now() - start;
    CHECK_FALSE(csv.table);
    CHECK(codeOf(csv.findings) == "files.table-huge");
    CHECK(took.count() < 60.0); // only against a hang
}

TEST_CASE("outer tables: read beside the project, kept by name", "[files][invariant]") {
    const Folder folder;
    folder.write("ground.csv", "chainage [m],elevation [m]\n0,500\n100,510\n200,520\n");
    const auto opened = demoWithGround(folder, "ground.csv");
    REQUIRE(opened.usable());
    CHECK(opened.bound.project.ground.size() == 3);
    CHECK(opened.bound.project.ground[1].second == 510.0);
    // Edits keep the table, the file keeps the name.
    const auto next = plant::edited(opened.tree, -1, {"title"}, plant::Tree::text("new"));
    CHECK(rebind(next).project.ground.size() == 3);
    CHECK_THAT(writeProject(next), ContainsSubstring("\"ground\": {\"csv\": \"ground.csv\"}"));
    fs::create_directory(folder.path() / "tables");
    folder.write("tables/g.csv", "0,500\n100,510\n");
    CHECK(demoWithGround(folder, "tables/g.csv").usable());
    folder.write("falling.csv", "100,500\n0,510\n");
    const auto falling = demoWithGround(folder, "falling.csv");
    CHECK_FALSE(falling.usable());
    CHECK(codeOf(falling.findings()) == "plant.table-order");
}

TEST_CASE("outer tables: never from outside the project's folder", "[files][messages]") {
    const Folder folder;
    const Folder other;
    other.write("secret.csv", "0,500\n100,510\n");
    fs::create_directory(folder.path() / "inside");
    fs::create_symlink(other.path() / "secret.csv", folder.path() / "link.csv");
    fs::create_directory_symlink(other.path(), folder.path() / "way");
    for (const auto& name :
         {std::string("../x.csv"), (other.path() / "secret.csv").string(), std::string("link.csv"),
          std::string("way/secret.csv"), std::string("inside/../../x.csv"), std::string("."),
          std::string("")}) {
        INFO(name);
        const auto opened = demoWithGround(folder, name);
        CHECK_FALSE(opened.usable());
        REQUIRE(codeOf(opened.findings()) == "files.table-outside");
        const auto lines = std::count(
            opened.text.begin(),
            opened.text.begin() + static_cast<std::ptrdiff_t>(opened.text.find("\"ground\"")),
            '\n');
        CHECK(opened.findings().front().place->line == lines + 1);
        CHECK(opened.findings().front().subject == "ground");
    }
    // A link that stays inside is fine.
    folder.write("real.csv", "0,500\n100,510\n");
    fs::create_symlink(folder.path() / "real.csv", folder.path() / "inner.csv");
    CHECK(demoWithGround(folder, "inner.csv").usable());
}

TEST_CASE("CsvWriter: RFC 4180, names with units, numbers in the file's unit",
          "[files][reference]") {
    CsvWriter csv(
        {{"time", Quantity::time}, {"U1, power", Quantity::power}, {"count", Quantity::count}});
    csv.row({0.5, 107e6, 3});
    csv.row({1, std::numeric_limits<double>::quiet_NaN(), -4});
    CHECK(csv.text() == "time [s],\"U1, power [MW]\",count\r\n0.5,107,3\r\n1,,-4\r\n");
    CHECK(csvCell("plain") == "plain");
    CHECK(csvCell("say \"yes\"") == "\"say \"\"yes\"\"\"");
    CHECK(csvCell("two\nlines") == "\"two\nlines\"");
}
