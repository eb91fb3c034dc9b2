// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

/// What can be wrong with a project, whatever file it came from.
namespace headroom::plant {

/// Every template of this floor.
std::span<const Message* const> messages();

namespace say {

// --- keys and values ----------------------------------------------------------------------------

inline constexpr Message missing{"plant.missing", Severity::error,
                                 "“{key}” ({label}) is missing here.", "Add it: {help}"};
inline constexpr Message missingForm{"plant.missing-form", Severity::error,
                                     "The {label} is missing here.", "Give one of: {keys}."};
inline constexpr Message mistyped{"plant.mistyped", Severity::error,
                                  "“{key}” holds {found}, but {wanted} is expected.",
                                  "Write {wanted}."};
inline constexpr Message unknownKey{"plant.unknown-key", Severity::error,
                                    "The key “{key}” is not known here.",
                                    "Keys known here: {keys}. Keys of your own begin with x-."};
inline constexpr Message unknownKeyNear{
    "plant.unknown-key-near", Severity::error, "The key “{key}” is not known here.",
    "The nearest known one is “{near}”. Keys of your own begin with x-."};
inline constexpr Message unknownChoice{"plant.unknown-choice", Severity::error,
                                       "“{key}” says “{found}”, which is none of its choices.",
                                       "Write one of: {keys}."};
inline constexpr Message outOfRange{
    "plant.out-of-range", Severity::error,
    "“{key}” ({label}) is {value}; it lies between {low} and {high}.",
    "Give a value within this range, in the unit of the key."};
inline constexpr Message notWhole{"plant.not-whole", Severity::error,
                                  "“{key}” is {value}, but a whole number is expected.",
                                  "Write a whole number."};
inline constexpr Message unusual{"plant.unusual", Severity::warning,
                                 "{label} is {value}; usual are {low} to {high} ({source}).",
                                 "Check the value and its unit."};
inline constexpr Message nullValue{
    "plant.null", Severity::error,
    "“{key}” is null; null has a meaning only inside the changes of an option.",
    "Remove the key, or give it a value."};
inline constexpr Message intervalReversed{"plant.interval-reversed", Severity::error,
                                          "“{key}” runs from {low} to {high}.",
                                          "Give the lower end first, then a greater upper end."};
inline constexpr Message nowOutsideSearch{
    "plant.now-outside-search", Severity::error,
    "The delay now used, {value}, lies outside its search range {low} to {high}.",
    "Widen the range or change the delay."};

// --- kinds --------------------------------------------------------------------------------------

inline constexpr Message noKind{"plant.no-kind", Severity::error, "“{key}” ({label}) says no kind.",
                                "Give exactly one of: {keys}."};
inline constexpr Message twoKinds{
    "plant.two-kinds", Severity::error,
    "“{first}” and “{second}” stand side by side, but only one can hold ({label}).",
    "Keep exactly one of them."};
inline constexpr Message forgottenNull{
    "plant.forgotten-null", Severity::error,
    "The option adds “{second}”, but “{first}” of the base is still there ({label}).",
    "Add the line \"{first}\": null beside “{second}” in the option."};

// --- names --------------------------------------------------------------------------------------

inline constexpr Message nameEmpty{"plant.name-empty", Severity::error, "A name here is empty.",
                                   "Give the thing a name of 1 to {longest} letters."};
inline constexpr Message nameTooLong{"plant.name-too-long", Severity::error,
                                     "This name has {length} letters.",
                                     "Use at most {longest} letters."};
inline constexpr Message nameNotPrintable{
    "plant.name-not-printable", Severity::error,
    "This name holds a character that cannot be printed.",
    "Use printable characters only, without line breaks and tabs."};
inline constexpr Message nameBlanks{"plant.name-blanks", Severity::error,
                                    "The name “{name}” begins or ends with a blank.",
                                    "Remove the outer blanks."};
inline constexpr Message nameTwice{
    "plant.name-twice", Severity::error,
    "The name “{name}” is given to two things: {first} and {second}.",
    "Give one of them another name; names are unique over the plant."};
inline constexpr Message nameDiffersInCase{
    "plant.name-differs-in-case", Severity::error,
    "The names “{name}” and “{other}” differ only in capital letters.",
    "Give one of the two things another name."};
inline constexpr Message nameTaken{"plant.name-taken", Severity::error,
                                   "The name “{name}” is already used by {other}.",
                                   "Choose a name that nothing else has."};
inline constexpr Message nothingToRename{"plant.nothing-to-rename", Severity::error,
                                         "There is nothing of this name that could be renamed.",
                                         "Choose a thing of the project."};

// --- references ---------------------------------------------------------------------------------

inline constexpr Message undeclared{"plant.undeclared", Severity::error,
                                    "“{key}” names “{name}”, which is not declared.",
                                    "Declare it among {collections}, or name one of: {known}."};
inline constexpr Message undeclaredNear{"plant.undeclared-near", Severity::error,
                                        "“{key}” names “{name}”, which is not declared.",
                                        "The nearest declared name is “{near}”."};
inline constexpr Message wrongCollection{
    "plant.wrong-collection", Severity::error,
    "“{key}” names “{name}”, which is one of the {found}; here one of the {wanted} is expected.",
    "Name one of the {wanted}."};
inline constexpr Message lackingHere{"plant.lacking-here", Severity::error,
                                     "“{name}” does not exist in this option.",
                                     "Judge the other options, or add “{name}” to this one."};
inline constexpr Message removedButUsed{
    "plant.removed-but-used", Severity::error,
    "The option removes “{name}”, but it is still used by: {users}.",
    "Remove or change these as well, or keep “{name}”."};

// --- tables -------------------------------------------------------------------------------------

inline constexpr Message tableRow{"plant.table-row", Severity::error,
                                  "Row {row} of this table is not a row of {columns} numbers.",
                                  "Write each row as [{names}]."};
inline constexpr Message tableTooShort{"plant.table-too-short", Severity::error,
                                       "This table has {rows} rows.", "Give at least {least}."};
inline constexpr Message tableTooLong{
    "plant.table-too-long", Severity::error, "This table has more than {longest} rows in line.",
    "Put it in a CSV beside the file and name that file under “csv” instead."};
inline constexpr Message tableOrder{"plant.table-order", Severity::error,
                                    "Row {row} of this table has {label} {value} after {before}; "
                                    "each row must {rule} than the one before.",
                                    "Put the rows in order and remove repetitions."};
inline constexpr Message tableRange{
    "plant.table-range", Severity::error,
    "Row {row} of this table has {label} {value}; it lies between {low} and {high}.",
    "Check the value and its unit."};
inline constexpr Message tableNotLoaded{"plant.table-not-loaded", Severity::error,
                                        "The table “{file}” has not been read.",
                                        "Save the project and open it again from its folder."};

// --- geometry and network -----------------------------------------------------------------------

inline constexpr Message noLength{"plant.no-length", Severity::error,
                                  "This conduit runs from chainage {from} to {to}.",
                                  "Let its end lie at a greater chainage than its beginning."};
inline constexpr Message cornerOutside{
    "plant.corner-outside", Severity::error,
    "The inner corner at chainage {value} lies outside the conduit, {from} to {to}.",
    "Move the corner, or one of the two end points."};
inline constexpr Message lengthDiffers{
    "plant.length-differs", Severity::warning,
    "The surveyed length is {surveyed}, but the drawn axis measures {drawn}.",
    "Check the corners; the surveyed length is used."};
inline constexpr Message lengthTooShort{"plant.length-too-short", Severity::error,
                                        "The surveyed length is {surveyed}, shorter than the "
                                        "straight line between the ends, {straight}.",
                                        "Check the length and the two points."};
inline constexpr Message noReach{"plant.no-reach", Severity::error, "This conduit has no reach.",
                                 "Add one under “reaches” with bore, friction and wave speed."};
inline constexpr Message reachEnd{
    "plant.reach-end", Severity::error,
    "The reach “{name}” ends at chainage {value}; it must lie after {from} and not beyond {to}.",
    "Move its end, or put the reaches in order."};
inline constexpr Message reachOpen{
    "plant.reach-open", Severity::error,
    "The reach “{name}” does not say where it ends, and another one follows.",
    "Add “to_m” to it; only the last reach may leave it out."};
inline constexpr Message reachesShort{
    "plant.reaches-short", Severity::error,
    "The last reach ends at chainage {value}, before the conduit's end at {to}.",
    "Remove “to_m” from the last reach, or add another one."};
inline constexpr Message placeOutside{
    "plant.place-outside", Severity::error,
    "Chainage {value} lies outside the conduit “{name}”, {from} to {to}.",
    "Give a chainage within the conduit."};
inline constexpr Message floorAboveRim{"plant.floor-above-rim", Severity::error,
                                       "The chamber's floor lies at {floor} and its rim at {rim}.",
                                       "Let the rim lie above the floor."};
inline constexpr Message floorBelowAxis{
    "plant.floor-below-axis", Severity::warning,
    "The chamber's floor at {floor} lies below the axis of the waterway at {axis}.",
    "Check both; below the axis the chamber cannot empty."};
inline constexpr Message levelBelowIntake{
    "plant.level-below-intake", Severity::error,
    "The level {level} lies below the axis of the waterway at the intake, {axis}.",
    "Raise the level or correct the point's elevation."};
inline constexpr Message levelOutside{
    "plant.level-outside", Severity::error,
    "The level {level} lies outside the range of operation, {low} to {high}.",
    "Change the level, or the lowest or highest one."};
inline constexpr Message startOutside{
    "plant.start-outside", Severity::warning,
    "The study starts with “{name}” at {level}, outside the range of operation, {low} to {high}.",
    "Check the level; the study runs with it."};
inline constexpr Message chamberOutside{
    "plant.chamber-outside", Severity::error,
    "The study starts with “{name}” at {level}, outside the chamber, {low} to {high}.",
    "Give a level between floor and rim."};
inline constexpr Message notOnConduit{"plant.not-on-conduit", Severity::error,
                                      "The point “{name}” is not an end of any conduit.",
                                      "Name a point where a conduit begins or ends."};
inline constexpr Message unitNotConnected{
    "plant.unit-not-connected", Severity::error,
    "No water reaches this unit: its {side} “{name}” is on no conduit and no reservoir.",
    "Let a conduit end at this point, or name another one."};
inline constexpr Message disconnected{"plant.disconnected", Severity::error,
                                      "These things hang together but on no reservoir: {names}.",
                                      "Connect them to a reservoir, or remove them."};
inline constexpr Message unusedPoint{"plant.unused-point", Severity::note,
                                     "No conduit, reservoir, chamber or unit uses this point.", ""};
inline constexpr Message unusedReservoir{"plant.unused-reservoir", Severity::note,
                                         "No conduit and no unit uses this water.", ""};
inline constexpr Message emptyPlant{"plant.empty", Severity::warning,
                                    "The plant has no reservoir and no conduit.",
                                    "Add points, a reservoir and a conduit."};

// --- units --------------------------------------------------------------------------------------

inline constexpr Message inertiaIsGd2{
    "plant.inertia-is-gd2", Severity::warning,
    "J = {value} is about four times the usual value of {trend} for {rating} at {speed}.",
    "Was GD² entered? Then J is a quarter of it, {quarter}."};
inline constexpr Message inertiaUnusual{
    "plant.inertia-unusual", Severity::warning,
    "J = {value}; usual for {rating} at {speed} is about {trend}.",
    "Check the moment of inertia; J is a quarter of GD²."};
inline constexpr Message turningNeeds{"plant.turning-needs", Severity::error,
                                      "A turbine that turns needs “{key}” ({label}).",
                                      "Add “{key}” to this unit."};
inline constexpr Message stageNotToClosed{"plant.stage-not-to-closed", Severity::error,
                                          "The closing stages end at {value} of the stroke.",
                                          "Let the last row go down to 0."};
inline constexpr Message powerNotRated{
    "plant.power-not-rated", Severity::error,
    "The rated power {power} is more than the water of the rated point holds, {water}.",
    "Check rated head, flow and power."};

// --- studies ------------------------------------------------------------------------------------

inline constexpr Message eventCircle{"plant.event-circle", Severity::error,
                                     "The time of this event depends on itself: {names}.",
                                     "Let one of these events have a time of its own."};
inline constexpr Message eventAfterEnd{
    "plant.event-after-end", Severity::error,
    "This event happens at {value}, after the study has ended at {until}.",
    "Let the study run longer, or the event happen earlier."};
inline constexpr Message outputTwice{"plant.output-twice", Severity::error,
                                     "The unit “{name}” starts with an output and an opening.",
                                     "Give one of the two."};
inline constexpr Message wrongEvent{"plant.wrong-event", Severity::error,
                                    "This event does not fit: {why}",
                                    "Change the event, or the thing that it names."};

// --- limits -------------------------------------------------------------------------------------

inline constexpr Message limitWithoutValue{
    "plant.limit-without-value", Severity::error, "This limit has no value.",
    "Give it a least or a greatest value for at least one class."};
inline constexpr Message leastAboveGreatest{
    "plant.least-above-greatest", Severity::error,
    "For the class “{class}” the least value {least} lies above the greatest {greatest}.",
    "Exchange the two, or correct one."};
inline constexpr Message classOrder{
    "plant.class-order", Severity::warning,
    "The value for “{class}”, {value}, is stricter than that for the milder “{milder}”, {other}.",
    "Check the two values; a rarer class usually allows more."};
inline constexpr Message unsignedLimit{"plant.unsigned-limit", Severity::note,
                                       "This number has no owner. Results using it are marked.",
                                       "Name its document and its author under “source”."};

// --- options ------------------------------------------------------------------------------------

inline constexpr Message patchOfNothing{
    "plant.patch-of-nothing", Severity::error,
    "The option changes “{name}”, which the plant does not have.",
    "Correct the name. If it is meant as new, it also needs: {keys}."};
inline constexpr Message patchOfNothingNear{
    "plant.patch-of-nothing-near", Severity::error,
    "The option changes “{name}”, which the plant does not have.",
    "The nearest name is “{near}”. If it is meant as new, it also needs: {keys}."};
inline constexpr Message nothingToRemove{
    "plant.nothing-to-remove", Severity::error,
    "The option removes “{name}”, which the plant does not have.",
    "Correct the name, or leave this line out."};

} // namespace say
} // namespace headroom::plant
