// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/compile_parts.h"
#include "simulation/messages.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

constexpr int mostIntervals = 30000;
constexpr int mostLines = 2000;
constexpr double stretchNoted = 0.02, stretchWarned = 0.05;
constexpr double shareOfTimeConstant = 0.1;

void fillGrid(Model& model, const plant::Plant& plant, Findings& findings) {
    if (const auto* imposed = std::get_if<plant::ImposedGrid>(&plant.grid)) {
        model.nominal_Hz = imposed->nominal_Hz;
        return;
    }
    const auto& area = std::get<plant::GridArea>(plant.grid);
    grid::AreaSpec spec;
    spec.nominal_Hz = area.nominal_Hz;
    spec.storedEnergy_J = area.storedEnergy_J;
    spec.load_W = area.load_W;
    spec.loadDamping_1Hz = area.loadDamping_1Hz;
    if (area.otherReserve) {
        spec.reserve = grid::ReserveSpec{};
        spec.reserve->power_W = area.otherReserve->power_W;
        spec.reserve->droop = area.otherReserve->droop;
        spec.reserve->lag_s = area.otherReserve->lag_s;
        spec.reserve->deadBand_Hz = area.otherReserve->deadBand_Hz;
    }
    model.nominal_Hz = area.nominal_Hz;
    const Findings faults = grid::check(spec, "plant/grid");
    findings.insert(findings.end(), faults.begin(), faults.end());
    model.area = spec;
}

void fillLevels(Model& model, const plant::Plant& plant, const plant::Study& study) {
    for (const auto& [name, reservoir] : plant.reservoirs) {
        model.reservoirLevel_m.push_back(reservoir.level_m);
    }
    for (const auto& [reservoir, level] : study.start.level_m) {
        model.reservoirLevel_m[static_cast<std::size_t>(reservoir.index)] = level;
    }
    model.chamberStart_m.resize(static_cast<std::size_t>(plant.chambers.size()));
    for (const auto& [chamber, level] : study.start.chamberLevel_m) {
        model.chamberStart_m[static_cast<std::size_t>(chamber.index)] = level;
    }
}

/// Heads and flows that tolerances are shares of.
void fillScales(Model& model) {
    double lowest = INFINITY, highest = -INFINITY;
    for (const double level : model.reservoirLevel_m) {
        lowest = std::min(lowest, level);
        highest = std::max(highest, level);
    }
    model.headScale_m = std::max(1.0, highest - lowest);
    for (const UnitRow& unit : model.units) {
        model.flowScale_m3s = std::max(model.flowScale_m3s, unit.flowScale_m3s);
    }
}

double stepCap(const Model& model, const Settings& settings) {
    double cap = settings.longestStep_s;
    for (const UnitRow& unit : model.units) {
        if (unit.servo && unit.servo->lag_s > 0.0) {
            cap = std::min(cap, shareOfTimeConstant * unit.servo->lag_s);
        }
        if (unit.freeShaft() && !unit.rotor.locked) {
            const auto swing =
                grid::swing(unit.rotor, unit.accelerationTime_s() / unit.electricalScale);
            if (swing.frequency_rads > 0.0) {
                cap = std::min(cap, shareOfTimeConstant / swing.frequency_rads);
            }
        }
    }
    if (model.area && model.area->reserve && model.area->reserve->lag_s > 0.0) {
        cap = std::min(cap, shareOfTimeConstant * model.area->reserve->lag_s);
    }
    return cap;
}

StepRequest stepRequest(const Model& model, const plant::Plant& plant, const Settings& settings) {
    StepRequest request;
    request.cap_s = stepCap(model, settings);
    for (int i = 0; i < plant.conduits.size(); ++i) {
        const auto wanted = plant.conduits[i].model;
        const double time = model.conduits[static_cast<std::size_t>(i)].geometry.travelTime_s();
        request.conduits.push_back(
            {time, wanted == plant::ConduitModel::rigid ? ConduitKind::rigid : ConduitKind::elastic,
             wanted == plant::ConduitModel::automatic});
        if (wanted == plant::ConduitModel::elastic) {
            request.cap_s = std::min(request.cap_s, time / leastCells);
        }
    }
    for (const UnitRow& unit : model.units) {
        if (unit.governor != nullptr && unit.governor->samplePeriod_s() > 0.0) {
            request.samplePeriods_s.push_back(unit.governor->samplePeriod_s());
        }
    }
    return request;
}

