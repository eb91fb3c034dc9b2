// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/lane_plan.h"

#include "desk/words.h"
#include "limits/bounds.h"
#include "limits/place.h"

#include <QCoreApplication>
#include <algorithm>
#include <array>
#include <cmath>

namespace headroom::desk {

namespace {

using results::Place;
using results::Thing;

constexpr double farthestBound = 3.0; // whole range over the data's own
constexpr double padding = 0.06;      // of the range, at each end

QString tr(const char* words) { return QCoreApplication::translate("desk", words); }

/// A lane's name stands in a narrow gutter.
QString shortName(Measure measure) {
    switch (measure) {
    case Measure::level: return tr("Level");
    case Measure::head: return tr("Head");
    case Measure::terminalPower: return tr("Power");
    case Measure::draftPressureHead: return tr("Draft tube");
    case Measure::frequency: return tr("Frequency");
    case Measure::frequencyRate: return tr("Freq. rate");
    case Measure::pressureRate: return tr("Head rate");
    default: return text(info(measure).label);
    }
}

/// Collects lanes without showing a thing twice.
class Planner {
public:
    Planner(const studies::Snapshot& snapshot, CellId inHand, const results::Run* run)
        : variant_(snapshot.variant(inHand.option)), run_(run) {
        const auto& studies = snapshot.project().studies;
        if (inHand.study >= 0 && inHand.study < studies.size()) {
            loadClass_ = studies[inHand.study].loadClass;
        }
    }

    void plan() {
        const auto& plant = variant_.plant;
        if (plant.chambers.size() > 0) {
            add(Measure::level, {Thing::chamber, 0});
        }
        for (int unit = 0; unit < std::min(1, plant.units.size()); ++unit) {
            addUnit(unit);
        }
        for (const auto& item : variant_.limits) {
            if (const auto place = limits::placeOf(item.second, plant)) {
                add(item.second.measure, *place);
            }
        }
        for (int chamber = 1; chamber < plant.chambers.size(); ++chamber) {
            add(Measure::level, {Thing::chamber, chamber});
        }
        for (int unit = 1; unit < plant.units.size(); ++unit) {
            addUnit(unit);
        }
        addRecorded(Measure::discharge);
        addRecorded(Measure::frequency);
    }
    std::vector<Lane> lanes;

    void choose(int limit) {
        for (auto& lane : lanes) {
            for (const auto& bound : lane.bounds) {
                lane.chosen = lane.chosen || bound.limit == limit;
            }
        }
        std::erase_if(lanes, [this](const Lane& lane) { // nothing to see there, unless asked for
            return run_ != nullptr && !lane.chosen && !recorded(lane.measure, lane.place);
        });
        for (auto& lane : lanes) {
            if (lane.chosen) { // pressing it again keeps the chosen limit
                std::stable_partition(lane.bounds.begin(), lane.bounds.end(),
                                      [limit](const LaneBound& b) { return b.limit == limit; });
            }
        }
    }

private:
    bool recorded(Measure measure, const Place& place) const {
        return run_ != nullptr && run_->find(measure, place) != nullptr;
    }
    void addUnit(int unit) {
        const Place place{Thing::unit, unit};
        const auto& from = variant_.plant.units[unit].from;
        const bool turns = run_ == nullptr || recorded(Measure::speed, place);
        if (turns) {
            add(Measure::speed, place);
        }
        add(Measure::head, {Thing::point, from.index});
        add(Measure::opening, place);
        for (const auto power : {Measure::terminalPower, Measure::gridPower, Measure::shaftPower}) {
            if (run_ == nullptr || recorded(power, place)) {
                add(power, place);
                break;
            }
        }
    }
    void addRecorded(Measure measure) {
        for (const auto& channel : run_ == nullptr ? std::vector<results::Channel>{}
                                                   : run_->channels) {
            if (channel.measure == measure && !channel.trace.last.empty()) {
                add(measure, channel.place);
            }
        }
    }
    void add(Measure measure, const Place& place) {
        const bool known = std::any_of(lanes.begin(), lanes.end(), [&](const Lane& lane) {
            return lane.measure == measure && lane.place == place;
        });
        if (known || (place.thing != Thing::grid && place.index < 0)) {
            return;
        }
        Lane lane;
        lane.measure = measure;
        lane.place = place;
        lane.name = shortName(measure);
        lane.where = text(limits::nameOf(place, variant_.plant));
        lane.bounds = boundsOf(measure, place);
        lanes.push_back(std::move(lane));
    }
    std::vector<LaneBound> boundsOf(Measure measure, const Place& place) const {
        std::vector<LaneBound> bounds;
        for (int i = 0; i < variant_.limits.size(); ++i) {
            const auto& limit = variant_.limits[i];
            const auto at = limits::placeOf(limit, variant_.plant);
            if (limit.measure != measure || !at || !(*at == place)) {
                continue;
            }
            const bool timed = limit.timeRule != plant::TimeRule::momentary;
            if (const auto least = limits::boundFor(limit.least, loadClass_)) {
                bounds.push_back({i, false, least->value, timed});
            }
            if (const auto greatest = limits::boundFor(limit.greatest, loadClass_)) {
                bounds.push_back({i, true, greatest->value, timed});
            }
        }
        return bounds;
    }

