// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <span>
#include <vector>

namespace headroom::numerics {

/// Least and greatest value of any stretch of a long trace, without walking the stretch.
///
/// The lowest layer is the trace itself, which the pyramid only looks at: it must outlive the
/// pyramid. Each layer above joins `fan` neighbours, so the layers together take a third of the
/// trace's memory and a question costs at most 2·fan looks a layer. Values that are not numbers
/// are passed over.
class MinMaxPyramid {
public:
    struct Extent {
        float low, high;
        bool empty() const { return low > high; } ///< nothing, or nothing but NaN, was looked at
    };

    MinMaxPyramid() = default;
    /// @param low, high  of each instant, of one length; the same span twice for a plain trace
    MinMaxPyramid(std::span<const float> low, std::span<const float> high);

    std::size_t size() const { return low_.size(); }
    /// Extent of the instants first … last−1; the part outside the trace is left out.
    Extent over(std::size_t first, std::size_t last) const;

private:
    static constexpr std::size_t fan = 4;
    struct Layer {
        std::vector<float> low, high;
    };
    Extent at(std::size_t layer, std::size_t index) const;

    std::span<const float> low_, high_;
    std::vector<Layer> layers_; // [k] joins fan^(k+1) instants
};

} // namespace headroom::numerics
