// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/near_miss.h"
#include "plant/checks.h"
#include "plant/project.h"
#include "plant/reader.h"
#include "plant/walk.h"

#include <algorithm>
#include <set>

namespace headroom::plant {

namespace {

/// {site, plant, limits} of a project.
Tree varyingPart(const Tree& project) {
    std::vector<Tree::Member> members;
    for (const auto& member : project.members()) {
        if (rowOf(varyingRow().fields, member.first) != nullptr) {
            members.push_back(member);
        }
    }
    return Tree::object(std::move(members));
}

/// The changes of each option, by the option's name.
std::vector<std::pair<std::string, const Tree*>> changesIn(const Tree& project) {
    std::vector<std::pair<std::string, const Tree*>> out;
    const Tree* options = project.at(pathOf(Collection::options));
    if (options == nullptr) {
        return out;
    }
    for (const auto& [name, option] : options->members()) {
        const Tree* changes = option.find(changesKey());
        out.emplace_back(name, changes != nullptr && changes->isObject() ? changes : nullptr);
    }
    return out;
}

/// Names of the base, knowing those that only options have.
Names namesOfAll(const Tree& project) {
    Names names = Names::of(project);
    names.knowFrom(names);
    for (const auto& [option, changes] : changesIn(project)) {
        if (changes != nullptr) {
            names.knowFrom(Names::of(*changes));
        }
    }
    return names;
}

void checkPlant(const Plant& plant, const Keyed<Limit>& limits, Report& report) {
    checkConduits(plant, report);
    checkWaters(plant, report);
    checkUnits(plant, report);
    checkNetwork(plant, report);
    checkLimits(plant, limits, report);
}

bool isAbsence(const Message* message) {
    return message == &say::missing || message == &say::missingForm || message == &say::noKind
           || message == &say::noReach || message == &say::limitWithoutValue
           || message == &say::turningNeeds;
}

std::string argumentText(const Finding& finding, std::string_view name) {
    for (const auto& [key, value] : finding.arguments) {
        if (key == name && std::holds_alternative<std::string>(value)) {
            return std::get<std::string>(value);
        }
    }
    return {};
}

/// Turns what an option does to things that are not there into one finding each.
class OptionFindings {
public:
    OptionFindings(const Tree& base, const Tree& changes, Report& report)
        : base_(base), changes_(changes), report_(report) {}

    void tidy() {
        Path path;
        look(varyingRow(), changes_, path);
        for (const auto collection : plantCollections()) {
            tellRemoved(collection);
        }
    }

private:
    void look(const Field& owner, const Tree& patch, Path& path) {
        for (const auto& [key, change] : patch.members()) {
            const Field* row = rowInside(owner, key);
            if (row == nullptr) {
                continue;
            }
            path.push_back(key);
            if (row->kind == FieldKind::keyed) {
                lookAtNames(*row, change, path);
            } else {
                look(*row, change, path);
            }
            path.pop_back();
        }
    }

    void lookAtNames(const Field& row, const Tree& patch, Path& path) {
        const Tree* there = base_.at(path);
        for (const auto& [name, change] : patch.members()) {
            const bool known = there != nullptr && there->find(name) != nullptr;
            path.push_back(name);
            if (!known && change.isNull()) {
                report_.add(say::nothingToRemove, path, {{"name", name}});
            } else if (!known) {
                tellNew(there, name, path);
            } else {
                look(row, change, path);
            }
            path.pop_back();
        }
    }

    /// A thing that the base lacks and that is not complete by itself.
    void tellNew(const Tree* siblings, const std::string& name, const Path& path) {
        const std::string subject = join(report_.subjectOf(path));
        std::vector<std::string> lacking;
        std::erase_if(report_.findings(), [&](const Finding& finding) {
            const bool inside =
                finding.subject == subject || finding.subject.starts_with(subject + "/");
            if (!inside || !isAbsence(finding.message)) {
                return false;
            }
            const auto keys = argumentText(finding, "keys");
            const auto key = argumentText(finding, "key");
            lacking.push_back(!key.empty() ? key : keys.empty() ? "reaches" : keys);
            return true;
        });
        if (lacking.empty()) {
            return;
        }
        const auto names = siblings != nullptr ? namesIn(*siblings) : std::vector<std::string>{};
        const auto near = nearMiss(name, names);
        Arguments arguments{{"name", name}, {"keys", listed(lacking)}};
        if (near) {
            arguments.emplace_back("near", *near);
        }
        report_.add(near ? say::patchOfNothingNear : say::patchOfNothing, path, arguments);
    }

