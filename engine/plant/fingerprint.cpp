// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/overloaded.h"
#include "plant/fields.h"
#include "plant/names.h"
#include "plant/project.h"
#include "plant/walk.h"

#include <fmt/format.h>
#include <xxhash.h>

#include <cstring>

namespace headroom::plant {

namespace {

/// Bytes that stand for a struct: keys of the rows that hold a value other than the default, and
/// their values. Names are replaced by positions.
class Bytes {
public:
    explicit Bytes(const Names& names) : names_(names) {}

    void add(const Fields& rows, const void* owner) {
        for (const auto& row : rows) {
            if (!row.counts) {
                continue;
            }
            for (const auto& form : row.forms) {
                add(form, owner);
            }
            addValue(row, owner);
            const int count = row.binding.count ? row.binding.count(owner) : 0;
            for (int i = 0; i < count; ++i) {
                addText(row.key);
                addNumber(i);
                bytes_ += '{';
                add(row.fields, row.binding.child(owner, i));
                bytes_ += '}';
            }
        }
    }
    void addNumber(double value) {
        const double plain = value + 0.0; // one zero
        char raw[sizeof plain];
        std::memcpy(raw, &plain, sizeof plain);
        bytes_.append(raw, sizeof plain);
    }
    void addText(std::string_view text) {
        bytes_ += text;
        bytes_ += '\0';
    }
    XXH128_hash_t digest() const { return XXH3_128bits(bytes_.data(), bytes_.size()); }

private:
    void addValue(const Field& row, const void* owner) {
        const auto value = row.binding.get ? row.binding.get(owner) : std::nullopt;
        const auto* number = value ? std::get_if<double>(&*value) : nullptr;
        if (!value || (number != nullptr && row.fallback && *number == *row.fallback)) {
            return;
        }
        addText(row.key);
        std::visit(overloaded{[&](double one) { addNumber(one); },
                              [&](bool truth) { addNumber(truth ? 1.0 : 0.0); },
                              [&](int choice) { addNumber(choice); },
                              [&](const std::string& text) { addText(text); },
                              [&](const Reference& thing) { addReference(thing); },
                              [&](const std::vector<Reference>& things) {
                                  for (const auto& thing : things) {
                                      addReference(thing);
                                  }
                              },
                              [&](const Location& location) {
                                  addReference(location.thing);
                                  addNumber(location.alongConduit ? location.chainage_m : 0.0);
                              },
                              [&](const TableRows& rows) { addPairs(rows); },
                              [&](const Interval& interval) { addPairs({interval}); },
                              [&](const NamedNumbers& numbers) {
                                  for (const auto& [thing, one] : numbers) {
                                      addReference(thing);
                                      addNumber(one);
                                  }
                              },
                              [](const Tree&) {}},
                   *value);
    }
    void addPairs(const TableRows& rows) {
        addNumber(static_cast<double>(rows.size()));
        for (const auto& [first, second] : rows) {
            addNumber(first);
            addNumber(second);
        }
    }
    /// Positions in the plant that is run; events keep theirs, which are their study's own.
    void addReference(const Reference& thing) {
        addNumber(static_cast<double>(thing.collection));
        addNumber(thing.collection == Collection::events || thing.name.empty()
                      ? thing.index
                      : names_.indexOf(thing.collection, thing.name));
    }

    const Names& names_;
    std::string bytes_;
};

const Fields& rowsAt(const Path& path) {
    return fieldAt(path)->fields;
}

} // namespace

std::string Fingerprint::text() const {
    return fmt::format("{:016x}{:016x}", high, low);
}

Fingerprint fingerprint(const Variant& variant, const Study& study, const Numerics& numerics,
                        int refinement) {
    const Names names = Names::of(variant.tree);
    Bytes plant(names), events(names), settings(names);
    plant.add(rowsAt({"site"}), &variant.site);
    plant.add(rowsAt({"plant"}), &variant.plant);
    events.add(rowsAt(pathOf(Collection::studies)), &study);
    settings.add(rowsAt({"numerics"}), &numerics);
    settings.addNumber(refinement);
    settings.addNumber(physicsRevision);

    Bytes all(names);
    for (const auto* part : {&plant, &events, &settings}) {
        const auto digest = part->digest();
        all.addText(fmt::format("{:016x}{:016x}", digest.high64, digest.low64));
    }
    const auto digest = all.digest();
    return {digest.high64, digest.low64};
}

} // namespace headroom::plant
