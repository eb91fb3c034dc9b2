// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample.h"

#include "limits/bounds.h"
#include "limits/place.h"

#include <QGuiApplication>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace headroom::drawing::test {

namespace {

using plant::Collection;

plant::Reference to(Collection collection, const char* name, int index) {
    return {name, collection, index};
}

plant::Conduit conduit(const plant::Plant& plant, const char* from, const char* end,
                       std::vector<std::pair<double, double>> axis, double diameter_m) {
    plant::Conduit out;
    out.from = to(Collection::points, from, plant.points.indexOf(from));
    out.to = to(Collection::points, end, plant.points.indexOf(end));
    out.axis = std::move(axis);
    plant::Reach reach;
    reach.diameter_m = diameter_m;
    reach.area_m2 = 0.25 * std::numbers::pi * diameter_m * diameter_m;
    out.reaches.add("steel", reach);
    return out;
}

plant::Limit limit(Measure measure, plant::Reference at, std::optional<double> least,
                   std::optional<double> greatest, double reserve = 0.0) {
    plant::Limit out;
    out.measure = measure;
    out.at.thing = std::move(at);
    out.least[0] = least;
    out.greatest[0] = greatest;
    out.reserve = reserve;
    return out;
}

plant::Chamber shaft(plant::Reference at, double floor, double rim, double area) {
    plant::Chamber out;
    out.at = std::move(at);
    out.shape.areaByLevel = {{floor, area}, {rim, area}};
    out.shape.throttled = true;
    return out;
}

void addLimits(plant::Project& project) {
    auto& limits = project.limits;
    limits.add("Shaft, lowest",
               limit(Measure::level, to(Collection::chambers, "Surge shaft", 0), 458.0, {}));
    limits.add("Spiral head, highest",
               limit(Measure::head, to(Collection::units, "U1", 0), {}, 590.0, 3.0));
    limits.add("Shaft, highest",
               limit(Measure::level, to(Collection::chambers, "Surge shaft", 0), {}, 534.0));
    limits.add("Speed, highest", limit(Measure::speed, to(Collection::units, "U1", 0), {}, 1.5));
    auto bend = limit(Measure::head, to(Collection::conduits, "Penstock", 1), 455.0, {});
    bend.at.alongConduit = true;
    bend.at.chainage_m = 5030.0;
    limits.add("Top bend, lowest", bend);
    limits.add("Draft tube, lowest",
               limit(Measure::draftPressureHead, to(Collection::units, "U1", 0), -6.0, {}));
    limits.add(
        "Tunnel pressure rate",
        limit(Measure::pressureRate, to(Collection::points, "Shaft foot", 1), {}, 10.0 / 60.0));
    auto rate = limit(Measure::openingRate, to(Collection::units, "U1", 0), {}, 0.33);
    rate.timeRule = plant::TimeRule::cumulative;
    rate.allowed_s = 20.0;
    limits.add("Gate rate", rate);
}

void addStudies(plant::Project& project) {
    const std::pair<const char*, plant::LoadClass> rows[] = {
        {"Full rejection", plant::LoadClass::normal},
        {"Rejection at 30 MW", plant::LoadClass::normal},
        {"Loading in 20 s, low reservoir", plant::LoadClass::normal},
        {"Accept, then reject", plant::LoadClass::exceptional},
        {"Reject, then reload", plant::LoadClass::exceptional},
        {"Fast step up 20 MW", plant::LoadClass::normal},
        {"Loss of 650 MW in the area", plant::LoadClass::normal},
        {"Stuck gate", plant::LoadClass::extreme},
    };
    for (const auto& [name, loadClass] : rows) {
        plant::Study study;
        study.loadClass = loadClass;
        study.until_s = 400.0;
        study.start.level_m = {{to(Collection::reservoirs, "Upper lake", 0), 488.0}};
        project.studies.add(name, study);
    }
}

double restHead(double chainage) {
    return 488.0 - 0.0022 * std::min(chainage, 5000.0) - 0.004 * std::max(0.0, chainage - 5000.0);
}

results::Envelope envelope(const plant::Plant& plant, int index, double low_m) {
    const auto& conduit = plant.conduits[index];
    const auto& from = plant.points[conduit.from.index];
    const auto& end = plant.points[conduit.to.index];
    results::Envelope out;
    out.conduit = index;
    constexpr int stations = 300, instants = 401;
    for (int i = 0; i < stations; ++i) {
        const double share = i / (stations - 1.0);
        const double chainage = from.chainage_m + share * (end.chainage_m - from.chainage_m);
        const double swing = from.elevation_m < 300.0
                                 ? 6.0 * (1.0 - share)
                                 : 40.0 * std::min(1.0, std::max(0.0, chainage / 5000.0));
        const bool tail = from.elevation_m < 300.0;
        const double hammer = chainage > 5000.0 && !tail ? 0.1 * (chainage - 5000.0) : 0.0;
        const double rest = tail ? 272.0 : std::max(restHead(chainage), end.elevation_m + 5.0);
        out.chainage_m.push_back(chainage);
        out.elevation_m.push_back(from.elevation_m + share * (end.elevation_m - from.elevation_m));
        out.rest_m.push_back(rest);
        out.greatest_m.push_back(rest + swing + 0.9 * hammer);
        out.least_m.push_back(rest - (restHead(5000.0) - low_m) * swing / 40.0 - 0.3 * hammer);
        out.largestStep_m.push_back(0.1);
    }
    for (int row = 0; row < instants; ++row) {
        for (int i = 0; i < stations; ++i) {
            const auto at = static_cast<std::size_t>(i);
            const double middle = (out.greatest_m[at] + out.least_m[at]) / 2;
            const double half = (out.greatest_m[at] - out.least_m[at]) / 2;
            out.line_m.push_back(static_cast<float>(middle + 0.9 * half * std::sin(row * 0.035)));
        }
    }
    return out;
}

results::Channel channel(Measure measure, results::Place place, double middle, double half) {
    results::Channel out;
    out.measure = measure;
    out.place = place;
    out.atRest = middle;
    for (int i = 0; i <= 4000; ++i) {
        out.trace.last.push_back(static_cast<float>(middle + half * std::sin(i * 0.0035)));
    }
    return out;
}

} // namespace

