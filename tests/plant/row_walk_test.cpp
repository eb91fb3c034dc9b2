// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/schema.h"
#include "support/catch.h"
#include "units/text.h"

#include <functional>
#include <map>
#include <set>

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::found;
using support::has;

namespace {

const std::string sampleName = "Sample";

/// A name of the demo that a reference row can give.
std::string nameFor(const Field& row) {
    static const std::map<Collection, std::string> names{
        {Collection::points, "Intake"},     {Collection::reservoirs, "Upper Dorvane"},
        {Collection::conduits, "Headrace"}, {Collection::chambers, "Surge shaft"},
        {Collection::units, "U1"},          {Collection::events, sampleName}};
    return names.at(row.collections.front());
}

double middle(const Field& row) {
    Range range = row.usual.value_or(row.hard.value_or(Range{0, 1}));
    return fromSi(row.quantity, 0.5 * (range.low + range.high));
}

Tree sampleGroup(const Field& owner);

Tree sampleTable(const Field& row) {
    std::vector<Tree> rows;
    for (int i = 0; i < std::max(2, row.leastRows); ++i) {
        std::vector<Tree> cells;
        for (const auto& column : row.columns) {
            const double low = std::max(fromSi(column.quantity, column.hard.low), -100.0);
            const double high = std::min(fromSi(column.quantity, column.hard.high), 100.0);
            const double share = column.falling ? 0.75 - 0.25 * i : 0.25 + 0.25 * i;
            cells.push_back(Tree::number(low + share * (high - low)));
        }
        rows.push_back(Tree::array(std::move(cells)));
    }
    return Tree::array(std::move(rows));
}

Tree sample(const Field& row) {
    switch (row.kind) {
    case FieldKind::number:
        return Tree::number(middle(row));
    case FieldKind::whole:
        return Tree::number(1);
    case FieldKind::truth:
        return Tree::boolean(true);
    case FieldKind::choice:
        return Tree::text(std::string(row.choices.front()));
    case FieldKind::text:
        return Tree::text("words");
    case FieldKind::reference:
    case FieldKind::location:
        return Tree::text(nameFor(row));
    case FieldKind::references:
        return Tree::array({Tree::text(nameFor(row))});
    case FieldKind::table:
        return sampleTable(row);
    case FieldKind::interval:
        return Tree::array({Tree::number(middle(row) * 0.5), Tree::number(middle(row))});
    case FieldKind::group:
    case FieldKind::oneOf:
        return sampleGroup(row);
    case FieldKind::keyed:
        return Tree::object({{sampleName, sampleGroup(row)}});
    case FieldKind::numbers:
        return Tree::object({{nameFor(row), Tree::number(middle(row))}});
    default:
        return Tree::object({});
    }
}

Tree withRequired(Tree object, const Fields& rows) {
    for (const auto& row : rows) {
        if (row.kind == FieldKind::eitherOf) {
            bool given = false;
            for (const auto& form : row.forms) {
                for (const auto& inner : form) {
                    given = given || object.find(inner.key) != nullptr;
                }
            }
            for (const auto& form : row.forms) {
                bool mine = !given && row.required;
                for (const auto& inner : form) {
                    mine = mine || object.find(inner.key) != nullptr;
                }
                if (mine) {
                    object = withRequired(object, form);
                    given = true;
                }
            }
        } else if (row.required && object.find(row.key) == nullptr) {
            object = object.with({std::string(row.key)}, sample(row));
        }
    }
    return object;
}

Tree sampleGroup(const Field& owner) {
    if (owner.kind == FieldKind::oneOf) {
        const auto& kind = owner.fields.front();
        return Tree::object({{std::string(kind.key), sample(kind)}});
    }
    return withRequired(Tree::object({}), owner.fields);
}

struct Place {
    Path path;
    const Field* row;
    const Field* owner;
    std::string_view ownerKey;
    bool mayBeLeftOut; ///< belongs to a form that is not required
};

/// Every row below `owner`, with a path that reaches it.
void collect(const Field& owner, const Path& base, std::vector<Place>& out);

void collectRow(const Field& owner, const Field& row, const Path& base, std::vector<Place>& out,
                bool mayBeLeftOut = false) {
    for (const auto& form : row.forms) {
        for (const auto& inner : form) {
            collectRow(owner, inner, base, out, !row.required);
        }
    }
    if (row.kind == FieldKind::eitherOf) {
        return;
    }
    Path path = base;
    path.emplace_back(row.key);
    out.push_back({path, &row, &owner, owner.key, mayBeLeftOut});
    if (row.kind == FieldKind::keyed) {
        path.push_back(sampleName);
    }
    if (row.kind != FieldKind::patch) {
        collect(row, path, out);
    }
}

void collect(const Field& owner, const Path& base, std::vector<Place>& out) {
    for (const auto& row : owner.fields) {
        collectRow(owner, row, base, out);
    }
}

const std::vector<Place>& places() {
    static const std::vector<Place> all = [] {
        std::vector<Place> out;
        collect(projectRow(), {}, out);
        return out;
    }();
    return all;
}

/// The demo with this row given a good value, and everything around it complete.
Tree treeWith(const Place& place) {
    static const Tree base = support::dorvane().without({"options"}); // quicker to bind
    Tree tree = base;
    for (std::size_t depth = 1; depth < place.path.size(); ++depth) {
        const Path here(place.path.begin(),
                        place.path.begin() + static_cast<std::ptrdiff_t>(depth));
        const Field* row = fieldAt(here);
        const Tree* there = tree.at(here);
        if (there == nullptr || !there->isObject()) {
            const bool names = row->kind == FieldKind::keyed && here.back() != sampleName;
            tree = edited(tree, -1, here, names ? Tree::object({}) : sampleGroup(*row));
        }
    }
    const Path parent(place.path.begin(), place.path.end() - 1);
    tree = edited(tree, -1, place.path, sample(*place.row));
    if (place.owner->kind == FieldKind::oneOf) {
        return tree;
    }
    return parent.empty() ? withRequired(tree, place.owner->fields)
                          : tree.with(parent, withRequired(*tree.at(parent), place.owner->fields));
}

Tree wrongType(const Field& row) {
    const bool wordy = row.kind == FieldKind::text || row.kind == FieldKind::reference
                       || row.kind == FieldKind::choice || row.kind == FieldKind::location
                       || row.kind == FieldKind::references;
    return wordy ? Tree::number(5) : Tree::text("wrong");
}

/// The schema of a path; nullptr if it says nothing about it.
const Tree* schemaAt(const Tree& schema, const Path& path) {
    const Tree* here = &schema;
    for (std::size_t i = 0; i < path.size(); ++i) {
        const Tree* next = nullptr;
        std::vector<const Tree*> looks{here};
        if (const Tree* any = here->find("anyOf")) {
            for (const auto& option : any->items()) {
                looks.push_back(&option);
            }
        }
        for (const Tree* look : looks) {
            if (const Tree* properties = look->find("properties")) {
                next = next != nullptr ? next : properties->find(path[i]);
            }
            const Tree* more = look->find("additionalProperties");
            if (next == nullptr && more != nullptr && more->isObject()) {
                next = more;
            }
        }
        if (next == nullptr) {
            return nullptr;
        }
        here = next;
    }
    return here;
}

} // namespace

