// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "control/load_control.h"
#include "control/pid_governor.h"
#include "control/servo.h"
#include "grid/area.h"
#include "grid/rotor.h"
#include "hydraulics/chamber.h"
#include "hydraulics/elastic_row.h"
#include "machines/francis_chart.h"
#include "machines/ideal_units.h"
#include "numerics/time_grid.h"
#include "results/run.h"
#include "simulation/conduit_geometry.h"
#include "simulation/run.h"
#include "simulation/schedule.h"
#include "simulation/step_choice.h"

#include <memory>
#include <optional>
#include <string>
#include <variant>
#include <vector>

/// The compiled plant: arrays and indices. Const and shared between runs; what moves is in
/// `State`.
namespace headroom::simulation {

/// Position of a counted thing in its array.
inline std::size_t at(int index) {
    return static_cast<std::size_t>(index);
}

/// A place with one energy level: a declared point, or a reservoir that stands at no point.
struct Node {
    results::Thing thing = results::Thing::point;
    int index = -1; ///< in its collection
    double elevation_m = 0.0;
    int reservoir = -1;      ///< ≥ 0: its level is the node's head
    double storage_m2 = 0.0; ///< elastic storage of short elements, per head
    int cluster = -1;        ///< of an unknown node
    int slot = -1;           ///< position in its cluster
    int headEnd = -1;        ///< the conduit end whose piezometric head is the point's, or -1
    bool known() const { return reservoir >= 0; }
};

/// One end of a conduit; ends 2c and 2c + 1 are the start and the end of conduit c.
struct ConduitRow {
    ConduitGeometry geometry;
    ConduitKind kind = ConduitKind::elastic;
    int from = -1, to = -1; ///< nodes
    int row = -1;           ///< in the elastic rows
    int cells = 0;
    double inertia_s2m2 = 0.0;
    double fromArea_m2 = 0.0, toArea_m2 = 0.0;
    double forward_s2m5 = 0.0, reverse_s2m5 = 0.0; ///< singular losses at stations
    double linear_sm2 = 0.0;                       ///< linear friction of the whole conduit

    /// Quadratic coefficient of friction of the whole conduit at this flow [s²/m⁵].
    double quadratic_s2m5(double flow) const;
    /// All losses between the nodes at rest [m], ends included, and the slope [s/m²].
    double restLoss_m(double flow) const;
    double restSlope_sm2(double flow) const;
};

struct ChamberRow {
    int node = -1, slot = -1;
    hydraulics::ChamberTable table;
    hydraulics::Throttle throttle;
    int tunnelEnd = -1;              ///< conduit end whose velocity head it does not see, or -1
    double velocityShare_s2m5 = 0.0; ///< χ/(2gA²) of that end
};

enum class UnitKind { francis, orifice, flow, power };

struct UnitRow {
    UnitKind kind = UnitKind::flow;
    int inlet = -1, outlet = -1; ///< nodes
    int inletSlot = -1, outletSlot = -1;
    double centreline_m = 0.0;
    double inertia_s2m2 = 0.0; ///< spiral and draft tube
    double draftInertia_s2m2 = 0.0;
    double exitLoss_s2m5 = 0.0; ///< of the draft tube's outlet into a reservoir
    double recovery_s2m5 =
        0.0; ///< velocity head at the runner outlet less that at the draft tube's
    double headScale_m = 1.0, flowScale_m3s = 1.0; ///< rated
    double speedScale_rads = 0.0;                  ///< rated; 0: nothing turns
    double powerScale_W = 1.0;                     ///< rated shaft power
    double inertia_kgm2 = 0.0;                     ///< 0: the speed follows the grid
    double generatorEfficiency = 1.0;
    double electricalScale = 1.0; ///< rated apparent power over rated shaft power
    std::shared_ptr<const machines::FrancisChart> chart;
    machines::OrificeUnit orifice;
    grid::RotorSpec rotor;
    std::optional<control::ServoSpec> servo;
    std::shared_ptr<const control::PidGovernor> governor; ///< cloned for each run
    control::LoadControlSpec loadControl;
    std::optional<double> overspeed_pu;
    double overspeedDelay_s = 0.0;
    std::optional<double> output_W, opening; ///< asked at rest
    double openingLimit = 1.0;
    double restFlow_m3s = 0.0; ///< of a `flow` unit
    double power_W = 0.0;      ///< of a `power` unit

    double torqueScale_Nm() const { return powerScale_W / speedScale_rads; }
    bool turns() const { return speedScale_rads > 0.0; }
    bool freeShaft() const { return turns() && inertia_kgm2 > 0.0; }
    /// T_a on rated shaft power [s].
    double accelerationTime_s() const {
        return inertia_kgm2 * speedScale_rads * speedScale_rads / powerScale_W;
    }
    double relativeOpening(double stroke) const {
        return chart != nullptr ? chart->gate().relativeOpening(stroke) : stroke;
    }
};

/// A connected set of unknown nodes between elastic conduits, with every branch that touches it.
struct Cluster {
    std::vector<int> nodes;
    std::vector<int> branches; ///< of `Model::branches`
    std::vector<int> chambers;
    std::vector<int> units;
};

enum class BranchKind { elasticStart, elasticEnd, rigid };

/// A branch with a closed-form law; flow positive from `from` to `to` (-1: the row of cells).
struct BranchRow {
    BranchKind kind = BranchKind::rigid;
    int conduit = -1;
    int from = -1, to = -1;
    int fromSlot = -1, toSlot = -1; ///< of unknown nodes in their cluster
};

class Model {
public:
    Medium medium;
    Settings settings;
    numerics::TimeGrid grid;
    std::int64_t recordEvery = 1, lineEvery = 1;
    hydraulics::InstructionSet instructions = hydraulics::InstructionSet::baseline;

    std::vector<Node> nodes;
    std::vector<ConduitRow> conduits;
    hydraulics::ElasticRows rows;
    std::vector<BranchRow> branches;
    std::vector<int> startBranch, endBranch; ///< by conduit; the same one where rigid
    std::vector<ChamberRow> chambers;
    std::vector<UnitRow> units;
    std::vector<Cluster> clusters;

    std::vector<double> reservoirLevel_m;              ///< at rest
    std::vector<std::optional<double>> chamberStart_m; ///< offset start
    std::optional<grid::AreaSpec> area;
    double nominal_Hz = 50.0;
    Schedule schedule;
    double headScale_m = 1.0, flowScale_m3s = 1.0; ///< for tolerances
    double duration_s = 0.0;
    results::Resolution resolution;

    // For messages: paths by position.
    std::vector<std::string> nodePath, conduitPath, chamberPath, unitPath, reservoirPath;

    bool startEnd(int end) const { return end % 2 == 0; }
    int pointNode(int point) const { return pointNode_[static_cast<std::size_t>(point)]; }
    std::vector<int> pointNode_, reservoirNode_;
};

} // namespace headroom::simulation
