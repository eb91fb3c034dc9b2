// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/limit.h"

#include <optional>
#include <string_view>

namespace headroom::limits {

/// The value that judges a study of one class on one side of a limit.
struct Bound {
    double value = 0.0;                                  ///< [SI of the measure]
    plant::LoadClass from = plant::LoadClass::normal;    ///< class whose value it is
};

/// The value of the study's class, or of the next milder class that has one; never a laxer one.
std::optional<Bound> boundFor(const plant::ClassValues& values, plant::LoadClass loadClass);

std::string_view name(plant::LoadClass loadClass); ///< "normal" … "catastrophic"

} // namespace headroom::limits
