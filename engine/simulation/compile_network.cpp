// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/compile_parts.h"
#include "simulation/messages.h"

#include <algorithm>
#include <cmath>
#include <numeric>

namespace headroom::simulation {
namespace {

/// Joins sets of nodes that one inertia or one unit connects.
class Sets {
public:
    explicit Sets(std::size_t count) : parent_(count) {
        std::iota(parent_.begin(), parent_.end(), 0);
    }
    int root(int item) {
        while (parent_[at(item)] != item) {
            item = parent_[at(item)] = parent_[at(parent_[at(item)])];
        }
        return item;
    }
    void join(int a, int b) { parent_[at(root(a))] = root(b); }

private:
    std::vector<int> parent_;
};

/// A loss at one place, `position` counted in cells, goes to the two cells whose middles lie on
/// either side, by the rule of the lever: so its place is kept to second order in the cell. Within
/// half a cell of an end it is all the last cell's.
void addLoss(std::vector<hydraulics::ElasticCell>& cells, const ConduitLoss& loss,
             double position) {
    const double last = static_cast<double>(cells.size()) - 1.0;
    const double middle = std::clamp(position - 0.5, 0.0, last);
    const double left = std::min(std::floor(middle), last - 1.0);
    const double share = middle - left; // of the right one
    const auto put = [&](double cell, double part) {
        auto& target = cells[static_cast<std::size_t>(cell)];
        target.forwardLoss_s2m5 += part * loss.forward_s2m5;
        target.reverseLoss_s2m5 += part * loss.reverse_s2m5;
    };
    put(left, 1.0 - share);
    put(left + 1.0, share);
}

/// The cells of a conduit, equal in travel time. A cell carries the inertia it covers, so the
/// inertia of the whole is exact; friction is that of the pieces it covers.
std::vector<hydraulics::ElasticCell> cellsOf(const ConduitGeometry& geometry, int count,
                                             double step, double gravity) {
    std::vector<hydraulics::ElasticCell> cells(at(count));
    const double cellTime = geometry.travelTime_s() / count;
    std::vector<double> inertia(at(count), 0.0);
    double time = 0.0;
    for (const ConduitPiece& piece : geometry.pieces) {
        const double pieceTime = piece.length_m / piece.waveSpeed_mps;
        const double until = time + pieceTime;
        constexpr double sliver = 1e-9; // of a cell; rounding, not a piece
        int first = static_cast<int>(std::floor(time / cellTime + sliver));
        for (int i = first; i < count && i * cellTime < until - sliver * cellTime; ++i) {
            const bool whole = i * cellTime >= time - sliver * cellTime
                               && (i + 1) * cellTime <= until + sliver * cellTime;
            const double share =
                whole ? cellTime
                      : std::min(until, (i + 1) * cellTime) - std::max(time, i * cellTime);
            const double length = share * piece.waveSpeed_mps;
            inertia[at(i)] += length / (gravity * piece.area_m2);
            cells[at(i)].friction.push_back({piece.friction, length});
        }
        time = until;
    }
    for (int i = 0; i < count; ++i) {
        cells[at(i)].impedance_sm2 = inertia[at(i)] / step;
    }
    for (const ConduitLoss& loss : geometry.losses) {
        addLoss(cells, loss, geometry.travelTimeTo_s(loss.at_m) / cellTime);
    }
    return cells;
}

void addBranches(Model& model) {
    const auto add = [&](BranchKind kind, int conduit, int from, int to) {
        model.branches.push_back({kind, conduit, from, to, -1, -1});
        return static_cast<int>(model.branches.size()) - 1;
    };
    for (int i = 0; i < static_cast<int>(model.conduits.size()); ++i) {
        const ConduitRow& conduit = model.conduits[at(i)];
        if (conduit.kind == ConduitKind::elastic) {
            model.startBranch.push_back(add(BranchKind::elasticStart, i, conduit.from, -1));
            model.endBranch.push_back(add(BranchKind::elasticEnd, i, -1, conduit.to));
        } else {
            const int branch = add(BranchKind::rigid, i, conduit.from, conduit.to);
            model.startBranch.push_back(branch);
            model.endBranch.push_back(branch);
        }
    }
}

void setHeadEnds(Model& model) {
    for (int i = 0; i < static_cast<int>(model.conduits.size()); ++i) {
        const ConduitRow& conduit = model.conduits[at(i)];
        if (Node& from = model.nodes[at(conduit.from)]; from.headEnd < 0) {
            from.headEnd = 2 * i;
        }
    }
    for (int i = static_cast<int>(model.conduits.size()) - 1; i >= 0; --i) {
        model.nodes[at(model.conduits[at(i)].to)].headEnd = 2 * i + 1; // arriving goes before
    }
}

} // namespace

double ConduitRow::quadratic_s2m5(double flow) const {
    double sum = 0.0;
    for (const ConduitPiece& piece : geometry.pieces) {
        sum += piece.friction.quadratic_s2m6(flow) * piece.length_m;
    }
    return sum;
}

double ConduitRow::restLoss_m(double flow) const {
    double sum = 0.0;
    for (const ConduitPiece& piece : geometry.pieces) {
        sum += piece.friction.lossPerMetre(flow) * piece.length_m;
    }
    const double singular =
        flow >= 0.0 ? forward_s2m5 + geometry.from.leaving_s2m5 + geometry.to.arriving_s2m5
                    : reverse_s2m5 + geometry.from.arriving_s2m5 + geometry.to.leaving_s2m5;
    return sum + singular * flow * std::fabs(flow);
}

double ConduitRow::restSlope_sm2(double flow) const {
    double sum = 0.0;
    for (const ConduitPiece& piece : geometry.pieces) {
        sum += piece.friction.slope_sm3(flow) * piece.length_m;
    }
    const double singular =
        flow >= 0.0 ? forward_s2m5 + geometry.from.leaving_s2m5 + geometry.to.arriving_s2m5
                    : reverse_s2m5 + geometry.from.arriving_s2m5 + geometry.to.leaving_s2m5;
    return sum + 2.0 * singular * std::fabs(flow);
}

void fillNodes(Model& model, const plant::Plant& plant, Findings& findings) {
    for (int i = 0; i < plant.points.size(); ++i) {
        Node node;
        node.index = i;
        node.elevation_m = plant.points[i].elevation_m;
        model.pointNode_.push_back(i);
        model.nodes.push_back(node);
        model.nodePath.push_back("plant/points/" + plant.points.name(i));
    }
    for (int i = 0; i < plant.reservoirs.size(); ++i) {
        const std::string path = "plant/reservoirs/" + plant.reservoirs.name(i);
        model.reservoirPath.push_back(path);
        const plant::Reference& place = plant.reservoirs[i].at;
        if (!place.resolved()) {
            Node node;
            node.thing = results::Thing::reservoir;
            node.index = i;
            node.reservoir = i;
            node.elevation_m = plant.reservoirs[i].level_m;
            model.reservoirNode_.push_back(static_cast<int>(model.nodes.size()));
            model.nodes.push_back(node);
            model.nodePath.push_back(path);
            continue;
        }
        Node& node = model.nodes[at(place.index)];
        if (node.known()) {
            findings.push_back({&twoReservoirs, path, {}, {}, {}, {}, {}});
        }
        node.reservoir = i;
        model.reservoirNode_.push_back(place.index);
    }
}

void fillConduits(Model& model, const plant::Plant& plant, Findings& findings) {
    for (int i = 0; i < plant.conduits.size(); ++i) {
        model.conduitPath.push_back("plant/conduits/" + plant.conduits.name(i));
        ConduitRow row;
        row.from = plant.conduits[i].from.index;
        row.to = plant.conduits[i].to.index;
        const ConduitEnds ends{model.nodes[at(row.from)].known(), model.nodes[at(row.to)].known()};
        row.geometry = conduitGeometry(plant, i, model.medium, ends, findings);
        if (row.geometry.pieces.empty() || !(row.geometry.length_m > 0.0)) {
            findings.push_back(
                {&conduitWithoutLength, model.conduitPath.back(), {}, {}, {}, {}, {}});
            model.conduits.push_back(row);
            continue;
        }
        row.inertia_s2m2 = row.geometry.inertia_s2m2(model.medium.gravity_mps2);
        row.fromArea_m2 = row.geometry.pieces.front().area_m2;
        row.toArea_m2 = row.geometry.pieces.back().area_m2;
        for (const ConduitLoss& loss : row.geometry.losses) {
            row.forward_s2m5 += loss.forward_s2m5;
            row.reverse_s2m5 += loss.reverse_s2m5;
        }
        for (const ConduitPiece& piece : row.geometry.pieces) {
            row.linear_sm2 += piece.friction.linear_sm3() * piece.length_m;
        }
        model.conduits.push_back(std::move(row));
    }
    setHeadEnds(model);
}

void cutConduits(Model& model, const StepChoice& choice) {
    const int refinement = std::max(1, model.settings.refinement);
    std::vector<hydraulics::ElasticConduit> elastic;
    for (std::size_t i = 0; i < model.conduits.size(); ++i) {
        ConduitRow& conduit = model.conduits[i];
        conduit.kind = choice.kinds[i];
        if (conduit.kind == ConduitKind::elastic) {
            conduit.cells = choice.cells[i] * refinement;
            conduit.row = static_cast<int>(elastic.size());
            elastic.push_back({cellsOf(conduit.geometry, conduit.cells, model.grid.step_s,
                                       model.medium.gravity_mps2)});
        } else if (conduit.kind == ConduitKind::shortElement) {
            const double half = 0.5 * conduit.geometry.storage_m2(model.medium.gravity_mps2);
            model.nodes[at(conduit.from)].storage_m2 += half;
            model.nodes[at(conduit.to)].storage_m2 += half;
        }
    }
    model.rows = hydraulics::ElasticRows(elastic, model.grid.step_s);
    addBranches(model);
}

void fillChambers(Model& model, const plant::Plant& plant, Findings& findings) {
    for (int i = 0; i < plant.chambers.size(); ++i) {
        const plant::Chamber& chamber = plant.chambers[i];
        const std::string path = "plant/chambers/" + plant.chambers.name(i);
        model.chamberPath.push_back(path);
        const int node = model.pointNode(chamber.at.index);
        if (model.nodes[at(node)].known()) {
            findings.push_back({&chamberAtReservoir, path, {}, {}, {}, {}, {}});
            continue;
        }
        auto table = hydraulics::ChamberTable::make(chamber.shape.areaByLevel, path);
        findings.insert(findings.end(), table.findings().begin(), table.findings().end());
        if (!table) {
            continue;
        }
        ChamberRow row{node, -1, *table, {}, -1, 0.0};
        if (chamber.shape.throttled) {
            row.throttle = {chamber.shape.lossIn_s2m5, chamber.shape.lossOut_s2m5};
        }
        if (const int end = model.nodes[at(node)].headEnd; end >= 0 && model.medium.velocityHeads) {
            const ConduitRow& tunnel = model.conduits[at(end / 2)];
            const double area = model.startEnd(end) ? tunnel.fromArea_m2 : tunnel.toArea_m2;
            row.tunnelEnd = end;
            row.velocityShare_s2m5 = chamber.velocityShare.value_or(1.0)
                                     / (2.0 * model.medium.gravity_mps2 * area * area);
        }
        model.chambers.push_back(std::move(row));
    }
}

namespace {

/// Gives every unknown node that a branch or a unit touches its cluster and its slot there.
void placeNodes(Model& model, Sets& sets) {
    std::vector<bool> used(model.nodes.size(), false);
    for (const BranchRow& branch : model.branches) {
        for (const int node : {branch.from, branch.to}) {
            if (node >= 0) {
                used[at(node)] = true;
            }
        }
    }
    for (const UnitRow& unit : model.units) {
        used[at(unit.inlet)] = used[at(unit.outlet)] = true;
    }
    std::vector<int> clusterOf(model.nodes.size(), -1);
    for (int i = 0; i < static_cast<int>(model.nodes.size()); ++i) {
        Node& node = model.nodes[at(i)];
        if (node.known() || !used[at(i)]) {
            continue;
        }
        int& cluster = clusterOf[at(sets.root(i))];
        if (cluster < 0) {
            cluster = static_cast<int>(model.clusters.size());
            model.clusters.emplace_back();
        }
        node.cluster = cluster;
        node.slot = static_cast<int>(model.clusters[at(cluster)].nodes.size());
        model.clusters[at(cluster)].nodes.push_back(i);
    }
}

/// Puts branches and units into the cluster of an unknown node they touch; what lies between known
/// heads goes into the first one.
void placeBranches(Model& model) {
    const auto slotOf = [&](int node) { return node >= 0 ? model.nodes[at(node)].slot : -1; };
    const auto clusterAt = [&](int a, int b) {
        for (const int node : {a, b}) {
            if (node >= 0 && !model.nodes[at(node)].known()) {
                return model.nodes[at(node)].cluster;
            }
        }
        return 0;
    };
    for (int i = 0; i < static_cast<int>(model.branches.size()); ++i) {
        BranchRow& branch = model.branches[at(i)];
        branch.fromSlot = slotOf(branch.from);
        branch.toSlot = slotOf(branch.to);
        model.clusters[at(clusterAt(branch.from, branch.to))].branches.push_back(i);
    }
    for (int i = 0; i < static_cast<int>(model.units.size()); ++i) {
        UnitRow& unit = model.units[at(i)];
        unit.inletSlot = slotOf(unit.inlet);
        unit.outletSlot = slotOf(unit.outlet);
        model.clusters[at(clusterAt(unit.inlet, unit.outlet))].units.push_back(i);
    }
}

} // namespace

void fillClusters(Model& model, Findings& findings) {
    Sets sets(model.nodes.size());
    const auto join = [&](int a, int b) {
        if (!model.nodes[at(a)].known() && !model.nodes[at(b)].known()) {
            sets.join(a, b);
        }
    };
    for (const BranchRow& branch : model.branches) {
        if (branch.kind == BranchKind::rigid) {
            join(branch.from, branch.to);
        }
    }
    for (const UnitRow& unit : model.units) {
        join(unit.inlet, unit.outlet);
    }
    model.clusters.emplace_back(); // everything between known heads
    placeNodes(model, sets);
    placeBranches(model);
    for (int i = 0; i < static_cast<int>(model.chambers.size()); ++i) {
        ChamberRow& chamber = model.chambers[at(i)];
        const Node& node = model.nodes[at(chamber.node)];
        if (node.cluster < 0) {
            findings.push_back({.message = &chamberAlone, .subject = model.chamberPath[at(i)]});
            continue;
        }
        chamber.slot = node.slot;
        model.clusters[at(node.cluster)].chambers.push_back(i);
    }
}

} // namespace headroom::simulation
