// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/friction.h"

#include "base/ensure.h"
#include "hydraulics/friction_factor.h"
#include "hydraulics/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <cmath>
#include <optional>

namespace headroom::hydraulics {

namespace {

struct Sample {
    double value, slope; // of the excess factor, by x = Re/2000
};

Sample sampleExcess(double x, double relativeRoughness) {
    const double reynolds = laminarReynolds * x;
    const double factor = colebrookWhiteFactor(reynolds, relativeRoughness);
    // Implicit derivative of X = −2 log₁₀(u), u = A + C X/Re, with X = 1/√f, so u = 10^(−X/2).
    const double root = 1.0 / numerics::sqrt(factor);
    const double u = numerics::pow(10.0, -0.5 * root);
    constexpr double smoothConstant = 2.51;
    const double s = 2.0 / numerics::log(10.0) * smoothConstant / (reynolds * u);
    const double rootSlope = s * root / (reynolds * (1.0 + s));
    const double factorSlope = -2.0 * factor / root * rootSlope;
    const double laminar = laminarFactor(reynolds);
    return {factor - laminar, laminarReynolds * factorSlope + laminar / x};
}

bool positive(double value) {
    return value > 0.0 && std::isfinite(value);
}

std::optional<Finding> checkBore(const Bore& bore, const std::string& subject) {
    if (positive(bore.area_m2) && positive(bore.hydraulicRadius_m)) {
        return std::nullopt;
    }
    return Finding{.message = &boreNotPositive,
                   .subject = subject,
                   .arguments = {{"area", amount(Quantity::area, bore.area_m2)},
                                 {"radius", amount(Quantity::length, bore.hydraulicRadius_m)}}};
}

Finding single(const Message& message, const std::string& subject, const char* name, Amount value) {
    return {.message = &message, .subject = subject, .arguments = {{name, value}}};
}

Findings collect(std::optional<Finding> first, bool holds, Finding second) {
    Findings findings;
    if (first) {
        findings.push_back(std::move(*first));
    }
    if (!holds) {
        findings.push_back(std::move(second));
    }
    return findings;
}

// Loss per metre is f Q|Q| times this; f is the Darcy factor on D_h = 4 R.
double darcyScale(const Bore& bore, double gravity_mps2) {
    return 1.0 / (8.0 * gravity_mps2 * bore.hydraulicRadius_m * numerics::square(bore.area_m2));
}

} // namespace

ExcessFactor::ExcessFactor(double relativeRoughness) {
    constexpr int perDoubling = 1 << digits;
    pieces_.reserve(static_cast<std::size_t>(doublings * perDoubling + 1));
    const double atTurbulent = sampleExcess(2.0, relativeRoughness).value;
    for (int i = 0; i < perDoubling; ++i) { // x = 1 … 2: the straight blend
        pieces_.push_back({atTurbulent * i / perDoubling, atTurbulent / perDoubling, 0.0, 0.0});
    }
    Sample low = sampleExcess(2.0, relativeRoughness);
    for (int doubling = 1; doubling < doublings; ++doubling) {
        const double width = std::ldexp(1.0, doubling - digits);
        for (int i = 0; i < perDoubling; ++i) {
            const Sample high =
                sampleExcess(std::ldexp(1.0, doubling) + (i + 1) * width, relativeRoughness);
            const double a = low.slope * width;
            const double b = high.slope * width;
            const double rise = high.value - low.value;
            pieces_.push_back({low.value, a, 3.0 * rise - 2.0 * a - b, a + b - 2.0 * rise});
            low = high;
        }
    }
    pieces_.push_back({low.value, 0.0, 0.0, 0.0});
}

double ExcessFactor::slope(double x) const {
    constexpr double largest = static_cast<double>(1 << doublings);
    if (!(x >= 1.0) || x >= largest) {
        return 0.0;
    }
    double t = 0.0;
    const Piece& p = pieces_[locate(x, t)];
    const double width = std::ldexp(1.0, std::ilogb(x) - digits);
    return (p[1] + t * (2.0 * p[2] + 3.0 * t * p[3])) / width;
}

Result<FrictionLaw> FrictionLaw::make(const Bore& bore, const ColebrookWhite& law,
                                      const std::string& subject) {
    ensure(law.viscosity_m2s > 0.0 && law.gravity_mps2 > 0.0, "water and gravity are given");
    constexpr double tested = 0.05; // largest k/D of the experiments behind the law
    const double diameter = 4.0 * bore.hydraulicRadius_m;
    Finding roughness{.message = &roughnessOutOfRange,
                      .subject = subject,
                      .arguments = {{"roughness", amount(Quantity::roughness, law.roughness_m)},
                                    {"diameter", amount(Quantity::diameter, diameter)}}};
    const auto wrongBore = checkBore(bore, subject);
    const bool inside = law.roughness_m >= 0.0 && std::isfinite(law.roughness_m)
                        && (wrongBore || law.roughness_m < diameter);
    if (Findings findings = collect(wrongBore, inside, roughness); !findings.empty()) {
        return findings;
    }
    FrictionLaw made;
    made.linear_ = 2.0 * law.viscosity_m2s
                   / (law.gravity_mps2 * bore.area_m2 * numerics::square(bore.hydraulicRadius_m));
    made.quadratic_ = darcyScale(bore, law.gravity_mps2);
    made.relative_ = reynoldsNumber(bore, 1.0, law.viscosity_m2s) / laminarReynolds;
    made.excess_ = std::make_shared<const ExcessFactor>(law.roughness_m / diameter);
    if (law.roughness_m > tested * diameter) {
        roughness.message = &roughnessBeyondTests;
        return {std::move(made), {std::move(roughness)}};
    }
    return made;
}

Result<FrictionLaw> FrictionLaw::make(const Bore& bore, const Strickler& law,
                                      const std::string& subject) {
    Findings findings = collect(
        checkBore(bore, subject), positive(law.number),
        single(stricklerNotPositive, subject, "number", amount(Quantity::strickler, law.number)));
    if (!findings.empty()) {
        return findings;
    }
    FrictionLaw made;
    made.quadratic_ = 1.0
                      / (numerics::square(law.number * bore.area_m2)
                         * numerics::pow(bore.hydraulicRadius_m, 4.0 / 3.0));
    return made;
}

Result<FrictionLaw> FrictionLaw::make(const Bore& bore, const DarcyFactor& law,
                                      const std::string& subject) {
    ensure(law.gravity_mps2 > 0.0, "gravity is given");
    Findings findings =
        collect(checkBore(bore, subject), law.factor >= 0.0 && std::isfinite(law.factor),
                single(factorBelowZero, subject, "factor", amount(Quantity::factor, law.factor)));
    if (!findings.empty()) {
        return findings;
    }
    FrictionLaw made;
    made.quadratic_ = law.factor * darcyScale(bore, law.gravity_mps2);
    return made;
}

Result<FrictionLaw> FrictionLaw::make(const Bore& bore, const Linear& law,
                                      const std::string& subject) {
    ensure(law.gravity_mps2 > 0.0, "gravity is given");
    Findings findings =
        collect(checkBore(bore, subject), law.rate_1s >= 0.0 && std::isfinite(law.rate_1s),
                single(rateBelowZero, subject, "rate", amount(Quantity::factor, law.rate_1s)));
    if (!findings.empty()) {
        return findings;
    }
    FrictionLaw made;
    made.linear_ = law.rate_1s / (law.gravity_mps2 * bore.area_m2);
    return made;
}

double FrictionLaw::slope_sm3(double flow_m3s) const {
    const double size = std::fabs(flow_m3s);
    double slope = linear_ + 2.0 * quadratic_s2m6(flow_m3s) * size;
    if (excess_ != nullptr) {
        slope += quadratic_ * excess_->slope(size * relative_) * relative_ * size * size;
    }
    return slope;
}

double reynoldsNumber(const Bore& bore, double flow_m3s, double viscosity_m2s) {
    return 4.0 * bore.hydraulicRadius_m * std::fabs(flow_m3s) / (bore.area_m2 * viscosity_m2s);
}

} // namespace headroom::hydraulics
