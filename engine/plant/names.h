// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/report.h"

#include <array>
#include <set>
#include <string>
#include <vector>

namespace headroom::plant {

inline constexpr std::size_t collectionCount = static_cast<std::size_t>(Collection::events) + 1;

/// The names that can be referred to, by collection.
class Names {
public:
    /// Names declared in a tree that holds site, plant, limits, options, studies.
    static Names of(const Tree& project);

    const std::vector<std::string>& here(Collection collection) const;
    void declare(Collection collection, std::vector<std::string> names);
    /// Position of a name in its collection, or -1.
    int indexOf(Collection collection, const std::string& name) const;

    /// Notes the names of another variant: known, but not here.
    void knowFrom(const Names& other);
    bool isElsewhere(Collection collection, const std::string& name) const;

private:
    std::array<std::vector<std::string>, collectionCount> here_;
    std::array<std::set<std::string>, collectionCount> elsewhere_;
};

/// The members of an object that are names, in order.
std::vector<std::string> namesIn(const Tree& object);

/// Collections whose names are unique together: points, reservoirs, conduits, chambers, units.
const std::vector<Collection>& plantCollections();

/// The same text with ASCII capitals made small and outer blanks taken off.
std::string folded(std::string_view name);

/// Length, printable characters, outer blanks of one name.
void checkName(const std::string& name, const Path& at, Report& report);
/// Names of the plant that are equal or differ only in case.
void checkUnique(const Names& names, Report& report);
/// The same within one list of names under `at`.
void checkCase(const std::vector<std::string>& names, const Path& at, Report& report);

} // namespace headroom::plant
