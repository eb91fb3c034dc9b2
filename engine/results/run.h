// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "units/measure.h"

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

/// What a run leaves behind: plain, immutable, no behaviour. Things are named by their position
/// in the plant that was run, never by the user's names, so a rename leaves a result valid.
namespace headroom::results {

enum class Thing { grid, point, reservoir, conduit, chamber, unit };

/// Where something was measured.
struct Place {
    Thing thing = Thing::grid;
    int index = -1;          ///< position in its collection; -1 for the grid
    double chainage_m = 0.0; ///< for a conduit: where along it (its `from` end if not said)
    bool operator==(const Place&) const = default;
};

/// An extreme with what surrounds it at the run's own step.
struct Extreme {
    double value = 0.0;             ///< [SI of the measure]
    double time_s = 0.0;
    std::array<double, 5> around{}; ///< two steps before … two after; repeats the end at the ends
    double largestStep = 0.0;       ///< S: largest change in one step within two steps of it
};

/// A trace on the run's recording instants. Where one interval holds several steps, `low` and
/// `high` keep its least and greatest, so no peak is lost; `last` is the value at the instant.
struct Trace {
    std::vector<float> low, high, last;
};

/// One measured quantity at one place.
struct Channel {
    Measure measure = Measure::level;
    Place place;
    double atRest = 0.0;
    double atEnd = 0.0;
    Extreme least, greatest;
    Trace trace;                    ///< may be empty (repeats keep none)
};

/// Heads along one conduit: axis, rest, envelope, and the moving line at coarse instants.
struct Envelope {
    int conduit = -1;
    std::vector<double> chainage_m, elevation_m;                 ///< stations, from → to
    std::vector<double> rest_m, least_m, greatest_m;             ///< head at the stations
    std::vector<double> leastTime_s, greatestTime_s;
    std::vector<double> largestStep_m;                           ///< S at each station
    std::vector<float> line_m;                                   ///< instants × stations, row per instant
};

enum class EndReason { completed, cancelled, failed };

/// How a run ended.
struct Status {
    EndReason reason = EndReason::completed;
    double reached_s = 0.0;
    std::optional<Finding> why;            ///< for `failed`
    /// Left the model's range (chamber emptied, vapour pressure reached …): what depends on it is
    /// not valid after this time. One entry a cause.
    struct Invalid {
        double from_s = 0.0;
        Finding why;
        std::vector<Thing> stillValid;     ///< measures at these things stay valid
    };
    std::vector<Invalid> invalid;
};

/// Bookkeeping of water and energy; a check of the program, never quoted as accuracy.
struct Balance {
    double inflow_m3 = 0.0, outflow_m3 = 0.0, stored_m3 = 0.0; ///< stored: end minus start
    double throughput_m3 = 0.0;                                ///< ∫ Σ|Q_in| dt
    double worstResidual_share = 0.0;                          ///< largest |in − out − stored| / throughput
    double worstEnergyResidual_share = 0.0;                    ///< of the rotating train
};

/// How the plant was cut up for this run; shown, so that no simplification is silent.
struct Resolution {
    double step_s = 0.0;
    std::int64_t steps = 0;
    int refinement = 1;                    ///< cells divided by this against the first run
    int cells = 0;
    std::vector<int> cellsByConduit;       ///< 0: rigid or short element
    std::vector<double> stretchByConduit;  ///< relative change of wave speed to fit the step
    std::string instructions;              ///< "baseline", "avx2", "avx512"
    Findings notes;                        ///< what was chosen and why
};

/// Everything a run leaves. Shared by pointer, never changed.
struct Run {
    Status status;
    Resolution resolution;
    double duration_s = 0.0;               ///< asked for
    double recordInterval_s = 0.0;         ///< of traces; instant i is i · recordInterval_s
    double lineInterval_s = 0.0;           ///< of `Envelope::line_m`
    std::vector<Channel> channels;
    std::vector<Envelope> envelopes;       ///< one a conduit
    Balance balance;
    Findings incidents;                    ///< with time: trips, joins, releases, held back orders
    double cpu_s = 0.0;                    ///< thread CPU time, for people; never compared

    const Channel* find(Measure measure, const Place& place) const {
        for (const auto& channel : channels) {
            if (channel.measure == measure && channel.place == place) {
                return &channel;
            }
        }
        return nullptr;
    }
};

} // namespace headroom::results
