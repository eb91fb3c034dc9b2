// SPDX-License-Identifier: GPL-3.0-or-later
#include "demo.h"

#include "files/project_file.h"
#include "units/text.h"

#include <cstdlib>
#include <iostream>

namespace headroom::bench {

namespace {

[[noreturn]] void giveUp(const Findings& findings) {
    for (const auto& finding : findings) {
        std::cerr << text(finding) << '\n';
    }
    std::exit(2);
}

} // namespace

const plant::Project& demo() {
    static const auto opened =
        files::openProject(std::string(HEADROOM_SOURCE_DIR) + "/studies/dorvane/Dorvane.headroom.json");
    if (!opened.bound.usable()) {
        giveUp(opened.bound.findings);
    }
    return opened.bound.project;
}

plant::Plant demoPlant(plant::ConduitModel headrace) {
    auto plant = demo().plant;
    plant.conduits[plant.conduits.indexOf("Headrace")].model = headrace;
    return plant;
}

plant::Study demoStudy(const std::string& name, double until_s) {
    const auto* found = demo().studies.find(name);
    if (found == nullptr) {
        std::cerr << "the demo has no study " << name << '\n';
        std::exit(2);
    }
    auto study = *found;
    study.until_s = until_s;
    return study;
}

std::shared_ptr<const simulation::Model> compiled(const plant::Plant& plant,
                                                  const plant::Study& study,
                                                  const simulation::Settings& settings) {
    auto model = simulation::compile(demo().site, plant, study, settings);
    if (!model) {
        giveUp(model.findings());
    }
    return *model;
}

} // namespace headroom::bench
