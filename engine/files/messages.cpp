// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/messages.h"

#include <array>

namespace headroom::files {

std::span<const Message* const> messages() {
    using namespace say;
    static constexpr std::array all{
        &notFound,     &notReadable,   &tooLarge,         &truncated,      &notJson,
        &notUtf8,      &byteOrderMark, &notANumber,       &numberTooLarge, &duplicateKey,
        &tooDeep,      &tableTooLong,  &notAProject,      &newerFormat,    &migrated,
        &tableOutside, &tableNotFound, &tableNotReadable, &tableRow,       &tableHuge,
        &notWritten,   &notReplaced,
    };
    return all;
}

} // namespace headroom::files
