// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/measure.h"

#include "base/ensure.h"

#include <array>

namespace headroom {

namespace {

// clang-format off
constexpr std::array rows{
    MeasureInfo{Measure::level, "level", "Water level", Quantity::elevation,
        "Free surface above the datum, from the volume of water held."},
    MeasureInfo{Measure::head, "head", "Piezometric head", Quantity::elevation,
        "Level to which the water would rise in a standpipe at this point, above the datum."},
    MeasureInfo{Measure::pressureHead, "pressureHead", "Pressure head", Quantity::head,
        "Piezometric head less the elevation of the axis there; gauge, negative below air pressure."},
    MeasureInfo{Measure::discharge, "discharge", "Discharge", Quantity::discharge,
        "Positive from the upper reservoir towards the tailwater, and into a chamber."},
    MeasureInfo{Measure::velocity, "velocity", "Velocity", Quantity::velocity,
        "Discharge over the area of the bore, positive towards the tailwater."},
    MeasureInfo{Measure::speed, "speed", "Speed", Quantity::speedRatio,
        "Speed of rotation over rated speed, positive in the turbine sense."},
    MeasureInfo{Measure::opening, "opening", "Gate", Quantity::percent,
        "Stroke of the servo, 0 closed to 100 % open."},
    MeasureInfo{Measure::openingRate, "openingRate", "Gate rate", Quantity::rate,
        "Strokes per second, opening positive."},
    MeasureInfo{Measure::shaftPower, "shaftPower", "Shaft power", Quantity::power,
        "Hydraulic torque times speed, positive as turbine."},
    MeasureInfo{Measure::terminalPower, "terminalPower", "Generator power", Quantity::power,
        "At the generator's terminals, positive when delivered."},
    MeasureInfo{Measure::gridPower, "gridPower", "Grid power", Quantity::power,
        "Delivered to the grid, positive when delivered."},
    MeasureInfo{Measure::netHead, "netHead", "Net head", Quantity::head,
        "Energy head at the spiral inlet less that at the draft-tube outlet."},
    MeasureInfo{Measure::draftPressureHead, "draftPressureHead", "Draft-tube pressure head", Quantity::head,
        "Gauge pressure head at the runner outlet, negative below air pressure."},
    MeasureInfo{Measure::frequency, "frequency", "Grid frequency", Quantity::frequency,
        "Frequency of the grid area."},
    MeasureInfo{Measure::frequencyRate, "frequencyRate", "Rate of frequency", Quantity::frequencyRate,
        "Rate of change of the grid's frequency, rising positive."},
    MeasureInfo{Measure::pressureRate, "pressureRate", "Rate of pressure", Quantity::pressureRate,
        "Rate of change of the piezometric head, rising positive."},
    MeasureInfo{Measure::openingTravel, "openingTravel", "Gate travel", Quantity::factor,
        "Way of the servo added up without regard to direction, in full strokes."},
};
// clang-format on

} // namespace

std::span<const MeasureInfo> measures() {
    return rows;
}

const MeasureInfo& info(Measure measure) {
    const auto& row = rows.at(static_cast<std::size_t>(measure));
    ensure(row.measure == measure, "the rows of measures are in the order of the list");
    return row;
}

} // namespace headroom
