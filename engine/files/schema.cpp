// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/schema.h"

#include "files/json_writer.h"
#include "plant/fields.h"

#include <fmt/format.h>

#include <charconv>

namespace headroom::files {

namespace {

using plant::Field;
using plant::FieldKind;
using plant::Fields;
using plant::Tree;
using Members = std::vector<Tree::Member>;

Tree text(std::string_view words) {
    return Tree::text(std::string(words));
}

Tree typed(std::string_view type) {
    return Tree::object({{"type", text(type)}});
}

Tree texts(const std::vector<std::string_view>& words) {
    std::vector<Tree> items;
    for (const auto word : words) {
        items.push_back(text(word));
    }
    return Tree::array(std::move(items));
}

/// A bound in the file's unit, without the last digits that the conversion to SI has touched.
Tree inFileUnit(Quantity quantity, double si) {
    const auto digits = fmt::format("{:.12g}", fromSi(quantity, si));
    double value = 0.0;
    std::from_chars(digits.data(), digits.data() + digits.size(), value);
    return Tree::number(value);
}

Tree numberWithin(Quantity quantity, const std::optional<plant::Range>& range) {
    Members members{{"type", text("number")}};
    if (range) {
        members.emplace_back("minimum", inFileUnit(quantity, range->low));
        members.emplace_back("maximum", inFileUnit(quantity, range->high));
    }
    return Tree::object(std::move(members));
}

Tree anyOf(std::vector<Tree> options) {
    return Tree::object({{"anyOf", Tree::array(std::move(options))}});
}

/// Objects as they stand in a file, or as an option's patch says them: nothing is required there
/// and null removes.
class Maker {
public:
    explicit Maker(bool patch) : patch_(patch) {}

    Tree group(const Field& owner) const {
        Members properties;
        addProperties(owner.fields, properties);
        if (owner.commons) {
            for (const auto& row : plant::commonFields()) {
                if (plant::rowOf(owner.fields, row.key) == nullptr) {
                    properties.emplace_back(row.key, shared(row));
                }
            }
        }
        std::string own("^");
        own += plant::ownKeyPrefix;
        Members members{{"type", text("object")},
                        {"properties", Tree::object(std::move(properties))},
                        {"patternProperties", Tree::object({{own, Tree::object({})}})},
                        {"additionalProperties", Tree::boolean(false)}};
        if (!patch_) {
            addPresence(owner, members);
        }
        return Tree::object(std::move(members));
    }

    /// The common rows once, for all groups to refer to.
    static Tree sharedParts() {
        Members parts;
        for (const auto& row : plant::commonFields()) {
            parts.emplace_back(row.key, Maker(false).described(row));
        }
        return Tree::object(std::move(parts));
    }

private:
    Tree shared(const Field& row) const {
        Tree there = Tree::object({{"$ref", Tree::text("#/$defs/" + std::string(row.key))}});
        return patch_ ? anyOf({std::move(there), typed("null")}) : there;
    }

    void addProperties(const Fields& rows, Members& properties) const {
        for (const auto& row : rows) {
            for (const auto& form : row.forms) {
                addProperties(form, properties);
            }
            if (row.kind != FieldKind::eitherOf) {
                properties.emplace_back(row.key, described(row));
            }
        }
    }

    static std::vector<std::string_view> requiredOf(const Fields& rows) {
        std::vector<std::string_view> keys;
        for (const auto& row : rows) {
            if (row.required && row.kind != FieldKind::eitherOf) {
                keys.push_back(row.key);
            }
        }
        return keys;
    }

    void addPresence(const Field& owner, Members& members) const {
        if (owner.kind == FieldKind::oneOf) {
            std::vector<Tree> kinds;
            for (const auto& kind : owner.fields) {
                kinds.push_back(Tree::object({{"required", texts({kind.key})}}));
            }
            members.emplace_back("oneOf", Tree::array(std::move(kinds)));
            return;
        }
        if (const auto keys = requiredOf(owner.fields); !keys.empty()) {
            members.emplace_back("required", texts(keys));
        }
        std::vector<Tree> forms;
        for (const auto& row : owner.fields) {
            if (row.kind == FieldKind::eitherOf) {
                forms.push_back(exactlyOne(row));
            }
        }
        if (!forms.empty()) {
            members.emplace_back("allOf", Tree::array(std::move(forms)));
        }
    }

    /// None of these keys.
    static Tree without(const std::vector<std::string_view>& keys) {
        std::vector<Tree> any;
        for (const auto key : keys) {
            any.push_back(Tree::object({{"required", texts({key})}}));
        }
        return anyOf(std::move(any));
    }

    static Tree exactlyOne(const Field& either) {
        std::vector<Tree> options;
        std::vector<std::string_view> all;
        for (const auto& form : either.forms) {
            std::vector<std::string_view> others;
            for (const auto& other : either.forms) {
                for (const auto& row : other) {
                    if (&other != &form) {
                        others.push_back(row.key);
                    }
                }
            }
            for (const auto& row : form) {
                all.push_back(row.key);
            }
            Members option;
            option.emplace_back("required", texts(requiredOf(form)));
            if (!others.empty()) {
                option.emplace_back("not", without(others));
            }
            options.push_back(Tree::object(std::move(option)));
        }
        if (!either.required) {
            options.push_back(Tree::object({{"not", without(all)}}));
        }
        return Tree::object({{"oneOf", Tree::array(std::move(options))}});
    }