TEST_CASE("Rows: there are many, and each can be reached by its path", "[plant][invariant]") {
    CHECK(places().size() > 300);
    for (const auto& place : places()) {
        INFO(join(place.path));
        CHECK(fieldAt(place.path) == place.row);
    }
    CHECK(fieldAt({"plant", "units", "U1", "nonsense"}) == nullptr);
    CHECK(fieldAt({"options", "A", "changes", "studies"}) == nullptr);
    CHECK(fieldAt({"options", "A", "changes", "plant", "units", "U1", "inertia", "j_tm2"})
          == fieldAt({"plant", "units", "U1", "inertia", "j_tm2"}));
    CHECK(fieldAt({"plant", "units", "U1", "note"}) != nullptr);
    CHECK(fieldAt({}) == nullptr);
}

TEST_CASE("Rows: each explains itself and its ranges make sense", "[plant][messages]") {
    for (const auto& place : places()) {
        const Field& row = *place.row;
        INFO(join(place.path));
        CHECK_FALSE(row.label.empty());
        CHECK(row.help.size() > 8);
        CHECK(row.help.back() == '.');
        if (row.usual) {
            CHECK_FALSE(row.usualSource.empty());
            REQUIRE(row.hard);
            CHECK(row.usual->low >= row.hard->low);
            CHECK(row.usual->high <= row.hard->high);
        }
        if (row.hard) {
            CHECK(row.hard->low < row.hard->high);
        }
        if (row.fallback && row.hard) {
            CHECK(row.hard->holds(*row.fallback));
        }
        if (row.fallback && row.usual) {
            CHECK(row.usual->holds(*row.fallback));
        }
        const auto suffix = "_" + std::string(info(row.quantity).suffix);
        if (row.kind == FieldKind::number && suffix.size() > 1) {
            const auto part = suffix.substr(1);
            CHECK((row.key.ends_with(suffix) || place.ownerKey.ends_with(suffix)
                   || row.key.starts_with(part)));
        }
    }
}

