// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/fields.h"
#include "plant/names.h"
#include "plant/project.h"
#include "plant/report.h"

#include <algorithm>

/// Renaming: one walk over all reference rows of the base and of every option.
namespace headroom::plant {

namespace {

struct Renaming {
    Path thing; ///< in the base's terms, without an option's changes
    Collection collection = Collection::none;
    std::string from, to;

    Path parent() const { return {thing.begin(), thing.end() - 1}; }
};

Tree rewrittenIn(const Renaming& job, const Field& owner, const Tree& tree);

Tree mapMembers(const Tree& tree,
                const std::function<Tree(const std::string&, const Tree&)>& next) {
    std::vector<Tree::Member> members = tree.members();
    bool same = true;
    for (auto& member : members) {
        Tree changed = next(member.first, member.second);
        same = same && changed.sameAs(member.second);
        member.second = std::move(changed);
    }
    return same ? tree : Tree::object(std::move(members));
}

Tree renamedName(const Renaming& job, const Tree& value) {
    return value.isText() && value.asText() == job.from ? Tree::text(job.to) : value;
}

Tree renamedNames(const Renaming& job, const Tree& list) {
    std::vector<Tree> items;
    bool same = true;
    for (const auto& item : list.items()) {
        items.push_back(renamedName(job, item));
        same = same && items.back().sameAs(item);
    }
    return same ? list : Tree::array(std::move(items));
}

/// A path written as a list of keys, in the parts that are kept as they are.
Tree renamedPaths(const Renaming& job, const Tree& tree) {
    if (tree.isObject()) {
        return mapMembers(
            tree, [&](const std::string&, const Tree& value) { return renamedPaths(job, value); });
    }
    const auto& items = tree.items();
    const bool names = items.size() >= job.thing.size()
                       && std::equal(job.thing.begin(), job.thing.end(), items.begin(),
                                     [](const std::string& key, const Tree& item) {
                                         return item.isText() && item.asText() == key;
                                     });
    if (!names) {
        return tree;
    }
    std::vector<Tree> next = items;
    next[job.thing.size() - 1] = Tree::text(job.to);
    return Tree::array(std::move(next));
}

bool about(const Renaming& job, const Field& row) {
    return std::find(row.collections.begin(), row.collections.end(), job.collection)
           != row.collections.end();
}

Tree rewrittenMember(const Renaming& job, const Field& row, const Tree& value) {
    switch (row.kind) {
    case FieldKind::reference:
        return about(job, row) ? renamedName(job, value) : value;
    case FieldKind::references:
        return about(job, row) ? renamedNames(job, value) : value;
    case FieldKind::location:
        return value.isObject()  ? rewrittenIn(job, row, value)
               : about(job, row) ? renamedName(job, value)
                                 : value;
    case FieldKind::numbers:
        return about(job, row) && value.find(job.from) != nullptr && value.find(job.to) == nullptr
                   ? value.renamed({}, job.from, job.to)
                   : value;
    case FieldKind::keyed:
        return mapMembers(value, [&](const std::string&, const Tree& thing) {
            return rewrittenIn(job, row, thing);
        });
    case FieldKind::patch:
        return rewrittenIn(job, varyingRow(), value);
    case FieldKind::free:
        return renamedPaths(job, value);
    case FieldKind::group:
    case FieldKind::oneOf:
        return rewrittenIn(job, row, value);
    default:
        return value;
    }
}

Tree rewrittenIn(const Renaming& job, const Field& owner, const Tree& tree) {
    return mapMembers(tree, [&](const std::string& key, const Tree& value) {
        const Field* row = rowInside(owner, key);
        return row != nullptr ? rewrittenMember(job, *row, value) : value;
    });
}

/// Every place where the thing's own key may stand: the base and each option's changes.
std::vector<Path> parentsOf(const Tree& project, const Renaming& job) {
    std::vector<Path> parents;
    const auto add = [&](Path path) {
        const Tree* owner = project.at(path);
        if (owner != nullptr && owner->isObject()) {
            parents.push_back(std::move(path));
        }
    };
    add(job.parent());
    const Path options = pathOf(Collection::options);
    const Tree* all = project.at(options);
    for (const auto& option : all != nullptr ? namesIn(*all) : std::vector<std::string>{}) {
        Path path = options;
        path.insert(path.end(), {option, std::string(changesKey())});
        const Path inside = job.parent();
        path.insert(path.end(), inside.begin(), inside.end());
        add(std::move(path));
    }
    return parents;
}

/// Names that the new one may not meet.
std::vector<Path> takenBy(const Tree& project, const Renaming& job) {
    std::vector<Path> found;
    std::vector<Renaming> places{job};
    const auto& shared = plantCollections();
    if (std::find(shared.begin(), shared.end(), job.collection) != shared.end()) {
        places.clear();
        for (const auto collection : shared) {
            Renaming other = job;
            other.thing = pathOf(collection);
            other.thing.push_back(job.from);
            places.push_back(other);
        }
    }
    for (const auto& place : places) {
        for (const auto& parent : parentsOf(project, place)) {
            for (const auto& name : namesIn(*project.at(parent))) {
                const bool self = name == job.from && place.thing == job.thing;
                if (!self && folded(name) == folded(job.to)) {
                    found.push_back(parent);
                    found.back().push_back(name);
                }
            }
        }
    }
    return found;
}

/// The thing in the base's terms; nothing if the path is no thing with a name.
std::optional<Renaming> understood(const Path& thing, std::string_view to) {
    Renaming job;
    job.thing = thing;
    job.to = std::string(to);
    const Path options = pathOf(Collection::options);
    if (thing.size() > 3 && thing[0] == options[0] && thing[2] == changesKey()) {
        job.thing.erase(job.thing.begin(), job.thing.begin() + 3);
    }
    if (job.thing.size() < 2) {
        return std::nullopt;
    }
    const Field* row = fieldAt(job.parent());
    if (row == nullptr || row->kind != FieldKind::keyed || fieldAt(job.thing) != row) {
        return std::nullopt;
    }
    job.collection = row->declares;
    job.from = job.thing.back();
    return job;
}

Tree withNewKey(Tree project, const Renaming& job) {
    for (const auto& parent : parentsOf(project, job)) {
        if (project.at(parent)->find(job.from) != nullptr) {
            project = project.renamed(parent, job.from, job.to);
        }
    }
    return project;
}

Tree withNewReferences(const Tree& project, const Renaming& job) {
    if (job.collection == Collection::none) {
        return project;
    }
    if (job.collection == Collection::events) { // known inside their own study only
        const Path study(job.thing.begin(), job.thing.begin() + 2);
        const Field* row = fieldAt(study);
        return project.with(study, rewrittenIn(job, *row, *project.at(study)));
    }
    return rewrittenIn(job, projectRow(), project);
}

} // namespace

Result<Tree> renamed(const Tree& project, const Path& thing, std::string_view to) {
    Report report({});
    const auto job = understood(thing, to);
    if (!job || project.at(thing) == nullptr) {
        report.add(say::nothingToRename, thing);
        return report.findings();
    }
    checkName(job->to, thing, report);
    const auto taken = takenBy(project, *job);
    if (!taken.empty()) {
        report.add(say::nameTaken, thing, {{"name", job->to}, {"other", join(taken.front())}},
                   taken);
    }
    if (anyError(report.findings())) {
        return report.findings();
    }
    if (job->from == job->to) {
        return project;
    }
    return withNewReferences(withNewKey(project, *job), *job);
}

} // namespace headroom::plant
