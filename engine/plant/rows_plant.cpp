// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "plant/rows.h"

namespace headroom::plant::rows {

namespace {

RowsOf<Point> pointRows() {
    return {
        chainage(&Point::chainage_m, {"chainage_m", "Chainage",
                                      "Distance along the waterway in plan, growing from the upper "
                                      "reservoir to the tailwater."})
            .needed(),
        elevation(&Point::elevation_m,
                  {"elevation_m", "Axis elevation",
                   "Elevation of the conduit's axis at this point above the datum."})
            .needed(),
    };
}

RowsOf<Reservoir> reservoirRows() {
    return {
        reference(&Reservoir::at, {Collection::points},
                  {"at", "Place",
                   "Point where the waterway begins or ends in this water; a tailwater may leave "
                   "it out and stands at the units that discharge into it."}),
        elevation(&Reservoir::level_m, {"level_m", "Level", "Water level when a study gives none."})
            .needed()
            .moves("gross head"),
        elevation(&Reservoir::lowest_m,
                  {"lowest_m", "Lowest level",
                   "Lowest level in operation; levels of studies are compared with it."}),
        elevation(&Reservoir::highest_m,
                  {"highest_m", "Highest level",
                   "Highest level in operation; levels of studies are compared with it."}),
    };
}

RowsOf<OtherReserve> otherReserveRows() {
    return {
        number(&OtherReserve::droop, Quantity::percent,
               {"droop_pct", "Droop of the others",
                "Fall of frequency, in per cent of nominal, for which the other plants give all "
                "their reserve."})
            .range(0.1, 100)
            .usual(2, 12),
        number(
            &OtherReserve::power_W, Quantity::power,
            {"power_MW", "Reserve of the others", "Power that the other plants can add at most."})
            .needed()
            .range(0, 1e6),
        number(&OtherReserve::lag_s, Quantity::time,
               {"lag_s", "Lag of the others", "Time constant with which the other plants follow."})
            .range(0.01, 600)
            .usual(1, 30),
        number(
            &OtherReserve::deadBand_Hz, Quantity::frequency,
            {"deadBand_Hz", "Dead band of the others",
             "Deviation of frequency, to either side, below which the other plants do not answer."})
            .range(0, 2)
            .usual(0, 0.05),
    };
}

RowsOf<GridArea> areaRows() {
    return {
        number(&GridArea::nominal_Hz, Quantity::frequency,
               {"nominal_Hz", "Nominal frequency", "Frequency of the grid at rest."})
            .range(10, 100)
            .usual(50, 60, "50 Hz and 60 Hz grids; common practice, no source"),
        number(&GridArea::storedEnergy_J, Quantity::energy,
               {"storedEnergy_GWs", "Stored energy",
                "Kinetic energy of all machines of the area but this plant's own units."})
            .needed()
            .range(1e-6, 1e5)
            .moves("rate of change of frequency"),
        number(&GridArea::loadDamping_1Hz, Quantity::loadDamping,
               {"loadDamping_pctHz", "Load damping",
                "Fall of the load in per cent when the frequency falls by 1 Hz."})
            .range(0, 20)
            .usual(0, 4),
        number(&GridArea::load_W, Quantity::load,
               {"load_GW", "Load", "Load of the area at nominal frequency."})
            .needed()
            .range(1e-6, 1e4),
        group(
            &GridArea::otherReserve, otherReserveRows(),
            {"otherReserve", "Other reserve",
             "What the other plants of the area do when the frequency moves; left out: nothing."}),
    };
}

RowsOf<ImposedGrid> imposedRows() {
    return {
        number(&ImposedGrid::nominal_Hz, Quantity::frequency,
               {"nominal_Hz", "Nominal frequency",
                "Frequency of the grid unless a study's table moves it."})
            .range(10, 100)
            .usual(50, 60, "50 Hz and 60 Hz grids; common practice, no source"),
    };
}

} // namespace

RowsOf<Site> siteRows() {
    return {
        text(&Site::datum,
             {"datum", "Datum", "Name of the height system of all elevations and levels."}),
        number(&Site::gravity_mps2, Quantity::gravity,
               {"gravity_mps2", "Gravity", "Acceleration of gravity at the plant."})
            .range(9.7, 9.9)
            .usual(9.76, 9.84,
                   "sea level to high mountains, all latitudes; common practice, no source"),
        number(&Site::waterTemperature_degC, Quantity::temperature,
               {"waterTemperature_degC", "Water temperature",
                "Sets density, viscosity, compressibility and vapour pressure of the water."})
            .range(0, 60)
            .usual(2, 25),
        number(&Site::airPressure_Pa, Quantity::pressure,
               {"airPressure_kPa", "Air pressure", "Absolute pressure of the air at the plant."})
            .range(40, 110)
            .usual(60, 105),
        number(&Site::density_kgm3, Quantity::density,
               {"density_kgm3", "Water density",
                "Given instead of the density that follows from the temperature, for example for "
                "silt-laden water."})
            .range(900, 1300)
            .usual(995, 1010),
        truth(
            &Site::velocityHeads,
            {"velocityHeads", "Velocity heads",
             "False leaves all kinetic terms out, to compare with hand calculations that do so."}),
    };
}

RowsOf<Source> sourceRows() {
    return {
        text(&Source::document,
             {"document", "Document", "Drawing, letter or report that the numbers come from."}),
        text(&Source::revision, {"revision", "Revision", "Revision or date of that document."}),
        text(&Source::author, {"author", "Author", "Who answers for the numbers."}),
        text(&Source::confidence,
             {"confidence", "Confidence", "How far the numbers can be trusted, in words."}),
    };
}

RowsOf<Location> alongConduitRows() {
    const Access<Location, double> along{[](Location& location, double chainage_m) {
                                             location.chainage_m = chainage_m;
                                             location.alongConduit = true;
                                         },
                                         [](const Location& location) {
                                             return location.alongConduit
                                                        ? std::optional(location.chainage_m)
                                                        : std::nullopt;
                                         }};
    return {
        reference(&Location::thing, {Collection::conduits},
                  {"conduit", "Conduit", "Conduit that the place lies on."})
            .needed(),
        number(along, Quantity::chainage,
               {"chainage_m", "Chainage", "Chainage of the place, within the conduit."})
            .needed()
            .range(-longestChainage_m, longestChainage_m),
    };
}

RowsOf<Plant> plantRows() {
    return {
        keyed(&Plant::points, Collection::points, pointRows(),
              {"points", "Points",
               "Places of the waterway, each declared once; conduits run between them."}),
        keyed(&Plant::reservoirs, Collection::reservoirs, reservoirRows(),
              {"reservoirs", "Reservoirs",
               "Waters whose level does not follow from the run: upper reservoir, tailwater."}),
        keyed(&Plant::conduits, Collection::conduits, conduitRows(),
              {"conduits", "Conduits", "Tunnels and pipes, each from one point to the next."}),
        keyed(&Plant::chambers, Collection::chambers, chamberRows(),
              {"chambers", "Chambers", "Surge shafts and chambers with a free water surface."}),
        keyed(&Plant::units, Collection::units, unitRows(),
              {"units", "Units", "Turbines with shaft, generator, servo and governor."}),
        oneOf<Plant>(
            {
                kind(&Plant::grid, areaRows(),
                     {"area", "Grid area",
                      "An area whose frequency follows from the balance of power."}),
                kind(&Plant::grid, imposedRows(),
                     {"imposed", "Imposed frequency",
                      "A grid so strong that its frequency is given."}),
            },
            {"grid", "Grid",
             "What the units deliver to; left out: imposed nominal frequency of 50 Hz."}),
    };
}

} // namespace headroom::plant::rows
