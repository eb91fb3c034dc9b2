// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "plant/tree.h"
#include "support/catch.h"

#include <malloc.h>

using namespace headroom;
using namespace headroom::plant;

namespace {

Tree rowsOf(int count) {
    std::vector<Tree> rows;
    rows.reserve(static_cast<std::size_t>(count));
    for (int i = 0; i < count; ++i) {
        rows.push_back(Tree::array({Tree::number(i), Tree::number(i * 0.5)}));
    }
    return Tree::array(std::move(rows));
}

std::size_t heapInUse() {
    return mallinfo2().uordblks + mallinfo2().hblkhd;
}

} // namespace

TEST_CASE("Path: joins and splits any name", "[plant][invariant]") {
    const Path plain{"plant", "chambers", "Surge shaft"};
    CHECK(join(plain) == "plant/chambers/Surge shaft");
    CHECK(split(join(plain)) == plain);
    const Path odd{"a/b", "c\\d", "", "/"};
    CHECK(split(join(odd)) == odd);
    CHECK(split("").empty());
}

TEST_CASE("Tree: an edit shares what it does not touch", "[plant][invariant]") {
    const Tree before = Tree::object({{"a", Tree::object({{"x", Tree::number(1)}})},
                                      {"b", Tree::object({{"y", Tree::text("same")}})}});
    const Tree after = before.with({"a", "x"}, Tree::number(2));
    CHECK(before.at({"a", "x"})->asNumber() == 1.0);
    CHECK(after.at({"a", "x"})->asNumber() == 2.0);
    CHECK(after.find("b")->sameAs(*before.find("b")));
    CHECK_FALSE(after.sameAs(before));
    CHECK_FALSE(after == before);
    CHECK(after.with({"a", "x"}, Tree::number(1)) == before);
}

TEST_CASE("Tree: with makes what is missing, without takes it back", "[plant][invariant]") {
    const Tree empty = Tree::object({});
    const Tree deep = empty.with({"a", "b", "c"}, Tree::boolean(true));
    CHECK(deep.at({"a", "b", "c"})->asBoolean());
    CHECK(deep.without({"a", "b", "c"}) == empty.with({"a", "b"}, Tree::object({})));
    CHECK(deep.without({"a", "b", "c"}, true) == empty);
    CHECK(deep.without({"a", "nothing"}).sameAs(deep));
}

TEST_CASE("Tree: renaming keeps the place of a member", "[plant][invariant]") {
    const Tree tree = Tree::object(
        {{"p",
          Tree::object({{"1", Tree::number(1)}, {"2", Tree::number(2)}, {"3", Tree::number(3)}})}});
    const Tree renamed = tree.renamed({"p"}, "2", "two");
    REQUIRE(renamed.find("p")->members().size() == 3);
    CHECK(renamed.find("p")->members()[1].first == "two");
    CHECK(renamed.renamed({"p"}, "two", "2") == tree);
    CHECK_THROWS_AS(tree.renamed({"p"}, "4", "four"), Bug);
    CHECK_THROWS_AS(tree.renamed({"p"}, "1", "2"), Bug);
}

TEST_CASE("Tree: the wrong question is a bug", "[plant][messages]") {
    CHECK_THROWS_AS(Tree::text("1").asNumber(), Bug);
    CHECK_THROWS_AS(Tree::number(1).asText(), Bug);
    CHECK_THROWS_AS(Tree().asBoolean(), Bug);
    CHECK(Tree::number(1).members().empty());
    CHECK(Tree::object({}).items().empty());
    CHECK(Tree().find("x") == nullptr);
}

TEST_CASE("Tree: members in another order are the same content", "[plant][invariant]") {
    const Tree a = Tree::object({{"x", Tree::number(1)}, {"y", Tree::number(2)}});
    const Tree b = Tree::object({{"y", Tree::number(2)}, {"x", Tree::number(1)}});
    CHECK_FALSE(a == b);
    CHECK(sameContent(a, b));
    CHECK_FALSE(sameContent(a, b.with({"x"}, Tree::number(3))));
}

TEST_CASE("Tree: a thousand edits beside a long table cost little", "[plant][invariant]") {
    // The bound is the project's own: less than 20 MB for 1 000 edits beside 1e6 rows.
    const int rows = 1'000'000;
    std::vector<Tree> history;
    Tree plant = Tree::object({});
    for (int i = 0; i < 60; ++i) {
        plant =
            plant.with({"plant", "conduits", "C" + std::to_string(i), "length_m"}, Tree::number(i));
    }
    history.push_back(plant.with({"ground"}, rowsOf(rows)));
    const std::size_t before = heapInUse();
    for (int i = 0; i < 1000; ++i) {
        history.push_back(
            history.back().with({"plant", "conduits", "C" + std::to_string(i % 60), "length_m"},
                                Tree::number(1000 + i)));
    }
    const std::size_t grown = heapInUse() - before;
    CAPTURE(rows, grown);
    CHECK(grown < 20U * 1000U * 1000U);
    CHECK(history.back().find("ground")->sameAs(*history.front().find("ground")));
    CHECK(history.front().find("ground")->items().size() == static_cast<std::size_t>(rows));
}

TEST_CASE("Tree: an outer table goes along with its object", "[plant][invariant]") {
    auto table = std::make_shared<OuterTable>();
    table->columns = 2;
    table->values = {1, 2, 3, 4};
    const Tree named = Tree::object({{"csv", Tree::text("a.csv")}});
    const Tree carried = named.withOuterTable(table);
    CHECK(carried == named);
    REQUIRE(carried.outerTable() != nullptr);
    CHECK(carried.outerTable()->rows() == 2);
    const Tree project = Tree::object({{"ground", carried}}).with({"title"}, Tree::text("x"));
    CHECK(project.find("ground")->outerTable() == table.get());
    CHECK(
        mergePatch(project, Tree::object({{"title", Tree::text("y")}})).find("ground")->outerTable()
        == table.get());
}
