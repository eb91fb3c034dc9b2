// SPDX-License-Identifier: GPL-3.0-or-later
#include "machines/messages.h"

#include <array>

namespace headroom::machines {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 10> all{
        &ratedValueNotPositive, &ratedEfficiencyImpossible, &speedNotFrancis, &targetOutOfRange,
        &chartMissesTarget,     &chartLossTooSmall,         &chartTurnsBack,  &gateLawNotRising,
        &gateLawEnds,           &gateFlowOutOfReach};
    return all;
}

} // namespace headroom::machines
