// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "hydraulics/elastic_sweep.h"
#include "hydraulics/friction.h"

#include <cstddef>
#include <span>
#include <string>
#include <string_view>
#include <vector>

/// Pressure waves in all elastic conduits of a plant: characteristics at Courant number 1 over
/// contiguous arrays. Derivation, order and proofs: resources/theory/waterway.md, section "Waves".
///
/// A conduit is a row of N cells of equal travel time Δt between N + 1 nodes, node 0 at its start.
/// Flow is positive from start to end, head is piezometric. In a cell with impedance B and steady
/// loss φ(Q) the two numbers that travel are
///
///     right-going, leaving node i into cell i:      F = H + B Q − φ/2
///     left-going, leaving node i into cell i − 1:   G = H − B Q + φ/2
///
/// and a step is: c₊ = F of the left neighbour, c₋ = G of the right one, and at the node
/// c₊ − H' = B Q' + φ'/2 on the left, H' − c₋ = B Q' + φ'/2 on the right. So friction is the
/// trapezoid along each characteristic (order 2), propagation is exact, and a discrete rest is
/// stationary and has the loss Σφ whatever the number of cells. Cost: README of the bench.
namespace headroom::hydraulics {

/// A stretch of one friction law inside a cell.
struct CellFriction {
    FrictionLaw law;
    double length_m = 0.0; ///< > 0
};

/// One cell. Neighbours with equal constants are swept in the vector loop; where constants change
/// the node between them is solved one by one, so give equal cells exactly equal numbers.
struct ElasticCell {
    double impedance_sm2 = 0.0; ///< B = a/(g A), head per discharge, > 0
    std::vector<CellFriction> friction;
    double forwardLoss_s2m5 = 0.0; ///< singular losses inside the cell for Q > 0, ≥ 0
    double reverseLoss_s2m5 = 0.0; ///< for Q < 0, ≥ 0
};

struct ElasticConduit {
    std::vector<ElasticCell> cells; ///< at least 2
};

/// `count` equal cells of one reach.
ElasticConduit uniformConduit(int count, const ElasticCell& cell);

/// What an end node knows of its conduit at the new time. With Q positive from start to end:
///     at the conduit's end:    arriving − H = linear·Q + quadratic·Q|Q|
///     at the conduit's start:  H − arriving = linear·Q + quadratic·Q|Q|
/// quadratic is `forward` where the left side is ≥ 0, else `reverse`.
struct EndLaw {
    double arriving_m = 0.0;
    double linear_sm2 = 0.0;
    double forward_s2m5 = 0.0;
    double reverse_s2m5 = 0.0;
};

/// The moving numbers of all rows; one per run. Made by `ElasticRows::state`.
class ElasticState {
public:
    /// Piezometric head [m] and discharge [m³/s] at every node; see `ElasticRows::nodes`.
    std::span<const double> head_m() const { return head_; }
    std::span<const double> flow_m3s() const { return flow_; }

private:
    friend class ElasticRows;
    double expectedFlow(std::size_t node) const { return 2.0 * flow_[node] - lastFlow_[node]; }

    std::vector<double> right_, left_, nextRight_, nextLeft_;
    std::vector<double> head_, flow_, lastFlow_; // lastFlow_: one step ago, then the next
    std::vector<double> curvature_;              // r/b² at nodes swept in the vector loop
    std::vector<EndLaw> ends_;                   // start and end of each conduit
    struct Solved {                              // a node between cells that differ
        double head, flow, right, left;
    };
    std::vector<Solved> solved_;
};

/// The rows of one plant: constant, shared between runs. A step is
/// `sweep`, then for each conduit both ends solved from `startLaw`/`endLaw` and handed back by
/// `setStart`/`setEnd`, then `advance`.
class ElasticRows {
public:
    ElasticRows() = default;
    /// Fewer than two cells, impedance or length not positive, a loss below zero: caller's fault.
    ElasticRows(const std::vector<ElasticConduit>& conduits, double step_s);

    std::size_t conduits() const { return rows_.size(); }
    std::size_t cells(std::size_t conduit) const { return rows_[conduit].cells; }
    double step_s() const { return step_; }
    /// Index of node 0 of a conduit in the arrays of a state; node i is that plus i.
    std::size_t firstNode(std::size_t conduit) const { return rows_[conduit].firstNode; }
    /// Length of the arrays; entries that belong to no conduit stay 0.
    std::size_t nodes() const { return nodes_; }

