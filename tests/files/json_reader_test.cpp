// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/json_writer.h"
#include "plant/fields.h"
#include "support/catch.h"
#include "units/text.h"

#include <chrono>
#include <random>

using namespace headroom;
using namespace headroom::files;
using plant::Tree;

namespace {

std::string codeOf(std::string_view text) {
    const auto parsed = parseJson(text, "a.json");
    return parsed.findings.empty() ? "" : std::string(parsed.findings.front().message->code);
}

} // namespace

TEST_CASE("parseJson: values of every kind", "[files][reference]") {
    const auto parsed =
        parseJson(R"({"t": true, "f": false, "n": null, "i": -3, "u": 18446744073709551615,
        "d": 2.5e-3, "s": "a\"b\\ü\u00e9\n", "a": [1, "x", {}], "o": {"k": {}}})",
                  "a.json");
    REQUIRE(parsed.complete);
    CHECK(parsed.findings.empty());
    CHECK(parsed.tree.find("t")->asBoolean());
    CHECK(parsed.tree.find("n")->isNull());
    CHECK(parsed.tree.find("i")->asNumber() == -3.0);
    CHECK(parsed.tree.find("u")->asNumber() == 18446744073709551615.0);
    CHECK(parsed.tree.find("d")->asNumber() == 0.0025);
    CHECK(parsed.tree.find("s")->asText() == "a\"b\\üé\n");
    CHECK(parsed.tree.find("a")->items().size() == 3);
    CHECK(parsed.tree.at({"o", "k"})->isObject());
}

TEST_CASE("parseJson: places of keys, of values beside them and of rows", "[files][invariant]") {
    const auto parsed = parseJson("{\n  \"ä\": 1, \"b\\\"c\": {\"x\" : -2.5e3},\n  \"rows\": [[1, "
                                  "2],\n   [3, 4]],\n\t\"end\": true}",
                                  "a.json");
    REQUIRE(parsed.complete);
    const auto at = [&](const plant::Path& path) {
        const auto place = parsed.places(path);
        REQUIRE(place);
        CHECK(place->file == "a.json");
        return std::pair(place->line, place->column);
    };
    CHECK(at({}) == std::pair(1, 1));
    CHECK(at({"ä"}) == std::pair(2, 3));
    CHECK(at({"b\"c"}) == std::pair(2, 11));
    CHECK(at({"b\"c", "x"}) == std::pair(2, 20));
    CHECK(at({"rows"}) == std::pair(3, 3));
    CHECK(at({"rows", "0"}) == std::pair(3, 12));
    CHECK(at({"rows", "1"}) == std::pair(4, 4));
    CHECK(at({"end"}) == std::pair(5, 2));
    CHECK_FALSE(parsed.places({"nothing"}));
}

TEST_CASE("parseJson: a key twice is told with both places, the first holds", "[files][messages]") {
    const auto parsed =
        parseJson("{\"a\": 1,\n \"b\": {\"c\": 1, \"c\": {\"d\": 5}},\n \"a\": 2}", "a.json");
    REQUIRE(parsed.complete);
    REQUIRE(parsed.findings.size() == 2);
    const auto& inner = parsed.findings[0];
    CHECK(inner.message->code == "files.duplicate-key");
    CHECK(inner.place->line == 2);
    CHECK(inner.place->column == 16);
    CHECK(inner.otherPlace->column == 8);
    CHECK(parsed.findings[1].place->line == 3);
    CHECK(parsed.findings[1].otherPlace->line == 1);
    CHECK(parsed.tree.find("a")->asNumber() == 1.0);
    CHECK(parsed.tree.at({"b", "c"})->asNumber() == 1.0);
}

