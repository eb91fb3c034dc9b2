// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "numerics/table.h"
#include "plant/study.h"

#include <optional>
#include <string>
#include <vector>

/// A study's events as counted times.
namespace headroom::simulation {

/// A quantity that a study prescribes over time: what it was before, then one table after the
/// other, each from its own instant on. Before a table's first row its first value is held.
class Prescription {
public:
    explicit Prescription(double before = 0.0) : before_(before) {}

    void add(double time_s, numerics::Table rows);
    bool given() const { return !parts_.empty(); }
    bool givenAt(double time_s) const { return given() && time_s > parts_.front().time_s; }
    /// The value reached at `time_s`; at a jump's own instant still the one before it.
    double value(double time_s) const { return at(time_s, false); }
    /// The value just after `time_s`.
    double valueAfter(double time_s) const { return at(time_s, true); }
    /// Instants at which the value jumps.
    std::vector<double> jumps() const;
    /// Puts every jump on the nearest multiple of the step.
    void snapJumps(double step_s);
    void setBefore(double value) { before_ = value; }

private:
    struct Part {
        double time_s = 0.0;
        numerics::Table rows;
    };
    double at(double time_s, bool after) const;

    double before_;
    std::vector<Part> parts_; // in rising time
};

struct Trip {
    double time_s = 0.0;
    int unit = -1;
};
struct LoadMove {
    double time_s = 0.0;
    int unit = -1;
    double to_W = 0.0, over_s = 0.0;
};
struct Jam {
    double time_s = 0.0;
    int unit = -1;
};
struct Loss {
    double time_s = 0.0;
    double power_W = 0.0;
};

struct Schedule {
    std::vector<Trip> trips;
    std::vector<LoadMove> loads;
    std::vector<Jam> jams;
    std::vector<Loss> losses;
    std::vector<Prescription> openings; ///< by unit
    std::vector<Prescription> flows;    ///< by unit
    std::vector<Prescription> levels;   ///< by reservoir
    Prescription frequency_Hz;
    std::vector<double> jumps_s; ///< instants at which a prescription jumps, rising
};

/// Resolves `of`/`after_s` chains and sorts by time. Findings: a chain that ends nowhere, tables
/// that cannot be read, an order that the named thing cannot follow.
Schedule scheduleOf(const plant::Plant& plant, const plant::Study& study, double step_s,
                    Findings& findings);

} // namespace headroom::simulation