    /// Everything at head 0 and flow 0.
    ElasticState state() const;
    /// Fills a conduit with its rest: head at the start [m] and discharge. Returns the head at the
    /// end, which is the one at the start less `restLoss`.
    double setRest(ElasticState& state, std::size_t conduit, double startHead_m,
                   double flow_m3s) const;
    /// Fills a conduit with any heads [m] and discharges at its cells + 1 nodes, as if the flows
    /// had been the same one step ago.
    void setProfile(ElasticState& state, std::size_t conduit, std::span<const double> head_m,
                    std::span<const double> flow_m3s) const;
    /// Head loss from start to end at rest [m] and its derivative by the discharge [s/m²].
    double restLoss_m(std::size_t conduit, double flow_m3s) const;
    double restLossSlope_sm2(std::size_t conduit, double flow_m3s) const;

    /// Computes all inner nodes at the new time and the laws of the ends.
    void sweep(ElasticState& state, InstructionSet set) const;
    const EndLaw& startLaw(const ElasticState& state, std::size_t conduit) const;
    const EndLaw& endLaw(const ElasticState& state, std::size_t conduit) const;
    void setStart(ElasticState& state, std::size_t conduit, double head_m, double flow_m3s) const;
    void setEnd(ElasticState& state, std::size_t conduit, double head_m, double flow_m3s) const;
    /// What is prescribed at an end jumps at the present instant, after `setStart`/`setEnd`: the
    /// arriving wave stays, so the head jumps by ±B times the discharge, without friction.
    double startImpedance_sm2(std::size_t conduit) const { return firstCell(conduit).impedance; }
    double endImpedance_sm2(std::size_t conduit) const { return lastCell(conduit).impedance; }
    void jumpStart(ElasticState& state, std::size_t conduit, double head_m, double flow_m3s) const;
    void jumpEnd(ElasticState& state, std::size_t conduit, double head_m, double flow_m3s) const;
    /// The new time becomes the present one.
    void advance(ElasticState& state) const;

    /// Water stored above head 0 by elasticity [m³]: its change in a step is exactly
    /// ½Δt(Q + Q') at the start less the same at the end (to rounding).
    double storedVolume_m3(const ElasticState& state, std::size_t conduit) const;
    /// Its derivative by a head that is the same everywhere [m²].
    double storage_m2(std::size_t conduit) const;

    /// Widens the envelope by the present heads; arrays of `nodes()` entries.
    void widen(const ElasticState& state, std::span<double> lowest_m, std::span<double> highest_m,
               InstructionSet set) const;

private:
    struct VariableLoss { // part of a cell that follows Colebrook–White
        FrictionLaw law;
        double length_m;
    };
    struct Cell {
        double impedance, linear, quadratic; // constant parts over the whole cell
        double forward, reverse;             // singular losses
        std::vector<VariableLoss> variable;

        double quadraticAt(double flow_m3s) const;
        double loss(double flow_m3s) const;
        double lossSlope(double flow_m3s) const;
        bool sameAs(const Cell& other) const;
    };
    struct Row {
        std::size_t firstNode, cells;
        std::vector<std::size_t> cell; // index into cells_ of each cell
    };
    struct Interface { // a node between cells that differ or hold singular losses
        std::size_t node, leftCell, rightCell;
    };
    struct VariableRun { // nodes begin … end − 1 between equal Colebrook–White cells
        std::size_t begin, end, cell;
        double scale; // cell's curvature per unit of quadratic loss
    };

    std::size_t addCell(const ElasticCell& cell);
    void addRow(const ElasticConduit& conduit);
    void addRun(std::size_t node, std::size_t cell);
    void refreshFriction(ElasticState& state) const;
    void findEndLaws(ElasticState& state) const;
    void solveInterfaces(ElasticState& state) const;
    void storeInterfaces(ElasticState& state) const;
    static EndLaw lawAt(double arriving_m, const Cell& cell, double expected_m3s);
    const Cell& firstCell(std::size_t conduit) const;
    const Cell& lastCell(std::size_t conduit) const;

    double step_ = 0.0;
    std::size_t nodes_ = 0;
    std::vector<Cell> cells_; // each distinct neighbour once
    std::vector<Row> rows_;
    std::vector<Interface> interfaces_;
    std::vector<VariableRun> runs_;
    std::vector<double> share_;       // linear part of the loss: k/(2B + k) at each node
    std::vector<double> conductance_; // 1/(2B)
    std::vector<double> curvature_;   // r/(2B + k)², constant friction
};

} // namespace headroom::hydraulics
