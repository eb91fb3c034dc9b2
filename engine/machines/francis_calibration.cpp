// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "machines/factors.h"
#include "machines/francis_chart.h"
#include "machines/francis_solve.h"
#include "machines/messages.h"
#include "numerics/elementary.h"
#include "numerics/least_squares.h"
#include "units/text.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace headroom::machines {

namespace {

using numerics::square;

constexpr double rpmPerRads = 30.0 / constants::pi;
constexpr double smallestFriction = 0.01; ///< of rated head, at the rated point
constexpr double largestDip = 1e-3;       ///< of rated head
constexpr double largestResidual = 3.0;   ///< in units of each target's tolerance

Finding finding(const Message& message, const std::string& subject,
                std::vector<std::pair<std::string, Argument>> arguments) {
    return {.message = &message, .subject = subject, .arguments = std::move(arguments)};
}

Amount share(double value) {
    return amount(Quantity::perUnit, value);
}

/// Parts of the form that a Francis chart does not fit; recipes worked out with them once.
FrancisForm fixedParts(const FrancisTargets& targets) {
    FrancisForm form;
    form.ratedEfficiency = targets.ratedEfficiency;
    form.u1 = targets.u1;
    form.disc = 0.010;
    form.recirculationFlow = 0.26;
    form.gate = 0.003;
    form.slip = 0.95;
    form.exitPump = 0.8;
    form.phiPump = 0.95;
    form.blendWidth = 0.10;
    form.blendRound = 0.3;
    return form;
}

/// The six free shape parameters, in the order of the least-squares unknowns.
struct Shape {
    double u2, phi, shockFreeFlow, shock, exit, recirculation;
    explicit Shape(std::span<const double> x)
        : u2(x[0]), phi(x[1]), shockFreeFlow(x[2]), shock(x[3]), exit(x[4]), recirculation(x[5]) {}
};

/// Loss on the pump side and the blend from the zero-flow head h₀ = C.
void fitZeroFlow(FrancisForm& form) {
    const double zeroFlowHead = form.speedTerm();
    const double rim = form.u1 * form.slip;
    const double w0 = (rim - zeroFlowHead) / (rim + form.u2);
    form.blendShift = numerics::artanh(2.0 * w0 - 1.0);
    form.shockPump =
        2.0 * (rim - zeroFlowHead - 0.5 * form.exitPump * form.u2) / (form.u1 * square(form.slip));
}

/// Swirl from the rated torque, inlet angle from the shock-free flow, friction from the rated head.
FrancisForm formOf(const FrancisTargets& targets, const Shape& shape) {
    FrancisForm form = fixedParts(targets);
    form.u2 = shape.u2;
    form.phi = shape.phi;
    form.shockTurbine = shape.shock;
    form.exitTurbine = shape.exit;
    form.recirculation = shape.recirculation;
    const double outlet = 1.0 - 1.0 / form.phi;
    const double atRated =
        form.recirculation * numerics::exp(-1.0 / square(form.recirculationFlow));
    form.e1 = (form.ratedEfficiency * (1.0 + form.disc + atRated) + form.u2 * outlet) / form.u1;
    form.e2 = form.e1 - 1.0 / shape.shockFreeFlow;
    form.frictionTurbine = 1.0 - (form.u1 * form.e1 - form.u2 * outlet)
                           - 0.5 * form.shockTurbine * form.u1 * square(form.e1 - form.e2 - 1.0)
                           - 0.5 * form.exitTurbine * form.u2 * square(outlet);
    form.frictionPump = form.frictionTurbine;
    fitZeroFlow(form);
    return form;
}

/// The blend leaves about 1e-9 of the pump side at the rated point; this removes it.
void polishRatedPoint(FrancisForm& form) {
    for (int i = 0; i < 4; ++i) {
        const ChartPoint p = form.at(1.0, 1.0, 1.0);
        const double torqueGap = 1.0 - p.m;
        form.e1 += form.ratedEfficiency * torqueGap / form.u1;
        form.e2 += form.ratedEfficiency * torqueGap / form.u1; // keeps the shock-free flow
        form.frictionTurbine += 1.0 - form.at(1.0, 1.0, 1.0).h;
        form.frictionPump = form.frictionTurbine;
    }
}

constexpr std::size_t targetCount = 6;

std::optional<std::array<double, targetCount>> reached(const FrancisForm& form) {
    if (!(form.flowTerm(1.0) > 0.0) || !(std::fabs(form.blendShift) < 20.0)
        || !(form.shockPump >= 0.0)) {
        return std::nullopt;
    }
    const auto noLoad = pointOfTorque(form, 0.0);
    const auto half = pointOfTorque(form, 0.5);
    const auto best = bestPoint(form);
    if (!noLoad || !half || !best) {
        return std::nullopt;
    }
    return std::array{runawayAt(form, 1.0),        noLoad->q,
                      flowAt(form, 1.0, 0.0, 1.0), best->m,
                      best->efficiency(form),      half->efficiency(form)};
}

std::vector<CalibrationRow> rowsOf(const FrancisTargets& t,
                                   const std::array<double, targetCount>& got) {
    return {{"runaway speed", t.runaway, got[0], 0.01},
            {"no-load flow", t.noLoadFlow, got[1], 0.01},
            {"standstill flow", t.standstillFlow, got[2], 0.05},
            {"power of best efficiency", t.bestPower, got[3], 0.02},
            {"best efficiency", t.bestEfficiency, got[4], 0.002},
            {"efficiency at half power", t.halfPowerEfficiency, got[5], 0.005}};
}

std::vector<double> fitShape(const FrancisTargets& targets) {
    const double u1 = targets.u1;
    numerics::LeastSquaresProblem problem;
    problem.residualCount = static_cast<int>(targetCount);
    problem.start = {u1 / 2.0, 0.95, 1.03, 1.0, 0.9, 0.05};
    problem.lower = {0.2, 0.7, 0.8, 0.3, 0.3, 0.0};
    problem.upper = {0.7, 1.3, 1.3, 1.5, 1.5, 0.15};
    problem.residuals = [&](std::span<const double> x, std::span<double> r) {
        const auto got = reached(formOf(targets, Shape(x)));
        if (!got) {
            return false;
        }
        const auto rows = rowsOf(targets, *got);
        std::transform(rows.begin(), rows.end(), r.begin(),
                       [](const CalibrationRow& row) { return row.residual(); });
        return true;
    };
    return numerics::fitBounded(problem).unknowns;
}

void requirePositive(Findings& found, const std::string& subject, const std::string& name,
                     Amount value) {
    if (!(value.si > 0.0) || !std::isfinite(value.si)) {
        found.push_back(
            finding(ratedValueNotPositive, subject, {{"name", name}, {"value", value}}));
    }
}

void requireWithin(Findings& found, const std::string& subject, const std::string& name,
                   double value, double least, double most) {
    if (!(value >= least && value <= most)) {
        found.push_back(finding(targetOutOfRange, subject,
                                {{"name", name},
                                 {"value", share(value)},
                                 {"least", share(least)},
                                 {"most", share(most)}}));
    }
}

Findings checkRated(const FrancisRating& r, const std::string& subject) {
    Findings found;
    requirePositive(found, subject, "rated head", amount(Quantity::head, r.ratedHead_m));
    requirePositive(found, subject, "rated flow", amount(Quantity::discharge, r.ratedFlow_m3s));
    requirePositive(found, subject, "rated speed", amount(Quantity::rotation, r.ratedSpeed_rads));
    requirePositive(found, subject, "rated power", amount(Quantity::power, r.ratedPower_W));
    if (r.runnerDiameter_m) {
        requirePositive(found, subject, "runner diameter",
                        amount(Quantity::diameter, *r.runnerDiameter_m));
    }
    return found;
}

Findings checkTargets(const FrancisTargets& t, const std::string& subject) {
    Findings found;
    constexpr double leastEfficiency = 0.5, mostEfficiency = 0.97;
    if (!(t.ratedEfficiency >= leastEfficiency && t.ratedEfficiency <= mostEfficiency)) {
        found.push_back(finding(ratedEfficiencyImpossible, subject,
                                {{"efficiency", share(t.ratedEfficiency)},
                                 {"least", share(leastEfficiency)},
                                 {"most", share(mostEfficiency)}}));
    }
    constexpr double slowest = 0.3, fastest = 3.0; // beyond, the form has not been tried
    if (!(t.u1 >= slowest && t.u1 <= fastest)) {
        found.push_back(
            finding(speedNotFrancis, subject,
                    {{"value", share(t.u1)}, {"least", share(slowest)}, {"most", share(fastest)}}));
    }
    requireWithin(found, subject, "runaway speed", t.runaway, 1.2, 3.0);
    requireWithin(found, subject, "no-load flow", t.noLoadFlow, 0.02, 0.3);
    requireWithin(found, subject, "standstill flow", t.standstillFlow, 0.5, 2.0);
    requireWithin(found, subject, "power of best efficiency", t.bestPower, 0.5, 1.1);
    requireWithin(found, subject, "best efficiency", t.bestEfficiency, t.ratedEfficiency, 0.98);
    requireWithin(found, subject, "efficiency at half power", t.halfPowerEfficiency, 0.4,
                  t.bestEfficiency);
    return found;
}

/// Head lost between the start of the turbine side and the lowest point of its curve.
double dip(const FrancisForm& form, double relativeOpening) {
    const double c = 1.0 / relativeOpening;
    const double mixed = form.mixedTerm(c);
    return mixed < 0.0 ? mixed * mixed / (4.0 * form.flowTerm(c)) : 0.0;
}

Findings checkForm(const FrancisForm& form, const std::vector<CalibrationRow>& rows,
                   const std::string& subject) {
    Findings found;
    for (const auto& row : rows) {
        const double times = std::fabs(row.residual());
        if (!(times <= largestResidual)) {
            found.push_back(finding(chartMissesTarget, subject,
                                    {{"name", row.name},
                                     {"asked", share(row.asked)},
                                     {"reached", share(row.reached)},
                                     {"times", amount(Quantity::factor, times)},
                                     {"tolerance", share(row.tolerance)}}));
        }
    }
    if (!(form.frictionTurbine >= smallestFriction)) {
        found.push_back(
            finding(chartLossTooSmall, subject,
                    {{"value", share(form.frictionTurbine)}, {"least", share(smallestFriction)}}));
    }
    return found;
}

// --- gate law -----------------------------------------------------------------------------------

std::vector<std::pair<double, double>> completeRows(const FrancisRating& rating) {
    auto rows = rating.flowByStroke;
    if (rows.empty()) {
        constexpr int parts = 10;
        for (int i = 0; i <= parts; ++i) {
            rows.emplace_back(i / static_cast<double>(parts), i / static_cast<double>(parts));
        }
    } else if (rows.front().first > 0.0 && rows.front().second > 0.0) {
        rows.insert(rows.begin(), {0.0, 0.0});
    }
    return rows;
}

Findings checkRows(const std::vector<std::pair<double, double>>& rows, const std::string& subject) {
    Findings found;
    for (std::size_t i = 1; i < rows.size(); ++i) {
        if (!(rows[i].first > rows[i - 1].first && rows[i].second > rows[i - 1].second)) {
            found.push_back(finding(gateLawNotRising, subject,
                                    {{"row", static_cast<std::int64_t>(i + 1)},
                                     {"stroke", share(rows[i].first)},
                                     {"flow", share(rows[i].second)}}));
        }
    }
    constexpr double rounding = 1e-9;
    if (rows.front().first != 0.0 || rows.front().second != 0.0
        || !(std::fabs(rows.back().first - 1.0) < rounding)) {
        found.push_back(finding(gateLawEnds, subject,
                                {{"firstStroke", share(rows.front().first)},
                                 {"firstFlow", share(rows.front().second)},
                                 {"lastStroke", share(rows.back().first)}}));
    }
    return found;
}

Result<GateLaw> gateLawOf(const FrancisRating& rating, const FrancisForm& form,
                          const std::string& subject) {
    const auto rows = completeRows(rating);
    Findings found = checkRows(rows, subject);
    if (!found.empty()) {
        return found;
    }
    std::vector<double> stroke, opening;
    for (const auto& [at, flow] : rows) {
        const auto c = flow > 0.0 ? inverseOpeningFor(form, flow) : std::optional(0.0);
        if (!c) {
            found.push_back(finding(gateFlowOutOfReach, subject,
                                    {{"stroke", share(at)}, {"flow", share(flow)}}));
            continue;
        }
        stroke.push_back(at);
        opening.push_back(flow > 0.0 ? 1.0 / *c : 0.0);
    }
    if (!found.empty()) {
        return found;
    }
    auto curve = numerics::MonotoneCurve::make(std::move(stroke), std::move(opening), subject);
    if (!curve) {
        return curve.findings();
    }
    return GateLaw(std::move(curve).value());
}

} // namespace

