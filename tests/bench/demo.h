// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "simulation/run.h"

#include <memory>
#include <string>

/// The demo plant as the benchmarks use it.
namespace headroom::bench {

/// The demo project; ends the program with the findings if it does not open.
const plant::Project& demo();
/// The base plant of the demo with its headrace elastic or rigid.
plant::Plant demoPlant(plant::ConduitModel headrace);
/// A study of the demo by name, with another duration.
plant::Study demoStudy(const std::string& name, double until_s);
/// Compiled; ends the program with the findings if it does not compile.
std::shared_ptr<const simulation::Model> compiled(const plant::Plant& plant,
                                                  const plant::Study& study,
                                                  const simulation::Settings& settings);

} // namespace headroom::bench
