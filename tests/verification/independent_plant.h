// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "machines/francis_chart.h"
#include "plant/plant.h"
#include "plant/study.h"

#include <array>
#include <memory>
#include <vector>

/// One rigid, smooth plant written twice: as plant values for the product, and as ordinary
/// differential equations for an integrator that shares nothing with it but the turbine's chart.
namespace headroom::verification {

/// The numbers both descriptions are made from. Levels are counted from the reservoir.
struct Numbers {
    double gravity = 9.81, density = 1000.0;
    double reservoir_m = 0.0, tail_m = -230.0;
    double tunnelLength_m = 3000.0, tunnelArea_m2 = 30.0, tunnelFactor = 0.06,
           tunnelRadius_m = 1.45;
    double shaftArea_m2 = 60.0, lossIn = 0.004, lossOut = 0.003;
    double penstockLength_m = 500.0, penstockDiameter_m = 4.0, penstockFactor = 0.012;
    double spiralLength_m = 20.0, spiralArea_m2 = 9.0, draftLength_m = 25.0, draftArea_m2 = 12.0;
    double ratedHead_m = 222.0, ratedFlow = 60.0, ratedSpeed = 34.906585, ratedPower = 121.5e6;
    double inertia = 700e3, ratedApparent = 135e6;
    double synchronising = 1.5, damping = 40.0, nominal_Hz = 50.0;
    double droop = 0.06, kp = 2.2, ki = 0.33, kd = 0.6, filter_s = 0.1, lag_s = 0.2;
    double storedEnergy = 5e9, load = 2e9, loadDamping = 0.012;
    double opening = 0.75;      ///< stroke at rest
    double shaftOffset_m = 1.5; ///< the start: this much above rest
};

plant::Plant productPlant(const Numbers& numbers);
plant::Site productSite(const Numbers& numbers);
plant::Study productStudy(const Numbers& numbers, double restLevel_m, double until_s);

/// Tunnel flow, shaft level, penstock flow, rotor angle, speed, frequency deviation, integral,
/// derivative filter, stroke.
constexpr int stateCount = 9;
using StateVector = std::array<double, stateCount>;

class IndependentPlant {
public:
    explicit IndependentPlant(const Numbers& numbers);

    /// Rest by its own bisection on the discharge.
    StateVector rest() const;
    void derivative(const StateVector& state, StateVector& rate) const;

private:
    double turbineHead_m(double flow, double speed, double stroke) const;
    double turbineTorque(double flow, double speed, double stroke) const;
    double order(const StateVector& state, double* error) const;

    Numbers n_;
    std::shared_ptr<const machines::FrancisChart> chart_;
    double tunnelInertia_ = 0, tunnelLoss_ = 0, penstockInertia_ = 0, penstockLoss_ = 0;
    double restPower_ = 0, reference_ = 0;
};

} // namespace headroom::verification
