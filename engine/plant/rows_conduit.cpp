// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "plant/rows.h"

/// Rows of conduits and chambers.
namespace headroom::plant::rows {

namespace {

constexpr double smallestBore_m = 0.01, largestBore_m = 50.0;
constexpr double smallestArea_m2 = 1e-4, largestArea_m2 = 5000.0;

Access<Reach, double> bore() {
    return {[](Reach& reach, double diameter_m) {
                reach.diameter_m = diameter_m;
                reach.area_m2 = constants::pi / 4.0 * diameter_m * diameter_m;
                reach.hydraulicRadius_m = diameter_m / 4.0;
            },
            [](const Reach& reach) { return reach.diameter_m; }};
}

RowsOf<SteelWall> steelRows() {
    return {
        number(&SteelWall::thickness_m, Quantity::thickness,
               {"thickness_mm", "Thickness", "Thickness of the steel less corrosion."})
            .needed()
            .range(1, 200)
            .usual(6, 60)
            .moves("wave speed"),
        number(&SteelWall::modulus_Pa, Quantity::modulus,
               {"modulus_GPa", "Modulus", "Modulus of elasticity of the steel."})
            .range(1, 400)
            .usual(200, 210),
        number(&SteelWall::poisson, Quantity::factor,
               {"poisson", "Poisson's ratio", "Poisson's ratio of the steel."})
            .range(0, 0.49)
            .usual(0.27, 0.31),
        choice(&SteelWall::restraint, {"upstreamOnly", "throughout", "joints"},
               {"restraint", "Support",
                "How the pipe is held lengthwise: at its upper end only, throughout, or with "
                "expansion joints."}),
    };
}

RowsOf<RockWall> rockRows() {
    return {
        number(&RockWall::modulus_Pa, Quantity::modulus,
               {"modulus_GPa", "Modulus of the rock",
                "Modulus of elasticity of the rock mass around the tunnel."})
            .needed()
            .range(0.01, 200)
            .usual(3, 60)
            .moves("wave speed"),
        number(&RockWall::poisson, Quantity::factor,
               {"poisson", "Poisson's ratio of the rock", "Poisson's ratio of the rock mass."})
            .range(0, 0.49)
            .usual(0.15, 0.3),
    };
}

RowsOf<LinedRockWall> linedRockRows() {
    return {
        number(&LinedRockWall::thickness_m, Quantity::thickness,
               {"thickness_mm", "Thickness of the lining",
                "Thickness of the steel lining less corrosion."})
            .needed()
            .range(1, 200)
            .usual(8, 60)
            .moves("wave speed"),
        number(&LinedRockWall::modulus_Pa, Quantity::modulus,
               {"modulus_GPa", "Modulus of the lining", "Modulus of elasticity of the lining."})
            .range(1, 400)
            .usual(200, 210),
        number(&LinedRockWall::poisson, Quantity::factor,
               {"poisson", "Poisson's ratio of the lining", "Poisson's ratio of the lining."})
            .range(0, 0.49)
            .usual(0.27, 0.31),
        number(&LinedRockWall::rockModulus_Pa, Quantity::modulus,
               {"rockModulus_GPa", "Modulus of the rock",
                "Modulus of elasticity of the rock mass behind the lining."})
            .needed()
            .range(0.01, 200)
            .usual(3, 60),
        number(&LinedRockWall::rockPoisson, Quantity::factor,
               {"rockPoisson", "Poisson's ratio of the rock", "Poisson's ratio of the rock mass."})
            .range(0, 0.49)
            .usual(0.15, 0.3),
    };
}

Row<Reach> boreRow() {
    return eitherOf<Reach>(
        {
            {number(bore(), Quantity::diameter,
                    {"diameter_m", "Diameter", "Inner diameter of a round bore."})
                 .needed()
                 .range(smallestBore_m, largestBore_m)
                 .usual(0.5, 15)
                 .moves("velocity, losses, inertia")},
            {number(&Reach::area_m2, Quantity::area, {"area_m2", "Area", "Area of the bore."})
                 .needed()
                 .range(smallestArea_m2, largestArea_m2)
                 .usual(0.2, 200)
                 .moves("velocity, losses, inertia"),
             number(&Reach::hydraulicRadius_m, Quantity::length,
                    {"hydraulicRadius_m", "Hydraulic radius",
                     "Area of the bore over its wetted perimeter."})
                 .needed()
                 .range(smallestBore_m / 4, largestBore_m / 4)
                 .usual(0.1, 4)
                 .moves("losses")},
        },
        "Bore", "The bore as a diameter, or as area and hydraulic radius.");
}

Row<Reach> frictionRow() {
    return eitherOf<Reach>(
        {
            {number(access(&Reach::friction, &Strickler::number), Quantity::strickler,
                    {"strickler", "Strickler number",
                     "Friction by the Strickler number of the wall; smaller is rougher."})
                 .needed()
                 .range(5, 150)
                 .usual(25, 95,
                        "rough rock 25–35, shotcrete 40–50, concrete 70–90; common practice, no "
                        "source")
                 .moves("losses, shaft level")},
            {number(access(&Reach::friction, &Roughness::height_m), Quantity::roughness,
                    {"roughness_mm", "Roughness",
                     "Friction by the equivalent sand roughness of the wall."})
                 .needed()
                 .range(0, 2000)
                 .usual(0.01, 3, "steel 0.02–0.3, concrete 0.3–3; common practice, no source")
                 .moves("losses")},
            {number(access(&Reach::friction, &DarcyFactor::factor), Quantity::factor,
                    {"darcy", "Darcy factor", "Friction by a constant Darcy factor."})
                 .needed()
                 .range(0, 1)
                 .usual(0.007, 0.1)
                 .moves("losses")},
            {number(
                 access(&Reach::friction, &LinearFriction::rate_1s), Quantity::rate,
                 {"linear_1s", "Linear friction",
                  "Friction in proportion to the velocity, for comparison with closed solutions."})
                 .needed()
                 .range(0, 1000)},
        },
        "Friction", "The friction law with its number.");
}

Row<Reach> wallRow() {
    return eitherOf<Reach>(
        {
            {number(access(&Reach::wall, &GivenWaveSpeed::speed_mps), Quantity::velocity,
                    {"waveSpeed_mps", "Wave speed", "Speed of pressure waves in this reach."})
                 .needed()
                 .range(20, 1500)
                 .usual(900, 1450, "steel and rock without free gas; common practice, no source")
                 .moves("2L/a, Joukowsky rise")},
            {oneOf<Reach>(
                 {
                     kind(&Reach::wall, steelRows(), {"steel", "Steel pipe", "A free steel pipe."}),
                     kind(&Reach::wall, rockRows(),
                          {"rock", "Rock", "A tunnel in rock without steel."}),
                     kind(&Reach::wall, linedRockRows(),
                          {"linedRock", "Lined rock", "A steel lining backed by rock."}),
                 },
                 {"wall", "Wall", "What the wave speed follows from."})
                 .needed()},
        },
        "Wave speed", "The wave speed as a number, or from the wall.");
}

RowsOf<Reach> reachRows() {
    return {
        chainage(&Reach::to_m,
                 {"to_m", "To chainage",
                  "Chainage where the reach ends and the next begins; left out in the last one."}),
        boreRow(),
        frictionRow(),
        wallRow(),
        number(&Reach::gasShare, Quantity::factor,
               {"gasShare", "Free gas",
                "Share of free gas by volume at air pressure; lowers the wave speed."})
            .range(0, 0.1)
            .usual(0, 0.001)
            .moves("wave speed"),
    };
}

RowsOf<StationLoss> lossRows() {
    return {
        chainage(&StationLoss::chainage_m, {"chainage_m", "Chainage", "Where the loss stands."})
            .needed(),
        number(&StationLoss::coefficient, Quantity::factor,
               {"coefficient", "Loss coefficient",
                "Loss over the velocity head of the reach there, for flow from the conduit's "
                "beginning to its end."})
            .needed()
            .range(0, 1e6)
            .usual(0, 3)
            .moves("losses"),
        number(&StationLoss::reverse, Quantity::factor,
               {"reverse", "Loss coefficient in reverse",
                "The same for flow the other way; left out: equal."})
            .range(0, 1e6)
            .usual(0, 3),
    };
}

Access<ChamberShape, double> shaftDiameter() {
    return {[](ChamberShape& shape, double diameter_m) {
                shape.diameter_m = diameter_m;
                shape.areaByLevel.resize(2);
                const double area_m2 = constants::pi / 4.0 * diameter_m * diameter_m;
                shape.areaByLevel[0].second = area_m2;
                shape.areaByLevel[1].second = area_m2;
            },
            [](const ChamberShape& shape) { return shape.diameter_m; }};
}

Access<ChamberShape, double> shaftEnd(std::size_t end) {
    return {[end](ChamberShape& shape, double level_m) {
                shape.areaByLevel.resize(2);
                shape.areaByLevel[end].first = level_m;
            },
            [end](const ChamberShape& shape) -> std::optional<double> {
                return shape.diameter_m ? std::optional(shape.areaByLevel[end].first)
                                        : std::nullopt;
            }};
}

Access<ChamberShape, TableRows> areaTable() {
    return {[](ChamberShape& shape, TableRows table) { shape.areaByLevel = std::move(table); },
            [](const ChamberShape& shape) -> std::optional<TableRows> {
                return shape.diameter_m ? std::nullopt : std::optional(shape.areaByLevel);
            }};
}

RowsOf<ChamberShape> shapeRows() {
    return {eitherOf<ChamberShape>(
        {
            {number(shaftDiameter(), Quantity::diameter,
                    {"diameter_m", "Diameter", "Inner diameter of an upright round shaft."})
                 .needed()
                 .range(0.1, 200)
                 .usual(2, 40)
                 .moves("surge period, Thoma ratio"),
             number(shaftEnd(0), Quantity::elevation,
                    {"floor_m", "Floor", "Level at which the shaft is empty."})
                 .needed()
                 .range(lowestLevel_m, highestLevel_m)
                 .moves("lowest level"),
             number(shaftEnd(1), Quantity::elevation,
                    {"rim_m", "Rim", "Level at which the shaft overflows."})
                 .needed()
                 .range(lowestLevel_m, highestLevel_m)
                 .moves("highest level")},
            {table(
                 areaTable(),
                 {risingColumn("level_m", "Level", Quantity::elevation, lowestLevel_m,
                               highestLevel_m),
                  column("area_m2", "Area", Quantity::area, 0.01, 1e6)},
                 {"areaByLevel", "Area by level",
                  "Free surface over level, from the floor to the rim; straight between the rows."})
                 .needed()},
        },
        "Shape", "The chamber as an upright shaft, or as areas over level.")};
}

RowsOf<ChamberShape> throttleRows() {
    return shapeRows().with({
        number(&ChamberShape::lossIn_s2m5, Quantity::throttleLoss,
               {"lossIn_s2m5", "Loss into the chamber",
                "Head lost at the throttle over the square of the discharge into the chamber."})
            .needed()
            .range(0, 1e4)
            .moves("surge amplitude, head below the throttle"),
        number(&ChamberShape::lossOut_s2m5, Quantity::throttleLoss,
               {"lossOut_s2m5", "Loss out of the chamber",
                "Head lost at the throttle over the square of the discharge out of the chamber."})
            .needed()
            .range(0, 1e4)
            .moves("surge amplitude"),
    });
}

Row<Chamber> shapeKind(bool throttled, RowsOf<ChamberShape> inner, Words words) {
    return groupBy<Chamber, ChamberShape>(
        [throttled](Chamber& chamber) {
            chamber.shape = {};
            chamber.shape.throttled = throttled;
            return &chamber.shape;
        },
        [throttled](const Chamber& chamber) {
            return chamber.shape.throttled == throttled ? &chamber.shape : nullptr;
        },
        std::move(inner), words);
}

} // namespace

RowsOf<Conduit> conduitRows() {
    return {
        reference(
            &Conduit::from, {Collection::points},
            {"from", "From", "Point where the conduit begins, on the side of the upper reservoir."})
            .needed(),
        reference(&Conduit::to, {Collection::points}, {"to", "To", "Point where the conduit ends."})
            .needed(),
        table(&Conduit::axis,
              {risingColumn("chainage_m", "Chainage", Quantity::chainage, -longestChainage_m,
                            longestChainage_m),
               column("elevation_m", "Elevation", Quantity::elevation, lowestLevel_m,
                      highestLevel_m)},
              {"axis", "Inner corners",
               "Corners of the axis between the two ends: chainage and elevation."})
            .leastRows(0),
        number(&Conduit::length_m, Quantity::length,
               {"length_m", "Surveyed length",
                "Length along the axis as surveyed; left out: as drawn."})
            .range(0.01, longestChainage_m),
        choice(&Conduit::model, {"automatic", "elastic", "rigid"},
               {"model", "Water model",
                "Elastic with pressure waves, rigid as one moving mass, or as the step allows."}),
        keyed(
            &Conduit::reaches, Collection::none, reachRows(),
            {"reaches", "Reaches", "Lengths of equal bore and wall, in the order of the chainage."})
            .needed(),
        keyed(&Conduit::losses, Collection::none, lossRows(),
              {"losses", "Losses", "Losses at single places: intake, bends, branches, valves."}),
        number(
            &Conduit::enteringLoss, Quantity::factor,
            {"enteringLoss", "Entrance loss",
             "Loss coefficient at the beginning, where water enters from a reservoir or junction."})
            .range(0, 1e6)
            .usual(0, 1.5),
        number(&Conduit::leavingLoss, Quantity::factor,
               {"leavingLoss", "Exit loss",
                "Loss coefficient at the end, where water leaves into a reservoir or junction; 1 "
                "loses the whole velocity head."})
            .range(0, 1e6)
            .usual(0, 1.5),
    };
}

RowsOf<Chamber> chamberRows() {
    return {
        reference(&Chamber::at, {Collection::points},
                  {"at", "Place", "Point of the waterway that the chamber stands on."})
            .needed(),
        oneOf<Chamber>(
            {
                shapeKind(false, shapeRows(),
                          {"open", "Open chamber", "A chamber without a throttle."}),
                shapeKind(true, throttleRows(),
                          {"throttled", "Throttled chamber",
                           "A chamber behind an orifice or a narrow neck."}),
            },
            {"shape", "Shape", "The kind of chamber and its measures."})
            .needed(),
        number(&Chamber::velocityShare, Quantity::factor,
               {"velocityShare", "Share of the velocity head",
                "Share of the tunnel's velocity head that the chamber's level stands below; left "
                "out: 1."})
            .range(-1, 2)
            .usual(0, 1),
    };
}

} // namespace headroom::plant::rows
