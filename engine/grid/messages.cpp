// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/messages.h"

#include <array>

namespace headroom::grid {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 3> all{&areaNotPositive, &areaNegative,
                                                       &reserveLimits};
    return all;
}

} // namespace headroom::grid
