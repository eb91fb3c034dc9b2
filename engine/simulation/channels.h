// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/state.h"

#include <cstddef>
#include <vector>

/// What a run watches: the natural quantities of every thing in the plant, in one fixed order.
namespace headroom::simulation {

/// Where a head along a conduit is taken.
struct Station {
    int conduit = -1;
    int cell = -1;        ///< node of the row of cells; −1: between the ends of a conduit without
    std::size_t node = 0; ///< of the rows' arrays, where there is a cell
    double share = 0.0;   ///< of the length
    double along_m = 0.0;
};

/// Mean rate of a head over a sliding window: what a limit in metres per minute is about; over one
/// step a rate would be that of the pressure wave.
inline constexpr double rateWindow_s = 60.0; // common practice, no source

class Channels {
public:
    explicit Channels(const Model& model);

    struct Item {
        Measure measure;
        results::Place place;
    };
    /// Recorded and tracked at every step.
    const std::vector<Item>& items() const { return items_; }
    /// Heads along conduits: tracked at every step, recorded as lines.
    const std::vector<Station>& stations() const { return stations_; }
    std::size_t width() const { return items_.size() + stations_.size(); }

    /// Writes the values of this instant; `row` has `width()` entries.
    void fill(const State& state, double* row);

private:
    void add(Measure measure, results::Thing thing, int index, double chainage = 0.0);
    void addStations();
    double* fillPoints(const State& state, double* out);
    double* fillUnits(const State& state, double* out) const;
    double pointHead(const State& state, int node) const;

    const Model& model_;
    std::vector<Item> items_;
    std::vector<Station> stations_;
    // Heads of the last `rateWindow_s`, a row for every `windowEvery_` instants; the rate is held in
    // between, which is a thousandth of the window.
    std::vector<double> window_, rate_;
    std::size_t windowRows_ = 0, windowRow_ = 0, windowEvery_ = 1, windowCount_ = 0;
    bool windowFilled_ = false;
};

} // namespace headroom::simulation
