// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/migration.h"

#include "files/messages.h"
#include "plant/fields.h"

#include <cmath>

namespace headroom::files {

namespace {

/// The key of the format number: the first row of a project.
std::string formatKey() {
    return std::string(plant::projectFields().front().key);
}

} // namespace

std::span<const Migration> migrations() {
    return {};
}

Migrated migrate(const plant::Tree& project, std::span<const Migration> chain, int newest) {
    Migrated out{project, {}, true};
    const plant::Tree* number = project.find(formatKey());
    if (number == nullptr || !number->isNumber()) {
        return out;
    }
    const double found = number->asNumber();
    if (found > newest) {
        Finding finding;
        finding.message = &say::newerFormat;
        finding.subject = formatKey();
        finding.arguments = {{"found", static_cast<std::int64_t>(std::min(found, 1e15))},
                             {"known", std::int64_t{newest}}};
        out.findings.push_back(std::move(finding));
        out.usable = false;
        return out;
    }
    int format = static_cast<int>(found);
    for (const auto& migration : chain) {
        if (migration.from != format) {
            continue;
        }
        ++format;
        out.tree = migration.step(out.tree).with({formatKey()}, plant::Tree::number(format));
        Finding note;
        note.message = &say::migrated;
        note.subject = formatKey();
        note.arguments = {{"from", std::int64_t{migration.from}},
                          {"to", std::int64_t{format}},
                          {"what", migration.what}};
        out.findings.push_back(std::move(note));
    }
    return out;
}

} // namespace headroom::files
