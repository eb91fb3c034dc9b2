// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"
#include "results/run.h"
#include "simulation/run.h"

#include <string>
#include <utility>
#include <vector>

/// Plants for tests, built as plain values.
namespace headroom::tests {

/// Site of all check lists: g = 9.81, 1000 kg/m³, no kinetic terms.
plant::Site plainSite();

/// A plant, its site and a study, with short ways to say the usual things.
struct Case {
    plant::Site site = plainSite();
    plant::Plant plant;
    plant::Study study;
    simulation::Settings settings;

    plant::Reference point(const std::string& name, double chainage, double elevation = 0.0);
    plant::Reference reservoir(const std::string& name, const plant::Reference& at, double level);
    /// A uniform conduit; friction frictionless unless given.
    plant::Conduit& conduit(const std::string& name, const plant::Reference& from,
                            const plant::Reference& to, double length, double area,
                            double waveSpeed, plant::ConduitModel model);
    plant::Chamber& chamber(const std::string& name, const plant::Reference& at, double area,
                            double floor, double rim);
    plant::Unit& unit(const std::string& name, const plant::Reference& from,
                      const plant::Reference& to, plant::Turbine turbine);
    plant::Reference ref(plant::Collection collection, const std::string& name) const;
    void at(double time_s, plant::EventKind kind);

    results::Run run() const;
    simulation::Rest rest() const;
};

/// Loss of the whole conduit in metres at a discharge, as a station loss in its middle.
void addLoss(Case& made, const std::string& conduit, double head_m, double flow_m3s);

/// Value of a trace at a time, straight between instants.
double valueAt(const results::Run& run, Measure measure, const results::Place& place,
               double time_s);
const results::Channel& channel(const results::Run& run, Measure measure,
                                const results::Place& place);
results::Place pointPlace(int index);
results::Place chamberPlace(int index = 0);
results::Place unitPlace(int index = 0);

/// Tunnel, chamber and a unit of given discharge: L 5000 m, A 25 m², F 100 m², level 0 at rest.
/// `lossAt50_m` is the tunnel's loss at 50 m³/s.
Case surgeCase(double lossAt50_m, double area_m2 = 100.0);

/// The demo plant: 120 MW Francis, 5 km rock tunnel, throttled shaft.
Case dorvane(double level_m, double output_W);
/// Tunnel rigid instead of elastic.
void makeTunnelRigid(Case& made);

} // namespace headroom::tests
