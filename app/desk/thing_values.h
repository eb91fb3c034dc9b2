// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/fields.h"
#include "plant/project.h"

#include <QString>
#include <optional>
#include <vector>

/// The single values of a thing that can be entered in a slip: a walk over the field rows beside
/// the value tree. A cell of a table is a value of its own.
namespace headroom::desk {

struct EditableValue {
    plant::Path path;                   ///< of the field in the project
    const plant::Field* field = nullptr;
    int row = -1, column = -1;          ///< inside a table (row, column) or an interval (column)
    Quantity quantity = Quantity::factor;
    std::optional<plant::Range> hard, usual;
    QString label;                      ///< "Diameter", "Area by level, row 2, area"
    bool given = false;                 ///< stands in the file; else the row's default is used
    std::optional<double> si;           ///< numbers only; nothing: not given, no default

    bool numeric() const;
    bool operator==(const EditableValue& other) const {
        return path == other.path && row == other.row && column == other.column;
    }
};

/// What a path says with an option in the hand: the option's tree for site, plant and limits, the
/// project's for the rest; nullptr if it is not given.
const plant::Tree* valueAt(const plant::Project& project, const plant::Variant& variant,
                           const plant::Path& path);

/// Values of the thing or value at a path, in the order of the rows.
std::vector<EditableValue> valuesOf(const plant::Project& project, const plant::Variant& variant,
                                    const plant::Path& path);

/// Every value of the project that can be entered, for the search.
std::vector<EditableValue> allValues(const plant::Project& project,
                                     const plant::Variant& variant);

/// The first value whose short name is typed: the key without its unit, then a beginning of it,
/// then the beginning of a word of its label; −1 if none.
int valueNamed(const std::vector<EditableValue>& values, const QString& typed);
/// "diameter", the short name of a value.
QString shortName(const EditableValue& value);

/// The tree that stands at `value.path` once the number is entered (a whole table for its cells).
plant::Tree treeWith(const EditableValue& value, const plant::Tree* now, double si);

/// As printed beside its label: "8.0 m", "rigid", "not given".
QString printed(const EditableValue& value, const plant::Tree* now);

} // namespace headroom::desk
