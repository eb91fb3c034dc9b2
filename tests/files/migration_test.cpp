// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/migration.h"
#include "support/catch.h"
#include "units/text.h"

using namespace headroom;
using namespace headroom::files;
using plant::Tree;

namespace {

Tree tree(std::string_view text) {
    return parseJson(text, "t").tree;
}

/// Two artificial steps: a key gets a new name, then a unit.
std::vector<Migration> artificial() {
    return {{1, "“width” is called “span”.",
             [](const Tree& old) {
                 return old.find("width") ? old.renamed({}, "width", "span") : old;
             }},
            {2, "“span” is written in millimetres.", [](const Tree& old) {
                 const Tree* span = old.find("span");
                 return span ? old.without({"span"}).with({"span_mm"},
                                                          Tree::number(span->asNumber() * 1000))
                             : old;
             }}};
}

} // namespace

TEST_CASE("migrate: step by step in memory, with a note for each", "[files][invariant]") {
    const auto chain = artificial();
    const auto old = migrate(tree(R"({"headroom": 1, "width": 2.5})"), chain, 3);
    REQUIRE(old.usable);
    CHECK(old.tree == tree(R"({"headroom": 3, "span_mm": 2500})"));
    REQUIRE(old.findings.size() == 2);
    CHECK(old.findings[0].severity() == Severity::note);
    CHECK_THAT(text(old.findings[0]), ContainsSubstring("format 1") && ContainsSubstring("span"));
    CHECK_THAT(text(old.findings[1]), ContainsSubstring("format 3"));
    const auto middle = migrate(tree(R"({"headroom": 2, "span": 1})"), chain, 3);
    CHECK(middle.tree == tree(R"({"headroom": 3, "span_mm": 1000})"));
    CHECK(middle.findings.size() == 1);
    const auto newest = migrate(tree(R"({"headroom": 3, "span_mm": 4})"), chain, 3);
    CHECK(newest.findings.empty());
    CHECK(newest.tree == tree(R"({"headroom": 3, "span_mm": 4})"));
}

TEST_CASE("migrate: a newer format is refused and left alone", "[files][messages]") {
    const auto newer = migrate(tree(R"({"headroom": 4})"), artificial(), 3);
    CHECK_FALSE(newer.usable);
    REQUIRE(newer.findings.size() == 1);
    CHECK(newer.findings[0].message->code == "files.newer-format");
    CHECK_THAT(text(newer.findings[0]), ContainsSubstring("format 4"));
    CHECK_FALSE(migrate(tree(R"({"headroom": 1e300})"), artificial(), 3).usable);
    CHECK(migrate(tree(R"({"headroom": "x"})"), artificial(), 3).usable); // its reader says so
    CHECK(migrate(tree(R"({})"), artificial(), 3).usable);
}

TEST_CASE("migrate: the program's own chain reaches its newest format", "[files][invariant]") {
    int format = 1;
    for (const auto& step : migrations()) {
        CHECK(step.from == format);
        CHECK_FALSE(step.what.empty());
        ++format;
    }
    CHECK(format == newestFormat);
}
