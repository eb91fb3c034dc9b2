// SPDX-License-Identifier: GPL-3.0-or-later
// The textbook turbine (1 - T_w s)/(1 + ½ T_w s) through the whole product: an ideal orifice below a
// rigid frictionless column, on a locked grid. The law is that of small moves; the mean of a move
// up and the same move down leaves an error of the third power of its size.
#include "support/catch.h"

#include <array>
#include <cmath>
#include <complex>
#include <functional>

#include "cases.h"

using namespace headroom;
using namespace headroom::verification;
using tests::unitPlace;

namespace {

constexpr double base = 0.5; ///< stroke at rest
constexpr double size = 1e-4;
constexpr double step_s = 0.0005;

/// T_w = L Q0/(g A H0) by the length of the column.
Case column(double waterTime_s) {
    const double head_m = 250.0, velocity_mps = 4.0;
    const double length_m = waterTime_s * 9.81 * head_m / velocity_mps;
    // Velocity refers to the stroke at rest.
    Case made = orificePipe({length_m, 7.0, 1200.0, head_m, velocity_mps / base}, step_s, base,
                            plant::ConduitModel::rigid);
    auto& unit = made.plant.units[0];
    unit.turbine = plant::OrificeUnit{head_m, velocity_mps * 7.0 / base, 0.9, 30.0};
    unit.inertia_kgm2 = 1e5;
    plant::Synchronous drive;
    drive.locked = true;
    unit.drive = drive;
    return made;
}

/// Shaft power over its value at rest, in shares of the relative move of the gate `move(t)`.
class Response {
public:
    Response(double waterTime_s, double until_s, const std::function<double(double)>& move) {
        for (int i = 0; i < 2; ++i) {
            Case made = column(waterTime_s);
            const double sign = i == 0 ? 1.0 : -1.0;
            plant::Rows rows;
            for (int k = 0; k * step_s <= until_s + 0.5 * step_s; ++k) {
                rows.emplace_back(k * step_s, base * (1.0 + sign * size * move(k * step_s)));
            }
            openings(made, rows);
            made.study.until_s = until_s;
            runs_[static_cast<std::size_t>(i)] = course(made);
        }
        power_ = runs_[0].find(Measure::shaftPower, unitPlace());
        const auto rest = column(waterTime_s).rest();
        for (const auto& row : rest.rows) {
            if (row.measure == Measure::shaftPower) {
                rest_W_ = row.value;
            }
        }
    }
    double at(double time_s) const {
        return (runs_[0].at(power_, time_s) - runs_[1].at(power_, time_s)) / (2.0 * size * rest_W_);
    }

private:
    std::array<Course, 2> runs_;
    std::size_t power_ = 0;
    double rest_W_ = 0.0;
};

} // namespace

TEST_CASE("Response: step of the gate", "[verification][analytic]") {
    // Kundur 1994, ch. 9, from memory; recomputed: P(t) = 1 - 3 exp(-2t/T_w), T_w 1.5 s. The jump
    // itself is exact; after it one backward step leaves half its square.
    const Response response(1.5, 3.0, [](double) { return 1.0; });
    const double rows[][2] = {
        {0.0, -2.0}, {0.75, -0.103638324}, {1.5, 0.593994150}, {3.0, 0.945053083}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        hold("H58 step of the gate", response.at(row[0]), row[1], 1e-6);
    }
    // State form of the same turbine: zero at 0.549306 T_w, and the power missing is 1.5 T_w.
    double missing = 0.0, before = response.at(0.0), zero_s = 0.0;
    for (int k = 1; k * step_s <= 3.0 + 0.5 * step_s; ++k) {
        const double now = response.at(k * step_s);
        missing += 0.5 * step_s * ((1.0 - before) + (1.0 - now));
        if (before < 0.0 && now >= 0.0) {
            zero_s = (k - 1) * step_s + step_s * before / (before - now);
        }
        before = now;
    }
    hold("C35 zero, share of T_w", zero_s / 1.5, 0.549306, 1e-6);
    hold("C35 missing power, share of T_w", missing / 1.5 + 0.5 * 3.0 * std::exp(-4.0), 1.5, 1e-6);
}

TEST_CASE("Response: ramp of the gate", "[verification][analytic]") {
    // Ramp of 5 s: dip of -0.450694 T_w/T_r at 0.549306 T_w, zero at 1.410720 T_w; derived from the
    // same response. Tolerance of the list 1e-6.
    const double rows[][4] = {{1.0, -0.0901388, 1.410720, 0.700014},
                              {2.0, -0.1802775, 2.821439, 0.404043}};
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        const Response response(row[0], 5.0, [](double t) { return t / 5.0; });
        double least = 0.0, least_s = 0.0, zero_s = 0.0, before = 0.0;
        for (int k = 1; k * step_s <= 5.0 + 0.5 * step_s; ++k) {
            const double now = response.at(k * step_s);
            if (now < least) {
                least = now;
                least_s = k * step_s;
            }
            if (before < 0.0 && now >= 0.0) {
                zero_s = (k - 1) * step_s + step_s * before / (before - now);
            }
            before = now;
        }
        hold("C36 dip", least, row[1], 1e-6);
        hold("C36 time of the dip, s", least_s, 0.549306 * row[0], step_s);
        hold("C36 zero, s", zero_s, row[2], 2e-6);
        hold("C36 end of the ramp", response.at(5.0), row[3], 1e-6);
    }
}

TEST_CASE("Response: waves of the gate", "[verification][analytic]") {
    // |p/y| and phase of the same turbine at omega T_w 0.1, 0.5, 1, 2, 5; derived here.
    const double rows[][3] = {{0.1, 1.0037337, -8.5730},
                              {0.5, 1.0846523, -40.6013},
                              {1.0, 1.2649111, -71.5651},
                              {2.0, 1.5811388, -108.4349},
                              {5.0, 1.8937283, -146.8887}};
    const double pi = std::acos(-1.0);
    for (const auto& row : rows) {
        CAPTURE(row[0]);
        // A whole number of steps a wave; T_w near 0.8 s; the start has died away after 10 T_w.
        const int stepsAWave = static_cast<int>(std::lround(2.0 * pi * 0.8 / row[0] / step_s));
        const double period_s = stepsAWave * step_s;
        const double waterTime_s = row[0] * period_s / (2.0 * pi);
        const int waves = static_cast<int>(std::ceil(10.0 * waterTime_s / period_s)) + 1;
        const Response response(waterTime_s, waves * period_s,
                                [&](double t) { return std::sin(2.0 * pi * t / period_s); });
        std::complex<double> sum;
        for (int k = (waves - 1) * stepsAWave; k < waves * stepsAWave; ++k) {
            sum += response.at(k * step_s)
                   * std::exp(std::complex<double>(0.0, -2.0 * pi * k / stepsAWave));
        }
        const auto ratio = sum * std::complex<double>(0.0, 2.0) / static_cast<double>(stepsAWave);
        hold("C37 amplitude", std::abs(ratio), row[1], 1e-5);
        hold("C37 phase, degrees", std::arg(ratio) * 180.0 / pi, row[2], 1e-3);
    }
}
