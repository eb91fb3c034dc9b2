// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/fields.h"

#include <initializer_list>
#include <type_traits>

/// Builders of field rows: they tie a row to a member of the struct that owns it, so that the
/// type of the owner is checked when the rows are compiled. Ranges are given as written in the
/// file and kept in SI.
namespace headroom::plant::rows {

/// How a value is put into and read from its owner.
template <class Owner, class T>
struct Access {
    std::function<void(Owner&, T)> put;
    std::function<std::optional<T>(const Owner&)> read;
};

template <class T>
struct Plain {
    using type = std::conditional_t<std::is_enum_v<T>, int, T>;
};
template <class T>
struct Plain<std::optional<T>> : Plain<T> {};

/// Access to a member; an optional member reads as nothing while it is empty.
template <class Owner, class M>
Access<Owner, typename Plain<M>::type> access(M Owner::*member) {
    using T = typename Plain<M>::type;
    return {[member](Owner& owner, T value) { owner.*member = static_cast<M>(std::move(value)); },
            [member](const Owner& owner) -> std::optional<T> {
                if constexpr (requires { (owner.*member).has_value(); }) {
                    return owner.*member;
                } else {
                    return static_cast<T>(owner.*member);
                }
            }};
}

/// Access to a member of a member.
template <class Owner, class Part, class M>
Access<Owner, typename Plain<M>::type> access(Part Owner::*part, M Part::*member) {
    const auto inner = access(member);
    using T = typename Plain<M>::type;
    return {[part, inner](Owner& owner, T value) { inner.put(owner.*part, std::move(value)); },
            [part, inner](const Owner& owner) { return inner.read(owner.*part); }};
}

/// Access to the number of one alternative of a variant: putting chooses the alternative.
template <class Owner, class... Kinds, class Kind>
Access<Owner, double> access(std::variant<Kinds...> Owner::*choice, double Kind::*member) {
    return {[choice, member](Owner& owner, double value) {
                Kind kind;
                kind.*member = value;
                owner.*choice = kind;
            },
            [choice, member](const Owner& owner) -> std::optional<double> {
                const auto* kind = std::get_if<Kind>(&(owner.*choice));
                return kind ? std::optional<double>(kind->*member) : std::nullopt;
            }};
}

/// One row of the table of `Owner`.
template <class Owner>
struct Row {
    Field field;

