// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/lane_layers.h"
#include "desk/lane_plan.h"
#include "desk/lanes.h"
#include "driver.h"

#include <cmath>

using namespace headroom;
using namespace headroom::desk;

namespace {

/// A run of our own making: a swing in a chamber with one needle in it.
std::shared_ptr<const RunTraces> made(double duration_s, double interval_s, std::size_t needle) {
    auto run = std::make_shared<results::Run>();
    run->duration_s = duration_s;
    run->recordInterval_s = interval_s;
    run->status.reached_s = duration_s;
    results::Channel channel;
    channel.measure = Measure::level;
    channel.place = {results::Thing::chamber, 0};
    const auto count = static_cast<std::size_t>(duration_s / interval_s) + 1;
    for (std::size_t i = 0; i < count; ++i) {
        const double level = 480.0 + 10.0 * std::sin(static_cast<double>(i) * interval_s / 20.0);
        channel.trace.last.push_back(static_cast<float>(level));
    }
    channel.trace.low = channel.trace.high = channel.trace.last;
    channel.trace.high[needle] = 530.0F;
    channel.least.value = 470.0;
    channel.greatest.value = 530.0;
    run->channels.push_back(std::move(channel));
    return makeRunTraces(run);
}

Lane lane(std::vector<LaneBound> bounds = {}) {
    Lane made;
    made.measure = Measure::level;
    made.place = {results::Thing::chamber, 0};
    made.name = QStringLiteral("Water level");
    made.bounds = std::move(bounds);
    return made;
}

} // namespace

TEST_CASE("Lanes: a needle of one instant is seen at any zoom, with two segments a column",
          "[desk][lanes]") {
    application();
    const auto traces = made(600.0, 0.02, 12345);
    QCustomPlot plot;
    plot.resize(900, 200);
    plot.replot();
    plot.yAxis->setRange(460, 540);
    for (const double span : {600.0, 60.0, 6.0, 0.5}) {
        INFO(span);
        plot.xAxis->setRange(12345 * 0.02 - span / 3, 12345 * 0.02 + span * 2 / 3);
        const auto lines = traceSegments(*traces, 0, *plot.xAxis, *plot.yAxis, Quantity::elevation, 1.0);
        const double columns = plot.axisRect()->width();
        CHECK(lines.size() <= 2 * static_cast<int>(columns) + 4);
        double highest = 1e9;
        for (const auto& line : lines) {
            highest = std::min({highest, line.y1(), line.y2()});
            CHECK(std::isfinite(line.length()));
        }
        if (span > 10.0) { // closer in, the instants themselves are joined
            CHECK_THAT(highest, WithinAbs(plot.yAxis->coordToPixel(530.0), 0.5));
        }
    }
}

TEST_CASE("Lanes: values at the cursor are straight between instants", "[desk][lanes]") {
    const auto traces = made(10.0, 0.5, 3);
    const double at1 = traces->valueAt(0, 1.0), at15 = traces->valueAt(0, 1.5);
    CHECK_THAT(traces->valueAt(0, 1.25), WithinRel(0.5 * (at1 + at15), 1e-12));
    CHECK(traces->valueAt(0, -5.0) == traces->valueAt(0, 0.0));
    CHECK(traces->valueAt(0, 99.0) == traces->valueAt(0, 10.0));
    CHECK(traces->indexOf(Measure::speed, {results::Thing::chamber, 0}) == -1);
}

TEST_CASE("Lanes: limits come into the range, or an edge note says how far they are",
          "[desk][lanes]") {
    const auto near = laneRange(lane({{0, true, 500.0}}), 470.0, 490.0);
    CHECK(near.high >= 500.0);
    CHECK(near.above.isEmpty());
    const auto far = laneRange(lane({{0, true, 534.0}, {1, false, 400.0}}), 480.0, 490.0);
    CHECK(far.high < 534.0);
    CHECK(far.above.toStdString() == "limit 44.0\u2009m above");
    CHECK(far.below.toStdString() == "limit 80.0\u2009m below");
    const auto flat = laneRange(lane(), 480.0, 480.0);
    CHECK(flat.high > flat.low);
    CHECK(std::isfinite(flat.high - flat.low));
}

TEST_CASE("Lanes: the chosen limit's lane is always shown, and twice as tall", "[desk][lanes]") {
    application();
    drive::Bench bench;
    bench.window->openFile(bench.demo());
    auto& workbench = bench.window->bench();
    const auto& limits = workbench.snapshot().variant(-1).limits;
    for (int limit = 0; limit < limits.size(); ++limit) {
        workbench.pressLimit(limit);
        drive::settle();
        INFO(limits.name(limit));
        int chosen = -1;
        const auto& lanes = bench.window->lanes().lanes();
        CHECK(lanes.size() >= 4);
        for (std::size_t i = 0; i < lanes.size(); ++i) {
            chosen = lanes[i].chosen ? static_cast<int>(i) : chosen;
        }
        REQUIRE(chosen >= 0);
        bench.window->lanes().paintNow();
        const double tall = bench.window->lanes().laneRect(chosen).height();
        const double other = bench.window->lanes().laneRect(chosen == 0 ? 1 : 0).height();
        CHECK_THAT(tall / other, WithinAbs(2.0, 0.35)); // margins and whole pixels
    }
}

TEST_CASE("Lanes: forty-eight long traces are painted in a frame", "[desk][lanes]") {
    application();
    const auto traces = made(600.0, 0.02, 777);
    Lanes lanes;
    lanes.resize(1200, 500);
    std::vector<Lane> eight(8, lane());
    std::vector<LaneRun> six(6, LaneRun{QStringLiteral("run"), traces, false});
    lanes.show(eight, six);
    lanes.setVisible(true);
    drive::settle();
    lanes.paintNow();
    REQUIRE(lanes.laneRect(7).width() > 1000.0); // laid out at its full size
    const double before = threadTime_s();
    constexpr int frames = 5;
    for (int i = 0; i < frames; ++i) {
        lanes.paintNow();
    }
    const double each_ms = (threadTime_s() - before) * 1e3 / frames;
    // Thirty frames a second are the goal; processor time of this thread, ten times that allowed
    // because such machines are shared. Out of the box, wide pens take far longer than this.
    WARN("48 traces of 30 000 instants: " << each_ms << " ms a frame");
    CHECK(each_ms < 330.0);
}
