// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "plant/tree.h"

#include <algorithm>

/// JSON Merge Patch, RFC 7396 section 2, and its inverse.
namespace headroom::plant {

namespace {

using Members = std::vector<Tree::Member>;

Members::iterator named(Members& members, std::string_view key) {
    return std::find_if(members.begin(), members.end(),
                        [&](const Tree::Member& member) { return member.first == key; });
}

void addLeaves(const Tree& tree, Path& path, bool isAfter, std::vector<Difference>& out) {
    if (!tree.isObject() || tree.members().empty()) {
        out.push_back({path, isAfter ? nullptr : &tree, isAfter ? &tree : nullptr});
        return;
    }
    for (const auto& [key, child] : tree.members()) {
        path.push_back(key);
        addLeaves(child, path, isAfter, out);
        path.pop_back();
    }
}

void compare(const Tree& before, const Tree& after, Path& path, std::vector<Difference>& out) {
    if (before.sameAs(after)) {
        return;
    }
    if (!before.isObject() || !after.isObject()) {
        if (!(before == after)) {
            out.push_back({path, &before, &after});
        }
        return;
    }
    for (const auto& [key, child] : after.members()) {
        path.push_back(key);
        if (const Tree* old = before.find(key)) {
            compare(*old, child, path, out);
        } else {
            addLeaves(child, path, true, out);
        }
        path.pop_back();
    }
    for (const auto& [key, child] : before.members()) {
        if (after.find(key) == nullptr) {
            path.push_back(key);
            addLeaves(child, path, false, out);
            path.pop_back();
        }
    }
}

} // namespace

Tree mergePatch(const Tree& target, const Tree& patch) {
    if (!patch.isObject()) {
        return patch;
    }
    if (patch.outerTable() != nullptr) {
        return patch; // a table in a file of its own replaces whole, as a table in line does
    }
    Members next = target.members(); // empty unless the target is an object
    for (const auto& [key, change] : patch.members()) {
        const auto found = named(next, key);
        if (change.isNull()) {
            if (found != next.end()) {
                next.erase(found);
            }
        } else if (found != next.end()) {
            found->second = mergePatch(found->second, change);
        } else {
            next.emplace_back(key, mergePatch(Tree(), change));
        }
    }
    return Tree::object(std::move(next));
}

Tree makePatch(const Tree& before, const Tree& after) {
    ensure(!after.isNull(), "a patch cannot lead to null");
    if (!before.isObject() || !after.isObject() || after.outerTable() != nullptr) {
        return after;
    }
    Members changes;
    for (const auto& [key, child] : before.members()) {
        if (after.find(key) == nullptr) {
            changes.emplace_back(key, Tree());
        }
    }
    for (const auto& [key, child] : after.members()) {
        const Tree* old = before.find(key);
        if (old == nullptr || !sameContent(*old, child)) {
            changes.emplace_back(key, old ? makePatch(*old, child) : child);
        }
    }
    return Tree::object(std::move(changes));
}

std::vector<Difference> differences(const Tree& before, const Tree& after) {
    std::vector<Difference> out;
    Path path;
    compare(before, after, path, out);
    return out;
}

} // namespace headroom::plant
