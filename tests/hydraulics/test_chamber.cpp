// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/chamber.h"
#include "hydraulics/messages.h"
#include "support/catch.h"
#include "units/text.h"

#include <cmath>
#include <random>

using namespace headroom;
using namespace headroom::hydraulics;

namespace {

using Rows = std::vector<std::pair<double, double>>;

ChamberTable table(const Rows& rows) {
    return ChamberTable::make(rows).value();
}
// 50 m² below 10 m, 400 m² above; the static level is 0.
const Rows expanded{{-30.0, 50.0}, {10.0, 50.0}, {10.0, 400.0}, {40.0, 400.0}};

/// Data S of the surge checks: L 5000 m, A 25 m², Q₀ 50 m³/s, g 9.81; sudden total stop. The
/// rigid tunnel and the chamber by the trapezoid, all laws from this floor; returns the first
/// maximum (parabola through the three largest) and its time.
struct Peak {
    double level_m, time_s;
};
Peak upsurge(const ChamberTable& chamber, double loss_s2m5, double step_s) {
    const double inertia = 5000.0 / (9.81 * 25.0);
    double flow = 50.0, last[3] = {0, 0, 0};
    double volume = chamber.volume_m3(-loss_s2m5 * flow * flow);
    last[2] = last[1] = last[0] = chamber.level_m(volume);
    for (int n = 1; n < 1000000; ++n) {
        // ½Δt(−z − kQ|Q| − z' − kQ'|Q'|) = I(Q' − Q), the chamber along its tangent, repeated.
        double next = flow;
        for (int repeat = 0; repeat < 4; ++repeat) {
            const ChamberBranch branch = chamberBranch(chamber, {}, {volume, flow, next, step_s});
            const double present = chamber.level_m(volume) + loss_s2m5 * flow * std::fabs(flow);
            const double b = inertia + 0.5 * step_s * branch.linear_sm2;
            const double w = inertia * flow - 0.5 * step_s * (present + branch.base_m);
            next = solveBranch(b, 0.5 * step_s * loss_s2m5, w).flow_m3s;
        }
        volume += 0.5 * step_s * (flow + next);
        flow = next;
        last[0] = last[1];
        last[1] = last[2];
        last[2] = chamber.level_m(volume);
        if (last[2] < last[1]) {
            const double bend = last[0] - 2 * last[1] + last[2];
            const double shift = 0.5 * (last[0] - last[2]) / bend;
            return {last[1] - 0.125 * (last[0] - last[2]) * (last[0] - last[2]) / bend,
                    (n - 1 + shift) * step_s};
        }
    }
    return {};
}

} // namespace

TEST_CASE("Chamber: volume and level are exact inverses", "[hydraulics][invariant]") {
    const ChamberTable chamber =
        table({{440.0, 20.0}, {450.0, 20.0}, {455.0, 80.0}, {455.0, 300.0}, {470.0, 40.0}});
    CHECK_THAT(chamber.volume_m3(440.0), WithinAbs(0.0, 1e-12));
    CHECK_THAT(chamber.volume_m3(450.0), WithinRel(200.0, 1e-14));
    CHECK_THAT(chamber.volume_m3(455.0), WithinRel(450.0, 1e-14)); // + 5 (20 + 80)/2
    CHECK_THAT(chamber.capacity_m3(), WithinRel(450.0 + 15.0 * 170.0, 1e-14));
    std::mt19937_64 random(7);
    std::uniform_real_distribution<double> levels(430.0, 480.0);
    for (int i = 0; i < 20000; ++i) {
        const double level = levels(random);
        const WaterSurface surface = chamber.surface(chamber.volume_m3(level));
        REQUIRE_THAT(surface.level_m, WithinAbs(level, 1e-12 * 470.0));
        if (std::fabs(level - 455.0) > 1e-9) {
            REQUIRE_THAT(surface.area_m2, WithinRel(chamber.area_m2(level), 1e-10));
        }
    }
}

TEST_CASE("Chamber: area is the slope of the volume", "[hydraulics][order]") {
    const ChamberTable chamber = table({{0.0, 10.0}, {4.0, 50.0}, {9.0, 12.0}});
    for (const double level : {0.3, 3.9, 4.1, 8.5}) {
        const double slope =
            (chamber.volume_m3(level + 1e-4) - chamber.volume_m3(level - 1e-4)) / 2e-4;
        CHECK_THAT(chamber.area_m2(level), WithinRel(slope, 1e-9));
    }
}

TEST_CASE("Chamber: floor and rim are events, the volume goes on", "[hydraulics][limit]") {
    const ChamberTable chamber = table({{100.0, 10.0}, {120.0, 30.0}});
    CHECK(chamber.floor_m() == 100.0);
    CHECK(chamber.rim_m() == 120.0);
    CHECK_FALSE(chamber.belowFloor(0.0));
    CHECK(chamber.belowFloor(-1e-9));
    CHECK_FALSE(chamber.aboveRim(chamber.capacity_m3()));
    CHECK(chamber.aboveRim(chamber.capacity_m3() + 1e-6));
    CHECK_THAT(chamber.level_m(-50.0), WithinRel(95.0, 1e-14));
    CHECK_THAT(chamber.level_m(chamber.capacity_m3() + 60.0), WithinRel(122.0, 1e-14));
    CHECK_THAT(chamber.volume_m3(122.0), WithinRel(chamber.capacity_m3() + 60.0, 1e-14));
    CHECK_THAT(chamber.volume_m3(95.0), WithinRel(-50.0, 1e-14));
}