/// What the reading of one value can say; how things fit together is for other tests.
const std::set<std::string_view> readingCodes{
    "plant.mistyped",       "plant.out-of-range",     "plant.unusual",
    "plant.unknown-key",    "plant.unknown-key-near", "plant.unknown-choice",
    "plant.two-kinds",      "plant.no-kind",          "plant.missing-form",
    "plant.undeclared",     "plant.undeclared-near",  "plant.wrong-collection",
    "plant.table-row",      "plant.table-order",      "plant.table-range",
    "plant.table-too-short"};

TEST_CASE("Rows: a good value of each binds without a fault there", "[plant][invariant]") {
    for (const auto& place : places()) {
        const auto bound = bind(treeWith(place));
        const auto subject = join(place.path);
        for (const auto& finding : bound.findings) {
            if (finding.subject == subject && readingCodes.count(finding.message->code) > 0) {
                FAIL_CHECK(subject << ": " << text(finding));
            }
        }
    }
}

TEST_CASE("Rows: a wrong type is said at its place", "[plant][messages]") {
    for (const auto& place : places()) {
        if (place.row->kind == FieldKind::free) {
            continue;
        }
        const auto findings =
            bind(treeWith(place).with(place.path, wrongType(*place.row))).findings;
        INFO(join(place.path) << "\n" << support::texts(findings));
        CHECK(has(findings, "plant.mistyped", join(place.path)));
    }
}

TEST_CASE("Rows: below and above the range are said with the unit", "[plant][messages]") {
    int checked = 0;
    for (const auto& place : places()) {
        const Field& row = *place.row;
        if (row.kind != FieldKind::number || !row.hard) {
            continue;
        }
        ++checked;
        const double width = row.hard->high - row.hard->low;
        const Tree tree = treeWith(place);
        for (const double si : {row.hard->low - 0.01 * width, row.hard->high + 0.01 * width}) {
            const auto findings =
                bind(tree.with(place.path, Tree::number(fromSi(row.quantity, si)))).findings;
            INFO(join(place.path) << "\n" << support::texts(findings));
            const auto hits = found(findings, "plant.out-of-range", join(place.path));
            REQUIRE(hits.size() == 1);
            CHECK_THAT(text(hits.front()),
                       ContainsSubstring(std::string(info(row.quantity).symbol)));
        }
        for (const double si : {row.hard->low, row.hard->high}) { // the ends are allowed
            const double file = fromSi(row.quantity, si);
            if (toSi(row.quantity, file) == si) {
                CHECK_FALSE(has(bind(tree.with(place.path, Tree::number(file))).findings,
                                "plant.out-of-range", join(place.path)));
            }
        }
    }
    CHECK(checked > 150);
}

TEST_CASE("Rows: what is required is missed", "[plant][messages]") {
    int checked = 0;
    for (const auto& place : places()) {
        if ((!place.row->required && place.owner->kind != FieldKind::oneOf) || place.mayBeLeftOut) {
            continue;
        }
        ++checked;
        const auto findings = bind(treeWith(place).without(place.path)).findings;
        const Path parent(place.path.begin(), place.path.end() - 1);
        INFO(join(place.path) << "\n" << support::texts(findings));
        CHECK((has(findings, "plant.missing", join(place.path))
               || has(findings, "plant.missing-form", join(parent))
               || has(findings, "plant.no-kind", join(parent))));
    }
    CHECK(checked > 80);
}

TEST_CASE("Rows: an unknown choice names the known ones", "[plant][messages]") {
    for (const auto& place : places()) {
        if (place.row->kind != FieldKind::choice) {
            continue;
        }
        const auto findings = bind(treeWith(place).with(place.path, Tree::text("wrong"))).findings;
        const auto hits = found(findings, "plant.unknown-choice", join(place.path));
        REQUIRE(hits.size() == 1);
        for (const auto choice : place.row->choices) {
            CHECK_THAT(text(hits.front()), ContainsSubstring(std::string(choice)));
        }
    }
}

TEST_CASE("Rows: each stands in the schema", "[plant][files]") {
    const Tree schema = files::projectSchema();
    for (const auto& place : places()) {
        const Tree* said = schemaAt(schema, place.path);
        INFO(join(place.path));
        REQUIRE(said != nullptr);
        REQUIRE(said->find("description") != nullptr);
        CHECK(said->find("description")->asText() == place.row->help);
    }
}
