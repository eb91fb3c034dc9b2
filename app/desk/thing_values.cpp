// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/thing_values.h"

#include "base/ensure.h"
#include "desk/words.h"

#include <QCoreApplication>
#include <algorithm>
#include <cmath>

namespace headroom::desk {

namespace {

using plant::Field;
using plant::FieldKind;
using plant::Path;
using plant::Tree;

QString tr(const char* words) { return QCoreApplication::translate("desk", words); }

Path below(Path path, std::string_view key) {
    path.emplace_back(key);
    return path;
}

bool isWord(FieldKind kind) {
    return kind == FieldKind::truth || kind == FieldKind::choice || kind == FieldKind::text ||
           kind == FieldKind::reference || kind == FieldKind::location;
}

/// Collects the values below one path.
class Collector {
public:
    explicit Collector(std::size_t thingDepth) : thingDepth_(thingDepth) {}

    void rows(const plant::Fields& fields, const Path& owner, const Tree* node) {
        for (const auto& field : fields) {
            if (field.kind == FieldKind::eitherOf) {
                form(field, owner, node);
            } else {
                field_(field, below(owner, field.key),
                       node == nullptr ? nullptr : node->find(field.key));
            }
        }
    }
    void field_(const Field& field, const Path& path, const Tree* node) {
        switch (field.kind) {
        case FieldKind::number:
        case FieldKind::whole: return number(field, path, node);
        case FieldKind::group:
        case FieldKind::location: return group(field, path, node);
        case FieldKind::oneOf: return kinds(field, path, node);
        case FieldKind::keyed: return named(field, path, node);
        case FieldKind::numbers: return numbers(field, path, node);
        case FieldKind::table: return table(field, path, node);
        case FieldKind::interval: return interval(field, path, node);
        case FieldKind::truth:
        case FieldKind::choice:
        case FieldKind::text:
        case FieldKind::reference: return word(field, path, node);
        default: return; // structure that has no single value: patches, reserved keys
        }
    }

