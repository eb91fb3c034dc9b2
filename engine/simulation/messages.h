// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::simulation {

// --- what cannot be computed ----------------------------------------------------------------------
inline constexpr Message twoReservoirs{"simulation.two-reservoirs", Severity::error,
                                       "Another reservoir already stands at this point.",
                                       "Give this reservoir a point of its own."};
inline constexpr Message chamberAtReservoir{
    "simulation.chamber-at-reservoir", Severity::error,
    "The chamber stands at a point whose level a reservoir holds, so it could never move.",
    "Put the chamber at another point."};
inline constexpr Message chamberAlone{"simulation.chamber-alone", Severity::error,
                                      "No conduit and no unit leads to the chamber.",
                                      "Connect a conduit to its point, or delete the chamber."};
inline constexpr Message conduitWithoutLength{
    "simulation.conduit-without-length", Severity::error, "The conduit has no length or no reach.",
    "Move one of its points, give a surveyed length, or add a reach."};
inline constexpr Message lossNeedsArea{
    "simulation.loss-needs-area", Severity::error,
    "Generation is lost in the area, but the grid's frequency is imposed.",
    "Describe the grid as an area, or impose the frequency that the loss would cause."};
inline constexpr Message flowNeedsFlowUnit{
    "simulation.flow-needs-flow-unit", Severity::error,
    "A discharge is ordered from a unit whose discharge follows from its gate.",
    "Order an opening or a load, or make the unit an ideal `flow` unit."};
inline constexpr Message eventWithoutTime{
    "simulation.event-without-time", Severity::error,
    "The event counts from another event that is not there, or from itself.",
    "Let it count from an event that has a time."};
inline constexpr Message outputAndOpening{
    "simulation.output-and-opening", Severity::error,
    "The study's start gives the unit both an output and an opening.",
    "Delete one of them; the other follows."};
inline constexpr Message startNeedsGate{
    "simulation.start-needs-gate", Severity::error,
    "The study's start gives an output or an opening to an ideal unit that has no gate.",
    "Delete it; the unit's own discharge or power holds."};

// --- rest -----------------------------------------------------------------------------------------
inline constexpr Message noRest{
    "simulation.no-rest", Severity::error,
    "No steady state was found, not even at a tenth of the output.",
    "Look for a conduit of wrong size, a loss far too large, or levels that leave a unit no head."};
inline constexpr Message outputStoppedByGate{
    "simulation.output-stopped-by-gate", Severity::error,
    "At reservoir {level} an output of {asked} cannot be reached; {reached} can. The gate stops "
    "it: "
    "it is open as far as it goes.",
    "Ask for less, raise the reservoir, or reduce the losses."};
inline constexpr Message outputPastTurn{"simulation.output-past-turn", Severity::error,
                                        "At reservoir {level} an output of {asked} cannot be "
                                        "reached; {reached} can. Beyond it a larger "
                                        "opening gives less power.",
                                        "Ask for less, raise the reservoir, or reduce the losses."};
inline constexpr Message chamberRestOutside{
    "simulation.chamber-rest-outside", Severity::error,
    "At rest the water would stand at {level}, outside the chamber's range from {floor} to {rim}.",
    "Lower the floor or raise the rim, or start from another level or output."};
inline constexpr Message restMoves{
    "simulation.rest-moves", Severity::warning,
    "Left alone, the rest does not stand still: {what} moves away from it and after {time} is off "
    "by "
    "{share} of its scale.",
    "Look at the chamber's area against the Thoma area and at the governor's settings."};

// --- choices --------------------------------------------------------------------------------------
inline constexpr Message stepChosen{"simulation.step", Severity::note,
                                    "One time step for the whole plant: {step}.", ""};
inline constexpr Message sampleTimesNotDivided{
    "simulation.sample-times", Severity::warning,
    "No step between half its cap and the cap divides all controllers' sample times; controllers "
    "act "
    "at the instants nearest to theirs.",
    "Give the controllers sample times with a common divisor, or raise the cap of the step."};
