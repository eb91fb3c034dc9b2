// SPDX-License-Identifier: GPL-3.0-or-later
#include "grid/area.h"
#include "support/catch.h"
#include "units/text.h"

#include <array>
#include <cmath>
#include <limits>

using namespace headroom;
using namespace headroom::grid;

namespace {

AreaSpec plain(double stored_J) {
    AreaSpec spec;
    spec.storedEnergy_J = stored_J;
    return spec;
}

} // namespace

TEST_CASE("Area: first rate of change after a loss", "[area][analytic]") {
    // Source: f₀·ΔP/(2E_k) (Kundur 1994 ch. 11, from memory; recomputed), 1450 MW and 3000 MW.
    const std::array rows{
        std::array{120e9, 1450e6, -0.302083}, std::array{150e9, 1450e6, -0.241667},
        std::array{190e9, 1450e6, -0.190789}, std::array{280e9, 1450e6, -0.129464},
        std::array{2000e9, 3000e6, -0.0375},  std::array{1500e9, 3000e6, -0.05}};
    for (const auto& [energy, lost, rate] : rows) {
        const AreaSpec spec = plain(energy);
        CHECK_THAT(initialRate_Hzs(spec, lost), WithinAbs(rate, 1e-6));
        const AreaState after =
            advance(spec, {}, {.lostStart_W = lost, .lostEnd_W = lost, .step_s = 0.01});
        CHECK_THAT(after.rate_Hzs, WithinAbs(rate, 1e-6));
        CHECK_THAT(after.deviation_Hz, WithinAbs(0.01 * rate, 1e-8));
    }
}

TEST_CASE("Area: lowest frequency with a reserve that rises at a constant rate",
          "[area][analytic]") {
    // Source: Δf = −(f₀/2E_k)(ΔP·t_d + ΔP²/2ρ) at t_d + ΔP/ρ (derived; recomputed): 1450 MW,
    // 0.5 s, 290 MW/s: 5.5 s.
    const std::array rows{std::pair{120e9, -0.906250}, std::pair{150e9, -0.725000},
                          std::pair{190e9, -0.572368}, std::pair{280e9, -0.388393}};
    const auto reserve = [](double t) { return t < 0.5 ? 0.0 : 290e6 * (t - 0.5); };
    for (const auto& [energy, lowest] : rows) {
        AreaState state;
        double found = 0.0, at = 0.0;
        for (int n = 0; n < 1000; ++n) {
            const double t = 0.01 * n;
            state = advance(plain(energy), state,
                            {.ownStart_W = reserve(t),
                             .ownEnd_W = reserve(t + 0.01),
                             .lostStart_W = 1450e6,
                             .lostEnd_W = 1450e6,
                             .step_s = 0.01});
            if (state.deviation_Hz < found) {
                found = state.deviation_Hz;
                at = t + 0.01;
            }
        }
        CHECK_THAT(found, WithinAbs(lowest, 1e-6));
        CHECK_THAT(at, WithinAbs(5.5, 1e-9));
    }
}

TEST_CASE("Area: steady deviation with droop and damping", "[area][analytic]") {
    // Source: Δω = −ΔP/(1/R + D) (Kundur 1994 ch. 11, from memory; recomputed). Per unit of a base
    // of 1 GW; D in pu/pu is D/f₀ of the load per Hz.
    const std::array rows{std::array{0.05, 1.0, 0.1, -0.238095}, std::array{0.04, 0.0, 0.1, -0.2},
                          std::array{0.06, 1.5, 0.05, -0.137615}};
    for (const auto& [droop, damping, lost, deviation] : rows) {
        AreaSpec spec = plain(4e9);
        spec.load_W = 1e9;
        spec.loadDamping_1Hz = damping / 50.0;
        spec.reserve = ReserveSpec{.power_W = 1e9, .droop = droop, .lag_s = 2.0};
        CHECK_THAT(steadyDeviation_Hz(spec, lost * 1e9), WithinAbs(deviation, 1e-6));
        AreaState state;
        for (int n = 0; n < 20000; ++n) {
            state = advance(spec, state,
                            {.lostStart_W = lost * 1e9, .lostEnd_W = lost * 1e9, .step_s = 0.01});
        }
        CHECK_THAT(state.deviation_Hz, WithinAbs(deviation, 1e-6));
        CHECK_THAT(state.imbalance_W, WithinAbs(0.0, 10.0));
    }
}

