// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "hydraulics/friction_factor.h"
#include "support/catch.h"

#include <array>
#include <cmath>

using namespace headroom::hydraulics;

namespace {

constexpr std::array reynoldsNumbers{4e3, 1e4, 1e5, 1e6, 1e7, 1e8};
constexpr std::array roughnesses{0.0, 1e-6, 1e-5, 1e-4, 1e-3, 1e-2, 5e-2};

// Explicit approximations, used only to cross-check the implicit law.
double swameeJain(double reynolds, double roughness) {
    return 0.25 / std::pow(std::log10(roughness / 3.7 + 5.74 / std::pow(reynolds, 0.9)), 2);
}
double haaland(double reynolds, double roughness) {
    return std::pow(-1.8 * std::log10(std::pow(roughness / 3.7, 1.11) + 6.9 / reynolds), -2);
}

} // namespace

TEST_CASE("Friction factor: laminar flow has 64/Re", "[hydraulics][analytic]") {
    // Source: Hagen–Poiseuille, from memory.
    for (const auto& [reynolds, factor] :
         {std::pair{100.0, 0.64}, {1000.0, 0.064}, {2000.0, 0.032}}) {
        CHECK_THAT(laminarFactor(reynolds), WithinRel(factor, 1e-12));
        CHECK_THAT(darcyFactor(reynolds, 1e-3), WithinRel(factor, 1e-12));
    }
}

TEST_CASE("Friction factor: Colebrook–White to eight figures", "[hydraulics][reference]") {
    // Source: form with 3.7 and 2.51 as in Clamond 2009, Ind. Eng. Chem. Res. 48, 3665; original
    // Colebrook 1939, J. ICE 11. Numbers: 30-digit iteration. Tolerance: the printed figures.
    const double expected[6][7] = {
        {0.039907014, 0.039908029, 0.039917167, 0.040008431, 0.040910390, 0.049082269, 0.076986835},
        {0.030882950, 0.030884498, 0.030898423, 0.031037212, 0.032381806, 0.043126585, 0.073801276},
        {0.017989773, 0.017995193, 0.018043803, 0.018513866, 0.022174536, 0.038503544, 0.071780929},
        {0.011645041, 0.011668156, 0.011869545, 0.013441438, 0.019943466, 0.037964742, 0.071573754},
        {0.0081026694, 0.0082131804, 0.0089957117, 0.012166081, 0.019667052, 0.037909826,
         0.071552982},
        {0.0059404664, 0.0064325565, 0.0081875591, 0.011999051, 0.019638633, 0.037904323,
         0.071550904}};
    for (std::size_t i = 0; i < reynoldsNumbers.size(); ++i) {
        for (std::size_t j = 0; j < roughnesses.size(); ++j) {
            CAPTURE(reynoldsNumbers[i], roughnesses[j]);
            CHECK_THAT(darcyFactor(reynoldsNumbers[i], roughnesses[j]),
                       WithinRel(expected[i][j], 6e-8));
        }
    }
}

TEST_CASE("Friction factor: the iteration leaves no residual", "[hydraulics][invariant]") {
    for (const double reynolds : reynoldsNumbers) {
        for (const double roughness : roughnesses) {
            const double x = 1.0 / std::sqrt(colebrookWhiteFactor(reynolds, roughness));
            const double again = -2.0 * std::log10(roughness / 3.7 + 2.51 * x / reynolds);
            CHECK_THAT(again, WithinRel(x, 1e-12));
        }
    }
}

TEST_CASE("Friction factor: fully rough limit", "[hydraulics][limit]") {
    // Source: White, Fluid Mechanics, eq. 6.63 (rounded values seen in an extract); recomputed.
    const std::array<std::pair<double, double>, 5> rows{{{1e-5, 0.0080632493},
                                                         {1e-4, 0.011979797},
                                                         {1e-3, 0.019635466},
                                                         {1e-2, 0.037903712},
                                                         {5e-2, 0.071550673}}};
    for (const auto& [roughness, factor] : rows) {
        CHECK_THAT(fullyRoughFactor(roughness), WithinRel(factor, 3e-8));
        // The law reaches it: at Re 1e13 the smooth term is below 1e-6 of the rough one.
        CHECK_THAT(darcyFactor(1e13, roughness), WithinRel(factor, 1e-6));
    }
}

