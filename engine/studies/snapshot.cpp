// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/board.h"

namespace headroom::studies {

namespace {

using plant::Project;
using plant::Tree;

/// Older fingerprints remembered behind one, so that a day of edits stays small.
constexpr int longestMemory = 1024;

/// Whether a part of two trees is the same node, or absent in both.
bool sameAt(const Tree& a, const Tree& b, const plant::Path& path) {
    const Tree* first = a.at(path);
    const Tree* second = b.at(path);
    return first == nullptr || second == nullptr ? first == second : first->sameAs(*second);
}

/// Whether option `now` of a project is what option `before` was in an earlier one.
bool sameVariant(const Project& project, int now, const Project& earlier, int before) {
    for (const char* part : {"site", "plant", "limits"}) {
        if (!sameAt(project.tree, earlier.tree, {part})) {
            return false;
        }
    }
    if (now < 0) {
        return before < 0 && project.baseName == earlier.baseName;
    }
    const auto& name = project.options.name(now);
    return before >= 0 && earlier.options.name(before) == name &&
           sameAt(project.tree, earlier.tree, {"options", name, "changes"});
}

/// Where a thing of this name was before; a renamed one is known by its unchanged position.
template <class Value>
int indexBefore(const plant::Keyed<Value>& now, int index, const plant::Keyed<Value>& before) {
    const int same = before.indexOf(now.name(index));
    if (same >= 0) {
        return same;
    }
    const bool renamed = now.size() == before.size() && now.indexOf(before.name(index)) < 0;
    return renamed ? index : -1;
}

/// The first error that stops a study, whatever the option: its own, or one of the whole project.
const Finding* blockingError(const plant::Bound& bound, const std::string& studyName) {
    const std::string own = plant::join({"studies", studyName});
    const auto beginsWith = [](const std::string& text, std::string_view start) {
        return text.compare(0, start.size(), start) == 0;
    };
    for (const auto& finding : bound.findings) {
        if (finding.severity() != Severity::error) {
            continue;
        }
        const auto& subject = finding.subject;
        const bool ofStudy = subject == own || beginsWith(subject, plant::join({"studies", studyName, ""}));
        // Errors of site, plant, limits and an option's changes are those of its variant.
        bool elsewhere = false;
        for (const char* part : {"studies/", "options/", "plant", "site", "limits"}) {
            elsewhere = elsewhere || beginsWith(subject, part);
        }
        if (ofStudy || !elsewhere) {
            return &finding;
        }
    }
    return nullptr;
}

const Finding* firstError(const Findings& findings) {
    for (const auto& finding : findings) {
        if (finding.severity() == Severity::error) {
            return &finding;
        }
    }
    return nullptr;
}

std::shared_ptr<const Earlier> remembered(const CellInputs& before) {
    if (before.blocked) {
        return before.earlier;
    }
    const int depth = before.earlier == nullptr ? 0 : before.earlier->depth + 1;
    auto latest = std::make_shared<Earlier>(Earlier{before.fingerprint, before.earlier, depth});
    if (depth > longestMemory) {
        latest->before = nullptr; // forgets all at once; the next run is remembered again
        latest->depth = 0;
    }
    return latest;
}

/// Makes the cells of a snapshot, sharing with the previous one what did not change.
class CellMaker {
public:
    CellMaker(const Snapshot& now, const Snapshot* previous) : now_(now), previous_(previous) {}

    std::shared_ptr<const CellInputs> make(int option, int study) const {
        const auto before = cellBefore(option, study);
        if (before != nullptr && unchanged(option, study, *before)) {
            return before;
        }
        auto made = std::make_shared<CellInputs>(fresh(option, study));
        if (before != nullptr) {
            const bool same = !made->blocked && !before->blocked &&
                              made->fingerprint == before->fingerprint;
            made->earlier = same ? before->earlier : remembered(*before);
        }
        return made;
    }

private:
    std::shared_ptr<const CellInputs> cellBefore(int option, int study) const {
        if (previous_ == nullptr) {
            return nullptr;
        }
        const auto& then = previous_->project();
        const auto& project = now_.project();
        const int optionThen =
            option < 0 ? -1 : indexBefore(project.options, option, then.options);
        const int studyThen = indexBefore(project.studies, study, then.studies);
        if ((option >= 0 && optionThen < 0) || studyThen < 0) {
            return nullptr;
        }
        return previous_->cells[static_cast<std::size_t>((optionThen + 1) * then.studies.size() +
                                                         studyThen)];
    }

    bool unchanged(int option, int study, const CellInputs& before) const {
        const auto& then = previous_->project();
        const auto& project = now_.project();
        const auto& name = now_.studyName(study);
        bool sharedVariant = false;
        for (const auto& variant : previous_->variants) {
            sharedVariant = sharedVariant ||
                            variant == now_.variants[static_cast<std::size_t>(option + 1)];
        }
        return sharedVariant && !before.blocked && !anyError(now_.bound->findings) &&
               then.studies.indexOf(name) >= 0 &&
               sameAt(project.tree, then.tree, {"studies", name}) &&
               sameAt(project.tree, then.tree, {"numerics"});
    }

    CellInputs fresh(int option, int study) const {
        const auto& variant = now_.variant(option);
        const auto& project = now_.project();
        const auto& name = now_.studyName(study);
        CellInputs made;
        made.study = std::make_shared<const plant::Study>(project.studies[study]);
        const Finding* error = firstError(variant.findings);
        if (error == nullptr) {
            error = blockingError(*now_.bound, name);
        }
        if (error != nullptr) {
            made.blocked = *error;
            return made;
        }
        auto resolved = plant::studyIn(variant, project.studies[study]);
        if (!resolved) {
            made.blocked = resolved.findings().front();
            return made;
        }
        made.study = std::make_shared<const plant::Study>(std::move(resolved).value());
        made.fingerprint = plant::fingerprint(variant, *made.study, project.numerics, 1);
        return made;
    }

    const Snapshot& now_;
    const Snapshot* previous_;
};

std::shared_ptr<const plant::Variant> variantOf(const Project& project, int option,
                                                const Snapshot* previous) {
    if (previous != nullptr) {
        const auto& then = previous->project();
        const int before =
            option < 0 ? -1 : then.options.indexOf(project.options.name(option));
        if ((option < 0 || before >= 0) && sameVariant(project, option, then, before)) {
            return previous->variants[static_cast<std::size_t>(before + 1)];
        }
    }
    return std::make_shared<const plant::Variant>(plant::variant(project, option));
}

} // namespace

std::shared_ptr<const Snapshot> makeSnapshot(plant::Bound bound, const Snapshot* previous) {
    auto made = std::make_shared<Snapshot>();
    made->bound = std::make_shared<const plant::Bound>(std::move(bound));
    const auto& project = made->project();
    for (int option = -1; option < project.options.size(); ++option) {
        made->variants.push_back(variantOf(project, option, previous));
    }
    const CellMaker maker(*made, previous);
    for (int option = -1; option < project.options.size(); ++option) {
        for (int study = 0; study < project.studies.size(); ++study) {
            made->cells.push_back(maker.make(option, study));
        }
    }
    return made;
}

} // namespace headroom::studies
