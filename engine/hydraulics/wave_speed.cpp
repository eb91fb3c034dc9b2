// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/wave_speed.h"

#include "base/constants.h"
#include "base/ensure.h"
#include "base/overloaded.h"
#include "hydraulics/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <cmath>

namespace headroom::hydraulics {

namespace {

using numerics::square;

bool positive(double value) {
    return value > 0.0 && std::isfinite(value);
}

class Checker {
public:
    explicit Checker(const std::string& subject) : subject_(subject) {}

    void dimensions(double diameter_m, double thickness_m) {
        if (!positive(diameter_m) || !positive(thickness_m)) {
            add(wallDimension, {{"diameter", amount(Quantity::diameter, diameter_m)},
                                {"thickness", amount(Quantity::thickness, thickness_m)}});
        }
    }
    void material(double modulus_Pa, double poisson) {
        if (!positive(modulus_Pa)) {
            add(modulusNotPositive, {{"modulus", amount(Quantity::modulus, modulus_Pa)}});
        }
        if (!(poisson >= 0.0 && poisson <= 0.5)) {
            add(poissonOutOfRange, {{"ratio", amount(Quantity::factor, poisson)}});
        }
    }
    void gas(const WaveMedium& medium) {
        if (!(medium.gasShare >= 0.0 && medium.gasShare < 1.0) || !positive(medium.pressure_Pa)) {
            add(gasOutOfRange, {{"share", amount(Quantity::factor, medium.gasShare)},
                                {"pressure", amount(Quantity::pressure, medium.pressure_Pa)}});
        }
    }
    Findings findings;

private:
    void add(const Message& message, std::vector<std::pair<std::string, Argument>> arguments) {
        findings.push_back(
            {.message = &message, .subject = subject_, .arguments = std::move(arguments)});
    }
    const std::string& subject_;
};

Findings check(const Wall& wall, const WaveMedium& medium, const std::string& subject) {
    Checker checker(subject);
    std::visit(overloaded{
                   [](const RigidWall&) {},
                   [&](const SteelWall& w) {
                       checker.dimensions(w.diameter_m, w.thickness_m);
                       checker.material(w.modulus_Pa, w.poisson);
                   },
                   [&](const RockWall& w) { checker.material(w.modulus_Pa, w.poisson); },
                   [&](const LinedRockWall& w) {
                       checker.dimensions(w.diameter_m, w.thickness_m);
                       checker.material(w.modulus_Pa, w.poisson);
                       checker.material(w.rockModulus_Pa, w.rockPoisson);
                   },
               },
               wall);
    checker.gas(medium);
    return checker.findings;
}

double thinFactor(AxialRestraint restraint, double poisson) {
    switch (restraint) {
    case AxialRestraint::upstreamOnly:
        return 1.0 - 0.5 * poisson;
    case AxialRestraint::throughout:
        return 1.0 - square(poisson);
    case AxialRestraint::joints:
        return 1.0;
    }
    return 1.0;
}

double restraintFactor(const SteelWall& wall) {
    const double thin = thinFactor(wall.restraint, wall.poisson);
    if (wall.theory == WallTheory::thin) {
        return thin;
    }
    const double relative = wall.thickness_m / wall.diameter_m;
    return 2.0 * relative * (1.0 + wall.poisson) + thin / (1.0 + relative);
}

void addWall(WaveSpeed& made, const SteelWall& wall) {
    made.restraintFactor = restraintFactor(wall);
    made.wall_1Pa = wall.diameter_m / (wall.modulus_Pa * wall.thickness_m) * made.restraintFactor;
}

void addWall(WaveSpeed& made, const RockWall& wall) {
    made.wall_1Pa = 2.0 * (1.0 + wall.poisson) / wall.modulus_Pa;
    made.rockShare = 1.0;
}

// Steel ring in plane strain and rock carry the pressure side by side: stiffnesses add.
void addWall(WaveSpeed& made, const LinedRockWall& wall) {
    const double steel =
        2.0 * wall.modulus_Pa * wall.thickness_m / (wall.diameter_m * (1.0 - square(wall.poisson)));
    const double rock = wall.rockModulus_Pa / (1.0 + wall.rockPoisson);
    made.wall_1Pa = 2.0 / (steel + rock);
    made.rockShare = rock / (steel + rock);
}

void addWall(WaveSpeed&, const RigidWall&) {}

} // namespace

Result<WaveSpeed> waveSpeed(const Wall& wall, const WaveMedium& medium,
                            const std::string& subject) {
    ensure(medium.density_kgm3 > 0.0 && medium.bulkModulus_Pa > 0.0 && medium.temperature_K > 0.0,
           "water is given");
    if (Findings findings = check(wall, medium, subject); !findings.empty()) {
        return findings;
    }
    WaveSpeed made;
    const double gasDensity = medium.pressure_Pa / (constants::airGas_JkgK * medium.temperature_K);
    made.density_kgm3 =
        (1.0 - medium.gasShare) * medium.density_kgm3 + medium.gasShare * gasDensity;
    made.water_1Pa = 1.0 / medium.bulkModulus_Pa;
    made.gas_1Pa = medium.gasShare * (1.0 / medium.pressure_Pa - made.water_1Pa);
    std::visit([&made](const auto& kind) { addWall(made, kind); }, wall);
    made.speed_mps =
        1.0 / numerics::sqrt(made.density_kgm3 * (made.water_1Pa + made.wall_1Pa + made.gas_1Pa));
    return made;
}

double travelTime_s(std::span<const WaveReach> reaches) {
    double sum = 0.0;
    for (const WaveReach& reach : reaches) {
        sum += reach.length_m / reach.speed_mps;
    }
    return sum;
}

double meanWaveSpeed_mps(std::span<const WaveReach> reaches) {
    double length = 0.0;
    for (const WaveReach& reach : reaches) {
        length += reach.length_m;
    }
    return length / travelTime_s(reaches);
}

} // namespace headroom::hydraulics