    Row needed() && {
        field.required = true;
        field.fallback.reset();
        return std::move(*this);
    }
    Row optional() && {
        field.required = false;
        return std::move(*this);
    }
    Row varies() && {
        field.varies = true;
        return std::move(*this);
    }
    Row withoutCommons() && {
        field.commons = false;
        return std::move(*this);
    }
    Row uncounted() && {
        field.counts = false;
        return std::move(*this);
    }
    Row range(double low, double high) && {
        field.hard = Range{toSi(field.quantity, low), toSi(field.quantity, high)};
        return std::move(*this);
    }
    Row usual(double low, double high, std::string_view source = "common practice, no source") && {
        field.usual = Range{toSi(field.quantity, low), toSi(field.quantity, high)};
        field.usualSource = source;
        return std::move(*this);
    }
    Row moves(std::string_view effect) && {
        field.effect = effect;
        return std::move(*this);
    }
    Row leastRows(int count) && {
        field.leastRows = count;
        return std::move(*this);
    }
};

/// The rows of one struct.
template <class Owner>
struct RowsOf {
    Fields fields;
    RowsOf(std::initializer_list<Row<Owner>> rows) {
        for (const auto& row : rows) {
            fields.push_back(row.field);
        }
    }
    RowsOf with(const RowsOf& more) const {
        RowsOf all = *this;
        all.fields.insert(all.fields.end(), more.fields.begin(), more.fields.end());
        return all;
    }
};

struct Words {
    std::string_view key, label, help;
};

template <class Owner>
Row<Owner> bare(FieldKind kind, Words words) {
    Row<Owner> row;
    row.field.kind = kind;
    row.field.key = words.key;
    row.field.label = words.label;
    row.field.help = words.help;
    return row;
}

template <class Owner, class T>
Row<Owner> bound(FieldKind kind, Words words, Access<Owner, T> through) {
    auto row = bare<Owner>(kind, words);
    row.field.binding.set = [put = through.put](void* owner, Value value) {
        put(*static_cast<Owner*>(owner), std::get<T>(std::move(value)));
    };
    row.field.binding.get = [read = through.read](const void* owner) -> std::optional<Value> {
        auto value = read(*static_cast<const Owner*>(owner));
        return value ? std::optional<Value>(std::move(*value)) : std::nullopt;
    };
    return row;
}

// --- single values ------------------------------------------------------------------------------

template <class Owner>
Row<Owner> number(Access<Owner, double> through, Quantity quantity, Words words) {
    auto row = bound(FieldKind::number, words, through);
    row.field.quantity = quantity;
    if constexpr (std::is_default_constructible_v<Owner>) {
        row.field.fallback = through.read(Owner{});
    }
    return row;
}
template <class Owner, class M>
Row<Owner> number(M Owner::*member, Quantity quantity, Words words) {
    return number(access(member), quantity, words);
}
template <class Owner>
Row<Owner> text(std::string Owner::*member, Words words) {
    return bound(FieldKind::text, words, access(member)).uncounted();
}
template <class Owner>
Row<Owner> truth(bool Owner::*member, Words words) {
    return bound(FieldKind::truth, words, access(member));
}
template <class Owner, class M>
Row<Owner> choice(M Owner::*member, std::vector<std::string_view> choices, Words words) {
    auto row = bound(FieldKind::choice, words, access(member));
    row.field.choices = std::move(choices);
    return row;
}
template <class Owner>
Row<Owner> reference(Reference Owner::*member, std::vector<Collection> to, Words words) {
    auto row = bound(FieldKind::reference, words, access(member));
    row.field.collections = std::move(to);
    return row;
}
template <class Owner>
Row<Owner> table(Access<Owner, TableRows> through, std::vector<Column> columns, Words words) {
    auto row = bound(FieldKind::table, words, through);
    row.field.columns = std::move(columns);
    return row;
}
template <class Owner, class M>
Row<Owner> table(M Owner::*member, std::vector<Column> columns, Words words) {
    return table(access(member), std::move(columns), words);
}
/// A column whose range is given as written in the file.
inline Column column(std::string_view key, std::string_view label, Quantity quantity, double low,
                     double high) {
    return {key, label, quantity, {toSi(quantity, low), toSi(quantity, high)}};
}
inline Column risingColumn(std::string_view key, std::string_view label, Quantity quantity,
                           double low, double high) {
    auto made = column(key, label, quantity, low, high);
    made.rising = true;
    return made;
}
template <class Owner>
Row<Owner> numbers(NamedNumbers Owner::*member, Collection of, Quantity quantity, Words words) {
    auto row = bound(FieldKind::numbers, words, access(member));
    row.field.collections = {of};
    row.field.quantity = quantity;
    return row;
}

// --- structure ----------------------------------------------------------------------------------

/// A group reached by functions: `make` puts the owner into the state the key says and returns
/// the inner object, `find` returns it while the owner is in that state, else nullptr.
template <class Owner, class Inner>
Row<Owner> groupBy(std::function<Inner*(Owner&)> make,
                   std::function<const Inner*(const Owner&)> find, RowsOf<Inner> inner,
                   Words words) {
    auto row = bare<Owner>(FieldKind::group, words);
    row.field.fields = std::move(inner.fields);
    row.field.binding.make = [make](void* owner, std::string_view) -> void* {
        return make(*static_cast<Owner*>(owner));
    };
    row.field.binding.child = [find](const void* owner, int) -> const void* {
        return find(*static_cast<const Owner*>(owner));
    };
    row.field.binding.count = [find](const void* owner) {
        return find(*static_cast<const Owner*>(owner)) != nullptr ? 1 : 0;
    };
    return row;
}
template <class Owner, class Inner>
Row<Owner> group(Inner Owner::*member, RowsOf<Inner> inner, Words words) {
    return groupBy<Owner, Inner>([member](Owner& owner) { return &(owner.*member); },
                                 [member](const Owner& owner) { return &(owner.*member); },
                                 std::move(inner), words);
}
template <class Owner, class Inner>
Row<Owner> group(std::optional<Inner> Owner::*member, RowsOf<Inner> inner, Words words) {
    return groupBy<Owner, Inner>(
        [member](Owner& owner) { return &(owner.*member).emplace(); },
        [member](const Owner& owner) { return owner.*member ? &*(owner.*member) : nullptr; },
        std::move(inner), words);
}
/// One kind of a variant.
template <class Owner, class... Kinds, class Kind>
Row<Owner> kind(std::variant<Kinds...> Owner::*choice, RowsOf<Kind> inner, Words words) {
    return groupBy<Owner, Kind>(
        [choice](Owner& owner) { return &(owner.*choice).template emplace<Kind>(); },
        [choice](const Owner& owner) { return std::get_if<Kind>(&(owner.*choice)); },
        std::move(inner), words);
}
/// An object with exactly one of the kinds, which belong to the owner itself.
template <class Owner>
Row<Owner> oneOf(RowsOf<Owner> kinds, Words words) {
    auto row =
        groupBy<Owner, Owner>([](Owner& owner) { return &owner; },
                              [](const Owner& owner) { return &owner; }, std::move(kinds), words);
    row.field.kind = FieldKind::oneOf;
    return row;
}
/// Exactly one of the forms; required unless said otherwise.
template <class Owner>
Row<Owner> eitherOf(std::vector<RowsOf<Owner>> forms, std::string_view label,
                    std::string_view help) {
    auto row = bare<Owner>(FieldKind::eitherOf, {"", label, help});
    for (auto& form : forms) {
        row.field.forms.push_back(std::move(form.fields));
    }
    row.field.required = true;
    return row;
}
template <class Owner, class Inner>
Row<Owner> keyed(Keyed<Inner> Owner::*member, Collection declares, RowsOf<Inner> inner,
                 Words words) {
    auto row = bare<Owner>(FieldKind::keyed, words);
    row.field.declares = declares;
    row.field.fields = std::move(inner.fields);
    row.field.binding.make = [member](void* owner, std::string_view name) -> void* {
        return &(static_cast<Owner*>(owner)->*member).add(std::string(name));
    };
    row.field.binding.count = [member](const void* owner) {
        return (static_cast<const Owner*>(owner)->*member).size();
    };
    row.field.binding.child = [member](const void* owner, int index) -> const void* {
        return &(static_cast<const Owner*>(owner)->*member)[index];
    };
    row.field.binding.name = [member](const void* owner, int index) {
        return (static_cast<const Owner*>(owner)->*member).name(index);
    };
    return row;
}
/// Kept in the tree only.
template <class Owner>
Row<Owner> reserved(Words words) {
    return bare<Owner>(FieldKind::free, words).uncounted();
}

} // namespace headroom::plant::rows
