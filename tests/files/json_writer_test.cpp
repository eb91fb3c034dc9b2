// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"
#include "files/json_writer.h"
#include "files/project_file.h"
#include "support/catch.h"

#include <cmath>
#include <cstring>
#include <functional>
#include <limits>
#include <random>
#include <sstream>

using namespace headroom;
using namespace headroom::files;
using plant::Tree;

namespace {

const std::string demoPath = HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json";

Tree tree(std::string_view text) {
    const auto parsed = parseJson(text, "t");
    REQUIRE(parsed.complete);
    return parsed.tree;
}

std::vector<std::string> linesOf(const std::string& text) {
    std::vector<std::string> lines;
    std::istringstream in(text);
    for (std::string line; std::getline(in, line);) {
        lines.push_back(line);
    }
    return lines;
}

/// Lines of `a` that are not in `b` at their place after the common beginning and end.
std::pair<std::size_t, std::size_t> changedLines(const std::string& a, const std::string& b) {
    auto before = linesOf(a), after = linesOf(b);
    while (!before.empty() && !after.empty() && before.back() == after.back()) {
        before.pop_back();
        after.pop_back();
    }
    std::size_t same = 0;
    while (same < before.size() && same < after.size() && before[same] == after[same]) {
        ++same;
    }
    return {before.size() - same, after.size() - same};
}

} // namespace

TEST_CASE("shortest: numbers come back as the same double", "[files][invariant]") {
    CHECK(shortest(512.0) == "512");
    CHECK(shortest(0.1) == "0.1");
    CHECK(shortest(-0.00455) == "-0.00455");
    CHECK(shortest(1e22) == "1e+22");
    std::mt19937_64 draw(3);
    const int count = testCount(20'000, 1'000'000);
    for (int i = 0; i < count; ++i) {
        const auto bits = draw();
        double number = 0.0;
        std::memcpy(&number, &bits, sizeof number);
        if (!std::isfinite(number)) {
            continue;
        }
        const double back = tree("[" + shortest(number) + "]").items()[0].asNumber();
        if (back != number) {
            CAPTURE(number, back);
            REQUIRE(back == number);
        }
    }
    const double tiny = std::numeric_limits<double>::denorm_min();
    CHECK(tree("[" + shortest(tiny) + "]").items()[0].asNumber() == tiny);
}

TEST_CASE("quoted: what must be escaped is, the rest stays", "[files][reference]") {
    CHECK(quoted("a\"b\\c") == R"("a\"b\\c")");
    CHECK(quoted("line\nend\t\x01") == R"("line\nend\t\u0001")");
    CHECK(quoted("Größe ≤ 5 m²") == "\"Größe ≤ 5 m²\"");
}

TEST_CASE("writeProject: the demo comes back byte for byte", "[files][invariant]") {
    const auto opened = openProject(demoPath);
    REQUIRE(opened.usable());
    CHECK(writeProject(plant::ordered(opened.tree)) == opened.text);
    const auto again = openText(writeProject(opened.tree), ".", "again");
    CHECK(again.tree == opened.tree);
}

TEST_CASE("writeProject: a foreign file is put in order once, then stays", "[files][invariant]") {
    const auto foreign = openText(
        R"({"studies":{},"plant":{"points":{"B":{"elevation_m":1.50,"chainage_m":0,"x-my":[{"a":1}]}}},"x-tool":{"v":2},"headroom":1})",
        ".", "f");
    const std::string once = writeProject(plant::ordered(foreign.tree));
    CHECK(once == R"({
  "headroom": 1,
  "plant": {
    "points": {
      "B": {
        "chainage_m": 0,
        "elevation_m": 1.5,
        "x-my": [
          {"a": 1}
        ]
      }
    }
  },
  "studies": {},
  "x-tool": {"v": 2}
}
)");
    CHECK(writeProject(plant::ordered(openText(once, ".", "f").tree)) == once);
}

TEST_CASE("writeProject: any number edited changes one line", "[files][invariant]") {
    const auto opened = openProject(demoPath);
    const Tree& base = opened.tree;
    const std::string before = writeProject(base);
    int edits = 0;
    const std::function<void(const Tree&, plant::Path&)> visit = [&](const Tree& at,
                                                                     plant::Path& path) {
        if (at.isNumber()) {
            ++edits;
            const auto lines =
                changedLines(before, writeProject(base.with(path, Tree::number(-123456.789))));
            if (lines != std::pair<std::size_t, std::size_t>(1, 1)) {
                INFO(plant::join(path));
                CHECK(lines == std::pair<std::size_t, std::size_t>(1, 1));
            }
        }
        for (const auto& member : at.members()) {
            path.push_back(member.first);
            visit(member.second, path);
            path.pop_back();
        }
    };
    plant::Path path;
    visit(base, path);
    CHECK(edits > 100);
}

TEST_CASE("writeProject: any change to an option alters its one line", "[files][invariant]") {
    const auto opened = openProject(demoPath);
    const auto& options = opened.tree.find("options")->members();
    const std::string before = writeProject(opened.tree);
    const std::vector<std::pair<const char*, const char*>> changes{
        {"plant/chambers/Surge shaft/shape/throttled/diameter_m", "10.5"},
        {"plant/units/U1/inertia/j_tm2", "800"},
        {"plant/reservoirs/Upper Dorvane/lowest_m", "489"},
        {"plant/conduits/Headrace/axis",
         "[[100, 474], [200, 473], [300, 472], [400, 471], [500, 470], [600, 469], [700, 468], "
         "[800, 467], [900, 466], [1000, 465]]"},
        {"limits/Shaft, lowest/level/min_m/normal", "461"},
        {"plant/units/U1/servo/closingStages", "[[60, 8], [0, 12]]"},
        {"plant/chambers/Surge shaft/shape/open",
         R"({"diameter_m": 9, "floor_m": 455, "rim_m": 536})"}};
    for (std::size_t option = 0; option < options.size(); ++option) {
        for (const auto& [path, value] : changes) {
            INFO(options[option].first << ": " << path);
            const Tree next = plant::edited(opened.tree, static_cast<int>(option),
                                            plant::split(path), tree(value));
            CHECK(changedLines(before, writeProject(plant::ordered(next)))
                  == std::pair<std::size_t, std::size_t>(1, 1));
        }
    }
    // The same for an option that changes nothing yet.
    const Tree fresh =
        opened.tree.with({"options", "Fresh"}, tree(R"({"about": "new", "changes": {}})"));
    const int last = static_cast<int>(fresh.find("options")->members().size()) - 1;
    const Tree next =
        plant::edited(fresh, last, plant::split("plant/units/U1/inertia/j_tm2"), Tree::number(800));
    CHECK(changedLines(writeProject(fresh), writeProject(plant::ordered(next)))
          == std::pair<std::size_t, std::size_t>(1, 1));
}
