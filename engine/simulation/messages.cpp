// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/messages.h"

namespace headroom::simulation {

std::span<const Message* const> messages() {
    static constexpr const Message* all[] = {&notBuilt};
    return all;
}

} // namespace headroom::simulation
