// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "hydraulics/branch.h"

#include <cstddef>
#include <span>
#include <string>
#include <utility>
#include <vector>

/// Surge chambers: a table of area over level, its exact volume, and the branch that a chamber is
/// in a node cluster. Derivation: resources/theory/surge.md, section "Chambers".
namespace headroom::hydraulics {

/// Water surface at a stored volume.
struct WaterSurface {
    double level_m = 0.0;
    double area_m2 = 0.0;
};

/// Area over level in straight lines between rows; two rows at one level make a step.
/// The chamber carries its volume above the floor [m³]; the level follows exactly from it.
/// Below the floor and above the rim the end areas continue upright, so that the volume balance
/// stays exact; being there is an event that the caller asks for by `belowFloor`/`aboveRim`.
class ChamberTable {
public:
    /// Rows (level [m], area [m²]), levels not falling. Refuses, all at once: fewer than two rows,
    /// values that are not finite, an area that is not positive, levels that fall, three rows at
    /// one level, a rim that is not above the floor.
    static Result<ChamberTable> make(std::span<const std::pair<double, double>> rows,
                                     const std::string& subject = {});

    double floor_m() const { return level_.front(); }
    double rim_m() const { return level_.back(); }
    double capacity_m3() const { return volume_.back(); } ///< floor to rim
    double area_m2(double level_m) const;                 ///< the upper one at a step
    double volume_m3(double level_m) const; ///< exact integral from the floor; negative below it
    double level_m(double volume_m3) const { return surface(volume_m3).level_m; }
    WaterSurface surface(double volume_m3) const; ///< exact inverse, with the area there
    bool belowFloor(double volume_m3) const { return volume_m3 < 0.0; }
    bool aboveRim(double volume_m3) const { return volume_m3 > capacity_m3(); }

private:
    ChamberTable() = default;
    std::vector<double> level_, area_, volume_; // volume_[i]: floor to level_[i]
};

/// Head loss between the node and the chamber's water, each ≥ 0 [s²/m⁵]; 0 for an open chamber.
struct Throttle {
    double in_s2m5 = 0.0;  ///< for Q > 0, into the chamber
    double out_s2m5 = 0.0; ///< for Q < 0
};

/// The chamber in a step Δt: V' = V + ½Δt(Q + Q') and H' = z(V') + K Q'|Q'|, with z taken along
/// its tangent at the volume reached with the flow `about`. So H' − base = linear·Q' + K Q'|Q'|.
struct ChamberBranch {
    double base_m = 0.0;     ///< H' at Q' = 0 on the tangent
    double linear_sm2 = 0.0; ///< Δt/(2F)
    Throttle throttle;

    /// Flow into the chamber at the node's head; slope dQ'/dH'.
    BranchFlow<double> flow(double head_m) const {
        const double w = head_m - base_m;
        return solveBranch(linear_sm2, w < 0.0 ? throttle.out_s2m5 : throttle.in_s2m5, w);
    }
};

struct ChamberStep {
    double volume_m3 = 0.0; ///< V
    double flow_m3s = 0.0;  ///< Q, into the chamber
    double about_m3s = 0.0; ///< expected Q'; Q itself, or the last iterate
    double step_s = 0.0;    ///< Δt > 0
};
ChamberBranch chamberBranch(const ChamberTable& table, const Throttle& throttle,
                            const ChamberStep& step);

} // namespace headroom::hydraulics
