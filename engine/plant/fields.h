// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/reference.h"
#include "plant/tree.h"
#include "units/quantity.h"

#include <functional>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

/// The field tables: the single truth about what a project file may say.
/// Reader, writer, schema, range check, form, help, difference, fingerprint and rename are walks
/// over these rows; a key is written once in the program.
namespace headroom::plant {

enum class FieldKind {
    number,    ///< with quantity, hard range, usual range
    whole,     ///< whole number
    truth,     ///< true or false
    choice,    ///< one of `choices`
    text,
    reference, ///< a name out of `collections`
    location,  ///< a name, or {"conduit", "chainage_m"}
    table,     ///< rows of numbers, `columns`
    group,     ///< an object with `fields`
    oneOf,     ///< an object with exactly one of `fields` (kind → group)
    eitherOf,  ///< not a key of its own: exactly one of the alternatives in `forms`
    keyed,     ///< the user's names → `fields`
    numbers,   ///< the user's or a collection's names → number (levels by reservoir)
    patch,     ///< an option's merge patch
    free,      ///< kept as it is (reserved for later work)
};

struct Range {
    double low, high; ///< SI
};

struct Column {
    std::string_view key, label;
    Quantity quantity;
    Range hard;
    bool rising = false; ///< strictly
};

struct Field;
using Fields = std::vector<Field>;

/// One row. Only the members that its kind uses are set.
struct Field {
    FieldKind kind = FieldKind::number;
    std::string_view key;      ///< in the file, ends in the unit
    std::string_view label;    ///< for people
    std::string_view help;     ///< what it is; never empty
    Quantity quantity = Quantity::factor;
    std::optional<Range> hard;   ///< outside: error
    std::optional<Range> usual;  ///< outside: warning, with `usualSource`
    std::string_view usualSource;
    bool required = false;
    std::optional<double> fallback;       ///< default of a number [SI]
    bool counts = true;                   ///< takes part in the fingerprint
    std::string_view effect;              ///< what it moves, for the slip ("Thoma ratio")
    std::vector<std::string_view> choices;
    std::vector<Collection> collections;
    std::vector<Column> columns;
    Fields fields;                        ///< of a group, oneOf, keyed
    std::vector<Fields> forms;            ///< of an eitherOf
    std::function<const Fields&()> later; ///< for shared or deep tables, instead of `fields`
    /// Puts the read SI value into the struct; type-erased by the builders in fields.cpp.
    std::function<void(void* object, const Tree& value)> set;
    std::function<void*(void* object, std::string_view name)> enter; ///< child object of a group/keyed
};

/// The table of a whole project file.
const Fields& projectFields();

/// The row that describes `path` in a project tree; nullptr if no such key can exist.
/// Inside an option's `changes` the rows of {site, plant, limits} answer.
const Field* fieldAt(const Path& path);

} // namespace headroom::plant
