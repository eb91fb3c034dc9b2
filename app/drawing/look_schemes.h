// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

namespace headroom::drawing {

/// The colours of a scheme, at scale 1. Asked through `look()`.
Look colours(Scheme scheme);

} // namespace headroom::drawing
