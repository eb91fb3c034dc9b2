// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/near_miss.h"
#include "plant/reader.h"

#include <cmath>

/// The reader's part for names of other things and for tables.
namespace headroom::plant {

namespace {

std::string namesOf(const std::vector<Collection>& collections) {
    std::vector<std::string> words;
    for (const auto collection : collections) {
        words.emplace_back(nameOf(collection));
    }
    return listed(words);
}

std::string columnNames(const Field& row) {
    std::vector<std::string> keys;
    for (const auto& column : row.columns) {
        keys.emplace_back(column.key);
    }
    return listed(keys);
}

} // namespace

// --- references ---------------------------------------------------------------------------------

Reference Reader::resolve(const Field& row, const std::string& name) {
    for (const auto collection : row.collections) {
        const int index = names_.indexOf(collection, name);
        if (index >= 0) {
            return {name, collection, index};
        }
    }
    for (const auto collection : row.collections) {
        if (mayLack_ && names_.isElsewhere(collection, name)) {
            return {name, collection, -1};
        }
    }
    tellUndeclared(row, name);
    return {name, row.collections.front(), -1};
}

void Reader::tellUndeclared(const Field& row, const std::string& name) {
    const std::string key(row.key);
    const std::string wanted = namesOf(row.collections);
    for (const auto collection : plantCollections()) {
        if (names_.indexOf(collection, name) >= 0) {
            report_.add(say::wrongCollection, path_,
                        {{"key", key},
                         {"name", name},
                         {"wanted", wanted},
                         {"found", std::string(nameOf(collection))}});
            return;
        }
    }
    std::vector<std::string> known;
    for (const auto collection : row.collections) {
        const auto& names = names_.here(collection);
        known.insert(known.end(), names.begin(), names.end());
    }
    if (const auto near = nearMiss(name, known)) {
        report_.add(say::undeclaredNear, path_, {{"key", key}, {"name", name}, {"near", *near}});
        return;
    }
    const std::string list = known.empty() ? "(there is none yet)" : listed(known);
    report_.add(say::undeclared, path_,
                {{"key", key}, {"name", name}, {"collections", wanted}, {"known", list}});
}

void Reader::readReferences(const Field& row, const Tree& value, void* object) {
    std::vector<Reference> things;
    for (const auto& item : value.items()) {
        if (!item.isText()) {
            return tellMistyped(row, item);
        }
        things.push_back(resolve(row, item.asText()));
    }
    if (things.empty()) {
        return tellMistyped(row, value);
    }
    row.binding.set(object, std::move(things));
}

void Reader::readLocation(const Field& row, const Tree& value, void* object) {
    Location location;
    if (value.isText()) {
        location.thing = resolve(row, value.asText());
    } else if (value.isObject() && !row.fields.empty()) {
        readGroup(row, value, &location);
    } else {
        return tellMistyped(row, value);
    }
    row.binding.set(object, std::move(location));
}

// --- tables -------------------------------------------------------------------------------------

void Reader::readTable(const Field& row, const Tree& value, void* object) {
    const bool outer = value.isObject();
    if (!outer && !value.isArray()) {
        return tellMistyped(row, value);
    }
    const std::size_t before = report_.findings().size();
    auto rows = outer ? outerRows(row, value) : inlineRows(row, value);
    if (report_.findings().size() > before) {
        return;
    }
    if (rows.size() < static_cast<std::size_t>(row.leastRows)) {
        report_.add(say::tableTooShort, path_,
                    {{"rows", static_cast<std::int64_t>(rows.size())},
                     {"least", static_cast<std::int64_t>(row.leastRows)}});
        return;
    }
    row.binding.set(object, std::move(rows));
}

TableRows Reader::inlineRows(const Field& row, const Tree& value) {
    const auto& items = value.items();
    if (items.size() > static_cast<std::size_t>(longestInlineTable)) {
        report_.add(say::tableTooLong, path_, {{"longest", std::int64_t{longestInlineTable}}});
        return {};
    }
    TableRows rows;
    std::vector<double> now, before;
    for (std::size_t i = 0; i < items.size(); ++i) {
        now.clear();
        for (const auto& number : items[i].items()) {
            if (number.isNumber()) {
                now.push_back(number.asNumber());
            }
        }
        const bool whole = items[i].items().size() == now.size();
        if (!whole) {
            now.clear();
        }
        if (!checkRow(row, i, now, i > 0 ? &before : nullptr)) {
            return {};
        }
        rows.emplace_back(toSi(row.columns[0].quantity, now[0]),
                          toSi(row.columns[1].quantity, now[1]));
        before = now;
    }
    return rows;
}

TableRows Reader::outerRows(const Field& row, const Tree& value) {
    const Tree* file = value.find(outerTableKey);
    if (file == nullptr || !file->isText() || value.members().size() != 1) {
        tellMistyped(row, value);
        return {};
    }
    const OuterTable* table = value.outerTable();
    if (table == nullptr) {
        report_.add(say::tableNotLoaded, path_, {{"file", file->asText()}});
        return {};
    }
    TableRows rows;
    std::vector<double> now, before;
    for (int i = 0; i < table->rows(); ++i) {
        const auto first = table->values.begin() + static_cast<std::ptrdiff_t>(i) * table->columns;
        now.assign(first, first + table->columns);
        if (!checkRow(row, static_cast<std::size_t>(i), now, i > 0 ? &before : nullptr)) {
            return {};
        }
        rows.emplace_back(toSi(row.columns[0].quantity, now[0]),
                          toSi(row.columns[1].quantity, now[1]));
        before = now;
    }
    return rows;
}

bool Reader::checkRow(const Field& row, std::size_t index, const std::vector<double>& file,
                      const std::vector<double>* before) {
    const Argument number = static_cast<std::int64_t>(index) + 1;
    const Deeper deeper(path_, std::to_string(index));
    if (file.size() != row.columns.size()) {
        report_.add(say::tableRow, path_,
                    {{"row", number},
                     {"columns", static_cast<std::int64_t>(row.columns.size())},
                     {"names", columnNames(row)}});
        return false;
    }
    for (std::size_t i = 0; i < file.size(); ++i) {
        const auto& column = row.columns[i];
        const double si = toSi(column.quantity, file[i]);
        const auto print = [&](double value) { return Argument(amount(column.quantity, value)); };
        if (!column.hard.holds(si)) {
            report_.add(say::tableRange, path_,
                        {{"row", number},
                         {"label", std::string(column.label)},
                         {"value", print(si)},
                         {"low", print(column.hard.low)},
                         {"high", print(column.hard.high)}});
            return false;
        }
        if (before != nullptr
            && ((column.rising && !(file[i] > (*before)[i]))
                || (column.falling && !(file[i] < (*before)[i])))) {
            report_.add(say::tableOrder, path_,
                        {{"row", number},
                         {"label", std::string(column.label)},
                         {"value", print(si)},
                         {"before", print(toSi(column.quantity, (*before)[i]))},
                         {"rule", std::string(column.rising ? "be greater" : "be less")}});
            return false;
        }
    }
    return true;
}

} // namespace headroom::plant
