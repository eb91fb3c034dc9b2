// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/messages.h"

#include <array>

namespace headroom::desk {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 5> all{
        &say::notOverwritten, &say::noName, &say::internalError, &say::demoNotCopied,
        &say::demoMissing};
    return all;
}

} // namespace headroom::desk
