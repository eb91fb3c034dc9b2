// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/tree.h"
#include "support/catch.h"

#include <random>

#include "project_support.h"

using namespace headroom::plant;
using support::json;

namespace {

struct Example {
    const char* target;
    const char* patch;
    const char* result;
};

/// A value of a few kinds, at most `depth` objects deep; never null.
Tree randomValue(std::mt19937& draw, int depth) {
    const auto pick = draw() % (depth > 0 ? 6 : 4);
    switch (pick) {
    case 0:
        return Tree::number(static_cast<double>(draw() % 7));
    case 1:
        return Tree::text(std::string(1, static_cast<char>('a' + draw() % 4)));
    case 2:
        return Tree::boolean(draw() % 2 == 0);
    case 3:
        return Tree::array({Tree::number(static_cast<double>(draw() % 3)), Tree::text("t")});
    default:
        break;
    }
    Tree object = Tree::object({});
    const auto count = draw() % 4;
    for (unsigned i = 0; i < count; ++i) {
        object = object.with({std::string(1, static_cast<char>('k' + draw() % 5))},
                             randomValue(draw, depth - 1));
    }
    return object;
}

Path randomPath(std::mt19937& draw) {
    Path path;
    const auto length = 1 + draw() % 3;
    for (unsigned i = 0; i < length; ++i) {
        path.emplace_back(1, static_cast<char>('k' + draw() % 5));
    }
    return path;
}

} // namespace

TEST_CASE("mergePatch: the examples of RFC 7396", "[plant][reference]") {
    // Source: RFC 7396 "JSON Merge Patch", October 2014, appendix A, all fifteen rows.
    const Example examples[] = {
        {R"({"a":"b"})", R"({"a":"c"})", R"({"a":"c"})"},
        {R"({"a":"b"})", R"({"b":"c"})", R"({"a":"b","b":"c"})"},
        {R"({"a":"b"})", R"({"a":null})", R"({})"},
        {R"({"a":"b","b":"c"})", R"({"a":null})", R"({"b":"c"})"},
        {R"({"a":["b"]})", R"({"a":"c"})", R"({"a":"c"})"},
        {R"({"a":"c"})", R"({"a":["b"]})", R"({"a":["b"]})"},
        {R"({"a":{"b":"c"}})", R"({"a":{"b":"d","c":null}})", R"({"a":{"b":"d"}})"},
        {R"({"a":[{"b":"c"}]})", R"({"a":[1]})", R"({"a":[1]})"},
        {R"(["a","b"])", R"(["c","d"])", R"(["c","d"])"},
        {R"({"a":"b"})", R"(["c"])", R"(["c"])"},
        {R"({"a":"foo"})", R"(null)", R"(null)"},
        {R"({"a":"foo"})", R"("bar")", R"("bar")"},
        {R"({"e":null})", R"({"a":1})", R"({"e":null,"a":1})"},
        {R"([1,2])", R"({"a":"b","c":null})", R"({"a":"b"})"},
        {R"({})", R"({"a":{"bb":{"ccc":null}}})", R"({"a":{"bb":{}}})"},
    };
    for (const auto& example : examples) {
        INFO(example.target << " with " << example.patch);
        CHECK(mergePatch(json(example.target), json(example.patch)) == json(example.result));
    }
}

TEST_CASE("makePatch: leads from one tree to the other", "[plant][invariant]") {
    std::mt19937 draw(20260101);
    const int count = testCount(10'000, 200'000);
    Tree tree = randomValue(draw, 4);
    while (!tree.isObject()) {
        tree = randomValue(draw, 4);
    }
    for (int i = 0; i < count; ++i) {
        const Path path = randomPath(draw);
        const Tree next = draw() % 3 == 0 ? tree.without(path, draw() % 2 == 0)
                                          : tree.with(path, randomValue(draw, 2));
        const Tree patch = makePatch(tree, next);
        const Tree merged = mergePatch(tree, patch);
        if (!sameContent(merged, next)) {
            INFO("edit " << i);
            REQUIRE(sameContent(merged, next));
        }
        if (sameContent(tree, next)) {
            REQUIRE(patch.members().empty());
        }
        tree = tree.nodeCount() > 200 ? Tree::object({}) : next;
    }
}

TEST_CASE("differences: the leaves that differ, tables whole", "[plant][invariant]") {
    const Tree before = json(R"({"a": {"x": 1, "y": 2}, "t": [[1, 2]], "gone": {"deep": "text"}})");
    const Tree after = json(R"({"a": {"x": 1, "y": 3}, "t": [[1, 3]], "new": 4})");
    const auto changes = differences(before, after);
    REQUIRE(changes.size() == 4);
    CHECK(join(changes[0].path) == "a/y");
    CHECK(changes[0].before->asNumber() == 2.0);
    CHECK(changes[0].after->asNumber() == 3.0);
    CHECK(join(changes[1].path) == "t");
    CHECK(join(changes[2].path) == "new");
    CHECK(changes[2].before == nullptr);
    CHECK(join(changes[3].path) == "gone/deep");
    CHECK(changes[3].after == nullptr);
    CHECK(differences(before, before).empty());
}
