// SPDX-License-Identifier: GPL-3.0-or-later
// Steady grade line of a chain, walked through with the laws of this floor.
#include "hydraulics/friction.h"
#include "hydraulics/losses.h"
#include "hydraulics/sections.h"
#include "support/catch.h"

#include <cmath>

using namespace headroom::hydraulics;

namespace {

constexpr double g = 9.81;
constexpr double flow = 60.0;

/// Walks down the energy line; `area` is that of the conduit where one stands.
struct Walk {
    double energy_m;
    double area_m2;
    void local(double coefficient) {
        energy_m -= perFlowSquared_s2m5(coefficient, area_m2, g) * flow * flow;
    }
    void friction(const FrictionLaw& law, double length) {
        energy_m -= law.lossPerMetre(flow) * length;
    }
    double piezometric_m() const { return energy_m - velocityHead_m(flow, area_m2, g); }
};

FrictionLaw steel(double diameter) {
    const Section section = circle(diameter);
    return FrictionLaw::make({section.area_m2, section.hydraulicRadius_m()},
                             FrictionLaw::ColebrookWhite{1e-4, 1.307e-6, g})
        .value();
}

} // namespace

TEST_CASE("Grade line: a chain from reservoir to unit", "[hydraulics][reference]") {
    // Constructed case, recomputed: Q 60 m³/s, ν 1.307e-6 m²/s, reservoir 500 m. Tolerance 1e-5 m.
    const Section tunnel = dShape(6.0, 7.0);
    const auto rock = FrictionLaw::make({tunnel.area_m2, tunnel.hydraulicRadius_m()},
                                        FrictionLaw::Strickler{35.0});
    Walk at{500.0, tunnel.area_m2};
    const auto expect = [&at](double energy, double piezometric) {
        CHECK_THAT(at.energy_m, WithinAbs(energy, 1e-5));
        CHECK_THAT(at.piezometric_m(), WithinAbs(piezometric, 1e-5));
    };
    at.local(0.30); // intake
    expect(499.962153, 499.835998);
    at.friction(*rock, 5000.0);
    expect(494.687317, 494.561162);
    at.local(0.15); // tee of the chamber
    expect(494.668394, 494.542238);
    // A chamber that sees the whole velocity head of the tunnel stands on the piezometric line.
    CHECK_THAT(at.energy_m - chamberHeadDrop_m(1.0, flow, tunnel.area_m2, g),
               WithinAbs(494.542238, 1e-5));
    at.area_m2 = circle(4.2).area_m2;
    at.local(0.10);
    expect(494.572801, 493.616870);
    at.friction(steel(4.2), 300.0);
    expect(493.912001, 492.956069);
    at.local(2 * 0.08);
    expect(493.759052, 492.803121);
    at.area_m2 = circle(3.4).area_m2;
    at.local(0.04);
    expect(493.670015, 491.444103);
    at.friction(steel(3.4), 300.0);
    expect(491.726318, 489.500405);
    at.local(0.05);
    expect(491.615022, 489.389110);
    CHECK_THAT(500.0 - at.energy_m, WithinAbs(8.384978083, 1e-6));
    const double head = at.energy_m - 250.0;
    CHECK_THAT(1000.0 * g * flow * head * 0.92 / 1e6, WithinRel(130.837434, 1e-8));
}

TEST_CASE("Grade line: two parallel pipes share the flow", "[hydraulics][reference]") {
    // Constructed case, recomputed: same end heads, 10 m³/s in total.
    const auto coefficient = [](double length, double diameter, double factor) {
        const Section section = circle(diameter);
        return length
               * FrictionLaw::make({section.area_m2, section.hydraulicRadius_m()},
                                   FrictionLaw::DarcyFactor{factor, g})
                     ->quadratic_s2m6(1.0);
    };
    const double first = coefficient(800, 1.2, 0.015);
    const double second = coefficient(900, 1.6, 0.014);
    CHECK_THAT(first, WithinRel(0.398470569, 1e-8));
    CHECK_THAT(second, WithinRel(0.099286881, 1e-8));
    const double loss = std::pow(10.0 / (1 / std::sqrt(first) + 1 / std::sqrt(second)), 2);
    CHECK_THAT(loss, WithinRel(4.417642275, 1e-8));
    CHECK_THAT(std::sqrt(loss / first), WithinRel(3.329638984, 1e-8));
    CHECK_THAT(std::sqrt(loss / second), WithinRel(6.670361016, 1e-8));
}