TEST_CASE("Friction factor: explicit approximations differ as published",
          "[hydraulics][reference]") {
    // Sources: Swamee & Jain 1976, ASCE J. Hydr. Div. 102 HY5; Haaland 1983, J. Fluids Eng. 105;
    // both from memory, numbers recomputed. Columns: value, deviation from Colebrook–White in %.
    struct Row {
        double reynolds, roughness, swamee, swameeDeviation, haaland, haalandDeviation;
    };
    const std::array<Row, 7> rows{{{1e4, 1e-4, 0.03114870, 0.36, 0.03099034, -0.15},
                                   {1e5, 1e-4, 0.01845245, -0.33, 0.01826505, -1.34},
                                   {1e6, 1e-4, 0.01350770, 0.49, 0.01332616, -0.86},
                                   {1e6, 1e-3, 0.02002924, 0.43, 0.01994120, -0.01},
                                   {1e7, 1e-3, 0.01968617, 0.10, 0.01970193, 0.18},
                                   {1e7, 1e-5, 0.009058546, 0.70, 0.008957983, -0.42},
                                   {5e3, 1e-2, 0.04859553, 2.83, 0.04730334, 0.09}}};
    for (const Row& row : rows) {
        CAPTURE(row.reynolds, row.roughness);
        const double exact = colebrookWhiteFactor(row.reynolds, row.roughness);
        CHECK_THAT(swameeJain(row.reynolds, row.roughness), WithinRel(row.swamee, 5e-7));
        CHECK_THAT(haaland(row.reynolds, row.roughness), WithinRel(row.haaland, 5e-7));
        CHECK_THAT(100.0 * (row.swamee / exact - 1.0), WithinAbs(row.swameeDeviation, 0.006));
        CHECK_THAT(100.0 * (row.haaland / exact - 1.0), WithinAbs(row.haalandDeviation, 0.006));
    }
}

TEST_CASE("Friction factor: continuous through the transition, loss increasing",
          "[hydraulics][invariant]") {
    for (const double roughness : roughnesses) {
        CAPTURE(roughness);
        CHECK_THAT(darcyFactor(2000.0 * (1 + 1e-12), roughness), WithinRel(0.032, 1e-9));
        CHECK_THAT(darcyFactor(4000.0 * (1 - 1e-12), roughness),
                   WithinRel(darcyFactor(4000.0, roughness), 1e-9));
        double last = 0.0;
        for (double reynolds = 100.0; reynolds < 1e5; reynolds *= 1.01) {
            const double loss = darcyFactor(reynolds, roughness) * reynolds * reynolds;
            REQUIRE(loss > last);
            last = loss;
        }
    }
}

TEST_CASE("Friction factor: Strickler number and back", "[hydraulics][analytic]") {
    // Source: V = M R^(2/3) S^(1/2), from memory; f = 8g/(M² R^(1/3)) derived here. M = 35.
    CHECK_THAT(factorOfStrickler(35.0, 3.0 / 4.0, 9.81), WithinRel(0.070512993, 1e-8));
    CHECK_THAT(factorOfStrickler(35.0, 6.0 / 4.0, 9.81), WithinRel(0.055966200, 1e-8));
    // Full circular pipe: f = 124.5792 n²/D^(1/3) (g = 9.81), n = 1/M.
    CHECK_THAT(factorOfStrickler(50.0, 2.0 / 4.0, 9.81),
               WithinRel(124.5792 / 2500.0 / std::cbrt(2.0), 1e-6));
    CHECK_THAT(stricklerOfFactor(factorOfStrickler(47.0, 1.3, 9.81), 1.3, 9.81),
               WithinRel(47.0, 1e-14));
}

TEST_CASE("Friction factor: nonsense is the caller's fault", "[hydraulics][limit]") {
    CHECK_THROWS_AS(darcyFactor(0.0, 1e-3), headroom::Bug);
    CHECK_THROWS_AS(colebrookWhiteFactor(1e5, -1e-3), headroom::Bug);
    CHECK_THROWS_AS(colebrookWhiteFactor(std::nan(""), 1e-3), headroom::Bug);
    CHECK_THROWS_AS(fullyRoughFactor(0.0), headroom::Bug);
}
