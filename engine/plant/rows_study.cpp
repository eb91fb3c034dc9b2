// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/rows.h"

/// Rows of studies: start, events, class.
namespace headroom::plant::rows {

namespace {

constexpr double longestStudy_s = 1e6;

/// The name of one thing in a vector of references.
Access<RejectLoad, Reference> oneUnit() {
    return {[](RejectLoad& event, Reference unit) { event.units = {std::move(unit)}; },
            [](const RejectLoad& event) {
                return event.units.size() == 1 ? std::optional(event.units.front()) : std::nullopt;
            }};
}

Row<RejectLoad> severalUnits() {
    auto row = bound(FieldKind::references,
                     {"units", "Units", "Several units that lose their load together."},
                     access(&RejectLoad::units));
    row.field.collections = {Collection::units};
    return std::move(row).needed();
}

RowsOf<RejectLoad> rejectRows() {
    auto one =
        bound(FieldKind::reference, {"unit", "Unit", "The unit that loses its load."}, oneUnit());
    one.field.collections = {Collection::units};
    return {eitherOf<RejectLoad>({{std::move(one).needed()}, {severalUnits()}}, "Units",
                                 "One unit or several; left out: all.")
                .optional()};
}

template <class Kind>
Row<Kind> unitRow(std::string_view help) {
    return reference(&Kind::unit, {Collection::units}, {"unit", "Unit", help}).needed();
}

/// Seconds after the event against a value.
template <class Kind>
Row<Kind> overTime(Column value, Words words) {
    return table(&Kind::table,
                 {risingColumn("time_s", "Time", Quantity::time, 0, longestStudy_s), value}, words)
        .needed();
}

RowsOf<LoadOrder> loadRows() {
    return {
        unitRow<LoadOrder>("The unit that is given the order."),
        number(&LoadOrder::to_W, Quantity::power,
               {"to_MW", "To power",
                "Power at the end of the ramp; a unit off the grid joins it first."})
            .needed()
            .range(-5000, 5000),
        number(&LoadOrder::over_s, Quantity::time,
               {"over_s", "Over", "Duration of the ramp; 0 is a step."})
            .range(0, longestStudy_s)
            .usual(0, 600)
            .moves("lowest shaft level, lowest head"),
    };
}

RowsOf<Event> kindRows(Row<Event> row) {
    return {std::move(row).needed()};
}

std::vector<RowsOf<Event>> eventKinds() {
    return {
        kindRows(
            kind(&Event::kind, rejectRows(),
                 {"rejectLoad", "Load rejection", "Units lose their load and their gates close."})),
        kindRows(kind(&Event::kind, loadRows(),
                      {"load", "Load order", "A unit takes load or moves its set-point."})),
        kindRows(
            kind(&Event::kind,
                 RowsOf<GateStuck>{unitRow<GateStuck>("The unit whose gate stays where it is.")},
                 {"gateStuck", "Gate stuck", "The gate of a unit stays where it is from now on."})),
        kindRows(kind(
            &Event::kind,
            RowsOf<LossOfGeneration>{number(&LossOfGeneration::power_W, Quantity::power,
                                            {"power_MW", "Power lost",
                                             "Generation lost in the area; negative: load lost."})
                                         .needed()
                                         .range(-1e6, 1e6)},
            {"lossOfGeneration", "Loss of generation", "Another plant of the grid area is lost."})),
        kindRows(kind(
            &Event::kind,
            RowsOf<ImposedFrequency>{overTime<ImposedFrequency>(
                column("frequency_Hz", "Frequency", Quantity::frequency, 0, 200),
                {"frequency", "Frequency over time",
                 "Seconds after the event against the grid's frequency; the last value is held."})},
            {"imposedFrequency", "Imposed frequency", "The grid's frequency follows a table."})),
        kindRows(kind(
            &Event::kind,
            RowsOf<OpeningOrder>{
                unitRow<OpeningOrder>("The unit whose gate is moved."),
                overTime<OpeningOrder>(column("opening_pct", "Stroke", Quantity::percent, 0, 100),
                                       {"opening", "Opening over time",
                                        "Seconds after the event against the stroke of the gate; "
                                        "the last value is held."})},
            {"opening", "Opening order", "The gate of a unit follows a table."})),
        kindRows(kind(
            &Event::kind,
            RowsOf<FlowOrder>{
                unitRow<FlowOrder>("The unit of given discharge."),
                overTime<FlowOrder>(
                    column("flow_m3s", "Discharge", Quantity::discharge, -5000, 5000),
                    {"flow", "Discharge over time",
                     "Seconds after the event against the discharge; the last value is held."})},
            {"flow", "Discharge order", "The discharge of an ideal unit follows a table."})),
        kindRows(kind(
            &Event::kind,
            RowsOf<LevelOrder>{
                reference(&LevelOrder::reservoir, {Collection::reservoirs},
                          {"reservoir", "Reservoir", "The water whose level moves."})
                    .needed(),
                overTime<LevelOrder>(
                    column("level_m", "Level", Quantity::elevation, lowestLevel_m, highestLevel_m),
                    {"level", "Level over time",
                     "Seconds after the event against the level; the last value is held."})},
            {"level", "Level over time", "The level of a reservoir follows a table."})),
    };
}

/// The delay as a number, or with the range in which a search may move it.
Row<Event> delayRow() {
    const auto now = access(&Event::time, &EventTime::after_s);
    auto row =
        number(now, Quantity::time, {"after_s", "Delay", "Time from the other event to this one."})
            .needed()
            .range(0, longestStudy_s);
    auto search = bound(FieldKind::interval,
                        {"search", "Search range", "Range in which a search may move the delay."},
                        access(&Event::time, &EventTime::search_s));
    search.field.quantity = Quantity::time;
    row.field.fields =
        RowsOf<Event>{
            std::move(search).range(0, longestStudy_s).needed().uncounted(),
            number(now, Quantity::time,
                   {"now", "Delay now used", "Delay within that range that is used now."})
                .needed()
                .range(0, longestStudy_s),
        }
            .fields;
    return row;
}

Row<Event> ofRow() {
    auto row =
        bound(FieldKind::reference, {"of", "Counted from", "The event that the delay counts from."},
              access(&Event::time, &EventTime::of));
    row.field.collections = {Collection::events};
    return std::move(row).needed();
}

RowsOf<Event> eventRows() {
    return {
        eitherOf<Event>(
            {
                {number(access(&Event::time, &EventTime::at_s), Quantity::time,
                        {"at_s", "At", "Time of the event from the start of the study."})
                     .needed()
                     .range(0, longestStudy_s)},
                {delayRow(), ofRow()},
            },
            "Time", "The time of the event, or its delay after another one."),
        eitherOf<Event>(eventKinds(), "What happens", "The kind of event."),
    };
}

RowsOf<Start> startRows() {
    auto levels =
        numbers(&Start::level_m, Collection::reservoirs, Quantity::elevation,
                {"levels_m", "Levels", "Level of each reservoir; left out: its usual one."});
    levels = std::move(levels).range(lowestLevel_m, highestLevel_m);
    return {
        levels,
        numbers(&Start::output_W, Collection::units, Quantity::power,
                {"output_MW", "Output",
                 "Power of each unit at the terminals; left out: 0, on the grid."})
            .range(-5000, 5000),
        numbers(&Start::opening, Collection::units, Quantity::percent,
                {"opening_pct", "Opening", "Stroke of a unit's gate, instead of an output."})
            .range(0, 100),
        numbers(&Start::chamberLevel_m, Collection::chambers, Quantity::elevation,
                {"chamberLevels_m", "Chamber levels",
                 "Level of a chamber that does not start at rest, for checks."})
            .range(lowestLevel_m, highestLevel_m),
    };
}

} // namespace

RowsOf<Study> studyRows() {
    auto loadClass =
        choice(&Study::loadClass, loadClassKeys(),
               {"class", "Load class", "Class whose values the limits are judged by."});
    return {
        std::move(loadClass).needed().uncounted(),
        text(&Study::about, {"about", "About", "What the study shows, in words."}),
        group(&Study::start, startRows(),
              {"start", "Start", "The state of rest that the study starts from."}),
        keyed(&Study::events, Collection::events, eventRows(),
              {"events", "Events", "What happens, by names that later events can refer to."}),
        number(&Study::until_s, Quantity::time,
               {"until_s", "Until", "Simulated time at which the study ends."})
            .needed()
            .range(0.01, longestStudy_s),
    };
}

} // namespace headroom::plant::rows
