// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <string>
#include <vector>

#include "plants.h"

/// The plants of the check lists, and ways to read a run in full precision.
namespace headroom::verification {

using tests::Case;

// --- one pipe ---------------------------------------------------------------------------------

/// Reservoir at `head_m` above the tailwater at 0, one frictionless pipe.
struct Pipe {
    double length_m = 0.0, area_m2 = 0.0, waveSpeed_mps = 0.0, head_m = 0.0;
    double velocity_mps = 0.0; ///< with the orifice fully open, or at the start
    double flow_m3s() const { return velocity_mps * area_m2; }
};
/// Points "Intake" (0) and "Inlet" (1), reservoirs "Upper" and "Tail", conduit "Pipe".
Case barePipe(const Pipe& pipe, plant::ConduitModel model, double step_s);
/// The same with an ideal orifice, stroke at rest as given.
Case orificePipe(const Pipe& pipe, double step_s, double opening = 1.0,
                 plant::ConduitModel model = plant::ConduitModel::elastic);
/// The same with a prescribed discharge.
Case flowPipe(const Pipe& pipe, double step_s);
/// Cuts conduit 0 in two at a share of its length; the new point is the last one.
void cutPipe(Case& made, double share);

// --- tunnel and chamber -----------------------------------------------------------------------

/// v₀√(LA/(gF)) of the base data L 5000 m, A 25 m², F 100 m², v₀ 2 m/s; derived here.
inline constexpr double swing_m = 22.576182049;
inline constexpr double swingPeriod_s = 283.700670689; ///< 2π√(LF/(gA)), the same data

/// Rigid tunnel, open chamber, discharge from one value to another at t = 0; `loss_m` is the
/// tunnel's at 50 m³/s, `throttle_m` the chamber's at 50 m³/s (0: open).
Case surge(double loss_m, double from_m3s, double to_m3s, double throttle_m = 0.0);

// --- orders to the unit named "Unit" ----------------------------------------------------------

void openings(Case& made, plant::Rows rows);
void flows(Case& made, plant::Rows rows);

// --- reading ----------------------------------------------------------------------------------

/// Height and time of the highest (sign +1) or lowest (−1) recorded value between two times.
struct Crest {
    double value = 0.0, time_s = 0.0;
};
Crest crest(const results::Run& run, Measure measure, const results::Place& place, double from_s,
            double to_s, int sign);

/// Every channel at every step as the kernel holds it, in double.
struct Course {
    std::vector<Measure> measures;
    std::vector<results::Place> places;
    double step_s = 0.0;
    std::vector<std::vector<double>> rows; ///< instant × channel; instant 0 is t = 0

    std::size_t find(Measure measure, const results::Place& place) const;
    double at(std::size_t channel, double time_s) const;
};
/// Runs a case step by step; keeps every `every`-th instant.
Course course(const Case& made, int every = 1);

/// CHECKs that a value is within a tolerance of the expected one, and notes the largest share of
/// its tolerance that each check has used; with HEADROOM_FIGURES set they are printed at the end.
void hold(const std::string& check, double value, double expected, double tolerance);

} // namespace headroom::verification
