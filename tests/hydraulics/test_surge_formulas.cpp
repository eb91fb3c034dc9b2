// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "hydraulics/surge_formulas.h"
#include "support/catch.h"

#include <array>
#include <cmath>

using namespace headroom::hydraulics;

namespace {

// Data S: L 5000 m, A 25 m², F 100 m², Q₀ 50 m³/s (2 m/s), g 9.81 m/s².
constexpr double flow = 50.0;
SurgeTunnel dataS(double loss_m) {
    return {5000.0 / 25.0, loss_m / (flow * flow), 9.81};
}

} // namespace

TEST_CASE("Surge: frictionless period and amplitude", "[surge][analytic]") {
    // Source: formulas in Massoud, Engineering Thermofluids, ch. IIIb.6; recomputed.
    CHECK_THAT(surgePeriod_s(dataS(0), 100.0), WithinRel(283.700670689, 1e-11));
    CHECK_THAT(surgeAmplitude_m(dataS(0), 100.0, flow), WithinRel(22.576182049, 1e-10));
}

TEST_CASE("Surge: exact extremes after a sudden stop", "[surge][reference]") {
    // Source: first integral, Forchheimer 1913, Prášil 1908 (Jaeger 1977, Fluid Transients), from
    // memory; recomputed by two methods.
    const std::array<std::array<double, 3>, 4> rows{{{2, 21.263005113, -19.132211915},
                                                     {5, 19.373329386, -15.440548944},
                                                     {10, 16.461977931, -11.461730432},
                                                     {15, 13.886592830, -8.927713430}}};
    for (const auto& [loss, up, down] : rows) {
        const double amplitude = surgeAmplitude_m(dataS(loss), 100.0, flow);
        const double k = relativeLoss(dataS(loss), 100.0, flow);
        CHECK_THAT(k, WithinRel(loss / 22.576182049, 1e-10));
        CHECK_THAT(amplitude * upsurge(k), WithinAbs(up, 1e-8));
        CHECK_THAT(amplitude * followingDownsurge(k), WithinAbs(down, 1e-8));
    }
    // The frictionless limit, and continuity where the series takes over.
    CHECK(upsurge(0.0) == 1.0);
    CHECK(followingDownsurge(0.0) == -1.0);
    CHECK_THAT(upsurge(4.9e-5), WithinAbs(upsurge(5.1e-5) + 2.0 / 3.0 * 2e-6, 1e-8));
    CHECK_THAT(followingDownsurge(4.9e-5),
               WithinAbs(followingDownsurge(5.1e-5) - 2.0 * 2e-6, 1e-7));
    CHECK_THROWS_AS(upsurge(-0.1), headroom::Bug);
}

TEST_CASE("Surge: hand formulas for the upsurge keep their published bands", "[surge][reference]") {
    // Exact values derived here and recomputed, x₁ and x₂ by K = h_f0/Z*; estimates Calame &
    // Gaden 1926 and Jaeger, from memory, with their errors.
    struct Row {
        double k, up, down, upError, downError; // errors in %, NaN: none given
    };
    const double none = std::nan("");
    const std::array<Row, 10> rows{{{0.05, 0.96694817, -0.90836893, none, none},
                                    {0.1, 0.93447442, -0.83081473, -0.00, -2.4},
                                    {0.2, 0.87135336, -0.70647530, none, none},
                                    {0.3, 0.81082410, -0.61105954, -0.1, -3.7},
                                    {0.4, 0.75307523, -0.53550715, none, none},
                                    {0.5, 0.69829044, -0.47423764, -0.55, -2.7},
                                    {0.6, 0.64664039, -0.42361241, none, none},
                                    {0.7, 0.59827285, -0.38115520, -1.8, -0.4},
                                    {0.8, 0.55330155, -0.34512309, none, none},
                                    {1.0, 0.47376545, -0.28761172, -6.2, 4.3}}};
    for (const Row& row : rows) {
        CAPTURE(row.k);
        CHECK_THAT(upsurge(row.k), WithinAbs(row.up, 6e-9));
        CHECK_THAT(followingDownsurge(row.k), WithinAbs(row.down, 6e-9));
        if (!std::isnan(row.upError)) {
            CHECK_THAT(100 * (upsurgeEstimate(row.k) / row.up - 1), WithinAbs(row.upError, 0.06));
            CHECK_THAT(100 * (followingDownsurgeEstimate(row.k) / row.down - 1),
                       WithinAbs(row.downError, 0.06));
        }
    }
}

TEST_CASE("Surge: throttled upsurge and the best throttle", "[surge][reference]") {
    // Derived here, recomputed by two methods. Data S, h_f0 5 m, throttle loss R₀ at Q₀.
    const std::array<std::pair<double, double>, 6> rows{{{0, 19.373329386},
                                                         {5, 16.764101578},
                                                         {10, 14.811730605},
                                                         {15, 13.279950065},
                                                         {20, 12.037201455},
                                                         {25, 11.003415198}}};
    const double amplitude = surgeAmplitude_m(dataS(5), 100.0, flow);
    for (const auto& [throttle, level] : rows) {
        CHECK_THAT(amplitude * upsurge(5.0 / amplitude, throttle / amplitude),
                   WithinAbs(level, 1e-8));
    }
    // Best throttle: first head under it equals the highest level, R₀ − h_f0 = z₁. Derived here.
    const std::array<std::array<double, 3>, 4> best{{{0, 15.963771420, 15.963771420},
                                                     {2, 16.573270392, 14.573270392},
                                                     {5, 17.602854186, 12.602854186},
                                                     {10, 19.699964254, 9.699964254}}};
    for (const auto& [loss, throttle, level] : best) {
        CHECK_THAT(amplitude * upsurge(loss / amplitude, throttle / amplitude),
                   WithinAbs(level, 1e-8));
    }
}

