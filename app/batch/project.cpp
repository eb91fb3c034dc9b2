// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/project.h"

#include "batch/findings_output.h"
#include "plant/report.h"

namespace headroom::batch {

std::optional<Project> open(const std::string& path) {
    Project made{files::openProject(path), nullptr};
    tell(made.opened.findings(), made.opened.text);
    if (!made.opened.usable()) {
        return std::nullopt;
    }
    made.snapshot = studies::makeSnapshot(made.opened.bound);
    return made;
}

Findings placed(Findings findings, const files::Opened& opened) {
    for (auto& finding : findings) {
        if (!finding.place) {
            finding.place = plant::placeOf(opened.places, plant::split(finding.subject));
        }
    }
    return findings;
}

} // namespace headroom::batch
