// SPDX-License-Identifier: GPL-3.0-or-later
#include "independent_plant.h"

#include <cmath>

namespace headroom::verification {

namespace {

machines::FrancisRating rating(const Numbers& n) {
    machines::FrancisRating made;
    made.ratedHead_m = n.ratedHead_m;
    made.ratedFlow_m3s = n.ratedFlow;
    made.ratedSpeed_rads = n.ratedSpeed;
    made.ratedPower_W = n.ratedPower;
    made.gravity_mps2 = n.gravity;
    made.density_kgm3 = n.density;
    made.runnerDiameter_m = 2.44;
    made.runaway_pu = 1.73;
    return made;
}

plant::Reference reference(const char* name, plant::Collection collection, int index) {
    return {name, collection, index};
}

plant::Conduit tunnel(const Numbers& n) {
    plant::Conduit made;
    made.from = reference("Intake", plant::Collection::points, 0);
    made.to = reference("Foot", plant::Collection::points, 1);
    made.length_m = n.tunnelLength_m;
    made.model = plant::ConduitModel::rigid;
    plant::Reach reach;
    reach.area_m2 = n.tunnelArea_m2;
    reach.hydraulicRadius_m = n.tunnelRadius_m;
    reach.friction = plant::DarcyFactor{n.tunnelFactor};
    reach.wall = plant::GivenWaveSpeed{1100.0};
    made.reaches.add("rock", reach);
    return made;
}

plant::Conduit penstock(const Numbers& n) {
    plant::Conduit made;
    made.from = reference("Foot", plant::Collection::points, 1);
    made.to = reference("Inlet", plant::Collection::points, 2);
    made.length_m = n.penstockLength_m;
    made.model = plant::ConduitModel::rigid;
    plant::Reach reach;
    reach.diameter_m = n.penstockDiameter_m;
    reach.area_m2 = 0.25 * 3.14159265358979323846 * n.penstockDiameter_m * n.penstockDiameter_m;
    reach.hydraulicRadius_m = 0.25 * n.penstockDiameter_m;
    reach.friction = plant::DarcyFactor{n.penstockFactor};
    reach.wall = plant::GivenWaveSpeed{1200.0};
    made.reaches.add("steel", reach);
    return made;
}

plant::Unit unit(const Numbers& n) {
    plant::Unit made;
    made.from = reference("Inlet", plant::Collection::points, 2);
    made.to = reference("Tail", plant::Collection::reservoirs, 1);
    made.spiral = plant::Passage{n.spiralLength_m, n.spiralArea_m2};
    made.draftTube = plant::Passage{n.draftLength_m, n.draftArea_m2};
    plant::FrancisTurbine francis;
    francis.ratedHead_m = n.ratedHead_m;
    francis.ratedFlow_m3s = n.ratedFlow;
    francis.ratedSpeed_rads = n.ratedSpeed;
    francis.ratedPower_W = n.ratedPower;
    francis.runnerDiameter_m = 2.44;
    francis.runaway_pu = 1.73;
    made.turbine = francis;
    made.inertia_kgm2 = n.inertia;
    made.generator = plant::Generator{n.ratedApparent, 0.9, 1.0};
    plant::Synchronous drive;
    drive.synchronising_pu = n.synchronising;
    drive.damping_pu = n.damping;
    made.drive = drive;
    plant::Servo servo;
    servo.opening_s = 1.0; // rates never bind in this event
    servo.closing_s = 1.0;
    servo.lag_s = n.lag_s;
    made.servo = servo;
    plant::PidGovernor governor;
    governor.droop = n.droop;
    governor.gains = {n.kp, n.ki, n.kd};
    governor.derivativeFilter_s = n.filter_s;
    made.governor = governor;
    return made;
}

} // namespace

plant::Site productSite(const Numbers& n) {
    plant::Site site;
    site.gravity_mps2 = n.gravity;
    site.density_kgm3 = n.density;
    site.velocityHeads = false;
    return site;
}

plant::Plant productPlant(const Numbers& n) {
    plant::Plant made;
    made.points.add("Intake", {0.0, -20.0});
    made.points.add("Foot", {n.tunnelLength_m, -40.0});
    made.points.add("Inlet", {n.tunnelLength_m + n.penstockLength_m, -240.0});
    plant::Reservoir upper;
    upper.at = reference("Intake", plant::Collection::points, 0);
    upper.level_m = n.reservoir_m;
    made.reservoirs.add("Upper", upper);
    plant::Reservoir tail;
    tail.level_m = n.tail_m;
    made.reservoirs.add("Tail", tail);
    made.conduits.add("Tunnel", tunnel(n));
    made.conduits.add("Penstock", penstock(n));
    plant::Chamber shaft;
    shaft.at = reference("Foot", plant::Collection::points, 1);
    shaft.shape.areaByLevel = {{-40.0, n.shaftArea_m2}, {40.0, n.shaftArea_m2}};
    shaft.shape.lossIn_s2m5 = n.lossIn;
    shaft.shape.lossOut_s2m5 = n.lossOut;
    shaft.shape.throttled = true;
    made.chambers.add("Shaft", shaft);
    made.units.add("U1", unit(n));
    plant::GridArea area;
    area.nominal_Hz = n.nominal_Hz;
    area.storedEnergy_J = n.storedEnergy;
    area.load_W = n.load;
    area.loadDamping_1Hz = n.loadDamping;
    made.grid = area;
    return made;
}

plant::Study productStudy(const Numbers& n, double restLevel_m, double until_s) {
    plant::Study made;
    made.until_s = until_s;
    made.start.opening = {{reference("U1", plant::Collection::units, 0), n.opening}};
    made.start.chamberLevel_m = {
        {reference("Shaft", plant::Collection::chambers, 0), restLevel_m + n.shaftOffset_m}};
    return made;
}

IndependentPlant::IndependentPlant(const Numbers& numbers) : n_(numbers) {
    chart_ =
        std::make_shared<machines::FrancisChart>(*machines::FrancisChart::calibrate(rating(n_)));
    const double penstockArea =
        0.25 * 3.14159265358979323846 * n_.penstockDiameter_m * n_.penstockDiameter_m;
    tunnelInertia_ = n_.tunnelLength_m / (n_.gravity * n_.tunnelArea_m2);
    tunnelLoss_ =
        n_.tunnelFactor * n_.tunnelLength_m
        / (4.0 * n_.tunnelRadius_m * 2.0 * n_.gravity * n_.tunnelArea_m2 * n_.tunnelArea_m2);
    penstockInertia_ = n_.penstockLength_m / (n_.gravity * penstockArea)
                       + n_.spiralLength_m / (n_.gravity * n_.spiralArea_m2)
                       + n_.draftLength_m / (n_.gravity * n_.draftArea_m2);
    penstockLoss_ = n_.penstockFactor * n_.penstockLength_m
                    / (n_.penstockDiameter_m * 2.0 * n_.gravity * penstockArea * penstockArea);
    const auto start = rest();
    reference_ = n_.opening;
    restPower_ = turbineTorque(start[2], 1.0, n_.opening) * n_.ratedPower;
}

double IndependentPlant::turbineHead_m(double flow, double speed, double stroke) const {
    const double opening = chart_->gate().relativeOpening(stroke);
    return n_.ratedHead_m * chart_->at(flow / n_.ratedFlow, speed, 1.0 / opening).h;
}

double IndependentPlant::turbineTorque(double flow, double speed, double stroke) const {
    const double opening = chart_->gate().relativeOpening(stroke);
    return chart_->at(flow / n_.ratedFlow, speed, 1.0 / opening).m;
}

StateVector IndependentPlant::rest() const {
    double low = 0.0, high = 2.0 * n_.ratedFlow;
    for (int i = 0; i < 200; ++i) {
        const double flow = 0.5 * (low + high);
        const double left = n_.reservoir_m - n_.tail_m - (tunnelLoss_ + penstockLoss_) * flow * flow
                            - turbineHead_m(flow, 1.0, n_.opening);
        (left > 0.0 ? low : high) = flow;
    }
    const double flow = 0.5 * (low + high);
    const double torque = turbineTorque(flow, 1.0, n_.opening);
    const double angle = torque * n_.ratedPower / n_.ratedApparent / n_.synchronising;
    return {flow,      n_.reservoir_m - tunnelLoss_ * flow * flow, flow, angle, 1.0, 0.0, 0.0, 0.0,
            n_.opening};
}

double IndependentPlant::order(const StateVector& s, double* error) const {
    const double deviation = 1.0 - s[4];
    const double derivative = n_.kd * (deviation - s[7]) / n_.filter_s;
    const double made =
        (reference_ + n_.kp * (deviation + n_.droop * reference_) + s[6] + derivative)
        / (1.0 + n_.kp * n_.droop);
    *error = deviation + n_.droop * (reference_ - made);
    return made;
}

void IndependentPlant::derivative(const StateVector& s, StateVector& rate) const {
    const double into = s[0] - s[2];
    const double foot_m = s[1] + (into > 0.0 ? n_.lossIn : n_.lossOut) * into * std::abs(into);
    rate[0] = (n_.reservoir_m - foot_m - tunnelLoss_ * s[0] * std::abs(s[0])) / tunnelInertia_;
    rate[1] = into / n_.shaftArea_m2;
    rate[2] = (foot_m - n_.tail_m - penstockLoss_ * s[2] * std::abs(s[2])
               - turbineHead_m(s[2], s[4], s[8]))
              / penstockInertia_;
    const double grid = 1.0 + s[5] / n_.nominal_Hz;
    rate[3] = 2.0 * 3.14159265358979323846 * n_.nominal_Hz * (s[4] - grid);
    const double electrical = (n_.synchronising * s[3] + n_.damping * (s[4] - grid))
                              * n_.ratedApparent / n_.ratedPower; // of rated turbine torque
    const double acceleration_s = n_.inertia * n_.ratedSpeed * n_.ratedSpeed / n_.ratedPower;
    rate[4] = (turbineTorque(s[2], s[4], s[8]) - electrical) / acceleration_s;
    const double own_W = electrical * s[4] * n_.ratedPower - restPower_;
    rate[5] = (own_W - n_.loadDamping * n_.load * s[5]) * n_.nominal_Hz / (2.0 * n_.storedEnergy);
    double error = 0.0;
    const double asked = order(s, &error);
    rate[6] = n_.ki * error;
    rate[7] = (1.0 - s[4] - s[7]) / n_.filter_s;
    rate[8] = (asked - s[8]) / n_.lag_s;
}

} // namespace headroom::verification
