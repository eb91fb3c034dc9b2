// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "plant/fields.h"
#include "plant/project.h"

#include <algorithm>

/// Edits make the next tree; what did not change is shared with the one before.
namespace headroom::plant {

namespace {

/// The rows that the keys inside `path` are looked up in.
const Field* ownerAt(const Path& path) {
    return path.empty() ? &projectRow() : fieldAt(path);
}

/// The keys of the same form of an either-of as `key`.
std::vector<std::string_view> companionsOf(const Field& owner, std::string_view key) {
    for (const auto& row : owner.fields) {
        for (const auto& form : row.forms) {
            if (rowOf(form, key) == nullptr) {
                continue;
            }
            std::vector<std::string_view> keys;
            for (const auto& other : form) {
                keys.push_back(other.key);
            }
            return keys;
        }
    }
    return {};
}

/// Calls `visit(parent, row of parent, key)` for each key of a path that is not a user's name.
template <class Visit>
void forEachKey(const Path& path, Visit visit) {
    Path parent;
    for (const auto& key : path) {
        const Field* owner = ownerAt(parent);
        const bool isName =
            owner != nullptr && owner->kind == FieldKind::keyed
            && (parent.empty() || fieldAt(Path(parent.begin(), parent.end() - 1)) != owner);
        if (owner != nullptr && !isName) {
            visit(parent, *owner, key);
        }
        parent.push_back(key);
    }
}

Path below(const Path& parent, std::string_view key) {
    Path path = parent;
    path.emplace_back(key);
    return path;
}

Tree editedBase(Tree project, const Path& path, const Tree& value) {
    if (value.isNull()) {
        return project.without(path);
    }
    forEachKey(path, [&](const Path& parent, const Field& owner, const std::string& key) {
        for (const auto rival : rivalsOf(owner, key)) {
            project = project.without(below(parent, rival));
        }
    });
    return project.with(path, value);
}

/// Makes room for `path` in a patch: other kinds go, and what was removed beside it comes back.
Tree roomFor(const Tree& base, Tree changes, const Path& path) {
    forEachKey(path, [&](const Path& parent, const Field& owner, const std::string& key) {
        for (const auto rival : rivalsOf(owner, key)) {
            const Path other = below(parent, rival);
            changes = base.at(other) != nullptr ? changes.with(other, Tree())
                                                : changes.without(other, true);
        }
        for (const auto companion : companionsOf(owner, key)) {
            const Path other = below(parent, companion);
            const Tree* said = changes.at(other);
            if (companion != key && said != nullptr && said->isNull()) {
                changes = changes.without(other, true);
            }
        }
    });
    return changes;
}

Tree editedChanges(const Tree& base, const Tree& before, const Path& path, const Tree& value) {
    const Tree* old = base.at(path);
    if (value.isNull()) {
        return old != nullptr ? before.with(path, Tree()) : before.without(path, true);
    }
    const Tree changes = roomFor(base, before, path);
    if (old != nullptr && sameContent(*old, value)) {
        return changes.without(path, true);
    }
    return changes.with(path, old != nullptr ? makePatch(*old, value) : value);
}

Path changesPath(const Tree& project, int option) {
    const Path owner = pathOf(Collection::options);
    const Tree* options = project.at(owner);
    ensure(options != nullptr && option >= 0
               && static_cast<std::size_t>(option) < options->members().size(),
           "the option in the hand exists");
    Path path = below(owner, options->members()[static_cast<std::size_t>(option)].first);
    return below(path, changesKey());
}

bool varies(const Path& path) {
    return !path.empty() && rowOf(varyingRow().fields, path.front()) != nullptr;
}

Tree objectOr(const Tree* tree) {
    return tree != nullptr && tree->isObject() ? *tree : Tree::object({});
}

// --- order --------------------------------------------------------------------------------------

Tree orderedBy(const Field& owner, const Tree& tree);

Tree orderedNames(const Field& row, const Tree& tree) {
    std::vector<Tree::Member> members = tree.members();
    bool same = true;
    for (auto& member : members) {
        Tree next = orderedBy(row, member.second);
        same = same && next.sameAs(member.second);
        member.second = std::move(next);
    }
    return same ? tree : Tree::object(std::move(members));
}

Tree orderedMember(const Field& row, const Tree& value) {
    if (!value.isObject() || value.outerTable() != nullptr) {
        return value;
    }
    switch (row.kind) {
    case FieldKind::keyed:
        return orderedNames(row, value);
    case FieldKind::patch:
        return orderedBy(varyingRow(), value);
    case FieldKind::group:
    case FieldKind::oneOf:
    case FieldKind::location:
    case FieldKind::number:
        return orderedBy(row, value);
    default:
        return value;
    }
}

std::vector<std::string> keyOrder(const Field& owner) {
    auto keys = keysOf(owner.fields);
    for (const auto& key : keysOf(commonFields())) {
        if (owner.commons && std::find(keys.begin(), keys.end(), key) == keys.end()) {
            keys.push_back(key);
        }
    }
    return keys;
}

Tree orderedBy(const Field& owner, const Tree& tree) {
    if (!tree.isObject()) {
        return tree;
    }
    std::vector<Tree::Member> members;
    const auto keys = keyOrder(owner);
    for (const auto& key : keys) {
        const Tree* value = tree.find(key);
        const Field* known = value != nullptr ? rowInside(owner, key) : nullptr;
        if (known != nullptr) {
            members.emplace_back(key, orderedMember(*known, *value));
        }
    }
    for (const auto& member : tree.members()) {
        if (std::find(keys.begin(), keys.end(), member.first) == keys.end()) {
            members.push_back(member);
        }
    }
    const bool same = std::equal(members.begin(), members.end(), tree.members().begin(),
                                 tree.members().end(), [](const auto& a, const auto& b) {
                                     return a.first == b.first && a.second.sameAs(b.second);
                                 });
    return same ? tree : Tree::object(std::move(members));
}

} // namespace

Tree ordered(const Tree& project) {
    return orderedBy(projectRow(), project);
}

Tree edited(const Tree& project, int option, const Path& path, const Tree& value) {
    if (option < 0 || !varies(path)) {
        return editedBase(project, path, value);
    }
    const Path patch = changesPath(project, option);
    const Tree changes = editedChanges(project, objectOr(project.at(patch)), path, value);
    return project.with(patch, objectOr(&changes));
}

Tree takenBack(const Tree& project, int option, const Path& path) {
    if (option < 0 || !varies(path)) {
        return project;
    }
    const Path patch = changesPath(project, option);
    Tree changes = objectOr(project.at(patch)).without(path, true);
    const Path parent(path.begin(), path.end() - 1);
    if (const Field* owner = ownerAt(parent)) {
        for (const auto rival : rivalsOf(*owner, path.back())) {
            const Path other = below(parent, rival);
            const Tree* said = changes.at(other);
            if (said != nullptr && said->isNull()) {
                changes = changes.without(other, true);
            }
        }
    }
    return project.with(patch, objectOr(&changes));
}

} // namespace headroom::plant
