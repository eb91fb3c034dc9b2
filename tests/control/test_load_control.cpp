// SPDX-License-Identifier: GPL-3.0-or-later
#include "control/load_control.h"
#include "support/catch.h"

#include <cmath>

using namespace headroom::control;

namespace {

constexpr LoadReference full{0.9, 1.0};
constexpr LoadReference idle{0.06, 0.0};

} // namespace

TEST_CASE("Load control: ramps are exact functions of time", "[loadControl][analytic]") {
    LoadControl load({}, {{10.0, {0.5, 0.5}, 20.0}, {50.0, full, 0.0}}, idle, true);
    CHECK(load.at(0.0, 0.01, 1.0, 1.0).reference.opening_pu == 0.06);
    CHECK(load.at(10.0, 0.01, 1.0, 1.0).reference.opening_pu == 0.06);
    CHECK_THAT(load.at(20.003, 0.01, 1.0, 1.0).reference.opening_pu,
               WithinAbs(0.06 + 0.44 * 10.003 / 20.0, 1e-14));
    CHECK(load.at(30.0, 0.01, 1.0, 1.0).reference.opening_pu == 0.5);
    CHECK(load.at(49.9, 0.01, 1.0, 1.0).reference.power_pu == 0.5);
    CHECK(load.at(50.1, 0.01, 1.0, 1.0).reference.opening_pu == 0.9);
}

TEST_CASE("Load control: a later order starts from where the earlier has come",
          "[loadControl][analytic]") {
    LoadControl load({}, {{0.0, {1.0, 1.0}, 100.0}, {50.0, {0.0, 0.0}, 10.0}}, {0.0, 0.0}, true);
    CHECK(load.at(0.0, 0.1, 1.0, 1.0).reference.opening_pu == 0.0);
    CHECK_THAT(load.at(49.0, 0.1, 1.0, 1.0).reference.opening_pu, WithinAbs(0.49, 1e-14));
    CHECK_THAT(load.at(55.0, 0.1, 1.0, 1.0).reference.opening_pu, WithinAbs(0.25, 1e-14));
}

TEST_CASE("Load control: after a trip a reload waits for the interlock and for the speed",
          "[loadControl][analytic]") {
    const LoadControlSpec spec{.reloadNotBefore_s = 300.0};
    LoadControl load(spec, {{102.0, full, 20.0}}, full, true);
    load.trip(0.0, idle);
    CHECK_FALSE(load.onGrid());
    const double dt = 0.5;
    double closed_s = -1.0;
    for (int n = 1; n <= 800; ++n) {
        const double t = n * dt;
        const auto answer = load.at(t, dt, 1.001, 1.0);
        CHECK(answer.heldBack == (t >= 102.0 && t < 300.0));
        if (answer.closeBreaker) {
            closed_s = t;
        }
        if (t <= 300.0) {
            CHECK(answer.reference.opening_pu == 0.06);
        } else {
            const double share = t < 320.0 ? (t - 300.0) / 20.0 : 1.0; // duration kept
            CHECK_THAT(answer.reference.opening_pu, WithinAbs(0.06 + share * 0.84, 1e-12));
        }
    }
    CHECK(closed_s == 300.0);
    CHECK(load.onGrid());
}

TEST_CASE("Load control: synchronising needs the speed in its band for its time",
          "[loadControl][limit]") {
    LoadControl load({}, {{10.0, full, 20.0}}, full, true);
    load.trip(0.0, idle);
    const double dt = 0.1;
    double closed_s = -1.0;
    for (int n = 1; n <= 400; ++n) {
        const double t = n * dt;
        // Enters the band at 20 s, leaves it once at 20.5 s for an instant.
        const double speed = t < 19.95 || std::fabs(t - 20.5) < 0.01 ? 1.02 : 1.004;
        if (load.at(t, dt, speed, 1.0).closeBreaker) {
            closed_s = t;
        }
    }
    CHECK_THAT(closed_s, WithinAbs(21.5, 1e-9)); // 20.6 … 21.5: ten steps of 0.1 s inside
    CHECK_THAT(load.at(closed_s + 10.0, dt, 1.0, 1.0).reference.opening_pu,
               WithinAbs(0.06 + 0.5 * 0.84, 1e-9));
}

TEST_CASE("Load control: of orders held back the newest counts", "[loadControl][limit]") {
    LoadControl load({.reloadNotBefore_s = 100.0}, {{10.0, full, 5.0}, {50.0, {0.4, 0.4}, 10.0}},
                     full, true);
    load.trip(0.0, idle);
    for (int n = 1; n <= 2000; ++n) {
        load.at(0.1 * n, 0.1, 1.0, 1.0);
    }
    CHECK_THAT(load.at(200.1, 0.1, 1.0, 1.0).reference.opening_pu, WithinAbs(0.4, 1e-14));
}

TEST_CASE("Load control: an order under way is dropped by a trip", "[loadControl][limit]") {
    LoadControl load({}, {{0.0, full, 100.0}}, idle, true);
    load.at(0.0, 0.1, 1.0, 1.0);
    load.at(50.0, 0.1, 1.0, 1.0);
    load.trip(50.0, idle);
    const auto answer = load.at(60.0, 0.1, 1.0, 1.0);
    CHECK(answer.reference.opening_pu == 0.06);
    CHECK_FALSE(answer.heldBack);
    CHECK_FALSE(answer.closeBreaker);
    load.add({70.0, {0.3, 0.3}, 0.0}); // an order given later is obeyed
    for (int n = 600; n <= 720; ++n) {
        load.at(0.1 * n, 0.1, 1.0, 1.0);
    }
    CHECK(load.onGrid());
    CHECK(load.at(73.0, 0.1, 1.0, 1.0).reference.opening_pu == 0.3);
}