TEST_CASE("Area: no governor, load damping alone", "[area][analytic]") {
    // Source: −(ΔP/D)(1 − e^(−tD/2H))·f₀; H 4, D 1, ΔP 0.1 (closed form; recomputed).
    AreaSpec spec = plain(4e9);
    spec.load_W = 1e9;
    spec.loadDamping_1Hz = 1.0 / 50.0;
    AreaState state;
    for (int n = 1; n <= 2000; ++n) {
        state = advance(spec, state, {.lostStart_W = 1e8, .lostEnd_W = 1e8, .step_s = 0.01});
        if (n == 100) {
            CHECK_THAT(state.deviation_Hz, WithinAbs(-0.587515, 2e-6));
        }
    }
    CHECK_THAT(state.deviation_Hz, WithinAbs(-4.589575, 2e-6));
}

TEST_CASE("Area: order two with a lagged reserve", "[area][order]") {
    // 2H dω/dt = P − Dω − r, T dr/dt = ω/R − r: exact by its two roots.
    AreaSpec spec = plain(4e9);
    spec.load_W = 1e9;
    spec.loadDamping_1Hz = 0.02;
    spec.reserve = ReserveSpec{.power_W = 1e9, .droop = 0.05, .lag_s = 2.0};
    const auto after = [&](int steps) {
        AreaState state;
        const double dt = 5.0 / steps;
        for (int n = 0; n < steps; ++n) {
            state = advance(spec, state, {.lostStart_W = 1e8, .lostEnd_W = 1e8, .step_s = dt});
        }
        return state.deviation_Hz;
    };
    // ω'' + 2a ω' + b ω = −P/(2H T)…: a = (D/2H + 1/T)/2, b = (D + 1/R)/(2H T).
    const double twoH = 8.0, d = 1.0, r = 0.05, t = 2.0, p = 0.1;
    const double a = 0.5 * (d / twoH + 1.0 / t), b = (d + 1.0 / r) / (twoH * t);
    const double w = std::sqrt(b - a * a), end = -p / (d + 1.0 / r), time = 5.0;
    const double slope = -p / twoH;
    const double exact =
        end
        + std::exp(-a * time)
              * (-end * std::cos(w * time) + (slope - a * end) / w * std::sin(w * time));
    CHECK_THAT(after(4000) / 50.0, WithinAbs(exact, 1e-8));
    const double coarse = std::fabs(after(100) / 50.0 - exact);
    const double fine = std::fabs(after(200) / 50.0 - exact);
    CHECK_THAT(std::log2(coarse / fine), WithinAbs(2.0, 0.05));
}

