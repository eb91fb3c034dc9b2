// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "simulation/state.h"

#include <vector>

/// Where a run leaves the range of its model: chambers emptied or full, boiling water.
namespace headroom::simulation {

class Validity {
public:
    explicit Validity(const Model& model);

    /// Every step: chambers and runner outlets, and the lowest heads along the rows.
    void take(const State& state);
    std::vector<results::Status::Invalid> found() const { return found_; }

private:
    void takeChambers(const State& state);
    void takeRunners(const State& state);
    void takeRows(const State& state);
    void add(double from_s, Finding why, std::vector<results::Thing> stillValid);

    const Model& model_;
    std::vector<double> lowest_m_, highest_m_; // by node of the rows, within the present watch
    std::vector<double> boiling_m_;            // head at which the water there boils
    std::vector<bool> chamberDone_, runnerDone_;
    bool rowsDone_ = false;
    double watchedSince_s_ = 0.0;
    int watched_ = 0;
    std::vector<results::Status::Invalid> found_;
};

} // namespace headroom::simulation
