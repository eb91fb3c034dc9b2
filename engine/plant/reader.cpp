// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/reader.h"

#include "base/near_miss.h"

#include <algorithm>
#include <cmath>

namespace headroom::plant {

namespace {

std::string foundText(const Tree& value) {
    switch (value.type()) {
    case Tree::Type::null:
        return "null";
    case Tree::Type::boolean:
        return "true or false";
    case Tree::Type::number:
        return "a number";
    case Tree::Type::text:
        return "a text";
    case Tree::Type::array:
        return "a list";
    case Tree::Type::object:
        return "an object";
    }
    throw Bug("a value has a type");
}

std::string numberText(const Field& row) {
    const auto& quantity = info(row.quantity);
    return quantity.symbol.empty() ? "a number" : "a number in " + std::string(quantity.symbol);
}

std::string wantedText(const Field& row) {
    switch (row.kind) {
    case FieldKind::number:
        return numberText(row);
    case FieldKind::whole:
        return "a whole number";
    case FieldKind::truth:
        return "true or false";
    case FieldKind::choice:
        return "one of its choices in quotes";
    case FieldKind::text:
        return "a text in quotes";
    case FieldKind::reference:
        return "a name in quotes";
    case FieldKind::references:
        return "a list of names in quotes";
    case FieldKind::location:
        return "a name in quotes, or a conduit and a chainage in braces";
    case FieldKind::table:
        return "a list of rows, or the name of a CSV file in braces";
    case FieldKind::interval:
        return "a list of two numbers";
    default:
        return "an object in braces";
    }
}

std::vector<std::string> keysInside(const Field& owner) {
    auto keys = keysOf(owner.fields);
    if (owner.commons) {
        for (const auto& key : keysOf(commonFields())) {
            keys.push_back(key);
        }
    }
    return keys;
}

/// The first of a form's keys that stands in the object, or "".
std::string_view presentKey(const Fields& form, const Tree& tree) {
    for (const auto& row : form) {
        if (tree.find(row.key) != nullptr) {
            return row.key;
        }
    }
    return {};
}

} // namespace

// --- objects ------------------------------------------------------------------------------------

void Reader::readGroup(const Field& owner, const Tree& tree, void* object) {
    for (const auto& [key, value] : tree.members()) {
        if (key.starts_with(ownKeyPrefix)) {
            continue;
        }
        const Field* row = rowInside(owner, key);
        if (row == nullptr) {
            tellUnknown(owner, key);
            continue;
        }
        const Deeper deeper(path_, key);
        if (value.isNull()) {
            report_.add(say::nullValue, path_, {{"key", key}});
        } else {
            readMember(*row, value, object);
        }
    }
    if (owner.kind == FieldKind::oneOf) {
        checkKinds(owner, tree);
    } else {
        checkPresence(owner, owner.fields, tree);
    }
}

void Reader::readMember(const Field& row, const Tree& value, void* object) {
    switch (row.kind) {
    case FieldKind::number:
        return readNumber(row, value, object);
    case FieldKind::whole:
        return readWhole(row, value, object);
    case FieldKind::choice:
        return readChoice(row, value, object);
    case FieldKind::references:
        return readReferences(row, value, object);
    case FieldKind::location:
        return readLocation(row, value, object);
    case FieldKind::table:
        return readTable(row, value, object);
    case FieldKind::interval:
        return readInterval(row, value, object);
    case FieldKind::keyed:
        return readKeyed(row, value, object);
    case FieldKind::numbers:
        return readNumbers(row, value, object);
    case FieldKind::free:
        return;
    case FieldKind::eitherOf:
        throw Bug("an either-of is not a key");
    default:
        return readInner(row, value, object);
    }
}

/// Truths, texts, references, patches, groups and one-ofs.
void Reader::readInner(const Field& row, const Tree& value, void* object) {
    const bool fits = row.kind == FieldKind::truth       ? value.type() == Tree::Type::boolean
                      : row.kind == FieldKind::text      ? value.isText()
                      : row.kind == FieldKind::reference ? value.isText()
                                                         : value.isObject();
    if (!fits) {
        return tellMistyped(row, value);
    }
    if (row.kind == FieldKind::group || row.kind == FieldKind::oneOf) {
        void* inner = row.binding.make ? row.binding.make(object, row.key) : nullptr;
        return readGroup(row, value, inner);
    }
    if (!row.binding.set) {
        return;
    }
    switch (row.kind) {
    case FieldKind::truth:
        return row.binding.set(object, value.asBoolean());
    case FieldKind::text:
        return row.binding.set(object, value.asText());
    case FieldKind::reference:
        return row.binding.set(object, resolve(row, value.asText()));
    default:
        return row.binding.set(object, value);
    }
}

void Reader::readKeyed(const Field& row, const Tree& value, void* object) {
    if (!value.isObject()) {
        return tellMistyped(row, value);
    }
    const bool lackedBefore = mayLack_;
    mayLack_ =
        mayLack_ || row.declares == Collection::limits || row.declares == Collection::studies;
    const auto names = namesIn(value);
    if (row.declares == Collection::events) {
        names_.declare(Collection::events, names);
    }
    const auto& shared = plantCollections(); // looked at together, see checkUnique
    if (std::find(shared.begin(), shared.end(), row.declares) == shared.end()) {
        checkCase(names, path_, report_);
    }
    for (const auto& [name, thing] : value.members()) {
        const Deeper deeper(path_, name);
        checkName(name, path_, report_);
        void* inner = row.binding.make(object, name); // always: positions follow the tree
        if (thing.isNull()) {
            report_.add(say::nullValue, path_, {{"key", name}});
        } else if (!thing.isObject()) {
            report_.add(say::mistyped, path_,
                        {{"key", name},
                         {"found", foundText(thing)},
                         {"wanted", std::string("an object in braces")}});
        } else {
            readGroup(row, thing, inner);
        }
    }
    mayLack_ = lackedBefore;
}

// --- presence -----------------------------------------------------------------------------------

void Reader::checkPresence(const Field& owner, const Fields& rows, const Tree& tree) {
    for (const auto& row : rows) {
        if (row.kind == FieldKind::eitherOf) {
            checkForms(owner, row, tree);
        } else if (row.required && tree.find(row.key) == nullptr) {
            const Deeper deeper(path_, row.key);
            report_.add(say::missing, path_,
                        {{"key", std::string(row.key)},
                         {"label", std::string(row.label)},
                         {"help", std::string(row.help)}});
        }
    }
}

void Reader::checkForms(const Field& owner, const Field& either, const Tree& tree) {
    const Fields* present = nullptr;
    for (const auto& form : either.forms) {
        if (presentKey(form, tree).empty()) {
            continue;
        }
        if (present != nullptr) {
            return tellRivals(presentKey(*present, tree), presentKey(form, tree), either.label);
        }
        present = &form;
    }
    if (present != nullptr) {
        return checkPresence(owner, *present, tree);
    }
    if (either.required) {
        report_.add(say::missingForm, path_,
                    {{"label", std::string(either.label)}, {"keys", listed(keysOf({either}), 20)}});
    }
}

void Reader::checkKinds(const Field& oneOf, const Tree& tree) {
    std::string_view first;
    for (const auto& kind : oneOf.fields) {
        if (tree.find(kind.key) == nullptr) {
            continue;
        }
        if (!first.empty()) {
            return tellRivals(first, kind.key, oneOf.label);
        }
        first = kind.key;
    }
    if (first.empty()) {
        report_.add(say::noKind, path_,
                    {{"key", std::string(oneOf.key)},
                     {"label", std::string(oneOf.label)},
                     {"keys", listed(keysOf(oneOf.fields))}});
    }
}

void Reader::tellRivals(std::string_view first, std::string_view second, std::string_view label) {
    Path both = path_;
    const auto said = [&](const Tree& tree, std::string_view key) {
        const Tree* owner = tree.at(both);
        return owner != nullptr && owner->find(key) != nullptr;
    };
    const auto& option = report_.option();
    const Message* message = &say::twoKinds;
    if (option) {
        if (said(*option->base, second) && said(*option->changes, first)) {
            std::swap(first, second);
        }
        if (said(*option->base, first) && said(*option->changes, second)) {
            message = &say::forgottenNull;
        }
    }
    Path other = path_;
    other.emplace_back(first);
    const Deeper deeper(path_, second);
    report_.add(*message, path_,
                {{"first", std::string(first)},
                 {"second", std::string(second)},
                 {"label", std::string(label)}},
                {other});
}

void Reader::tellUnknown(const Field& owner, const std::string& key) {
    const auto keys = keysInside(owner);
    const auto near = nearMiss(key, keys);
    const Deeper deeper(path_, key);
    if (near) {
        report_.add(say::unknownKeyNear, path_, {{"key", key}, {"near", *near}});
    } else {
        report_.add(say::unknownKey, path_, {{"key", key}, {"keys", listed(keys, 20)}});
    }
}

void Reader::tellMistyped(const Field& row, const Tree& value) {
    report_.add(say::mistyped, path_,
                {{"key", path_.back()}, {"found", foundText(value)}, {"wanted", wantedText(row)}});
}

// --- numbers ------------------------------------------------------------------------------------

std::optional<double> Reader::numberOf(const Field& row, const Tree& value) {
    if (!value.isNumber()) {
        tellMistyped(row, value);
        return std::nullopt;
    }
    const double si = toSi(row.quantity, value.asNumber());
    const auto print = [&](double number) { return Argument(amount(row.quantity, number)); };
    if (!std::isfinite(si) || (row.hard && !row.hard->holds(si))) {
        const Range range = row.hard.value_or(Range{-1e300, 1e300});
        report_.add(say::outOfRange, path_,
                    {{"key", path_.back()},
                     {"label", std::string(row.label)},
                     {"value", print(si)},
                     {"low", print(range.low)},
                     {"high", print(range.high)}});
        return std::nullopt;
    }
    if (row.usual && !row.usual->holds(si)) {
        report_.add(say::unusual, path_,
                    {{"label", std::string(row.label)},
                     {"value", print(si)},
                     {"low", print(row.usual->low)},
                     {"high", print(row.usual->high)},
                     {"source", std::string(row.usualSource)}});
    }
    return si;
}

void Reader::readNumber(const Field& row, const Tree& value, void* object) {
    if (!row.fields.empty() && value.isObject()) {
        readGroup(row, value, object);
        return checkSearch(value);
    }
    const auto si = numberOf(row, value);
    if (si && row.binding.set) {
        row.binding.set(object, *si);
    }
}

/// The delay now used lies within its search range.
void Reader::checkSearch(const Tree& value) {
    const Tree* now = nullptr;
    const Tree* search = nullptr;
    for (const auto& member : value.members()) {
        (member.second.isArray() ? search : now) = &member.second;
    }
    if (now == nullptr || search == nullptr || !now->isNumber() || search->items().size() != 2
        || !search->items()[0].isNumber() || !search->items()[1].isNumber()) {
        return;
    }
    const double at_s = now->asNumber();
    const double low_s = search->items()[0].asNumber();
    const double high_s = search->items()[1].asNumber();
    if (at_s < low_s || at_s > high_s) {
        report_.add(say::nowOutsideSearch, path_,
                    {{"value", amount(Quantity::time, at_s)},
                     {"low", amount(Quantity::time, low_s)},
                     {"high", amount(Quantity::time, high_s)}});
    }
}

void Reader::readWhole(const Field& row, const Tree& value, void* object) {
    Field whole = row;
    whole.quantity = Quantity::count;
    const auto number = numberOf(whole, value);
    if (!number) {
        return;
    }
    if (std::floor(*number) != *number) {
        report_.add(say::notWhole, path_,
                    {{"key", path_.back()}, {"value", amount(Quantity::factor, *number)}});
        return;
    }
    if (row.binding.set) {
        row.binding.set(object, *number);
    }
}

void Reader::readInterval(const Field& row, const Tree& value, void* object) {
    if (value.items().size() != 2) {
        return tellMistyped(row, value);
    }
    const auto low = numberOf(row, value.items()[0]);
    const auto high = numberOf(row, value.items()[1]);
    if (!low || !high) {
        return;
    }
    if (!(*low < *high)) {
        report_.add(say::intervalReversed, path_,
                    {{"key", path_.back()},
                     {"low", amount(row.quantity, *low)},
                     {"high", amount(row.quantity, *high)}});
        return;
    }
    row.binding.set(object, Interval{*low, *high});
}

void Reader::readNumbers(const Field& row, const Tree& value, void* object) {
    if (!value.isObject()) {
        return tellMistyped(row, value);
    }
    NamedNumbers numbers;
    for (const auto& [name, number] : value.members()) {
        const Deeper deeper(path_, name);
        auto thing = resolve(row, name);
        if (const auto si = numberOf(row, number)) {
            numbers.emplace_back(std::move(thing), *si);
        }
    }
    row.binding.set(object, std::move(numbers));
}

void Reader::readChoice(const Field& row, const Tree& value, void* object) {
    if (!value.isText()) {
        return tellMistyped(row, value);
    }
    for (std::size_t i = 0; i < row.choices.size(); ++i) {
        if (row.choices[i] == value.asText()) {
            row.binding.set(object, static_cast<int>(i));
            return;
        }
    }
    const std::vector<std::string> choices(row.choices.begin(), row.choices.end());
    report_.add(say::unknownChoice, path_,
                {{"key", path_.back()}, {"found", value.asText()}, {"keys", listed(choices)}});
}

} // namespace headroom::plant
