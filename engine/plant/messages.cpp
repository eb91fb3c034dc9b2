// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/messages.h"

#include <array>

namespace headroom::plant {

std::span<const Message* const> messages() {
    using namespace say;
    static constexpr std::array all{
        &missing, &missingForm, &mistyped, &unknownKey, &unknownKeyNear, &unknownChoice,
        &outOfRange, &notWhole, &unusual, &nullValue, &intervalReversed, &nowOutsideSearch,
        &noKind, &twoKinds, &forgottenNull, &nameEmpty, &nameTooLong, &nameNotPrintable,
        &nameBlanks, &nameTwice, &nameDiffersInCase, &nameTaken, &nothingToRename, &undeclared,
        &undeclaredNear, &wrongCollection, &lackingHere, &removedButUsed, &tableRow, &tableTooShort,
        &tableTooLong, &tableOrder, &tableRange, &tableNotLoaded, &noLength, &cornerOutside,
        &lengthDiffers, &lengthTooShort, &noReach, &reachEnd, &reachOpen, &reachesShort,
        &placeOutside, &floorAboveRim, &floorBelowAxis, &levelBelowIntake, &levelOutside,
        &startOutside, &chamberOutside, &notOnConduit, &unitNotConnected, &disconnected,
        &unusedPoint, &emptyPlant, &inertiaIsGd2, &inertiaUnusual, &turningNeeds,
        &stageNotToClosed, &powerNotRated, &eventCircle, &eventAfterEnd, &outputTwice, &wrongEvent,
        &limitWithoutValue, &leastAboveGreatest, &classOrder, &unsignedLimit, &patchOfNothing,
        &patchOfNothingNear, &nothingToRemove,
    };
    return all;
}

} // namespace headroom::plant
