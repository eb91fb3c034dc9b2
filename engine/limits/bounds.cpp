// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/bounds.h"

#include "base/ensure.h"

namespace headroom::limits {

std::optional<Bound> boundFor(const plant::ClassValues& values, plant::LoadClass loadClass) {
    for (int i = static_cast<int>(loadClass); i >= 0; --i) {
        const auto& value = values[static_cast<std::size_t>(i)];
        if (value) {
            return Bound{*value, static_cast<plant::LoadClass>(i)};
        }
    }
    return std::nullopt;
}

std::string_view name(plant::LoadClass loadClass) {
    switch (loadClass) {
    case plant::LoadClass::normal: return "normal";
    case plant::LoadClass::exceptional: return "exceptional";
    case plant::LoadClass::extreme: return "extreme";
    case plant::LoadClass::catastrophic: return "catastrophic";
    }
    throw Bug("a load class has a name");
}

} // namespace headroom::limits