void startGui() {
    static int count = 1;
    static char program[] = "test_drawing";
    static char* words[] = {program, nullptr};
    static QGuiApplication* gui = [] {
        qputenv("QT_QPA_PLATFORM", "offscreen");
        return new QGuiApplication(count, words);
    }();
    (void)gui;
}

plant::Project sampleProject() {
    plant::Project project;
    project.title = "Test plant";
    project.baseName = "As built";
    auto& plant = project.plant;
    plant.points.add("Intake", {0.0, 475.0});
    plant.points.add("Shaft foot", {5000.0, 452.0});
    plant.points.add("U1 inlet", {5579.0, 262.0});
    plant::Reservoir upper;
    upper.at = to(Collection::points, "Intake", 0);
    upper.level_m = 512.0;
    plant.reservoirs.add("Upper lake", upper);
    plant::Reservoir tail;
    tail.level_m = 270.0;
    plant.reservoirs.add("Tailwater", tail);
    plant.conduits.add(
        "Headrace", conduit(plant, "Intake", "Shaft foot", {{1800, 466.7}, {3600, 458.4}}, 6.38));
    plant.conduits.add("Penstock",
                       conduit(plant, "Shaft foot", "U1 inlet", {{5030, 452}, {5250, 262}}, 3.9));
    plant.conduits[1].length_m = 650.0;
    plant.chambers.add("Surge shaft",
                       shaft(to(Collection::points, "Shaft foot", 1), 455.0, 536.0, 50.27));
    plant::Unit unit;
    unit.from = to(Collection::points, "U1 inlet", 2);
    unit.to = to(Collection::reservoirs, "Tailwater", 1);
    unit.centreline_m = 262.0;
    plant.units.add("U1", unit);
    project.ground = {{-700, 505}, {-600, 480}, {-300, 470}, {-20, 472},  {60, 500},   {300, 548},
                      {900, 575},  {1600, 560}, {2300, 592}, {3100, 570}, {3800, 588}, {4500, 572},
                      {5000, 538}, {5060, 520}, {5230, 355}, {5320, 312}, {5450, 296}, {5560, 290},
                      {5600, 284}, {5640, 284}, {5645, 262}, {5760, 262}};
    addLimits(project);
    for (const char* name :
         {"Two-stage closing", "Wider shaft", "Larger throttle", "Reload not before 300 s"}) {
        project.options.add(name);
    }
    addStudies(project);
    return project;
}

