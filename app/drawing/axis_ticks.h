// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <vector>

namespace headroom::drawing {

/// Round values (1, 2, 5 times a power of ten) from `low` to `high`, at most `most` of them.
std::vector<double> roundValues(double low, double high, int most);

} // namespace headroom::drawing
