// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/checks.h"

#include <map>
#include <numeric>

namespace headroom::plant {

namespace {

/// Points and reservoirs joined by what the water passes.
class Islands {
public:
    explicit Islands(const Plant& plant)
        : points_(plant.points.size()),
          parent_(static_cast<std::size_t>(plant.points.size() + plant.reservoirs.size())) {
        std::iota(parent_.begin(), parent_.end(), 0);
        for (const auto& item : plant.conduits) {
            join(item.second.from, item.second.to);
        }
        for (const auto& item : plant.units) {
            join(item.second.from, item.second.to);
        }
        for (int i = 0; i < plant.reservoirs.size(); ++i) {
            join(plant.reservoirs[i].at, {"", Collection::reservoirs, i});
        }
    }

    int of(const Reference& thing) {
        int node = thing.collection == Collection::reservoirs ? points_ + thing.index : thing.index;
        while (parent_[static_cast<std::size_t>(node)] != node) {
            node = parent_[static_cast<std::size_t>(node)];
        }
        return node;
    }

private:
    void join(const Reference& a, const Reference& b) {
        if (a.resolved() && b.resolved()) {
            parent_[static_cast<std::size_t>(of(a))] = of(b);
        }
    }

    int points_;
    std::vector<int> parent_;
};

bool allResolved(const Plant& plant) {
    for (const auto& item : plant.conduits) {
        if (!item.second.from.resolved() || !item.second.to.resolved()) {
            return false;
        }
    }
    for (const auto& item : plant.units) {
        if (!item.second.from.resolved() || !item.second.to.resolved()) {
            return false;
        }
    }
    for (const auto& item : plant.reservoirs) {
        if (item.second.at.given() && !item.second.at.resolved()) {
            return false;
        }
    }
    return true;
}

/// How often each point is the end of a conduit or the place of a reservoir.
std::vector<int> waterAt(const Plant& plant) {
    std::vector<int> count(static_cast<std::size_t>(plant.points.size()));
    const auto add = [&](const Reference& point) {
        if (point.resolved() && point.collection == Collection::points) {
            ++count[static_cast<std::size_t>(point.index)];
        }
    };
    for (const auto& item : plant.conduits) {
        add(item.second.from);
        add(item.second.to);
    }
    for (const auto& item : plant.reservoirs) {
        add(item.second.at);
    }
    return count;
}

void checkUnitEnds(const Plant& plant, const std::vector<int>& water, Report& report) {
    for (int i = 0; i < plant.units.size(); ++i) {
        const auto& unit = plant.units[i];
        const std::pair<const char*, const Reference*> sides[] = {{"from", &unit.from},
                                                                  {"to", &unit.to}};
        for (const auto& [key, side] : sides) {
            const bool dry = side->resolved() && side->collection == Collection::points
                             && water[static_cast<std::size_t>(side->index)] == 0;
            if (dry) {
                report.add(say::unitNotConnected, {"plant", "units", plant.units.name(i), key},
                           {{"side", std::string(side == &unit.from ? "inlet" : "outlet")},
                            {"name", side->name}});
            }
        }
    }
}

void checkIslands(const Plant& plant, Report& report) {
    Islands islands(plant);
    std::map<int, bool> wet;
    for (int i = 0; i < plant.reservoirs.size(); ++i) {
        wet[islands.of({"", Collection::reservoirs, i})] = true;
    }
    std::map<int, std::vector<std::string>> dry;
    std::map<int, Path> first;
    for (int i = 0; i < plant.conduits.size(); ++i) {
        const int island = islands.of(plant.conduits[i].from);
        if (wet.count(island) == 0) {
            dry[island].push_back(plant.conduits.name(i));
            first.emplace(island, Path{"plant", "conduits", plant.conduits.name(i)});
        }
    }
    for (const auto& [island, names] : dry) {
        report.add(say::disconnected, first[island], {{"names", listed(names)}});
    }
}

void checkUnused(const Plant& plant, std::vector<int> water, Report& report) {
    const auto use = [&](const Reference& point) {
        if (point.resolved() && point.collection == Collection::points) {
            ++water[static_cast<std::size_t>(point.index)];
        }
    };
    for (const auto& item : plant.units) {
        use(item.second.from);
        use(item.second.to);
    }
    for (const auto& item : plant.chambers) {
        use(item.second.at);
    }
    for (int i = 0; i < plant.points.size(); ++i) {
        if (water[static_cast<std::size_t>(i)] == 0) {
            report.add(say::unusedPoint, {"plant", "points", plant.points.name(i)});
        }
    }
}

void checkUnusedReservoirs(const Plant& plant, Report& report) {
    for (int i = 0; i < plant.reservoirs.size(); ++i) {
        bool used = plant.reservoirs[i].at.given();
        for (const auto& item : plant.units) {
            used = used
                   || (item.second.to.collection == Collection::reservoirs
                       && item.second.to.index == i);
        }
        if (!used) {
            report.add(say::unusedReservoir, {"plant", "reservoirs", plant.reservoirs.name(i)});
        }
    }
}

} // namespace

void checkNetwork(const Plant& plant, Report& report) {
    if (plant.reservoirs.empty() && plant.conduits.empty()) {
        report.add(say::emptyPlant, {"plant"});
        return;
    }
    if (!allResolved(plant)) {
        return; // the findings about the names come first
    }
    const auto water = waterAt(plant);
    checkUnitEnds(plant, water, report);
    checkIslands(plant, report);
    checkUnused(plant, water, report);
    checkUnusedReservoirs(plant, report);
}

} // namespace headroom::plant