    std::vector<EditableValue> found;

private:
    /// "Rock, strickler number": names and labels below the thing.
    QString labelOf(const Path& path) const {
        const auto words = pathWords(path);
        const Path thing(path.begin(), path.begin() + static_cast<std::ptrdiff_t>(
                                                          std::min(thingDepth_, path.size())));
        auto label = words.mid(pathWords(thing).size());
        label = label.startsWith(QStringLiteral(", ")) ? label.mid(2) : words;
        if (!label.isEmpty()) {
            label[0] = label[0].toUpper();
        }
        return label;
    }
    EditableValue base(const Field& field, const Path& path) const {
        EditableValue value;
        value.path = path;
        value.field = &field;
        value.quantity = field.quantity;
        value.hard = field.hard;
        value.usual = field.usual;
        value.label = labelOf(path);
        return value;
    }
    void number(const Field& field, const Path& path, const Tree* node) {
        if (node != nullptr && node->isObject()) {
            return rows(field.fields, path, node);
        }
        auto value = base(field, path);
        value.given = node != nullptr && node->isNumber();
        value.si = value.given ? toSi(field.quantity, node->asNumber()) : field.fallback;
        found.push_back(std::move(value));
    }
    void word(const Field& field, const Path& path, const Tree* node) {
        auto value = base(field, path);
        value.given = node != nullptr;
        found.push_back(std::move(value));
    }
    void group(const Field& field, const Path& path, const Tree* node) {
        if (node != nullptr && node->isObject()) {
            rows(field.fields, path, node);
        } else if (field.kind == FieldKind::location && node != nullptr) {
            word(field, path, node);
        }
    }
    void kinds(const Field& field, const Path& path, const Tree* node) {
        for (const auto& kind : field.fields) {
            if (node != nullptr && node->find(kind.key) != nullptr) {
                field_(kind, below(path, kind.key), node->find(kind.key));
            }
        }
    }
    void named(const Field& field, const Path& path, const Tree* node) {
        for (const auto& [name, inner] : node == nullptr ? std::vector<Tree::Member>{}
                                                         : node->members()) {
            rows(field.fields, below(path, name), &inner);
        }
    }
    void numbers(const Field& field, const Path& path, const Tree* node) {
        for (const auto& [name, inner] : node == nullptr ? std::vector<Tree::Member>{}
                                                         : node->members()) {
            if (inner.isNumber()) {
                auto value = base(field, below(path, name));
                value.given = true;
                value.si = toSi(field.quantity, inner.asNumber());
                found.push_back(std::move(value));
            }
        }
    }
    void table(const Field& field, const Path& path, const Tree* node) {
        const auto& lines = node == nullptr ? std::vector<Tree>{} : node->items();
        for (std::size_t row = 0; row < lines.size(); ++row) {
            for (std::size_t column = 0; column < field.columns.size(); ++column) {
                const auto& cells = lines[row].items();
                if (column < cells.size() && cells[column].isNumber()) {
                    found.push_back(cell(field, path, row, column, cells[column].asNumber()));
                }
            }
        }
    }
    EditableValue cell(const Field& field, const Path& path, std::size_t row, std::size_t column,
                       double fileValue) const {
        const auto& head = field.columns[column];
        auto value = base(field, path);
        value.row = static_cast<int>(row);
        value.column = static_cast<int>(column);
        value.quantity = head.quantity;
        value.hard = head.hard;
        value.usual.reset();
        value.label += tr(", row %1, %2").arg(row + 1).arg(text(head.label).toLower());
        value.given = true;
        value.si = toSi(head.quantity, fileValue);
        return value;
    }
    void interval(const Field& field, const Path& path, const Tree* node) {
        const auto& ends = node == nullptr ? std::vector<Tree>{} : node->items();
        for (std::size_t end = 0; end < std::min<std::size_t>(2, ends.size()); ++end) {
            auto value = base(field, path);
            value.column = static_cast<int>(end);
            value.label += end == 0 ? tr(", low end") : tr(", high end");
            value.given = ends[end].isNumber();
            value.si = value.given ? std::optional(toSi(field.quantity, ends[end].asNumber()))
                                   : std::nullopt;
            found.push_back(std::move(value));
        }
    }
    /// The form whose keys are there; the first one if none is.
    void form(const Field& field, const Path& owner, const Tree* node) {
        const plant::Fields* chosen = &field.forms.front();
        for (const auto& form : field.forms) {
            for (const auto& key : keysOf(form)) {
                if (node != nullptr && node->find(key) != nullptr) {
                    chosen = &form;
                }
            }
        }
        if (chosen == &field.forms.front() && field.forms.size() > 4 &&
            (node == nullptr || !hasKeyOf(*chosen, *node))) {
            return; // a choice among many kinds, none made
        }
        rows(*chosen, owner, node);
    }
    static bool hasKeyOf(const plant::Fields& form, const Tree& node) {
        const auto keys = keysOf(form);
        return std::any_of(keys.begin(), keys.end(),
                           [&](const auto& key) { return node.find(key) != nullptr; });
    }

