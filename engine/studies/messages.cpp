// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/messages.h"

#include <array>

namespace headroom::studies {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 2> all{&stopped, &repeatStopped};
    return all;
}

} // namespace headroom::studies