TEST_CASE("Area: dead band and saturation of the other reserve", "[area][limit]") {
    AreaSpec spec = plain(4e9);
    spec.load_W = 1e9;
    spec.loadDamping_1Hz = 0.02;
    spec.reserve = ReserveSpec{.power_W = 1e9,
                               .droop = 0.05,
                               .lag_s = 0.0,
                               .deadBand_Hz = 0.1,
                               .most_W = 5e7,
                               .least_W = -2e7};
    // Inside the dead band the load alone answers: 20 MW/Hz.
    CHECK_THAT(steadyDeviation_Hz(spec, 1e6), WithinAbs(-0.05, 1e-9));
    // Beyond: 400 MW/Hz more.
    CHECK_THAT(steadyDeviation_Hz(spec, 12e6), WithinAbs(-0.1 - 10e6 / 420e6, 1e-9));
    // Saturated: 50 MW, then the load again.
    CHECK_THAT(steadyDeviation_Hz(spec, 100e6), WithinAbs(-50e6 / 20e6, 1e-9));
    CHECK_THAT(steadyDeviation_Hz(spec, -50e6), WithinAbs(30e6 / 20e6, 1e-9));
    for (double lost : {1e6, 12e6, 100e6, -50e6}) {
        AreaState state;
        for (int n = 0; n < 60000; ++n) {
            state = advance(spec, state, {.lostStart_W = lost, .lostEnd_W = lost, .step_s = 0.1});
        }
        CAPTURE(lost);
        CHECK_THAT(state.deviation_Hz, WithinAbs(steadyDeviation_Hz(spec, lost), 1e-6));
    }
}

TEST_CASE("Area: at rest it stays; a huge area does not move", "[area][limit]") {
    AreaSpec spec = plain(45e9);
    spec.load_W = 14e9;
    spec.loadDamping_1Hz = 0.012;
    spec.reserve = ReserveSpec{.power_W = 14e9, .lag_s = 5.0};
    const AreaState rest = advance(spec, {}, {.step_s = 0.01});
    CHECK(rest.deviation_Hz == 0.0);
    CHECK(rest.reserve_W == 0.0);
    AreaState huge;
    for (int n = 0; n < 1000; ++n) {
        huge = advance(plain(1e30), huge, {.lostStart_W = 1e9, .lostEnd_W = 1e9, .step_s = 0.01});
    }
    CHECK(std::fabs(huge.deviation_Hz) < 1e-15);
    // Units locked to the frequency add their energy.
    const AreaState heavy =
        advance(plain(1e9), {},
                {.lostStart_W = 1e6, .lostEnd_W = 1e6, .step_s = 0.01, .extraEnergy_J = 1e9});
    CHECK_THAT(heavy.rate_Hzs, WithinRel(initialRate_Hzs(plain(2e9), 1e6), 1e-12));
}

TEST_CASE("Area: slope of the deviation by own power", "[area][analytic]") {
    AreaSpec spec = plain(4e9);
    spec.load_W = 1e9;
    spec.loadDamping_1Hz = 0.02;
    const AreaStep one{.ownStart_W = 0.0, .ownEnd_W = 1e6, .step_s = 0.02};
    CHECK_THAT(advance(spec, {}, one).deviation_Hz / 1e6,
               WithinRel(deviationByPower(spec, one), 1e-9));
}

TEST_CASE("Area: faults are named all at once", "[area][messages]") {
    AreaSpec spec;
    spec.loadDamping_1Hz = -0.1;
    spec.load_W = std::numeric_limits<double>::quiet_NaN();
    spec.reserve = ReserveSpec{.power_W = 1e9,
                               .droop = 0.0,
                               .lag_s = -1.0,
                               .deadBand_Hz = 0.0,
                               .most_W = -5.0,
                               .least_W = 3.0};
    std::string said;
    for (const auto& finding : check(spec, "plant/grid/area")) {
        said += text(finding) + "\n";
    }
    CHECK_THAT(said, ContainsSubstring("stored energy is") && ContainsSubstring("load is")
                         && ContainsSubstring("load damping is")
                         && ContainsSubstring("other reserve's droop")
                         && ContainsSubstring("other reserve's lag")
                         && ContainsSubstring("must hold zero"));
    CHECK(check(plain(45e9)).empty());
}

TEST_CASE("Losses add up as they happen", "[area][analytic]") {
    const std::array losses{Loss{1.0, 650e6}, Loss{5.0, 100e6}};
    CHECK(lost_W(losses, 0.99) == 0.0);
    CHECK(lost_W(losses, 1.0) == 650e6);
    CHECK(lost_W(losses, 9.0) == 750e6);
}