    const plant::Variant& variant_;
    const results::Run* run_;
    plant::LoadClass loadClass_ = plant::LoadClass::normal;
};

/// "39 m": a distance in a lane, without false digits.
QString distanceWords(Quantity quantity, double distance) {
    const bool position = quantity == Quantity::elevation;
    return text(print(position ? Quantity::head : quantity, distance));
}

/// Smallest range worth showing, so that a quantity at rest is no noise [SI].
double leastRange(Quantity quantity) {
    const int decimals = info(quantity).decimals;
    return std::abs(toSi(quantity, 1.0) - toSi(quantity, 0.0)) * 10.0 * std::pow(10.0, -decimals);
}

} // namespace

std::vector<Lane> planLanes(const BoardModel& board, const drawing::Selection& selection,
                            int most) {
    const auto inHand = selection.inHand();
    if (inHand.option >= board.snapshot().options()) {
        return {};
    }
    const auto stored = board.latestRun(inHand);
    Planner planner(board.snapshot(), inHand, stored ? stored->run.get() : nullptr);
    planner.plan();
    planner.choose(selection.limit);
    auto& lanes = planner.lanes;
    const auto chosen = std::find_if(lanes.begin(), lanes.end(),
                                     [](const Lane& lane) { return lane.chosen; });
    if (chosen - lanes.begin() >= most && chosen != lanes.end() && most > 0) {
        std::rotate(lanes.begin() + most - 1, chosen, chosen + 1);
    }
    lanes.resize(std::min(lanes.size(), static_cast<std::size_t>(std::max(0, most))));
    return std::move(lanes);
}

LaneRange laneRange(const Lane& lane, double low, double high) {
    const double own = std::max(high - low, leastRange(lane.quantity()));
    const double middle = 0.5 * (low + high);
    LaneRange range{std::min(low, middle - 0.5 * own), std::max(high, middle + 0.5 * own), {}, {}};
    std::vector<LaneBound> nearest = lane.bounds;
    std::sort(nearest.begin(), nearest.end(), [&](const LaneBound& a, const LaneBound& b) {
        return std::abs(a.value - middle) < std::abs(b.value - middle);
    });
    for (const auto& bound : nearest) {
        const double newLow = std::min(range.low, bound.value);
        const double newHigh = std::max(range.high, bound.value);
        if (newHigh - newLow <= farthestBound * own) {
            range.low = newLow;
            range.high = newHigh;
        } else if (bound.value > range.high && range.above.isEmpty()) {
            range.above = tr("limit %1 above").arg(distanceWords(lane.quantity(), bound.value - high));
        } else if (bound.value < range.low && range.below.isEmpty()) {
            range.below = tr("limit %1 below").arg(distanceWords(lane.quantity(), low - bound.value));
        }
    }
    const double pad = padding * (range.high - range.low);
    range.low -= pad;
    range.high += pad;
    return range;
}

} // namespace headroom::desk
