// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/minmax_pyramid.h"

#include "base/ensure.h"

#include <algorithm>
#include <limits>

namespace headroom::numerics {

namespace {

constexpr MinMaxPyramid::Extent nothing{std::numeric_limits<float>::infinity(),
                                        -std::numeric_limits<float>::infinity()};

/// Comparisons with NaN are false, so a NaN in `b` changes nothing.
MinMaxPyramid::Extent joined(MinMaxPyramid::Extent a, MinMaxPyramid::Extent b) {
    return {b.low < a.low ? b.low : a.low, b.high > a.high ? b.high : a.high};
}

} // namespace

MinMaxPyramid::MinMaxPyramid(std::span<const float> low, std::span<const float> high)
    : low_(low), high_(high) {
    ensure(low.size() == high.size(), "both sides of a trace have one length");
    for (std::size_t below = low.size(); below > fan; below = layers_.back().low.size()) {
        const std::size_t above = layers_.size();
        Layer layer;
        for (std::size_t first = 0; first < below; first += fan) {
            Extent extent = nothing;
            for (std::size_t i = first; i < std::min(first + fan, below); ++i) {
                extent = joined(extent, at(above, i));
            }
            layer.low.push_back(extent.low);
            layer.high.push_back(extent.high);
        }
        layers_.push_back(std::move(layer));
    }
}

MinMaxPyramid::Extent MinMaxPyramid::at(std::size_t layer, std::size_t index) const {
    if (layer == 0) {
        return {low_[index], high_[index]};
    }
    return {layers_[layer - 1].low[index], layers_[layer - 1].high[index]};
}

MinMaxPyramid::Extent MinMaxPyramid::over(std::size_t first, std::size_t last) const {
    last = std::min(last, size());
    Extent extent = nothing;
    std::size_t layer = 0;
    while (first < last) {
        while (first < last && (first % fan != 0 || layer == layers_.size())) {
            extent = joined(extent, at(layer, first++));
        }
        while (first < last && last % fan != 0) {
            extent = joined(extent, at(layer, --last));
        }
        first /= fan;
        last /= fan;
        ++layer;
    }
    return extent;
}

} // namespace headroom::numerics