inline constexpr Message elasticChosen{"simulation.elastic", Severity::note,
                                       "Pressure waves are computed on {cells} cells.", ""};
inline constexpr Message rigidChosen{"simulation.rigid", Severity::note,
                                     "The water is taken as rigid, as asked; no pressure waves.",
                                     ""};
inline constexpr Message shortElementChosen{
    "simulation.short-element", Severity::note,
    "Shorter than two cells: rigid water with half its elastic storage at either end.", ""};
inline constexpr Message stretchedSome{
    "simulation.stretched", Severity::note,
    "The wave speed is changed by {stretch} so that whole cells fit the step.", ""};
inline constexpr Message stretchedMuch{
    "simulation.stretched-much", Severity::warning,
    "The wave speed is changed by {stretch} so that whole cells fit the step; pressures along the "
    "conduit carry that error.",
    "Lower the cap of the step, or join short conduits into one."};

// --- in the run -----------------------------------------------------------------------------------
inline constexpr Message clusterUnsolved{
    "simulation.cluster-unsolved", Severity::error,
    "The water around this place has no solution that the program can find; largest remainders: "
    "{residuals}.",
    "Look at the last values before it; a smaller step, a chamber or a spiral's inertia often "
    "helps."};
inline constexpr Message valueNotFinite{
    "simulation.not-finite", Severity::error, "A computed value is not a number.",
    "Look at the last values before it, and please report it: this must not happen."};
inline constexpr Message unitTripped{"simulation.tripped", Severity::note, "The breaker opened.",
                                     ""};
inline constexpr Message unitJoined{"simulation.joined", Severity::note,
                                    "The unit joined the grid.", ""};
inline constexpr Message orderHeldBack{
    "simulation.held-back", Severity::note,
    "A load order is held back until the interlock ends and the unit is synchronised.", ""};
inline constexpr Message orderReleased{"simulation.released", Severity::note,
                                       "The load order that was held back is released.", ""};
inline constexpr Message gateStuck{"simulation.gate-stuck", Severity::note,
                                   "The gate is stuck from here on.", ""};
inline constexpr Message overspeedTrip{
    "simulation.overspeed", Severity::note,
    "The overspeed protection shut the unit down at {speed} of rated speed.", ""};
inline constexpr Message chatters{
    "simulation.chatters", Severity::warning,
    "More than 20 changes of mode within one second: the gate chatters on its seat.",
    "Look at the governor's settings and at the dead band."};

// --- validity -------------------------------------------------------------------------------------
inline constexpr Message chamberEmpty{
    "simulation.chamber-empty", Severity::warning,
    "The water fell below the chamber's floor at {limit}; air would enter the waterway, which is "
    "not "
    "computed. Nothing is valid from here on.",
    "Lower the floor, enlarge the chamber or its throttle, or avoid this sequence."};
inline constexpr Message chamberFull{
    "simulation.chamber-full", Severity::warning,
    "The water rose above the chamber's rim at {limit}; overflow is not computed. Nothing is valid "
    "from here on.",
    "Raise the rim, enlarge the chamber or its throttle, or avoid this sequence."};
inline constexpr Message boilsInConduit{
    "simulation.boils-in-conduit", Severity::warning,
    "At {chainage} the pressure head fell below {head}, where water boils; cavities are not "
    "computed. "
    "Pressures are not valid from here on.",
    "Lower the conduit, close more slowly, or accept that the column parts."};
inline constexpr Message boilsAtRunner{
    "simulation.boils-at-runner", Severity::warning,
    "At the runner outlet the pressure head fell below {head}, where water boils; cavities are not "
    "computed. Pressures there are not valid from here on.",
    "Close more slowly, set the machine lower, or shorten the draft tube."};

/// All templates of this floor, for the test that renders them.
std::span<const Message* const> messages();

} // namespace headroom::simulation