TEST_CASE("Surge: acceptance formulas keep their published bands", "[surge][reference]") {
    // Exact values: rigid equations integrated to 1e-12, derived here. Vogt 1923/Forchheimer from
    // memory: within 0.15 % for n = 0, 1 % for n = 0.5. Simple rule: +0.1 % at K 0.05, +0.5 % at
    // 0.5, −2.0 % at 1.0.
    const std::array<std::array<double, 3>, 8> rows{{{0.05, -1.00486547, -0.51919562},
                                                     {0.1, -1.00988104, -0.53866935},
                                                     {0.2, -1.02040354, -0.57854394},
                                                     {0.3, -1.03166164, -0.61984207},
                                                     {0.4, -1.04377342, -0.66285006},
                                                     {0.5, -1.05689016, -0.70795556},
                                                     {0.7, -1.08700786, -0.80691641},
                                                     {1.0, -1.14830819, -1.00229949}}};
    for (const auto& [k, full, half] : rows) {
        CAPTURE(k);
        CHECK_THAT(-k * acceptanceDownsurgeEstimate(k, 0.0), WithinRel(full, 1.6e-3));
        CHECK_THAT(-k * acceptanceDownsurgeEstimate(k, 0.5), WithinRel(half, 1.05e-2));
        CHECK_THAT(fullAcceptanceEstimate(k), WithinRel(full, 2.1e-2));
    }
    CHECK_THAT(100 * (fullAcceptanceEstimate(0.05) / -1.00486547 - 1), WithinAbs(0.1, 0.06));
    CHECK_THAT(100 * (fullAcceptanceEstimate(0.5) / -1.05689016 - 1), WithinAbs(0.5, 0.06));
    CHECK_THAT(100 * (fullAcceptanceEstimate(1.0) / -1.14830819 - 1), WithinAbs(-2.0, 0.06));
}

TEST_CASE("Surge: Thoma's critical area", "[surge][reference]") {
    // Source: Thoma 1910, from memory; number recomputed. k = 1.25 s²/m on v², H_gross 150 m,
    // h_p0 1.5 m.
    const ThomaHeads heads{150.0, 5.0, 1.5};
    CHECK_THAT(thomaArea_m2(dataS(5), heads), WithinRel(36.276440991, 1e-10));
    CHECK_THAT(thomaArea_m2(dataS(5), {145.0 + 5.0 - 1.5, 5.0, 0.0}), WithinRel(35.518048, 1e-7));
    CHECK_THAT(thomaArea_m2(dataS(5), {150.0, 5.0, 0.0}), WithinRel(35.150620, 1e-7));
    CHECK(thomaAmplitudeHolds(heads));
    CHECK_FALSE(thomaAmplitudeHolds({150.0, 60.0, 1.5}));
    CHECK(std::isinf(thomaArea_m2(dataS(5), {5.0, 5.0, 0.0})));
    CHECK(std::isinf(thomaArea_m2(dataS(0), heads)));
}

TEST_CASE("Surge: modes around the critical area", "[surge][reference]") {
    // Derived here; recomputed with a non-linear constant-power simulation to 1e-4.
    struct Row {
        double ratio, growth, frequency, period, perCycle;
    };
    const std::array<Row, 9> rows{{{0.8, 1.226250e-3, 3.960237e-2, 158.6568, 1.214768},
                                   {0.9, 5.450000e-4, 3.735139e-2, 168.2182, 1.096013},
                                   {1.0, 0, 3.543841e-2, 177.2987, 1.000000},
                                   {1.1, -4.459091e-4, 3.378626e-2, 185.9687, 0.920420},
                                   {1.2, -8.175000e-4, 3.234037e-2, 194.2831, 0.853144},
                                   {1.5, -1.635000e-3, 2.888911e-2, 217.4932, 0.700752},
                                   {1.65, -1.932273e-3, 2.752102e-2, 228.3050, 0.643298},
                                   {1.8, -2.180000e-3, 2.632412e-2, 238.6855, 0.594322},
                                   {2.0, -2.452500e-3, 2.493844e-2, 251.9478, 0.539074}}};
    const ThomaHeads heads{150.0, 5.0, 1.5};
    for (const Row& row : rows) {
        const SurgeMode mode =
            governedSurgeMode(dataS(5), heads, row.ratio * thomaArea_m2(dataS(5), heads), flow);
        CHECK_THAT(mode.growth_1s, WithinAbs(row.growth, 6e-10));
        CHECK_THAT(mode.frequency_rads, WithinRel(row.frequency, 2e-7));
        CHECK_THAT(mode.period_s(), WithinAbs(row.period, 6e-5));
        CHECK_THAT(mode.ratioPerCycle(), WithinAbs(row.perCycle, 6e-7));
    }
}