TEST_CASE("parseJson: what is not JSON ends in one finding with its place", "[files][messages]") {
    CHECK(codeOf("") == "files.truncated");
    CHECK(codeOf("  \n") == "files.truncated");
    CHECK(codeOf("{\"a\": ") == "files.truncated");
    CHECK(codeOf("{\"a\": \"text") == "files.truncated");
    CHECK(codeOf("{\"a\": tru") == "files.truncated");
    CHECK(codeOf("{\"a\": 1 \"b\": 2}") == "files.not-json");
    CHECK(codeOf("{'a': 1}") == "files.not-json");
    CHECK(codeOf("{\"a\": 01}") == "files.not-json");
    CHECK(codeOf("{\"a\": 1} x") == "files.not-json");
    CHECK(codeOf("{\"a\": NaN}") == "files.not-a-number");
    CHECK(codeOf("{\"a\": Infinity}") == "files.not-a-number");
    CHECK(codeOf("{\"a\": 1e999}") == "files.number-too-large");
    CHECK(codeOf("{\"a\": -1e999}") == "files.number-too-large");
    CHECK(codeOf("{\"a\": 1e-999}").empty());
    CHECK(codeOf("{\"a\": \"\xff\"}") == "files.not-utf8");
    CHECK(codeOf("\xFF\xFE{") == "files.not-utf8");
    CHECK(codeOf("\xEF\xBB\xBF{}") == "files.byte-order-mark");
    CHECK(parseJson("\xEF\xBB\xBF{}", "a").complete);
    const auto parsed = parseJson("{\"a\": 1,\n\"b\": 12 13}", "a.json");
    CHECK(parsed.tree.isNull());
    CHECK(parsed.findings.front().place->line == 2);
}

TEST_CASE("parseJson: depth stops at 32, whatever comes", "[files][limit]") {
    const auto nested = [](int depth) {
        return std::string(static_cast<std::size_t>(depth), '[')
               + std::string(static_cast<std::size_t>(depth), ']');
    };
    CHECK(codeOf(nested(32)).empty());
    CHECK(codeOf(nested(33)) == "files.too-deep");
    CHECK(codeOf(nested(10'000)) == "files.too-deep");
    CHECK(codeOf(std::string(2'000'000, '[')) == "files.too-deep");
    std::string objects;
    for (int i = 0; i < 5000; ++i) {
        objects += "{\"a\":";
    }
    CHECK(codeOf(objects) == "files.too-deep");
}

TEST_CASE("parseJson: a long list is refused and not built", "[files][limit]") {
    const int rows = testCount(300'000, 8'000'000);
    std::string text = "{\"ground\": [";
    for (int i = 0; i < rows; ++i) {
        text += i > 0 ? ",[0,0]" : "[0,0]";
    }
    text += "], \"after\": 1}";
    const auto start = std::chrono::steady_clock::now();
    const auto parsed = parseJson(text, "a.json");
    const std::chrono::duration<double> took = std::chrono::steady_clock::now() - start;
    CAPTURE(took.count());
    REQUIRE(parsed.complete);
    REQUIRE(parsed.findings.size() == 1);
    CHECK(parsed.findings.front().message->code == "files.table-too-long");
    CHECK(parsed.tree.find("ground")->items().size()
          == static_cast<std::size_t>(plant::longestInlineTable));
    CHECK(parsed.tree.find("after") != nullptr);
    CHECK(took.count() < 60.0); // only against a hang
}

TEST_CASE("parseJson: more than 64 MB are refused before they are read", "[files][limit]") {
    CHECK(codeOf(std::string(largestFile_bytes + 1, ' ')) == "files.too-large");
}

TEST_CASE("parseJson: any damage to a file ends in findings or a tree", "[files][invariant]") {
    std::mt19937 draw(7);
    const std::string sound =
        R"({"a": [[1, 2.5], [3, -4e2]], "b": {"c": "text \u00e9", "d": true}, "e": null})";
    const int count = testCount(20'000, 500'000);
    for (int i = 0; i < count; ++i) {
        std::string text = sound;
        const auto edits = 1 + draw() % 4;
        for (unsigned k = 0; k < edits; ++k) {
            const auto at = draw() % text.size();
            switch (draw() % 3) {
            case 0:
                text[at] = static_cast<char>(draw() % 256);
                break;
            case 1:
                text.erase(at, 1 + draw() % 5);
                break;
            default:
                text.insert(at, 1, "{}[]\",:0e\\"[draw() % 10]);
                break;
            }
            if (text.empty()) {
                text = " ";
            }
        }
        const auto parsed = parseJson(text, "a.json");
        if (!parsed.complete) {
            if (!anyError(parsed.findings)) {
                INFO(text);
                REQUIRE(anyError(parsed.findings));
            }
            REQUIRE(parsed.tree.isNull());
        } else {
            writeJson(parsed.tree); // what was read can be written
        }
    }
}