    /// A row's value with title, help and default.
    Tree described(const Field& row) const {
        std::string title(row.label);
        const bool hasUnit = row.kind == FieldKind::number || row.kind == FieldKind::interval
                             || row.kind == FieldKind::numbers;
        if (hasUnit && !info(row.quantity).symbol.empty()) {
            title += fmt::format(" [{}]", info(row.quantity).symbol);
        }
        Members members{{"title", Tree::text(std::move(title))}, {"description", text(row.help)}};
        if (row.fallback) {
            members.emplace_back("default", inFileUnit(row.quantity, *row.fallback));
        }
        Tree value = valueOf(row);
        if (patch_) {
            value = anyOf({std::move(value), typed("null")});
        }
        for (const auto& member : value.members()) {
            members.push_back(member);
        }
        return Tree::object(std::move(members));
    }

    Tree valueOf(const Field& row) const {
        switch (row.kind) {
        case FieldKind::number:
            return row.fields.empty() ? numberWithin(row.quantity, row.hard)
                                      : anyOf({numberWithin(row.quantity, row.hard), group(row)});
        case FieldKind::whole:
            return Tree::object({{"type", text("integer")},
                                 {"minimum", Tree::number(row.hard ? row.hard->low : 0)}});
        case FieldKind::truth:
            return typed("boolean");
        case FieldKind::choice:
            return Tree::object({{"enum", texts(row.choices)}});
        case FieldKind::text:
            return typed("string");
        case FieldKind::reference:
            return name();
        case FieldKind::references:
            return Tree::object(
                {{"type", text("array")}, {"items", name()}, {"minItems", Tree::number(1)}});
        case FieldKind::location:
            return row.fields.empty() ? name() : anyOf({name(), group(row)});
        case FieldKind::table:
            return table(row);
        case FieldKind::interval:
            return rowOfNumbers({row.quantity, row.quantity}, {row.hard, row.hard});
        case FieldKind::group:
        case FieldKind::oneOf:
            return group(row);
        case FieldKind::keyed:
            return names(patch_ ? anyOf({group(row), typed("null")}) : group(row));
        case FieldKind::numbers:
            return names(numberWithin(row.quantity, row.hard));
        case FieldKind::patch:
            return Maker(true).group(plant::varyingRow());
        case FieldKind::free:
        case FieldKind::eitherOf:
            break;
        }
        return Tree::object({});
    }

    static Tree name() {
        return Tree::object({{"type", text("string")},
                             {"minLength", Tree::number(1)},
                             {"maxLength", Tree::number(plant::longestName)}});
    }

    static Tree names(Tree thing) {
        return Tree::object(
            {{"type", text("object")},
             {"propertyNames", Tree::object({{"minLength", Tree::number(1)},
                                             {"maxLength", Tree::number(plant::longestName)}})},
             {"additionalProperties", std::move(thing)}});
    }

    static Tree rowOfNumbers(const std::vector<Quantity>& quantities,
                             const std::vector<std::optional<plant::Range>>& ranges) {
        std::vector<Tree> cells;
        for (std::size_t i = 0; i < quantities.size(); ++i) {
            cells.push_back(numberWithin(quantities[i], ranges[i]));
        }
        const auto count = Tree::number(static_cast<double>(cells.size()));
        return Tree::object({{"type", text("array")},
                             {"prefixItems", Tree::array(std::move(cells))},
                             {"minItems", count},
                             {"maxItems", count}});
    }

    static Tree table(const Field& row) {
        std::vector<Quantity> quantities;
        std::vector<std::optional<plant::Range>> ranges;
        for (const auto& column : row.columns) {
            quantities.push_back(column.quantity);
            ranges.emplace_back(column.hard);
        }
        const Tree inLine = Tree::object({{"type", text("array")},
                                          {"items", rowOfNumbers(quantities, ranges)},
                                          {"minItems", Tree::number(row.leastRows)},
                                          {"maxItems", Tree::number(plant::longestInlineTable)}});
        const Tree outer = Tree::object(
            {{"type", text("object")},
             {"properties", Tree::object({{std::string(plant::outerTableKey), typed("string")}})},
             {"required", texts({plant::outerTableKey})},
             {"additionalProperties", Tree::boolean(false)}});
        return anyOf({inLine, outer});
    }

    bool patch_;
};

} // namespace

Tree projectSchema() {
    Members members{{"$schema", text("https://json-schema.org/draft/2020-12/schema")},
                    {"title", text("Headroom project")},
                    {"description", text("A plant, its limits, options and studies. Made by "
                                         "headroom-batch schema from the program's field rows.")}};
    const Tree project = Maker(false).group(plant::projectRow());
    for (const auto& member : project.members()) {
        members.push_back(member);
    }
    members.emplace_back("$defs", Maker::sharedParts());
    return Tree::object(std::move(members));
}

std::string projectSchemaText() {
    return writeJson(projectSchema());
}

} // namespace headroom::files
