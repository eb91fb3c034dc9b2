// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "hydraulics/friction.h"
#include "plant/plant.h"

#include <string>
#include <vector>

/// A conduit as the solver needs it: pieces of one bore, wall and friction law along its axis.
namespace headroom::simulation {

/// What a conduit's friction and walls need to know about the water.
struct Medium {
    double gravity_mps2 = 9.81;
    double density_kgm3 = 1000.0;
    double bulkModulus_Pa = 2.1e9;
    double viscosity_m2s = 1.3e-6;
    double vapourPressure_Pa = 1228.0;
    double airPressure_Pa = 101325.0;
    double temperature_degC = 10.0;
    bool velocityHeads = true;

    /// Gauge pressure head at which water boils [m], negative.
    double vapourHead_m() const {
        return (vapourPressure_Pa - airPressure_Pa) / (density_kgm3 * gravity_mps2);
    }
};
/// Water of the site; the finding says what is out of range.
Medium mediumOf(const plant::Site& site, Findings& findings);

/// Wave speed of a reach, given or from its wall, with free gas at air pressure.
double wallSpeed_mps(const plant::Reach& reach, const Medium& medium, const std::string& subject,
                     Findings& findings);

struct ConduitPiece {
    double from_m = 0.0; ///< along the axis
    double length_m = 0.0;
    double area_m2 = 0.0;
    double waveSpeed_mps = 0.0;
    hydraulics::FrictionLaw friction;
};

struct ConduitLoss {
    double at_m = 0.0; ///< along the axis
    double forward_s2m5 = 0.0, reverse_s2m5 = 0.0;
};

/// Between a node's energy level and the piezometric head of a conduit's end, times Q².
struct EndLoss {
    double leaving_s2m5 = 0.0;  ///< node to conduit: H_node − h
    double arriving_s2m5 = 0.0; ///< conduit to node: h − H_node; may be negative
};

struct ConduitGeometry {
    double length_m = 0.0;
    std::vector<ConduitPiece> pieces;
    std::vector<ConduitLoss> losses;
    EndLoss from, to;
    std::vector<double> along_m, chainage_m, elevation_m; ///< corners of the axis

    double travelTime_s() const;               ///< ΣL/a
    double travelTimeTo_s(double along) const; ///< from the start to a place along the axis
    double inertia_s2m2(double gravity) const; ///< ΣL/(gA)
    double storage_m2(double gravity) const;   ///< ΣgAL/a²
    double chainageAt(double along) const;
    double elevationAt(double along) const;
    double alongAt(double chainage) const;
    double area_m2(double along) const;
    double waveSpeed_mps() const { return length_m / travelTime_s(); }
};

/// What the ends of a conduit lead into, for the default losses there.
struct ConduitEnds {
    bool fromReservoir = false, toReservoir = false;
};
ConduitGeometry conduitGeometry(const plant::Plant& plant, int conduit, const Medium& medium,
                                const ConduitEnds& ends, Findings& findings);

} // namespace headroom::simulation