FrancisTargets targetsOf(const FrancisRating& r) {
    FrancisTargets t;
    const double water_W = r.density_kgm3 * r.gravity_mps2 * r.ratedFlow_m3s * r.ratedHead_m;
    t.ratedEfficiency = r.ratedPower_W / water_W;
    const double speed_rpm = r.ratedSpeed_rads * rpmPerRads;
    const auto speeds = specificSpeeds({.speed_rpm = speed_rpm,
                                        .flow_m3s = r.ratedFlow_m3s,
                                        .head_m = r.ratedHead_m,
                                        .diameter_m = 1.0,
                                        .efficiency = t.ratedEfficiency,
                                        .gravity_mps2 = r.gravity_mps2,
                                        .density_kgm3 = r.density_kgm3});
    t.specificSpeed_mhp = speeds.horsepower;
    t.runnerDiameter_m = r.runnerDiameter_m.value_or(
        trialDiameter_m(speed_rpm, r.ratedHead_m, speeds.kilowatt, r.gravity_mps2));
    const double rim_mps = 0.5 * t.runnerDiameter_m * r.ratedSpeed_rads;
    t.u1 = square(rim_mps) / (r.gravity_mps2 * r.ratedHead_m);
    t.runaway = r.runaway_pu.value_or(trialRunaway_pu(t.specificSpeed_mhp));
    // Usual values of a medium Francis turbine; common practice, no source.
    t.noLoadFlow = r.noLoadFlow_pu.value_or(0.08);
    t.standstillFlow = r.standstillFlow_pu.value_or(1.15);
    t.bestPower = r.bestPower_pu.value_or(0.88);
    t.bestEfficiency = r.bestEfficiency_pu.value_or(t.ratedEfficiency + 0.009);
    t.halfPowerEfficiency = r.halfPowerEfficiency_pu.value_or(t.bestEfficiency - 0.06);
    return t;
}

Result<FrancisChart> FrancisChart::calibrate(const FrancisRating& rating,
                                             const std::string& subject) {
    Findings found = checkRated(rating, subject);
    if (!found.empty()) {
        return found;
    }
    const FrancisTargets targets = targetsOf(rating);
    found = checkTargets(targets, subject);
    if (!found.empty()) {
        return found;
    }
    FrancisForm form = formOf(targets, Shape(fitShape(targets)));
    polishRatedPoint(form);
    const auto got = reached(form);
    const auto rows = rowsOf(targets, got.value_or(std::array<double, targetCount>{}));
    found = checkForm(form, rows, subject);
    if (!found.empty()) {
        return found;
    }
    auto gate = gateLawOf(rating, form, subject);
    if (!gate) {
        return gate.findings();
    }
    const double fall = dip(form, gate->largestOpening());
    if (fall > largestDip) {
        return finding(chartTurnsBack, subject,
                       {{"value", share(fall)}, {"most", share(largestDip)}});
    }
    return FrancisChart(rating, targets, form, std::move(gate).value(), rows);
}

} // namespace headroom::machines
