// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/messages.h"

#include <array>

namespace headroom::numerics {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 4> all{&tableTooShort, &tableNotFinite,
                                                       &tableNotRising, &curveNotRising};
    return all;
}

} // namespace headroom::numerics
