// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/messages.h"

#include <array>

namespace headroom::batch {

std::span<const Message* const> messages() {
    static constexpr std::array<const Message*, 8> all{
        &unknownOption, &unknownOptionNear, &unknownStudy, &unknownStudyNear,
        &badPart,       &noStudy,           &noOutput,     &folderNotMade};
    return all;
}

} // namespace headroom::batch