Finding about(const Message& message, const std::string& subject,
              std::vector<std::pair<std::string, Argument>> arguments) {
    return {&message, subject, std::move(arguments), {}, {}, {}, {}};
}

void noteChoice(Model& model, const plant::Plant& plant, const StepChoice& choice,
                Findings& notes) {
    const auto seconds = static_cast<int>(Quantity::time);
    const auto share = static_cast<int>(Quantity::percent);
    notes.push_back(about(stepChosen, "plant", {{"step", Amount{seconds, choice.step_s}}}));
    if (!choice.sampleTimesDivided) {
        notes.push_back(about(sampleTimesNotDivided, "plant/units", {}));
    }
    for (std::size_t i = 0; i < choice.kinds.size(); ++i) {
        const auto& path = model.conduitPath[i];
        if (choice.kinds[i] == ConduitKind::shortElement) {
            notes.push_back(about(shortElementChosen, path, {}));
        } else if (choice.kinds[i] == ConduitKind::rigid) {
            notes.push_back(about(rigidChosen, path, {}));
        } else {
            notes.push_back(about(elasticChosen, path, {{"cells", std::int64_t{choice.cells[i]}}}));
        }
        const double stretch = std::fabs(choice.stretch[i]);
        if (stretch > stretchNoted) {
            notes.push_back(about(stretch > stretchWarned ? stretchedMuch : stretchedSome, path,
                                  {{"stretch", Amount{share, choice.stretch[i]}}}));
        }
    }
    (void)plant;
}

void fillTime(Model& model, const plant::Study& study, const StepChoice& choice) {
    model.duration_s = study.until_s;
    auto base = numerics::TimeGrid::over(0.0, study.until_s, choice.step_s);
    base.steps = std::max<std::int64_t>(base.steps, 1);
    const std::int64_t every = (base.steps + mostIntervals - 1) / mostIntervals;
    base.steps = (base.steps + every - 1) / every * every; // whole recording intervals
    const int refinement = std::max(1, model.settings.refinement);
    model.grid = {0.0, choice.step_s / refinement, base.steps * refinement};
    model.recordEvery = every * refinement;
    const std::int64_t records = model.grid.steps / model.recordEvery;
    model.lineEvery = model.recordEvery * ((records + mostLines - 1) / mostLines);
}

void setInstructions(Model& model) {
    using hydraulics::InstructionSet;
    model.instructions = hydraulics::bestInstructionSet();
    for (const auto set :
         {InstructionSet::baseline, InstructionSet::avx2, InstructionSet::avx512}) {
        if (hydraulics::nameOf(set) == model.settings.instructions && hydraulics::available(set)) {
            model.instructions = set;
        }
    }
}

void fillResolution(Model& model, const StepChoice& choice, Findings notes) {
    auto& out = model.resolution;
    out.step_s = model.grid.step_s;
    out.steps = model.grid.steps;
    out.refinement = std::max(1, model.settings.refinement);
    for (const ConduitRow& conduit : model.conduits) {
        out.cellsByConduit.push_back(conduit.cells);
        out.cells += conduit.cells;
    }
    out.stretchByConduit = choice.stretch;
    out.instructions = std::string(hydraulics::nameOf(model.instructions));
    out.notes = std::move(notes);
}

} // namespace

Result<std::shared_ptr<const Model>> compile(const plant::Site& site, const plant::Plant& plant,
                                             const plant::Study& study, const Settings& settings) {
    auto model = std::make_shared<Model>();
    Findings findings;
    model->settings = settings;
    model->medium = mediumOf(site, findings);
    fillLevels(*model, plant, study);
    fillNodes(*model, plant, findings);
    fillConduits(*model, plant, findings);
    fillGrid(*model, plant, findings);
    fillUnits(*model, plant, study, findings);
    if (anyError(findings)) {
        return findings;
    }
    const StepChoice choice = chooseStep(stepRequest(*model, plant, settings));
    fillTime(*model, study, choice);
    setInstructions(*model);
    cutConduits(*model, choice);
    fillChambers(*model, plant, findings);
    fillClusters(*model, findings);
    fillScales(*model);
    model->schedule = scheduleOf(plant, study, model->grid.step_s, findings);
    if (anyError(findings)) {
        return findings;
    }
    Findings notes = findings;
    noteChoice(*model, plant, choice, notes);
    fillResolution(*model, choice, notes);
    return Result<std::shared_ptr<const Model>>(std::move(model), std::move(notes));
}

} // namespace headroom::simulation
