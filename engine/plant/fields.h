// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/keyed.h"
#include "plant/reference.h"
#include "plant/tree.h"
#include "units/quantity.h"

#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <variant>
#include <vector>

/// The field tables: the single truth about what a project file may say.
/// Reader, writer, schema, range check, form, help, difference, fingerprint and rename are walks
/// over these rows; a key is written once in the program. The rows stand in `rows_*.cpp`.
namespace headroom::plant {

enum class FieldKind {
    number, ///< with quantity, hard range, usual range; with `fields`, may instead be a group
    whole,  ///< whole number
    truth,  ///< true or false
    choice, ///< one of `choices`
    text,
    reference,  ///< a name out of `collections`
    references, ///< several names out of `collections`
    location,   ///< a name out of `collections`, or a group of `fields`
    table,      ///< rows of numbers, `columns`; or {"csv": "file.csv"} beside the project
    interval,   ///< [low, high] of one quantity
    group,      ///< an object with `fields`
    oneOf,      ///< an object with exactly one of `fields` (kind → group)
    eitherOf,   ///< not a key of its own: exactly one of the alternatives in `forms`
    keyed,      ///< the user's names → `fields`
    numbers,    ///< names out of `collections` → number
    patch,      ///< an option's merge patch over site, plant and limits
    free,       ///< kept as it is (reserved for later work)
};

struct Range {
    double low, high; ///< SI
    bool holds(double si) const { return si >= low && si <= high; }
};

struct Column {
    std::string_view key, label;
    Quantity quantity;
    Range hard;           ///< SI
    bool rising = false;  ///< strictly
    bool falling = false; ///< strictly
};

struct Field;
using Fields = std::vector<Field>;

using TableRows = std::vector<std::pair<double, double>>;       ///< SI
using NamedNumbers = std::vector<std::pair<Reference, double>>; ///< SI
using Interval = std::pair<double, double>;                     ///< SI

/// What a row carries between file and struct; a choice is its position in `choices`.
using Value = std::variant<double, bool, int, std::string, Reference, std::vector<Reference>,
                           Location, TableRows, Interval, NamedNumbers, Tree>;

/// How a row reaches its value in the struct that owns it; empty for rows that are only kept in
/// the tree (notes, reserved keys). Objects are the owners' structs, their types erased.
struct Binding {
    std::function<void(void* owner, Value value)> set;
    std::function<std::optional<Value>(const void* owner)> get; ///< nothing: not given

    // group, oneOf's alternatives, keyed: the objects inside
    std::function<void*(void* owner, std::string_view name)> make; ///< a new or replaced child
    std::function<int(const void* owner)> count;                   ///< children there are now
    std::function<const void*(const void* owner, int index)> child;
    std::function<std::string(const void* owner, int index)> name; ///< of a keyed child
};

/// One row. Only the members that its kind uses are set.
struct Field {
    FieldKind kind = FieldKind::number;
    std::string_view key;   ///< in the file, ends in the unit
    std::string_view label; ///< for people
    std::string_view help;  ///< what it is; never empty
    Quantity quantity = Quantity::factor;
    std::optional<Range> hard;  ///< outside: error
    std::optional<Range> usual; ///< outside: warning, with `usualSource`
    std::string_view usualSource;
    bool required = false;
    std::optional<double> fallback; ///< default of a number [SI]
    bool counts = true;             ///< takes part in the fingerprint
    bool varies = false;            ///< of the project's own rows: an option may change it
    bool commons = true;            ///< of a group: note and source may stand in it too
    std::string_view effect;        ///< what it moves, for the slip ("Thoma ratio")
    std::vector<std::string_view> choices;
    std::vector<Collection> collections;
    Collection declares = Collection::none; ///< of a keyed row whose names can be referred to
    std::vector<Column> columns;
    int leastRows = 2;         ///< of a table
    Fields fields;             ///< of a group, oneOf, keyed, location, number with a group
    std::vector<Fields> forms; ///< of an eitherOf
    Binding binding;
};

/// The key that names the file of an outer table, {"csv": "shaft.csv"}.
inline constexpr std::string_view outerTableKey = "csv";
/// Keys with this beginning are kept and never looked at; not among the user's own names.
inline constexpr std::string_view ownKeyPrefix = "x-";
/// Longest table in line; a longer one stands in a file beside the project.
inline constexpr int longestInlineTable = 5000;
/// Letters of a name.
inline constexpr int longestName = 80;

/// The table of a whole project file.
const Fields& projectFields();
/// The same as one group.
const Field& projectRow();
/// The part that an option may change: site, plant, limits.
const Field& varyingRow();
/// Rows that every group has besides its own: note and source.
const Fields& commonFields();

/// The row of `key` among `rows`, inside forms too; nullptr if there is none.
const Field* rowOf(const Fields& rows, std::string_view key);
/// The same among the rows of a group or kind, with the common rows for what it does not have.
const Field* rowInside(const Field& group, std::string_view key);
/// Keys that may stand in an object of these rows, in their order, without the common ones.
std::vector<std::string> keysOf(const Fields& rows);
/// The alternatives to `key`: keys that may not stand beside it (other kinds of a one-of, keys of
/// the other forms of an either-of).
std::vector<std::string_view> rivalsOf(const Field& owner, std::string_view key);

/// The row that describes `path` in a project tree; nullptr if no such key can exist. The path of
/// one thing in a keyed collection answers with the collection's row. Inside an option's `changes`
/// the rows of {site, plant, limits} answer.
const Field* fieldAt(const Path& path);

/// The keys under which a collection stands: {"plant", "points"}.
Path pathOf(Collection collection);
/// The key of an option's merge patch.
std::string_view changesKey();

} // namespace headroom::plant
