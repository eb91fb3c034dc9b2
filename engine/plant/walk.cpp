// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/walk.h"

#include "base/overloaded.h"

namespace headroom::plant {

namespace {

using Resolve = std::function<Reference(const Field&, const Reference&)>;

void replaceIn(const Field& row, void* owner, const Resolve& resolve) {
    auto held = row.binding.get ? row.binding.get(owner) : std::nullopt;
    if (!held) {
        return;
    }
    const auto renew = [&](Reference& reference) {
        if (reference.given()) {
            reference = resolve(row, reference);
        }
    };
    const bool changed = std::visit(overloaded{[&](Reference& one) {
                                                   renew(one);
                                                   return true;
                                               },
                                               [&](std::vector<Reference>& several) {
                                                   for (auto& one : several) {
                                                       renew(one);
                                                   }
                                                   return true;
                                               },
                                               [&](Location& location) {
                                                   renew(location.thing);
                                                   return true;
                                               },
                                               [&](NamedNumbers& numbers) {
                                                   for (auto& number : numbers) {
                                                       renew(number.first);
                                                   }
                                                   return true;
                                               },
                                               [](auto&) { return false; }},
                                    *held);
    if (changed) {
        row.binding.set(owner, std::move(*held));
    }
}

} // namespace

void walk(const Fields& rows, const void* owner, const Visit& visit, const Enter& enter) {
    for (const auto& row : rows) {
        for (const auto& form : row.forms) {
            walk(form, owner, visit, enter);
        }
        if (row.binding.get) {
            visit(row, owner);
        }
        const int count = row.binding.count ? row.binding.count(owner) : 0;
        for (int i = 0; i < count; ++i) {
            if (enter) {
                enter(row, i, true);
            }
            walk(row.fields, row.binding.child(owner, i), visit, enter);
            if (enter) {
                enter(row, i, false);
            }
        }
    }
}

void replaceReferences(const Fields& rows, void* owner, const Resolve& resolve) {
    for (const auto& row : rows) {
        for (const auto& form : row.forms) {
            replaceReferences(form, owner, resolve);
        }
        replaceIn(row, owner, resolve);
        const int count = row.binding.count ? row.binding.count(owner) : 0;
        for (int i = 0; i < count; ++i) {
            // The owner may be changed, so what it owns may be too.
            void* child = const_cast<void*>(row.binding.child(owner, i));
            replaceReferences(row.fields, child, resolve);
        }
    }
}

} // namespace headroom::plant
