// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/messages.h"

#include <array>

namespace headroom::limits {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 10> all{
        &notRun,       &repeatMissing, &cutShort, &runFailed,    &placeMissing,
        &classMissing, &notRecorded,   &noTrace,  &noStaticHead, &notFinite};
    return all;
}

} // namespace headroom::limits
