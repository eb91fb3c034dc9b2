// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <memory>

/// The one interface that a run calls once per control sample.
namespace headroom::control {

/// What the load reference asks of the unit at one instant.
struct LoadReference {
    double opening_pu = 0.0; ///< servo stroke that should give the load, 0…1 (also feed-forward)
    double power_pu = 0.0;   ///< the same load in power, of rated shaft power
};

/// What a controller of one unit can see at the instant it decides. Continuous controllers are
/// called each step with values extrapolated to the new time; sampled ones at their instants.
struct Measured {
    double time_s = 0.0;
    double step_s = 0.0;         ///< since the last call; 0 at the first
    double speed_pu = 1.0;       ///< of rated speed
    double frequency_pu = 1.0;   ///< of the grid, of nominal
    double opening_pu = 0.0;     ///< servo stroke, 0…1
    double power_pu = 0.0;       ///< given to the grid, of rated shaft power
    double inletHead_m = 0.0;    ///< piezometric level at the unit's inlet
    double chamberLevel_m = 0.0; ///< of the chamber that guards the unit, if any
    LoadReference reference;
    double speedReference_pu = 1.0;
    bool onGrid = true; ///< breaker closed
};

/// What a controller asks for.
struct Order {
    double opening_pu = 0.0; ///< servo stroke, 0…1
};

class Controller {
public:
    virtual ~Controller() = default;

    /// The order at `measured.time_s`. Advances the controller by `measured.step_s`.
    virtual Order decide(const Measured& measured) = 0;
    /// Sets the state whose order is `measured.opening_pu` for as long as nothing else changes, and
    /// returns the load reference that holds it. `measured.reference` is not read. The opening must
    /// lie within the controller's own limits.
    virtual LoadReference rest(const Measured& measured) = 0;
    /// A copy with its state.
    virtual std::unique_ptr<Controller> clone() const = 0;
    /// Seconds between calls; 0: each step, continuous.
    virtual double samplePeriod_s() const { return 0.0; }
    /// Shortest time constant inside [s], 0 none; the run's step is chosen below a tenth of it.
    virtual double shortestTime_s() const { return 0.0; }

protected:
    Controller() = default;
    Controller(const Controller&) = default;
    Controller& operator=(const Controller&) = default;
};

} // namespace headroom::control
