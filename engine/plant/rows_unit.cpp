// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/rows.h"

/// Rows of units: turbine, generator, servo, governor, interlocks.
namespace headroom::plant::rows {

namespace {

RowsOf<FrancisTurbine> chartRows() {
    return {
        number(&FrancisTurbine::runaway_pu, Quantity::speedRatio,
               {"runaway_pu", "Runaway speed",
                "Runaway speed at full opening and rated head, over rated speed."})
            .range(1.2, 3)
            .usual(1.4, 2.1)
            .moves("highest speed"),
        number(&FrancisTurbine::noLoadFlow_pu, Quantity::perUnit,
               {"noLoadFlow_pu", "No-load flow",
                "Discharge at rated speed and head without load, over rated."})
            .range(0.01, 0.6)
            .usual(0.05, 0.25),
        number(&FrancisTurbine::standstillFlow_pu, Quantity::perUnit,
               {"standstillFlow_pu", "Standstill flow",
                "Discharge at full opening and rated head with the runner held, over rated."})
            .range(0.2, 3)
            .usual(0.7, 1.4),
        number(&FrancisTurbine::bestPower_pu, Quantity::percent,
               {"bestPower_pct", "Power of best efficiency",
                "Power at which the efficiency is best, in per cent of rated."})
            .range(30, 120)
            .usual(70, 100),
        number(&FrancisTurbine::bestEfficiency_pu, Quantity::percent,
               {"bestEfficiency_pct", "Best efficiency",
                "Best efficiency of the turbine at rated head."})
            .range(50, 99)
            .usual(88, 96),
        number(&FrancisTurbine::halfPowerEfficiency_pu, Quantity::percent,
               {"halfPowerEfficiency_pct", "Efficiency at half power",
                "Efficiency of the turbine at half of its rated power."})
            .range(20, 99)
            .usual(75, 93),
        table(&FrancisTurbine::flowByStroke,
              {risingColumn("stroke_pct", "Stroke", Quantity::percent, 0, 100),
               column("flow_pct", "Flow", Quantity::percent, 0, 200)},
              {"flowByStroke", "Flow by stroke",
               "Discharge at rated head and speed over the servo's stroke, both in per cent of "
               "full; left out: in proportion."}),
        number(&FrancisTurbine::speedUncertainty_pu, Quantity::speedRatio,
               {"speedUncertainty_pu", "Uncertainty of speed",
                "How far a highest speed may be wrong because the chart is synthetic."})
            .range(0, 1)
            .usual(0.005, 0.1)
            .uncounted(),
        number(&FrancisTurbine::headUncertainty_m, Quantity::head,
               {"headUncertainty_m", "Uncertainty of head",
                "How far a highest head at the unit may be wrong because the chart is synthetic."})
            .range(0, 500)
            .usual(0.2, 30)
            .uncounted(),
    };
}

RowsOf<FrancisTurbine> francisRows() {
    return {
        number(&FrancisTurbine::ratedHead_m, Quantity::head,
               {"ratedHead_m", "Rated head", "Net head of the rated point."})
            .needed()
            .range(1, 2000)
            .usual(20, 700),
        number(&FrancisTurbine::ratedFlow_m3s, Quantity::discharge,
               {"ratedFlow_m3s", "Rated flow", "Discharge of the rated point."})
            .needed()
            .range(0.001, 2000)
            .usual(0.5, 800)
            .moves("velocities, Tw"),
        number(&FrancisTurbine::ratedSpeed_rads, Quantity::rotation,
               {"ratedSpeed_rpm", "Rated speed", "Speed of rotation of the rated point."})
            .needed()
            .range(10, 3600)
            .usual(50, 1500),
        number(&FrancisTurbine::ratedPower_W, Quantity::power,
               {"ratedPower_MW", "Rated power", "Shaft power of the rated point."})
            .needed()
            .range(0.001, 2000)
            .usual(0.1, 900),
        number(&FrancisTurbine::runnerDiameter_m, Quantity::diameter,
               {"runnerDiameter_m", "Runner diameter", "Reference diameter of the runner."})
            .range(0.1, 15)
            .usual(0.4, 9),
        oneOf<FrancisTurbine>(
            {
                groupBy<FrancisTurbine, FrancisTurbine>(
                    [](FrancisTurbine& turbine) { return &turbine; },
                    [](const FrancisTurbine& turbine) { return &turbine; }, chartRows(),
                    {"fromRatedData", "From rated data",
                     "A synthetic chart through the rated point; overspeed and runaway may be "
                     "wrong by more than a margin."}),
            },
            {"chart", "Chart",
             "Where the turbine's curves come from; left out: from rated data with usual values."}),
    };
}

RowsOf<OrificeUnit> orificeRows() {
    return {
        number(&OrificeUnit::ratedHead_m, Quantity::head,
               {"ratedHead_m", "Rated head", "Head at which full opening passes the rated flow."})
            .needed()
            .range(0.1, 5000),
        number(&OrificeUnit::ratedFlow_m3s, Quantity::discharge,
               {"ratedFlow_m3s", "Rated flow", "Discharge at full opening and rated head."})
            .needed()
            .range(1e-6, 5000),
        number(&OrificeUnit::efficiency, Quantity::factor,
               {"efficiency", "Efficiency",
                "Constant share of the hydraulic power that reaches the shaft."})
            .range(0, 1),
        number(&OrificeUnit::ratedSpeed_rads, Quantity::rotation,
               {"ratedSpeed_rpm", "Rated speed", "Speed of rotation, if the unit turns."})
            .range(1, 10000),
    };
}

RowsOf<FlowUnit> flowRows() {
    return {
        number(&FlowUnit::flow_m3s, Quantity::discharge,
               {"flow_m3s", "Discharge", "Discharge at the start; studies change it over time."})
            .range(-5000, 5000)};
}

RowsOf<PowerUnit> powerRows() {
    return {number(&PowerUnit::power_W, Quantity::power,
                   {"power_MW", "Hydraulic power",
                    "Power taken from the water, held whatever the head: the ideal governor."})
                .needed()
                .range(0, 5000)};
}

RowsOf<Passage> passageRows() {
    return {
        number(&Passage::length_m, Quantity::length,
               {"length_m", "Length", "Length of the passage along its middle line."})
            .needed()
            .range(0, 1000)
            .usual(1, 120)
            .moves("Tw"),
        number(&Passage::area_m2, Quantity::area,
               {"area_m2", "Area", "Area whose length over area is the passage's inertia."})
            .needed()
            .range(1e-3, 1000)
            .usual(0.1, 300)
            .moves("Tw"),
    };
}

RowsOf<Generator> generatorRows() {
    return {
        number(&Generator::rated_VA, Quantity::apparentPower,
               {"rated_MVA", "Rated power", "Rated apparent power of the generator."})
            .needed()
            .range(0.001, 3000)
            .usual(0.1, 1000),
        number(&Generator::powerFactor, Quantity::factor,
               {"powerFactor", "Power factor", "Rated power factor."})
            .range(0.1, 1)
            .usual(0.8, 1),
        number(&Generator::efficiency, Quantity::percent,
               {"efficiency_pct", "Efficiency",
                "Share of the shaft power that reaches the terminals."})
            .range(50, 100)
            .usual(94, 99.5),
    };
}

RowsOf<Synchronous> synchronousRows() {
    return {
        truth(&Synchronous::locked,
              {"locked", "Locked to the grid",
               "True: the speed is the grid's frequency, without a rotor angle."}),
        number(&Synchronous::synchronising_pu, Quantity::perUnit,
               {"synchronising_pu", "Synchronising torque",
                "Torque per radian of rotor angle, on the generator's rating."})
            .range(0.05, 20)
            .usual(0.8, 3),
        number(
            &Synchronous::damping_pu, Quantity::perUnit,
            {"damping_pu", "Damping torque", "Torque per unit of slip, on the generator's rating."})
            .range(0, 500)
            .usual(5, 40),
    };
}

Column stageStroke() {
    auto stroke = column("to_pct", "Down to stroke", Quantity::percent, 0, 100);
    stroke.falling = true;
    return stroke;
}

RowsOf<Servo> servoRows() {
    return {
        number(&Servo::opening_s, Quantity::time,
               {"opening_s", "Opening time", "Time for the full stroke in opening direction."})
            .needed()
            .range(0.1, 1000)
            .usual(4, 60)
            .moves("lowest head, wrong-way power"),
        eitherOf<Servo>(
            {
                {number(&Servo::closing_s, Quantity::time,
                        {"closing_s", "Closing time",
                         "Time for the full stroke in closing direction, at one rate."})
                     .needed()
                     .range(0.1, 1000)
                     .usual(4, 60)
                     .moves("highest head, highest speed")},
                {table(&Servo::closingStages,
                       {stageStroke(),
                        column("fullStroke_s", "Full-stroke time", Quantity::time, 0.1, 1000)},
                       {"closingStages", "Closing in stages",
                        "Rows from full stroke downwards: down to which stroke, and the "
                        "full-stroke time that the rate there would need."})
                     .needed()
                     .leastRows(1)},
            },
            "Closing", "The closing law at one rate, or in stages."),
        number(&Servo::cushionBelow, Quantity::percent,
               {"cushionBelow_pct", "Cushion below", "Stroke below which the closing is slowed."})
            .range(0, 50)
            .usual(0, 20),
        number(&Servo::cushion_s, Quantity::time,
               {"cushion_s", "Cushion time", "Time for the stroke from there to closed."})
            .range(0, 200)
            .usual(0, 10),
        number(&Servo::deadTime_s, Quantity::time,
               {"deadTime_s", "Dead time", "Time from an order to the first movement."})
            .range(0, 10)
            .usual(0, 0.5),
        number(&Servo::lag_s, Quantity::time,
               {"lag_s", "Servo lag", "Time constant of the pilot and main servo."})
            .range(0, 10)
            .usual(0.03, 0.5),
    };
}

RowsOf<PidGains> gainRows() {
    return {
        number(&PidGains::kp, Quantity::factor,
               {"kp", "Proportional gain", "Stroke per unit of speed deviation."})
            .needed()
            .range(0, 200)
            .usual(0.5, 10)
            .moves("stability"),
        number(&PidGains::ki_1s, Quantity::rate,
               {"ki_1s", "Integral gain", "Rate of stroke per unit of speed deviation."})
            .needed()
            .range(0, 200)
            .usual(0.05, 5)
            .moves("stability"),
        number(&PidGains::kd_s, Quantity::time,
               {"kd_s", "Derivative gain", "Stroke per unit of rate of speed."})
            .range(0, 200)
            .usual(0, 5),
    };
}

RowsOf<PidGovernor> pidRows() {
    return {
        number(&PidGovernor::droop, Quantity::percent,
               {"droop_pct", "Droop",
                "Fall of frequency, in per cent of nominal, for the full stroke or power."})
            .range(0, 100)
            .usual(2, 10)
            .moves("share in frequency control"),
        truth(&PidGovernor::droopOnPower,
              {"droopOnPower", "Droop on power", "True: the droop counts power, false: stroke."}),
        number(access(&PidGovernor::gains, &PidGains::kp), Quantity::factor,
               {"kp", "Proportional gain", "Stroke per unit of speed deviation."})
            .needed()
            .range(0, 200)
            .usual(0.5, 10)
            .moves("stability"),
        number(access(&PidGovernor::gains, &PidGains::ki_1s), Quantity::rate,
               {"ki_1s", "Integral gain", "Rate of stroke per unit of speed deviation."})
            .needed()
            .range(0, 200)
            .usual(0.05, 5)
            .moves("stability"),
        number(access(&PidGovernor::gains, &PidGains::kd_s), Quantity::time,
               {"kd_s", "Derivative gain", "Stroke per unit of rate of speed."})
            .range(0, 200)
            .usual(0, 5),
        group(&PidGovernor::noLoad, gainRows(),
              {"noLoad", "Gains off the grid",
               "Gains used while the unit is not on the grid; left out: the same."}),
        number(&PidGovernor::derivativeFilter_s, Quantity::time,
               {"derivativeFilter_s", "Derivative filter",
                "Time constant that smooths the derivative part."})
            .range(0, 10)
            .usual(0.01, 0.3),
        number(
            &PidGovernor::deadBand_Hz, Quantity::frequency,
            {"deadBand_Hz", "Dead band",
             "Deviation of frequency, to either side, below which the governor does not answer."})
            .range(0, 2)
            .usual(0, 0.02),
        number(&PidGovernor::sampleTime_s, Quantity::time,
               {"sampleTime_s", "Sample time",
                "Interval at which the governor reads and decides; left out: continuous."})
            .range(0.001, 5)
            .usual(0.005, 0.2),
        number(&PidGovernor::openingLimit, Quantity::percent,
               {"openingLimit_pct", "Opening limit",
                "Stroke that the governor does not exceed; left out: full."})
            .range(0, 100),
    };
}

RowsOf<Interlocks> interlockRows() {
    return {
        number(&Interlocks::reloadNotBefore_s, Quantity::time,
               {"reloadNotBefore_s", "Reload not before",
                "Time after a trip within which an order to load is held back; left out: none."})
            .range(0, 86400)
            .usual(0, 3600)
            .moves("lowest shaft level"),
        number(&Interlocks::synchroniseWithin_pu, Quantity::speedRatio,
               {"synchroniseWithin_pu", "Synchronising window",
                "Deviation of speed within which the unit may join the grid."})
            .range(1e-4, 0.1)
            .usual(0.001, 0.01),
        number(&Interlocks::synchroniseHold_s, Quantity::time,
               {"synchroniseHold_s", "Synchronising hold",
                "Time for which the speed stays within the window before the unit joins."})
            .range(0, 60)
            .usual(0.5, 5),
    };
}

RowsOf<Protection> protectionRows() {
    return {
        number(&Protection::overspeed_pu, Quantity::speedRatio,
               {"overspeed_pu", "Overspeed trip",
                "Speed at which the unit is shut down; left out: none."})
            .range(1.01, 3)
            .usual(1.1, 1.6),
        number(&Protection::overspeedDelay_s, Quantity::time,
               {"overspeedDelay_s", "Overspeed delay",
                "Time from passing that speed to the shutdown order."})
            .range(0, 60)
            .usual(0, 2),
    };
}

RowsOf<Unit> turbineKinds() {
    return {
        kind(&Unit::turbine, francisRows(),
             {"francis", "Francis turbine", "A Francis turbine with its chart."}),
        kind(&Unit::turbine, orificeRows(),
             {"orifice", "Ideal orifice",
              "An ideal gate: discharge follows opening and the root of the head."}),
        kind(&Unit::turbine, flowRows(),
             {"flow", "Given discharge", "An ideal unit whose discharge is given."}),
        kind(&Unit::turbine, powerRows(),
             {"power", "Constant power", "An ideal unit that takes constant hydraulic power."}),
    };
}

} // namespace

RowsOf<Unit> unitRows() {
    return {
        reference(&Unit::from, {Collection::points},
                  {"from", "Inlet", "Point where the unit takes its water."})
            .needed(),
        reference(&Unit::to, {Collection::reservoirs, Collection::points},
                  {"to", "Outlet", "Water or point that the unit discharges into."})
            .needed(),
        elevation(&Unit::centreline_m,
                  {"centreline_m", "Centreline",
                   "Elevation of the runner's middle; left out: that of the inlet point."})
            .moves("draft-tube pressure"),
        group(&Unit::spiral, passageRows(),
              {"spiral", "Spiral case", "Passage from the inlet to the runner, for its inertia."}),
        group(
            &Unit::draftTube, passageRows(),
            {"draftTube", "Draft tube", "Passage from the runner to the outlet, for its inertia."}),
        oneOf<Unit>(turbineKinds(), {"turbine", "Turbine", "The kind of turbine and its data."})
            .needed(),
        groupBy<Unit, Unit>(
            [](Unit& unit) { return &unit; },
            [](const Unit& unit) { return unit.inertia_kgm2 ? &unit : nullptr; },
            {number(&Unit::inertia_kgm2, Quantity::inertia,
                    {"j_tm2", "Moment of inertia J",
                     "Moment of inertia of all that turns; a quarter of GD²."})
                 .needed()
                 .range(1e-6, 1e6)
                 .moves("highest speed, Ta")},
            {"inertia", "Inertia",
             "Inertia of the turning masses; left out only for ideal units that do not turn."}),
        group(&Unit::generator, generatorRows(),
              {"generator", "Generator", "Rating of the generator."}),
        oneOf<Unit>(
            {
                kind(&Unit::drive, synchronousRows(),
                     {"synchronous", "Synchronous", "A generator directly on the grid."}),
            },
            {"drive", "Drive", "How the unit is tied to the grid; left out: synchronous."}),
        group(
            &Unit::servo, servoRows(),
            {"servo", "Servo", "Rates and delays of the gate; left out for units without a gate."}),
        oneOf<Unit>(
            {
                groupBy<Unit, PidGovernor>(
                    [](Unit& unit) { return &std::get<PidGovernor>(unit.governor.emplace()); },
                    [](const Unit& unit) {
                        return unit.governor ? std::get_if<PidGovernor>(&*unit.governor) : nullptr;
                    },
                    pidRows(),
                    {"pid", "PID governor",
                     "Proportional, integral and derivative parts side by side, with droop."}),
            },
            {"governor", "Governor",
             "What moves the gate; left out: the gate moves by a study's orders only."}),
        group(&Unit::interlocks, interlockRows(),
              {"interlocks", "Interlocks",
               "What keeps orders back, and when the unit may join the grid."}),
        group(&Unit::protection, protectionRows(),
              {"protection", "Protection", "What shuts the unit down by itself."}),
    };
}

} // namespace headroom::plant::rows
