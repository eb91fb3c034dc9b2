// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/keyed.h"
#include "plant/reference.h"

#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

/// What the user describes, as plain SI values. A reader fills these from the value tree by
/// walking the field tables (`plant/fields.h`); nothing else writes them.
namespace headroom::plant {

using Rows = std::vector<std::pair<double, double>>; ///< a table of two columns, SI

struct Source {
    std::string document, revision, author, confidence;
    bool given() const { return !document.empty() || !author.empty(); }
};

struct Site {
    std::string datum;
    double gravity_mps2 = 9.81;
    double waterTemperature_degC = 10.0;
    double airPressure_Pa = 101325.0;
    std::optional<double> density_kgm3; ///< else from the temperature
    bool velocityHeads = true;          ///< false drops all kinetic terms
};

struct Point {
    double chainage_m = 0.0;
    double elevation_m = 0.0; ///< of the axis
};

struct Reservoir {
    Reference at; ///< point; a reservoir without one is placed at the units that use it
    double level_m = 0.0;
    std::optional<double> lowest_m, highest_m;
};

// --- conduits ---------------------------------------------------------------------------------

struct Roughness {
    double height_m = 0.0;
}; ///< Colebrook–White
struct Strickler {
    double number = 0.0;
}; ///< m^(1/3)/s
struct DarcyFactor {
    double factor = 0.0;
}; ///< constant Darcy friction factor
struct LinearFriction {
    double rate_1s = 0.0;
}; ///< loss of dV/dt = -R V
using Friction = std::variant<Roughness, Strickler, DarcyFactor, LinearFriction>;

enum class Restraint { upstreamOnly, throughout, joints };
struct SteelWall {
    double thickness_m = 0.0, modulus_Pa = 206e9, poisson = 0.3;
    Restraint restraint = Restraint::throughout;
};
struct RockWall {
    double modulus_Pa = 0.0, poisson = 0.2;
};
struct LinedRockWall {
    double thickness_m = 0.0, modulus_Pa = 206e9, poisson = 0.3;
    double rockModulus_Pa = 0.0, rockPoisson = 0.2;
};
struct GivenWaveSpeed {
    double speed_mps = 0.0;
};
using Wall = std::variant<GivenWaveSpeed, SteelWall, RockWall, LinedRockWall>;

struct Reach {
    std::optional<double> to_m; ///< chainage where it ends; absent: the conduit's end
    double area_m2 = 0.0;
    double hydraulicRadius_m = 0.0;
    std::optional<double> diameter_m; ///< when given as a circle
    Friction friction;
    Wall wall;
    double gasShare = 0.0; ///< free gas by volume at air pressure
};

struct StationLoss {
    double chainage_m = 0.0;
    double coefficient = 0.0;      ///< of v²/2g of the reach there, from → to
    std::optional<double> reverse; ///< to → from; absent: the same
};

enum class ConduitModel { automatic, elastic, rigid };

struct Conduit {
    Reference from, to;                          ///< points
    std::vector<std::pair<double, double>> axis; ///< inner corners: chainage, elevation
    std::optional<double> length_m;              ///< surveyed; else along the axis
    ConduitModel model = ConduitModel::automatic;
    Keyed<Reach> reaches;
    Keyed<StationLoss> losses;
    std::optional<double> enteringLoss, leavingLoss; ///< ζ at the ends, physics section 0
};

// --- chambers ---------------------------------------------------------------------------------

struct ChamberShape {
    Rows areaByLevel;                 ///< (level, area), at least two rows, levels rising
    std::optional<double> diameter_m; ///< when given as an upright shaft
    double lossIn_s2m5 = 0.0;         ///< 0 for an open chamber
    double lossOut_s2m5 = 0.0;
    bool throttled = false;
    double floor_m() const { return areaByLevel.front().first; }
    double rim_m() const { return areaByLevel.back().first; }
};

struct Chamber {
    Reference at; ///< point
    ChamberShape shape;
    std::optional<double> velocityShare; ///< χ of the tunnel's v²/2g, 1 by default
};

// --- units ------------------------------------------------------------------------------------

struct Passage {
    double length_m = 0.0, area_m2 = 0.0;
};

struct FrancisTurbine {
    double ratedHead_m = 0, ratedFlow_m3s = 0, ratedSpeed_rads = 0, ratedPower_W = 0;
    std::optional<double> runnerDiameter_m;
    std::optional<double> runaway_pu, noLoadFlow_pu, standstillFlow_pu;
    std::optional<double> bestPower_pu, bestEfficiency_pu, halfPowerEfficiency_pu;
    Rows flowByStroke; ///< (stroke, flow), shares of one; empty: straight
    std::optional<double> speedUncertainty_pu, headUncertainty_m; ///< of the synthetic chart
};
struct OrificeUnit { ///< Q = τ Q_r √(H/H_r), constant efficiency
    double ratedHead_m = 0, ratedFlow_m3s = 0, efficiency = 1.0;
    std::optional<double> ratedSpeed_rads;
};
struct FlowUnit {
    double flow_m3s = 0;
}; ///< discharge over time by studies
struct PowerUnit {
    double power_W = 0;
}; ///< constant hydraulic power ρ g Q H
using Turbine = std::variant<FrancisTurbine, OrificeUnit, FlowUnit, PowerUnit>;

struct Generator {
    double rated_VA = 0, powerFactor = 0.9, efficiency = 0.985;
};
struct Synchronous {
    bool locked = false;           ///< speed is the grid's frequency, no rotor angle
    double synchronising_pu = 1.5; ///< torque per rad on generator rating
    double damping_pu = 20.0;      ///< torque per unit slip on generator rating
};
using Drive = std::variant<Synchronous>;

struct Servo {
    double opening_s = 0;                   ///< full stroke
    std::optional<double> closing_s;        ///< full stroke, one rate
    Rows closingStages;                     ///< (down to stroke, full-stroke time there)
    double cushionBelow = 0, cushion_s = 0; ///< last part of the stroke: time for it
    double deadTime_s = 0, lag_s = 0.1;
};

struct PidGains {
    double kp = 0, ki_1s = 0, kd_s = 0;
};
struct PidGovernor {
    double droop = 0.04; ///< share of frequency for full opening or power
    bool droopOnPower = false;
    PidGains gains;
    std::optional<PidGains> noLoad; ///< off the grid
    double derivativeFilter_s = 0.05;
    double deadBand_Hz = 0.0;
    std::optional<double> sampleTime_s; ///< absent: continuous
    std::optional<double> openingLimit; ///< share of stroke
};
using Governor = std::variant<PidGovernor>;

struct Interlocks {
    std::optional<double> reloadNotBefore_s; ///< after a trip
    double synchroniseWithin_pu = 0.005;     ///< of rated speed
    double synchroniseHold_s = 1.0;
};
struct Protection {
    std::optional<double> overspeed_pu; ///< trips the unit
    double overspeedDelay_s = 0.0;
};

struct Unit {
    Reference from;                     ///< point: its inlet
    Reference to;                       ///< reservoir or point
    std::optional<double> centreline_m; ///< else the inlet point's elevation
    std::optional<Passage> spiral, draftTube;
    Turbine turbine;
    std::optional<double> inertia_kgm2;
    std::optional<Generator> generator;
    Drive drive;
    std::optional<Servo> servo;
    std::optional<Governor> governor;
    Interlocks interlocks;
    Protection protection;
};

// --- grid -------------------------------------------------------------------------------------

struct OtherReserve {
    double droop = 0.04, power_W = 0, lag_s = 5.0, deadBand_Hz = 0.0;
};
struct GridArea {
    double nominal_Hz = 50.0;
    double storedEnergy_J = 0;  ///< of everything but this plant's own units
    double loadDamping_1Hz = 0; ///< share of load per Hz
    double load_W = 0;
    std::optional<OtherReserve> otherReserve;
};
struct ImposedGrid {
    double nominal_Hz = 50.0;
}; ///< frequency constant unless a study's table moves it
using Grid = std::variant<GridArea, ImposedGrid>;

struct Plant {
    Keyed<Point> points;
    Keyed<Reservoir> reservoirs;
    Keyed<Conduit> conduits;
    Keyed<Chamber> chambers;
    Keyed<Unit> units;
    Grid grid = ImposedGrid{};
};

} // namespace headroom::plant