plant::Project branchedProject() {
    auto project = sampleProject();
    auto& plant = project.plant;
    plant.points.add("U2 inlet", {5579.0, 262.0});
    plant.points.add("U3 inlet", {5579.0, 262.0});
    plant.points.add("Draft end", {5660.0, 262.0});
    plant.points.add("Outfall", {8200.0, 264.0});
    plant.conduits.add("Penstock 2",
                       conduit(plant, "Shaft foot", "U2 inlet", {{5030, 452}, {5250, 262}}, 2.2));
    plant.conduits.add("Tailrace", conduit(plant, "Draft end", "Outfall", {}, 7.0));
    plant.chambers.add("Lower chamber",
                       shaft(to(Collection::points, "Draft end", plant.points.indexOf("Draft end")),
                             264.0, 290.0, 400.0));
    plant.reservoirs[1].at = to(Collection::points, "Outfall", plant.points.indexOf("Outfall"));
    for (const char* name : {"U2", "U3"}) {
        plant::Unit unit = plant.units[0];
        const std::string inlet = std::string(name) + " inlet";
        unit.from = to(Collection::points, inlet.c_str(), plant.points.indexOf(inlet));
        plant.units.add(name, unit);
    }
    for (int i = 0; i < plant.units.size(); ++i) {
        plant.units[i].to = to(Collection::points, "Draft end", plant.points.indexOf("Draft end"));
    }
    project.ground.clear();
    return project;
}

plant::Project startedProject() {
    plant::Project project;
    project.plant.points.add("Intake", {0.0, 475.0});
    project.plant.points.add("Tunnel end", {3000.0, 460.0});
    plant::Reservoir upper;
    upper.at = to(Collection::points, "Intake", 0);
    upper.level_m = 490.0;
    project.plant.reservoirs.add("Upper lake", upper);
    project.plant.conduits.add("Tunnel", conduit(project.plant, "Intake", "Tunnel end", {}, 5.0));
    return project;
}

std::shared_ptr<const studies::Snapshot> snapshotOf(plant::Project project) {
    auto snapshot = std::make_shared<studies::Snapshot>();
    auto bound = std::make_shared<plant::Bound>();
    bound->project = std::move(project);
    for (int option = -1; option < bound->project.options.size(); ++option) {
        auto variant = std::make_shared<plant::Variant>();
        variant->name = option < 0 ? bound->project.baseName : bound->project.options.name(option);
        variant->site = bound->project.site;
        variant->plant = bound->project.plant;
        variant->limits = bound->project.limits;
        snapshot->variants.push_back(std::move(variant));
    }
    snapshot->bound = std::move(bound);
    return snapshot;
}

std::shared_ptr<const results::Run> sampleRun(const plant::Plant& plant, double low_m) {
    auto run = std::make_shared<results::Run>();
    run->duration_s = 400.0;
    run->recordInterval_s = 0.1;
    run->lineInterval_s = 1.0;
    for (int i = 0; i < plant.conduits.size(); ++i) {
        run->envelopes.push_back(envelope(plant, i, low_m));
    }
    for (int i = 0; i < plant.chambers.size(); ++i) {
        const auto& shape = plant.chambers[i].shape;
        const double middle = i == 0 ? 490.0 : (shape.floor_m() + shape.rim_m()) / 2;
        run->channels.push_back(
            channel(Measure::level, {results::Thing::chamber, i}, middle, i == 0 ? 33.9 : 5.0));
    }
    for (int i = 0; i < plant.units.size(); ++i) {
        run->channels.push_back(channel(Measure::speed, {results::Thing::unit, i}, 1.2, 0.25));
    }
    return run;
}

