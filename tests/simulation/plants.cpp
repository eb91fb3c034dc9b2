// SPDX-License-Identifier: GPL-3.0-or-later
#include "plants.h"

#include "base/constants.h"
#include "support/catch.h"
#include "units/text.h"

#include <cmath>

namespace headroom::tests {

using plant::Collection;
using plant::Reference;

plant::Site plainSite() {
    plant::Site site;
    site.density_kgm3 = 1000.0;
    site.velocityHeads = false;
    return site;
}

Reference Case::ref(Collection collection, const std::string& name) const {
    int index = -1;
    switch (collection) {
    case Collection::points:
        index = plant.points.indexOf(name);
        break;
    case Collection::reservoirs:
        index = plant.reservoirs.indexOf(name);
        break;
    case Collection::chambers:
        index = plant.chambers.indexOf(name);
        break;
    case Collection::units:
        index = plant.units.indexOf(name);
        break;
    default:
        break;
    }
    return {name, collection, index};
}

Reference Case::point(const std::string& name, double chainage, double elevation) {
    plant.points.add(name, {chainage, elevation});
    return ref(Collection::points, name);
}

Reference Case::reservoir(const std::string& name, const Reference& at, double level) {
    plant.reservoirs.add(name, {at, level, {}, {}});
    return ref(Collection::reservoirs, name);
}

plant::Conduit& Case::conduit(const std::string& name, const Reference& from, const Reference& to,
                              double length, double area, double waveSpeed,
                              plant::ConduitModel model) {
    plant::Conduit made;
    made.from = from;
    made.to = to;
    made.length_m = length;
    made.model = model;
    plant::Reach reach;
    reach.area_m2 = area;
    reach.hydraulicRadius_m = std::sqrt(area / (4.0 * constants::pi));
    reach.friction = plant::DarcyFactor{0.0};
    reach.wall = plant::GivenWaveSpeed{waveSpeed};
    made.reaches.add("whole", reach);
    return plant.conduits.add(name, made);
}

plant::Chamber& Case::chamber(const std::string& name, const Reference& at, double area,
                              double floor, double rim) {
    plant::Chamber made;
    made.at = at;
    made.shape.areaByLevel = {{floor, area}, {rim, area}};
    return plant.chambers.add(name, made);
}

plant::Unit& Case::unit(const std::string& name, const Reference& from, const Reference& to,
                        plant::Turbine turbine) {
    plant::Unit made;
    made.from = from;
    made.to = to;
    made.turbine = std::move(turbine);
    return plant.units.add(name, made);
}

void Case::at(double time_s, plant::EventKind kind) {
    plant::Event event;
    event.time.at_s = time_s;
    event.kind = std::move(kind);
    study.events.add("event " + std::to_string(study.events.size() + 1), event);
}

results::Run Case::run() const {
    const auto model = simulation::compile(site, plant, study, settings);
    for (const auto& finding : model.findings()) {
        if (finding.severity() == Severity::error) {
            FAIL(text(finding));
        }
    }
    auto done = simulation::run(**model);
    if (done.status.why) {
        FAIL(text(*done.status.why));
    }
    return done;
}

simulation::Rest Case::rest() const {
    const auto model = simulation::compile(site, plant, study, settings);
    REQUIRE(model);
    const auto found = simulation::rest(**model);
    if (!found) {
        FAIL(text(found.findings().front()));
    }
    return *found;
}

void addLoss(Case& made, const std::string& conduit, double head_m, double flow_m3s) {
    auto& target = made.plant.conduits[made.plant.conduits.indexOf(conduit)];
    const double area = target.reaches[0].area_m2;
    const double velocity = flow_m3s / area;
    plant::StationLoss loss;
    loss.chainage_m = 0.5
                      * (made.plant.points[target.from.index].chainage_m
                         + made.plant.points[target.to.index].chainage_m);
    loss.coefficient = head_m * 2.0 * made.site.gravity_mps2 / (velocity * velocity);
    target.losses.add("all", loss);
}

const results::Channel& channel(const results::Run& run, Measure measure,
                                const results::Place& place) {
    const auto* found = run.find(measure, place);
    REQUIRE(found != nullptr);
    return *found;
}

double valueAt(const results::Run& run, Measure measure, const results::Place& place,
               double time_s) {
    const auto& last = channel(run, measure, place).trace.last;
    const double at = time_s / run.recordInterval_s;
    const auto i = static_cast<std::size_t>(std::floor(at + 1e-9));
    REQUIRE(i < last.size());
    const double share = std::max(0.0, at - static_cast<double>(i));
    const double here = static_cast<double>(last[i]);
    const double next = static_cast<double>(last[std::min(i + 1, last.size() - 1)]);
    return share < 1e-9 ? here : here + share * (next - here);
}

results::Place pointPlace(int index) {
    return {results::Thing::point, index, 0.0};
}
results::Place chamberPlace(int index) {
    return {results::Thing::chamber, index, 0.0};
}
results::Place unitPlace(int index) {
    return {results::Thing::unit, index, 0.0};
}

Case surgeCase(double lossAt50_m, double area_m2) {
    Case made;
    const auto intake = made.point("Intake", 0.0, -40.0);
    const auto tee = made.point("Tee", 5000.0, -40.0);
    made.reservoir("Upper", intake, 0.0);
    const auto tail = made.reservoir("Tail", {}, -100.0);
    made.conduit("Tunnel", intake, tee, 5000.0, 25.0, 1300.0, plant::ConduitModel::rigid);
    addLoss(made, "Tunnel", lossAt50_m, 50.0);
    made.chamber("Chamber", tee, area_m2, -35.0, 60.0);
    made.unit("Unit", tee, tail, plant::FlowUnit{50.0});
    made.settings.longestStep_s = 0.05;
    return made;
}

Case dorvane(double level_m, double output_W) {
    Case made;
    made.site = plant::Site{};
    const auto intake = made.point("Intake", 0.0, 475.0);
    const auto foot = made.point("Shaft foot", 5000.0, 452.0);
    const auto bend = made.point("Top bend", 5030.0, 452.0);
    const auto inlet = made.point("Unit inlet", 5579.0, 262.0);
    made.reservoir("Upper Dorvane", intake, level_m);
    const auto tail = made.reservoir("Tailwater", {}, 270.0);
    auto& tunnel =
        made.conduit("Tunnel", intake, foot, 5000.0, 32.0, 1100.0, plant::ConduitModel::elastic);
    tunnel.reaches[0].hydraulicRadius_m = 1.497;
    tunnel.reaches[0].friction = plant::Strickler{34.0};
    tunnel.enteringLoss = 0.25;
    plant::StationLoss loss;
    loss.chainage_m = 2500.0;
    loss.coefficient = 0.35;
    tunnel.losses.add("bends", loss);
    const double bore = 0.25 * constants::pi * 3.9 * 3.9;
    auto& top = made.conduit("Penstock top", foot, bend, 30.0, bore, 1200.0,
                             plant::ConduitModel::automatic);
    top.reaches[0].friction = plant::DarcyFactor{0.011};
    top.reaches[0].hydraulicRadius_m = 3.9 / 4.0;
    plant::StationLoss bends;
    bends.chainage_m = 5300.0;
    bends.coefficient = 0.25;
    auto& rest =
        made.conduit("Penstock", bend, inlet, 620.0, bore, 1200.0, plant::ConduitModel::automatic);
    rest.axis = {{5250.0, 262.0}};
    rest.reaches[0].friction = plant::DarcyFactor{0.011};
    rest.reaches[0].hydraulicRadius_m = 3.9 / 4.0;
    rest.losses.add("bends", bends);
    auto& shaft = made.chamber("Surge shaft", foot, 0.25 * constants::pi * 64.0, 455.0, 536.0);
    shaft.shape.throttled = true;
    shaft.shape.lossIn_s2m5 = 0.0065;
    shaft.shape.lossOut_s2m5 = 0.00455;
    plant::FrancisTurbine francis;
    francis.ratedHead_m = 222.0;
    francis.ratedFlow_m3s = 60.0;
    francis.ratedSpeed_rads = 333.33 * constants::pi / 30.0;
    francis.ratedPower_W = 121.5e6;
    francis.runnerDiameter_m = 2.44;
    francis.runaway_pu = 1.73;
    francis.noLoadFlow_pu = 0.08;
    francis.standstillFlow_pu = 1.15;
    francis.bestPower_pu = 0.88;
    francis.bestEfficiency_pu = 0.939;
    francis.halfPowerEfficiency_pu = 0.880;
    francis.flowByStroke = {{0.0, 0.0},   {0.10, 0.12}, {0.25, 0.29},
                            {0.50, 0.55}, {0.75, 0.79}, {1.0, 1.0}};
    auto& unit = made.unit("Unit 1", inlet, tail, francis);
    unit.centreline_m = 262.0;
    unit.spiral = plant::Passage{22.0, 9.0};
    unit.draftTube = plant::Passage{28.0, 12.0};
    unit.inertia_kgm2 = 700e3;
    unit.generator = plant::Generator{135e6, 0.90, 0.985};
    plant::Servo servo;
    servo.opening_s = 8.0;
    servo.closing_s = 9.0;
    servo.cushionBelow = 0.12;
    servo.cushion_s = 3.0;
    servo.deadTime_s = 0.20;
    servo.lag_s = 0.15;
    unit.servo = servo;
    plant::PidGovernor governor;
    governor.droop = 0.06;
    governor.gains = {2.2, 0.33, 0.6};
    unit.governor = governor;
    plant::GridArea area;
    area.storedEnergy_J = 45e9;
    area.loadDamping_1Hz = 0.012;
    area.load_W = 14e9;
    area.otherReserve = plant::OtherReserve{0.04, 10e9, 5.0, 0.0};
    made.plant.grid = area;
    made.study.start.output_W = {{made.ref(Collection::units, "Unit 1"), output_W}};
    return made;
}

void makeTunnelRigid(Case& made) {
    made.plant.conduits[made.plant.conduits.indexOf("Tunnel")].model = plant::ConduitModel::rigid;
}

} // namespace headroom::tests
