// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/names.h"

#include "plant/fields.h"

#include <algorithm>
#include <map>

namespace headroom::plant {

namespace {

std::size_t at(Collection collection) {
    return static_cast<std::size_t>(collection);
}

/// The code points of UTF-8 text; a malformed byte counts as one that cannot be printed.
std::vector<char32_t> codePoints(const std::string& text) {
    std::vector<char32_t> out;
    for (std::size_t i = 0; i < text.size();) {
        const auto lead = static_cast<unsigned char>(text[i]);
        const std::size_t length = lead < 0x80 ? 1 : lead >= 0xF0 ? 4 : lead >= 0xE0 ? 3 : 2;
        if ((lead >= 0x80 && lead < 0xC2) || lead > 0xF4 || i + length > text.size()) {
            out.push_back(0);
            ++i;
            continue;
        }
        char32_t point = length == 1 ? lead : lead & (0x7FU >> length);
        for (std::size_t k = 1; k < length; ++k) {
            point = (point << 6U) | (static_cast<unsigned char>(text[i + k]) & 0x3FU);
        }
        out.push_back(point);
        i += length;
    }
    return out;
}

bool printable(char32_t point) {
    const bool control = point < 0x20 || (point >= 0x7F && point < 0xA0);
    const bool separator = point == 0x2028 || point == 0x2029;
    const bool direction = (point >= 0x200B && point <= 0x200F)
                           || (point >= 0x202A && point <= 0x202E) || point == 0xFEFF;
    return !control && !separator && !direction;
}

bool blank(char32_t point) {
    return point == 0x20 || point == 0xA0 || point == 0x3000
           || (point >= 0x2000 && point <= 0x200A);
}

Path thingPath(Collection collection, const std::string& name) {
    Path path = pathOf(collection);
    path.push_back(name);
    return path;
}

} // namespace

Names Names::of(const Tree& project) {
    Names names;
    for (const auto collection :
         {Collection::points, Collection::reservoirs, Collection::conduits, Collection::chambers,
          Collection::units, Collection::limits, Collection::options, Collection::studies}) {
        if (const Tree* owner = project.at(pathOf(collection))) {
            names.declare(collection, namesIn(*owner));
        }
    }
    return names;
}

const std::vector<std::string>& Names::here(Collection collection) const {
    return here_[at(collection)];
}

void Names::declare(Collection collection, std::vector<std::string> names) {
    here_[at(collection)] = std::move(names);
}

int Names::indexOf(Collection collection, const std::string& name) const {
    const auto& names = here(collection);
    const auto found = std::find(names.begin(), names.end(), name);
    return found == names.end() ? -1 : static_cast<int>(found - names.begin());
}

void Names::knowFrom(const Names& other) {
    for (std::size_t i = 0; i < collectionCount; ++i) {
        elsewhere_[i].insert(other.here_[i].begin(), other.here_[i].end());
    }
}

bool Names::isElsewhere(Collection collection, const std::string& name) const {
    return elsewhere_[at(collection)].count(name) > 0;
}

std::vector<std::string> namesIn(const Tree& object) {
    std::vector<std::string> names;
    for (const auto& member : object.members()) {
        names.push_back(member.first);
    }
    return names;
}

const std::vector<Collection>& plantCollections() {
    static const std::vector<Collection> all{Collection::points, Collection::reservoirs,
                                             Collection::conduits, Collection::chambers,
                                             Collection::units};
    return all;
}

std::string folded(std::string_view name) {
    const auto first = name.find_first_not_of(" \t");
    const auto last = name.find_last_not_of(" \t");
    std::string out;
    if (first != std::string_view::npos) {
        out = name.substr(first, last - first + 1);
    }
    for (char& letter : out) {
        if (letter >= 'A' && letter <= 'Z') {
            letter = static_cast<char>(letter - 'A' + 'a');
        }
    }
    return out;
}

void checkName(const std::string& name, const Path& at, Report& report) {
    const auto points = codePoints(name);
    if (points.empty()) {
        report.add(say::nameEmpty, at, {{"longest", std::int64_t{longestName}}});
        return;
    }
    if (points.size() > static_cast<std::size_t>(longestName)) {
        report.add(say::nameTooLong, at,
                   {{"length", static_cast<std::int64_t>(points.size())},
                    {"longest", std::int64_t{longestName}}});
    }
    if (!std::all_of(points.begin(), points.end(), printable)) {
        report.add(say::nameNotPrintable, at);
    }
    if (blank(points.front()) || blank(points.back())) {
        report.add(say::nameBlanks, at, {{"name", name}});
    }
}

void checkCase(const std::vector<std::string>& names, const Path& owner, Report& report) {
    std::map<std::string, std::string> seen;
    for (const auto& name : names) {
        const auto [entry, fresh] = seen.emplace(folded(name), name);
        if (!fresh && entry->second != name) {
            Path path = owner;
            path.push_back(name);
            Path other = owner;
            other.push_back(entry->second);
            report.add(say::nameDiffersInCase, path, {{"name", name}, {"other", entry->second}},
                       {other});
        }
    }
}

void checkUnique(const Names& names, Report& report) {
    struct Seen {
        std::string name;
        Path path;
    };
    std::map<std::string, Seen> seen;
    for (const auto collection : plantCollections()) {
        for (const auto& name : names.here(collection)) {
            const Path path = thingPath(collection, name);
            const auto [entry, fresh] = seen.emplace(folded(name), Seen{name, path});
            if (fresh || entry->second.path == path) {
                continue;
            }
            const Seen& first = entry->second;
            if (first.name == name) {
                report.add(say::nameTwice, path,
                           {{"name", name}, {"first", join(first.path)}, {"second", join(path)}},
                           {first.path});
            } else {
                report.add(say::nameDiffersInCase, path, {{"name", name}, {"other", first.name}},
                           {first.path});
            }
        }
    }
}

} // namespace headroom::plant