studies::Cell doneCell(const studies::Snapshot& snapshot, int option, int study) {
    const auto& variant = snapshot.variant(option);
    studies::Cell cell;
    cell.option = option;
    cell.study = study;
    cell.state = studies::CellState::done;
    cell.progress = 1.0;
    auto stored = std::make_shared<studies::StoredRun>();
    stored->run = stored->repeat = sampleRun(variant.plant);
    cell.stored = stored;
    const double shares[] = {-0.06, 0.04, 0.30, 0.03, 0.42, 0.55, 0.61, 0.66};
    const results::Mark marks[] = {
        results::Mark::broken, results::Mark::tight, results::Mark::held, results::Mark::undecided,
        results::Mark::held,   results::Mark::held,  results::Mark::held, results::Mark::held};
    for (int i = 0; i < variant.limits.size(); ++i) {
        const auto& limit = variant.limits[i];
        const auto row = static_cast<std::size_t>(i) % std::size(shares);
        results::Verdict verdict;
        verdict.limit = i;
        verdict.mark = marks[row];
        verdict.measure = limit.measure;
        verdict.place = limits::placeOf(limit, variant.plant).value_or(results::Place{});
        verdict.upper = limit.greatest[0].has_value();
        verdict.bound = verdict.upper ? *limit.greatest[0] : limit.least[0].value_or(0.0);
        verdict.share = shares[row];
        const double span = std::max(0.1, 0.08 * std::abs(verdict.bound));
        verdict.margin = verdict.share * span;
        verdict.extreme = verdict.bound + (verdict.upper ? -1.0 : 1.0) * verdict.margin;
        verdict.allowance = limit.measure == Measure::head && verdict.upper ? 11.0 : 0.0;
        verdict.rest = verdict.bound + (verdict.upper ? -1.0 : 1.0) * span;
        verdict.uncertainty = 0.02 * span;
        verdict.time_s = 12.3 + 27.8 * i;
        cell.verdicts.push_back(verdict);
    }
    if (!cell.verdicts.empty()) {
        cell.verdicts[0].extreme = 456.1;
        cell.verdicts[0].margin = -1.9;
        cell.verdicts[0].uncertainty = 0.5;
        cell.verdicts[0].time_s = 151.0;
    }
    return cell;
}

std::vector<studies::Cell> sampleCells(const studies::Snapshot& snapshot) {
    using studies::CellState;
    const CellState states[] = {CellState::done,         CellState::done,     CellState::running,
                                CellState::outdated,     CellState::notRun,   CellState::waiting,
                                CellState::done,         CellState::cutShort, CellState::failed,
                                CellState::notApplicable};
    std::vector<studies::Cell> cells;
    int count = 0;
    for (int option = -1; option < snapshot.options(); ++option) {
        for (int study = 0; study < snapshot.studies(); ++study) {
            auto cell = doneCell(snapshot, option, study);
            cell.state = states[static_cast<std::size_t>(count) % std::size(states)];
            cell.progress = cell.state == CellState::running ? 0.45 : 1.0;
            if (cell.state != CellState::done && cell.state != CellState::cutShort) {
                cell.stored = nullptr;
                cell.verdicts.clear();
            }
            // Not every cell has the same worst limit.
            for (auto& verdict : cell.verdicts) {
                const bool first = verdict.limit == 0;
                if (first && count % 3 != 0) {
                    verdict.mark = count % 3 == 1 ? results::Mark::tight : results::Mark::held;
                    verdict.share = 0.05 + 0.02 * count;
                }
            }
            cells.push_back(std::move(cell));
            ++count;
        }
    }
    return cells;
}

} // namespace headroom::drawing::test