TEST_CASE("Chamber: volume below the peak of an expanded chamber", "[hydraulics][analytic]") {
    // Derived here (energy): ∫ F z dz from 0 to z_max = L Q₀²/(2gA) = 25484.199796 m⁴.
    const ChamberTable chamber = table(expanded);
    const double top = std::sqrt(100.0 + 2.0 * (25484.199796 - 2500.0) / 400.0);
    CHECK_THAT(top, WithinAbs(14.660184139, 1e-8));
    CHECK_THAT(chamber.volume_m3(10.0) - chamber.volume_m3(0.0), WithinRel(500.0, 1e-13));
    CHECK_THAT(chamber.volume_m3(top) - chamber.volume_m3(10.0),
               WithinRel(400.0 * (top - 10.0), 1e-13));
    CHECK_THAT(chamber.level_m(chamber.volume_m3(top)), WithinRel(top, 1e-14));
}

TEST_CASE("Chamber: upsurge into an expansion", "[hydraulics][reference]") {
    // Derived here (energy) and recomputed by two methods: frictionless 14.660184139 m at
    // 84.23359 s; with h_f0 = 5 m 13.648197090 m at 81.50751 s. The trapezoid's error at 0.01 s is
    // of the order (Δt/T)² plus one kink where the level passes the expansion.
    const ChamberTable chamber = table(expanded);
    const Peak frictionless = upsurge(chamber, 0.0, 0.01);
    CHECK_THAT(frictionless.level_m, WithinAbs(14.660184139, 1e-5));
    CHECK_THAT(frictionless.time_s, WithinAbs(84.23359, 1e-3));
    const Peak damped = upsurge(chamber, 5.0 / 2500.0, 0.01);
    CHECK_THAT(damped.level_m, WithinAbs(13.648197090, 1e-5));
    CHECK_THAT(damped.time_s, WithinAbs(81.50751, 1e-3));
}

TEST_CASE("Chamber: simple upsurge is of second order", "[hydraulics][order]") {
    // Source: first integral, Forchheimer 1913, from memory; z₁ 19.373329386 m at h_f0 = 5 m.
    const ChamberTable chamber = table({{-40.0, 100.0}, {40.0, 100.0}});
    const double coarse = std::fabs(upsurge(chamber, 5.0 / 2500.0, 2.0).level_m - 19.373329386);
    const double fine = std::fabs(upsurge(chamber, 5.0 / 2500.0, 1.0).level_m - 19.373329386);
    CAPTURE(coarse, fine);
    CHECK_THAT(std::log2(coarse / fine), WithinAbs(2.0, 0.1));
}

TEST_CASE("Chamber: the branch of a throttled chamber", "[hydraulics][analytic]") {
    const ChamberTable chamber = table({{0.0, 40.0}, {50.0, 90.0}});
    const Throttle throttle{0.0065, 0.00455};
    for (const double head : {5.0, 19.0, 21.0, 40.0}) {
        // About the solution itself the tangent touches: H' = z(V') + K Q'|Q'| holds exactly.
        double flow = 10.0;
        const double volume = chamber.volume_m3(20.0), step = 0.5;
        for (int i = 0; i < 20; ++i) {
            flow = chamberBranch(chamber, throttle, {volume, 10.0, flow, step}).flow(head).flow_m3s;
        }
        const double level = chamber.level_m(volume + 0.5 * step * (10.0 + flow));
        const double loss = (flow < 0 ? 0.00455 : 0.0065) * flow * std::fabs(flow);
        CHECK_THAT(level + loss, WithinAbs(head, 1e-11));
    }
}

TEST_CASE("Chamber: a bad table is refused with all its faults", "[hydraulics][messages]") {
    const auto bad = ChamberTable::make(
        Rows{{10.0, 5.0}, {8.0, -1.0}, {9.0, std::nan("")}, {5.0, 4.0}}, "plant/chambers/S");
    REQUIRE_FALSE(bad);
    std::vector<const Message*> codes;
    for (const Finding& finding : bad.findings()) {
        codes.push_back(finding.message);
        CHECK(finding.subject == "plant/chambers/S");
    }
    CHECK(codes
          == std::vector<const Message*>{&chamberAreaNotPositive, &chamberLevelsFall,
                                         &chamberNotFinite, &chamberLevelsFall,
                                         &chamberFloorAboveRim});
    CHECK_THAT(text(bad.findings().back()),
               ContainsSubstring("floor at 10") && ContainsSubstring("rim at 5"));
    CHECK(ChamberTable::make(Rows{}).findings()[0].message == &chamberTooFewRows);
    CHECK(ChamberTable::make(Rows{{1, 1}, {1, 2}}).findings()[0].message == &chamberFloorAboveRim);
    CHECK(ChamberTable::make(Rows{{1, 1}, {2, 2}, {2, 3}, {2, 4}, {2, 5}, {3, 3}}).findings().size()
          == 1);
    CHECK(ChamberTable::make(Rows{{1, 1}, {2, 2}, {2, 3}, {3, 3}}));
}