    /// What still names a thing that the option removes, in one finding.
    void tellRemoved(Collection collection) {
        const Path owner = pathOf(collection);
        const Tree* patch = changes_.at(owner);
        if (patch == nullptr) {
            return;
        }
        for (const auto& [name, change] : patch->members()) {
            if (!change.isNull()) {
                continue;
            }
            std::vector<std::string> users;
            std::erase_if(report_.findings(), [&](const Finding& finding) {
                const bool about =
                    (finding.message == &say::undeclared || finding.message == &say::undeclaredNear)
                    && argumentText(finding, "name") == name;
                if (about) {
                    users.push_back(finding.subject);
                }
                return about;
            });
            if (!users.empty()) {
                Path path = owner;
                path.push_back(name);
                std::vector<Path> related;
                for (const auto& user : users) {
                    related.push_back(split(user));
                }
                report_.add(say::removedButUsed, path, {{"name", name}, {"users", listed(users)}},
                            related);
            }
        }
    }

    const Tree& base_;
    const Tree& changes_;
    Report& report_;
};

Variant baseVariant(const Project& project) {
    Variant out;
    out.name = project.baseName;
    out.site = project.site;
    out.plant = project.plant;
    out.limits = project.limits;
    out.tree = varyingPart(project.tree);
    return out;
}

Variant optionVariant(const Tree& project, const std::string& name, const Tree& changes,
                      const Names& known, const Places& places) {
    Variant out;
    out.name = name;
    out.tree = mergePatch(varyingPart(project), changes);
    Report report(places, OptionInHand{name, &changes, &project});
    Names names = Names::of(out.tree);
    names.knowFrom(known);
    names.knowFrom(Names::of(out.tree));
    Project part;
    Reader reader(report, names);
    reader.readGroup(varyingRow(), out.tree, &part);
    checkUnique(names, report);
    checkPlant(part.plant, part.limits, report);
    OptionFindings(project, changes, report).tidy();
    out.site = std::move(part.site);
    out.plant = std::move(part.plant);
    out.limits = std::move(part.limits);
    out.findings = std::move(report.findings());
    return out;
}

/// What tells one finding from another: its text with the subject as the base would name it.
std::string essence(Finding finding, const std::string& option) {
    Path changes = pathOf(Collection::options);
    changes.insert(changes.end(), {option, std::string(changesKey())});
    const std::string prefix = join(changes) + "/";
    if (!option.empty() && finding.subject.starts_with(prefix)) {
        finding.subject.erase(0, prefix.size());
    }
    return std::string(finding.message->code) + "\n" + text(finding);
}

} // namespace

Bound bind(const Tree& tree, const Places& places) {
    Bound bound;
    bound.project.tree = tree;
    Report report(places);
    if (!tree.isObject()) {
        report.add(say::mistyped, {},
                   {{"key", std::string("project")},
                    {"found", std::string("no object")},
                    {"wanted", std::string("an object in braces")}});
        bound.findings = std::move(report.findings());
        return bound;
    }
    const Names names = namesOfAll(tree);
    Reader(report, names).readGroup(projectRow(), tree, &bound.project);
    checkUnique(names, report);
    checkPlant(bound.project.plant, bound.project.limits, report);
    checkStudies(bound.project.plant, bound.project.studies, report);
    bound.findings = std::move(report.findings());

    std::set<std::string> told;
    for (const auto& finding : bound.findings) {
        told.insert(essence(finding, ""));
    }
    for (const auto& [name, changes] : changesIn(tree)) {
        if (changes == nullptr) {
            continue;
        }
        auto variant = optionVariant(tree, name, *changes, names, places);
        for (auto& finding : variant.findings) {
            if (told.count(essence(finding, name)) == 0) {
                bound.findings.push_back(std::move(finding));
            }
        }
    }
    return bound;
}

Variant variant(const Project& project, int option) {
    if (option < 0) {
        Variant out = baseVariant(project);
        Report report({});
        Project part;
        const Names names = namesOfAll(project.tree);
        Reader(report, names).readGroup(varyingRow(), out.tree, &part);
        checkUnique(names, report);
        checkPlant(part.plant, part.limits, report);
        out.findings = std::move(report.findings());
        return out;
    }
    const Tree& changes = project.options[option].changes;
    return optionVariant(project.tree, project.options.name(option),
                         changes.isObject() ? changes : Tree::object({}), namesOfAll(project.tree),
                         {});
}

Result<Study> studyIn(const Variant& variant, const Study& study) {
    Study resolved = study;
    Findings findings;
    const Names names = Names::of(variant.tree);
    std::set<std::string> told;
    const Field* rows = fieldAt(pathOf(Collection::studies));
    replaceReferences(rows->fields, &resolved, [&](const Field& row, const Reference& old) {
        if (row.collections == std::vector<Collection>{Collection::events}) {
            return old;
        }
        for (const auto collection : row.collections) {
            const int index = names.indexOf(collection, old.name);
            if (index >= 0) {
                return Reference{old.name, collection, index};
            }
        }
        if (told.insert(old.name).second) {
            Finding finding;
            finding.message = &say::lackingHere;
            Path path = pathOf(old.collection);
            path.push_back(old.name);
            finding.subject = join(path);
            finding.arguments = {{"name", old.name}};
            findings.push_back(std::move(finding));
        }
        return Reference{old.name, old.collection, -1};
    });
    if (!findings.empty()) {
        return findings;
    }
    return resolved;
}

} // namespace headroom::plant
