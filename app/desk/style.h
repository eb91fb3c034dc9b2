// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

#include <QPalette>
#include <QString>

namespace headroom::desk {

/// The library's own widgets (buttons, lines, lists) dressed in the sheet's look.
QPalette paletteFor(const drawing::Look& look);
QString styleSheetFor(const drawing::Look& look);

/// Whether the system asks for a dark window.
bool systemIsDark();

} // namespace headroom::desk
