// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/messages.h"

namespace headroom::simulation {

std::span<const Message* const> messages() {
    static constexpr const Message* all[] = {&twoReservoirs,       &chamberAtReservoir,
                                             &chamberAlone,        &conduitWithoutLength,
                                             &lossNeedsArea,       &flowNeedsFlowUnit,
                                             &eventWithoutTime,    &outputAndOpening,
                                             &startNeedsGate,      &noRest,
                                             &outputStoppedByGate, &outputPastTurn,
                                             &chamberRestOutside,  &restMoves,
                                             &stepChosen,          &sampleTimesNotDivided,
                                             &elasticChosen,       &rigidChosen,
                                             &shortElementChosen,  &stretchedSome,
                                             &stretchedMuch,       &clusterUnsolved,
                                             &valueNotFinite,      &unitTripped,
                                             &unitJoined,          &orderHeldBack,
                                             &orderReleased,       &gateStuck,
                                             &overspeedTrip,       &chatters,
                                             &chamberEmpty,        &chamberFull,
                                             &boilsInConduit,      &boilsAtRunner};
    return all;
}

} // namespace headroom::simulation