    std::size_t thingDepth_;
};

/// Without the last digit's noise of a conversion of units: 28 and not 28.000000000000004.
double tidied(double value) {
    return QString::number(value, 'g', 15).toDouble();
}

/// The row of a path and whether the path names one thing of a keyed collection.
struct Spot {
    const Field* field = nullptr;
    bool isName = false;
};
Spot spotOf(const Path& path) {
    const auto* field = plant::fieldAt(path);
    const Path owner(path.begin(), path.end() - 1);
    const auto* above = owner.empty() ? nullptr : plant::fieldAt(owner);
    const bool keyed = field != nullptr && (field->kind == FieldKind::keyed ||
                                            field->kind == FieldKind::numbers);
    return {field, keyed && above == field};
}

} // namespace

bool EditableValue::numeric() const { return field != nullptr && !isWord(field->kind); }

const Tree* valueAt(const plant::Project& project, const plant::Variant& variant,
                    const Path& path) {
    const auto* top = path.empty() ? nullptr : rowOf(plant::projectFields(), path.front());
    return top != nullptr && top->varies ? variant.tree.at(path) : project.tree.at(path);
}

std::vector<EditableValue> valuesOf(const plant::Project& project, const plant::Variant& variant,
                                    const Path& path) {
    if (path.empty()) {
        return {};
    }
    const auto spot = spotOf(path);
    if (spot.field == nullptr) {
        return {};
    }
    const Tree* node = valueAt(project, variant, path);
    Collector collector(thingPath(path).size());
    if (spot.isName && spot.field->kind == FieldKind::keyed) {
        collector.rows(spot.field->fields, path, node);
    } else if (spot.isName) {
        const Path owner(path.begin(), path.end() - 1);
        collector.field_(*spot.field, owner, valueAt(project, variant, owner));
        std::erase_if(collector.found, [&](const auto& value) { return value.path != path; });
    } else {
        collector.field_(*spot.field, path, node);
    }
    return std::move(collector.found);
}

std::vector<EditableValue> allValues(const plant::Project& project,
                                     const plant::Variant& variant) {
    std::vector<EditableValue> all;
    for (const auto& field : plant::projectFields()) {
        for (auto& value : valuesOf(project, variant, {std::string(field.key)})) {
            all.push_back(std::move(value));
        }
    }
    return all;
}

QString shortName(const EditableValue& value) {
    auto name = value.field->kind == FieldKind::table
                    ? text(value.field->columns[static_cast<std::size_t>(value.column)].key)
                    : text(value.path.back());
    const auto mark = name.lastIndexOf(QLatin1Char('_'));
    return mark > 0 ? name.left(mark) : name;
}

int valueNamed(const std::vector<EditableValue>& values, const QString& typed) {
    const auto wanted = typed.trimmed();
    if (wanted.isEmpty()) {
        return -1;
    }
    const auto first = [&](auto&& fits) {
        const auto at = std::find_if(values.begin(), values.end(), fits);
        return at == values.end() ? -1 : static_cast<int>(at - values.begin());
    };
    const int exact = first([&](const auto& value) {
        return shortName(value).compare(wanted, Qt::CaseInsensitive) == 0;
    });
    const int begins = first([&](const auto& value) {
        return shortName(value).startsWith(wanted, Qt::CaseInsensitive);
    });
    const int inLabel = first([&](const auto& value) {
        const auto words = value.label.split(QLatin1Char(' '));
        return std::any_of(words.begin(), words.end(), [&](const QString& word) {
            return word.startsWith(wanted, Qt::CaseInsensitive);
        });
    });
    return exact >= 0 ? exact : begins >= 0 ? begins : inLabel;
}

plant::Tree treeWith(const EditableValue& value, const Tree* now, double si) {
    const auto number = Tree::number(tidied(fromSi(value.quantity, si)));
    if (value.column < 0) {
        return number;
    }
    ensure(now != nullptr && now->isArray(), "a cell stands in a table");
    auto rows = now->items();
    if (value.row < 0) {
        rows[static_cast<std::size_t>(value.column)] = number;
        return Tree::array(std::move(rows));
    }
    auto cells = rows[static_cast<std::size_t>(value.row)].items();
    cells[static_cast<std::size_t>(value.column)] = number;
    rows[static_cast<std::size_t>(value.row)] = Tree::array(std::move(cells));
    return Tree::array(std::move(rows));
}

QString printed(const EditableValue& value, const Tree* now) {
    if (value.numeric()) {
        return value.si ? text(print(value.quantity, *value.si)) : tr("not given");
    }
    if (now == nullptr) {
        return tr("not given");
    }
    switch (now->type()) {
    case Tree::Type::boolean: return now->asBoolean() ? tr("yes") : tr("no");
    case Tree::Type::text: return text(now->asText());
    default: return tr("a group");
    }
}

} // namespace headroom::desk
