// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "base/overloaded.h"
#include "simulation/compile_parts.h"
#include "simulation/messages.h"

#include <algorithm>
#include <array>
#include <map>
#include <mutex>

namespace headroom::simulation {
namespace {

using plant::Unit;

/// Everything of a rating that can change its chart.
std::vector<double> keyOf(const machines::FrancisRating& r) {
    std::vector<double> key{r.ratedHead_m,  r.ratedFlow_m3s, r.ratedSpeed_rads,
                            r.ratedPower_W, r.gravity_mps2,  r.density_kgm3};
    for (const auto& value :
         {r.runnerDiameter_m, r.runaway_pu, r.noLoadFlow_pu, r.standstillFlow_pu, r.bestPower_pu,
          r.bestEfficiency_pu, r.halfPowerEfficiency_pu}) {
        key.push_back(value ? 1.0 : 0.0);
        key.push_back(value.value_or(0.0));
    }
    for (const auto& [stroke, flow] : r.flowByStroke) {
        key.push_back(stroke);
        key.push_back(flow);
    }
    return key;
}

machines::FrancisRating ratingOf(const plant::FrancisTurbine& t, const Medium& medium) {
    machines::FrancisRating r;
    r.ratedHead_m = t.ratedHead_m;
    r.ratedFlow_m3s = t.ratedFlow_m3s;
    r.ratedSpeed_rads = t.ratedSpeed_rads;
    r.ratedPower_W = t.ratedPower_W;
    r.gravity_mps2 = medium.gravity_mps2;
    r.density_kgm3 = medium.density_kgm3;
    r.runnerDiameter_m = t.runnerDiameter_m;
    r.runaway_pu = t.runaway_pu;
    r.noLoadFlow_pu = t.noLoadFlow_pu;
    r.standstillFlow_pu = t.standstillFlow_pu;
    r.bestPower_pu = t.bestPower_pu;
    r.bestEfficiency_pu = t.bestEfficiency_pu;
    r.halfPowerEfficiency_pu = t.halfPowerEfficiency_pu;
    r.flowByStroke.assign(t.flowByStroke.begin(), t.flowByStroke.end());
    return r;
}

void setTurbine(UnitRow& row, const plant::FrancisTurbine& turbine, const Medium& medium,
                const std::string& path, Findings& findings) {
    row.kind = UnitKind::francis;
    row.headScale_m = turbine.ratedHead_m;
    row.flowScale_m3s = turbine.ratedFlow_m3s;
    row.speedScale_rads = turbine.ratedSpeed_rads;
    row.powerScale_W = turbine.ratedPower_W;
    auto chart = sharedChart(ratingOf(turbine, medium), path);
    findings.insert(findings.end(), chart.findings().begin(), chart.findings().end());
    if (chart) {
        row.chart = *chart;
    }
}

void setTurbine(UnitRow& row, const plant::OrificeUnit& turbine, const Medium& medium,
                const std::string&, Findings&) {
    row.kind = UnitKind::orifice;
    row.orifice = {turbine.ratedHead_m, turbine.ratedFlow_m3s, turbine.efficiency};
    row.headScale_m = turbine.ratedHead_m;
    row.flowScale_m3s = turbine.ratedFlow_m3s;
    row.speedScale_rads = turbine.ratedSpeed_rads.value_or(0.0);
    row.powerScale_W = turbine.efficiency * medium.density_kgm3 * medium.gravity_mps2
                       * turbine.ratedFlow_m3s * turbine.ratedHead_m;
}

void setTurbine(UnitRow& row, const plant::FlowUnit& turbine, const Medium&, const std::string&,
                Findings&) {
    row.kind = UnitKind::flow;
    row.restFlow_m3s = turbine.flow_m3s;
    row.flowScale_m3s = std::max(1.0, turbine.flow_m3s);
}

void setTurbine(UnitRow& row, const plant::PowerUnit& turbine, const Medium&, const std::string&,
                Findings&) {
    row.kind = UnitKind::power;
    row.power_W = turbine.power_W;
    row.powerScale_W = std::max(1.0, turbine.power_W);
}

/// Inertia of spiral and draft tube, exit loss, and the velocity head that the draft tube turns
/// back into pressure. The runner's outlet is taken as wide as its reference diameter (common
/// practice, no source); without a diameter or a draft tube nothing is recovered.
void setPassages(UnitRow& row, const Unit& unit, const Medium& medium, bool intoReservoir) {
    const double g = medium.gravity_mps2;
    const auto inertia = [g](const std::optional<plant::Passage>& passage) {
        return passage && passage->area_m2 > 0.0 ? passage->length_m / (g * passage->area_m2) : 0.0;
    };
    row.draftInertia_s2m2 = inertia(unit.draftTube);
    row.inertia_s2m2 = inertia(unit.spiral) + row.draftInertia_s2m2;
    if (!unit.draftTube || !(unit.draftTube->area_m2 > 0.0) || !medium.velocityHeads) {
        return;
    }
    const double area = unit.draftTube->area_m2;
    const double outlet = 1.0 / (2.0 * g * area * area);
    row.exitLoss_s2m5 = intoReservoir ? outlet : 0.0;
    const auto* francis = std::get_if<plant::FrancisTurbine>(&unit.turbine);
    if (francis != nullptr && francis->runnerDiameter_m) {
        const double runner =
            0.25 * constants::pi * *francis->runnerDiameter_m * *francis->runnerDiameter_m;
        row.recovery_s2m5 = 1.0 / (2.0 * g * runner * runner);
    } else {
        row.recovery_s2m5 = outlet;
    }
}

void setShaft(UnitRow& row, const Unit& unit, double nominal_Hz) {
    row.inertia_kgm2 = unit.inertia_kgm2.value_or(0.0);
    if (unit.generator) {
        row.generatorEfficiency = unit.generator->efficiency;
        row.electricalScale = unit.generator->rated_VA / row.powerScale_W;
    }
    const auto& drive = std::get<plant::Synchronous>(unit.drive);
    row.rotor.synchronising_pu = drive.synchronising_pu;
    row.rotor.damping_pu = drive.damping_pu;
    row.rotor.nominal_Hz = nominal_Hz;
    row.rotor.locked = drive.locked || !(row.inertia_kgm2 > 0.0);
}

void setServo(UnitRow& row, const Unit& unit, const std::string& path, Findings& findings) {
    if (!unit.servo) {
        return;
    }
    const plant::Servo& servo = *unit.servo;
    control::ServoSpec spec;
    spec.opening_s = servo.opening_s;
    for (const auto& [downTo, time] : servo.closingStages) {
        spec.closing.push_back({downTo, time});
    }
    if (spec.closing.empty()) {
        spec.closing.push_back({0.0, servo.closing_s.value_or(servo.opening_s)});
    }
    spec.cushionBelow_pu = servo.cushionBelow;
    spec.cushion_s = servo.cushion_s;
    spec.deadTime_s = servo.deadTime_s;
    spec.lag_s = servo.lag_s;
    const Findings faults = control::check(spec, path + "/servo");
    findings.insert(findings.end(), faults.begin(), faults.end());
    row.servo = spec;
}

control::PidGains gainsOf(const plant::PidGains& gains) {
    return {gains.kp, gains.ki_1s, gains.kd_s};
}

void setGovernor(UnitRow& row, const Unit& unit, double nominal_Hz, const std::string& path,
                 Findings& findings) {
    if (!unit.governor) {
        return;
    }
    const auto& governor = std::get<plant::PidGovernor>(*unit.governor);
    control::PidSpec spec;
    spec.gains = gainsOf(governor.gains);
    if (governor.noLoad) {
        spec.noLoad = gainsOf(*governor.noLoad);
    }
    spec.droop = governor.droop;
    spec.droopOn = governor.droopOnPower ? control::DroopOn::power : control::DroopOn::opening;
    spec.derivativeFilter_s = governor.derivativeFilter_s;
    spec.deadBand_pu = governor.deadBand_Hz / nominal_Hz;
    spec.samplePeriod_s = governor.sampleTime_s.value_or(0.0);
    spec.openingLimit_pu = governor.openingLimit.value_or(1.0);
    row.openingLimit = spec.openingLimit_pu;
    auto made = control::PidGovernor::make(spec, path + "/governor");
    findings.insert(findings.end(), made.findings().begin(), made.findings().end());
    if (made) {
        row.governor = std::make_shared<const control::PidGovernor>(*made);
    }
}

int outletNode(const Model& model, const Unit& unit) {
    const auto place = static_cast<std::size_t>(unit.to.index);
    return unit.to.collection == plant::Collection::reservoirs ? model.reservoirNode_[place]
                                                               : model.pointNode_[place];
}

void setStart(UnitRow& row, int index, const plant::Study& study, const std::string& path,
              Findings& findings) {
    for (const auto& [unit, output] : study.start.output_W) {
        if (unit.index == index) {
            row.output_W = output;
        }
    }
    for (const auto& [unit, opening] : study.start.opening) {
        if (unit.index == index) {
            row.opening = opening;
        }
    }
    if (row.opening && row.output_W) {
        findings.push_back({&outputAndOpening, path, {}, {}, {}, {}, {}});
    }
    const bool gated = row.kind == UnitKind::francis || row.kind == UnitKind::orifice;
    if (!gated && (row.opening || row.output_W)) {
        findings.push_back({&startNeedsGate, path, {}, {}, {}, {}, {}});
    }
    if (gated && !row.opening && !row.output_W) {
        row.output_W = 0.0;
    }
}

} // namespace

Result<std::shared_ptr<const machines::FrancisChart>> sharedChart(
    const machines::FrancisRating& rating, const std::string& subject) {
    using Shared = std::shared_ptr<const machines::FrancisChart>;
    static std::mutex mutex;
    static std::map<std::vector<double>, Shared> charts;
    constexpr std::size_t most = 64; // ratings kept; a search over ratings would otherwise grow
    const auto key = keyOf(rating);
    {
        const std::lock_guard lock(mutex);
        if (const auto known = charts.find(key); known != charts.end()) {
            return known->second;
        }
    }
    auto made = machines::FrancisChart::calibrate(rating, subject);
    if (!made) {
        return made.findings();
    }
    auto chart = std::make_shared<const machines::FrancisChart>(*made);
    const std::lock_guard lock(mutex);
    if (made.findings().empty()) { // notes name their subject and are given anew each time
        if (charts.size() >= most) {
            charts.erase(charts.begin());
        }
        charts.emplace(key, chart);
    }
    return {std::move(chart), made.findings()};
}

void fillUnits(Model& model, const plant::Plant& plant, const plant::Study& study,
               Findings& findings) {
    for (int i = 0; i < plant.units.size(); ++i) {
        const Unit& unit = plant.units[i];
        const std::string path = "plant/units/" + plant.units.name(i);
        model.unitPath.push_back(path);
        UnitRow row;
        row.inlet = model.pointNode(unit.from.index);
        row.outlet = outletNode(model, unit);
        row.centreline_m = unit.centreline_m.value_or(plant.points[unit.from.index].elevation_m);
        std::visit(
            [&](const auto& turbine) { setTurbine(row, turbine, model.medium, path, findings); },
            unit.turbine);
        setPassages(row, unit, model.medium,
                    model.nodes[static_cast<std::size_t>(row.outlet)].known());
        setShaft(row, unit, model.nominal_Hz);
        setServo(row, unit, path, findings);
        setGovernor(row, unit, model.nominal_Hz, path, findings);
        row.loadControl = {unit.interlocks.reloadNotBefore_s, unit.interlocks.synchroniseWithin_pu,
                           unit.interlocks.synchroniseHold_s};
        row.overspeed_pu = unit.protection.overspeed_pu;
        row.overspeedDelay_s = unit.protection.overspeedDelay_s;
        setStart(row, i, study, path, findings);
        model.units.push_back(std::move(row));
    }
}

} // namespace headroom::simulation
