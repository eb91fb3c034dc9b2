// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/plausibility.h"

#include "base/constants.h"
#include "hydraulics/hammer_formulas.h"
#include "hydraulics/losses.h"
#include "hydraulics/surge_formulas.h"
#include "machines/factors.h"
#include "simulation/conduit_geometry.h"

#include <algorithm>
#include <cmath>

namespace headroom::studies {

namespace {

using results::Place;
using results::Thing;

/// Everything the rows of one cell need.
class Sheet {
public:
    Sheet(const plant::Variant& variant, const plant::Study& study, const RestState& rest)
        : plant_(variant.plant), study_(study), rest_(rest) {
        Findings ignored; // the same ones as of the compilation
        medium_ = simulation::mediumOf(variant.site, ignored);
        for (int i = 0; i < plant_.conduits.size(); ++i) {
            lines_.push_back(simulation::conduitGeometry(plant_, i, medium_, endsOf(i), ignored));
        }
    }

    std::vector<PlausibilityRow> rows() {
        for (int i = 0; i < plant_.conduits.size(); ++i) {
            conduitRows(i);
        }
        for (int i = 0; i < plant_.chambers.size(); ++i) {
            chamberRows(i);
        }
        for (int i = 0; i < plant_.units.size(); ++i) {
            unitRows(i);
        }
        return std::move(rows_);
    }

private:
    const simulation::ConduitGeometry& line(int conduit) const {
        return lines_[static_cast<std::size_t>(conduit)];
    }
    double g() const { return medium_.gravity_mps2; }

    simulation::ConduitEnds endsOf(int conduit) const {
        simulation::ConduitEnds ends;
        for (const auto& [name, reservoir] : plant_.reservoirs) {
            const int at = reservoir.at.index;
            ends.fromReservoir = ends.fromReservoir || at == plant_.conduits[conduit].from.index;
            ends.toReservoir = ends.toReservoir || at == plant_.conduits[conduit].to.index;
        }
        return ends;
    }

    void add(std::string thing, std::string label, std::string symbol, Quantity quantity,
             std::optional<double> byHand, std::optional<double> computed, std::string formula) {
        rows_.push_back({std::move(thing), std::move(label), std::move(symbol), quantity, byHand,
                         computed, std::move(formula)});
    }

    // --- conduits -------------------------------------------------------------------------------

    std::optional<double> flowOf(int conduit) const {
        for (const auto& row : rest_.values) {
            if (row.measure == Measure::discharge && row.place.thing == Thing::conduit &&
                row.place.index == conduit) {
                return row.value;
            }
        }
        return std::nullopt;
    }

    /// Loss between the energy levels of the two ends [m], by the friction laws.
    double loss_m(int conduit, double flow_m3s) const {
        const auto& geometry = line(conduit);
        const double squared = flow_m3s * std::abs(flow_m3s);
        double loss = (geometry.from.leaving_s2m5 + geometry.to.arriving_s2m5) * squared;
        for (const auto& piece : geometry.pieces) {
            loss += piece.friction.lossPerMetre(flow_m3s) * piece.length_m;
        }
        for (const auto& single : geometry.losses) {
            loss += (flow_m3s >= 0.0 ? single.forward_s2m5 : single.reverse_s2m5) * squared;
        }
        return loss;
    }

    double smallestArea_m2(int conduit) const {
        double area = line(conduit).pieces.front().area_m2;
        for (const auto& piece : line(conduit).pieces) {
            area = std::min(area, piece.area_m2);
        }
        return area;
    }

    void conduitRows(int i) {
        const auto& name = plant_.conduits.name(i);
        const auto flow = flowOf(i);
        const double speed_mps = line(i).waveSpeed_mps();
        if (flow) {
            const double velocity_mps = *flow / smallestArea_m2(i);
            add(name, "Discharge", "Q", Quantity::discharge, {}, flow, "");
            add(name, "Velocity", "v", Quantity::velocity, velocity_mps, {},
                "discharge over the smallest area");
            add(name, "Loss of head", "h", Quantity::head, loss_m(i, *flow), {},
                "friction and single losses at this discharge");
            add(name, "Rise for an instant stop", "", Quantity::head,
                hydraulics::joukowskyRise_m(speed_mps, -velocity_mps, g()), {},
                "a v/g (Joukowsky 1898)");
        }
        add(name, "Reflection time", "2L/a", Quantity::time,
            hydraulics::reflectionTime_s(line(i).length_m, speed_mps), {},
            "twice the length over the wave speed");
    }

    // --- chambers -------------------------------------------------------------------------------

    bool hasReservoir(int point) const {
        return std::any_of(plant_.reservoirs.begin(), plant_.reservoirs.end(),
                           [&](const auto& item) { return item.second.at.index == point; });
    }
    bool hasChamber(int point) const {
        return std::any_of(plant_.chambers.begin(), plant_.chambers.end(),
                           [&](const auto& item) { return item.second.at.index == point; });
    }

    /// Conduits from a point against or with the flow to the next free surface; nothing if the
    /// way ends or forks.
    std::vector<int> wayToSurface(int point, bool upstream) const {
        std::vector<int> way;
        while (static_cast<int>(way.size()) <= plant_.conduits.size()) {
            int next = -1;
            for (int i = 0; i < plant_.conduits.size(); ++i) {
                const auto& conduit = plant_.conduits[i];
                if ((upstream ? conduit.to.index : conduit.from.index) == point) {
                    if (next >= 0) {
                        return {};
                    }
                    next = i;
                }
            }
            if (next < 0) {
                return {};
            }
            way.push_back(next);
            const auto& conduit = plant_.conduits[next];
            point = upstream ? conduit.from.index : conduit.to.index;
            if (hasReservoir(point) || hasChamber(point)) {
                return way;
            }
        }
        return {};
    }

    /// The same up to a reservoir, past chambers.
    std::vector<int> wayToReservoir(int point) const {
        auto way = wayToSurface(point, true);
        while (!way.empty() && !hasReservoir(upperEnd(way))) {
            const auto more = wayToSurface(upperEnd(way), true);
            if (more.empty()) {
                return {};
            }
            way.insert(way.end(), more.begin(), more.end());
        }
        return way;
    }
    int upperEnd(const std::vector<int>& way) const {
        return plant_.conduits[way.back()].from.index;
    }

    double inertia_1m(const std::vector<int>& way) const {
        double sum = 0.0;
        for (const int conduit : way) {
            for (const auto& piece : line(conduit).pieces) {
                sum += piece.length_m / piece.area_m2;
            }
        }
        return sum;
    }
    double losses_m(const std::vector<int>& way, double flow_m3s) const {
        double sum = 0.0;
        for (const int conduit : way) {
            sum += loss_m(conduit, flow_m3s);
        }
        return sum;
    }
    /// Each conduit with its own discharge; nothing if one is not known.
    std::optional<double> ownLosses_m(const std::vector<int>& way) const {
        double sum = 0.0;
        for (const int conduit : way) {
            const auto flow = flowOf(conduit);
            if (!flow) {
                return std::nullopt;
            }
            sum += loss_m(conduit, *flow);
        }
        return sum;
    }

    double areaAt(const plant::ChamberShape& shape, double level_m) const {
        const auto& rows = shape.areaByLevel;
        if (level_m <= rows.front().first) {
            return rows.front().second;
        }
        for (std::size_t i = 1; i < rows.size(); ++i) {
            if (level_m <= rows[i].first) {
                const double share =
                    (level_m - rows[i - 1].first) / (rows[i].first - rows[i - 1].first);
                return rows[i - 1].second + share * (rows[i].second - rows[i - 1].second);
            }
        }
        return rows.back().second;
    }

    std::optional<double> levelByHand_m(const plant::Chamber& chamber) const {
        const auto way = wayToReservoir(chamber.at.index);
        const auto loss_m = ownLosses_m(way);
        if (way.empty() || !loss_m) {
            return std::nullopt;
        }
        const auto& last = line(way.front()).pieces.back();
        const double share = medium_.velocityHeads ? chamber.velocityShare.value_or(1.0) : 0.0;
        return *surfaceAt(upperEnd(way)) - *loss_m -
               hydraulics::chamberHeadDrop_m(share, *flowOf(way.front()), last.area_m2, g());
    }

    void chamberRows(int i) {
        const auto& name = plant_.chambers.name(i);
        const auto& chamber = plant_.chambers[i];
        const auto level = rest_.find(Measure::level, {Thing::chamber, i});
        if (!level) {
            return;
        }
        add(name, "Level", "", Quantity::elevation, levelByHand_m(chamber), level,
            "reservoir less the losses up to here and the tunnel's velocity head");
        auto way = wayToSurface(chamber.at.index, true);
        const bool upstream = !way.empty();
        if (!upstream) {
            way = wayToSurface(chamber.at.index, false);
        }
        const auto flow = way.empty() ? std::nullopt : flowOf(way.front());
        if (!flow) {
            return;
        }
        const double area_m2 = areaAt(chamber.shape, *level);
        const double loss_m = losses_m(way, *flow);
        hydraulics::SurgeTunnel tunnel;
        tunnel.inertia_1m = inertia_1m(way);
        tunnel.gravity_mps2 = g();
        add(name, "Surge period", "T", Quantity::time, hydraulics::surgePeriod_s(tunnel, area_m2),
            {}, "2π √(ΣL/A · F/g), without friction");
        if (std::abs(*flow) > 0.0) {
            tunnel.loss_s2m5 = loss_m / (*flow * std::abs(*flow));
            add(name, "Surge amplitude without friction", "Z*", Quantity::head,
                hydraulics::surgeAmplitude_m(tunnel, area_m2, *flow), {}, "Q √(ΣL/A/(g F))");
            add(name, "Relative loss", "P0*", Quantity::factor,
                hydraulics::relativeLoss(tunnel, area_m2, *flow), {}, "loss of the tunnel over Z*");
            thomaRow(name, i, upstream, tunnel, loss_m, area_m2);
        }
    }

    /// Only for a chamber with one unit below it: the criterion's heads are that unit's.
    void thomaRow(const std::string& name, int chamber, bool upstream,
                  const hydraulics::SurgeTunnel& tunnel, double loss_m, double area_m2) {
        const int at = plant_.chambers[chamber].at.index;
        for (int i = 0; i < plant_.units.size(); ++i) {
            const auto& unit = plant_.units[i];
            const auto way = wayToSurface(unit.from.index, true);
            const bool above = upstream && !way.empty() &&
                               plant_.conduits[way.back()].from.index == at;
            const auto gross_m = grossHead_m(unit);
            const auto flow = rest_.find(Measure::discharge, {Thing::unit, i});
            if (!above || !gross_m || !flow) {
                continue;
            }
            const hydraulics::ThomaHeads heads{*gross_m, loss_m, losses_m(way, *flow)};
            const double thoma_m2 = hydraulics::thomaArea_m2(tunnel, heads);
            if (std::isfinite(thoma_m2) && thoma_m2 > 0.0) {
                add(name, "Area by Thoma", "", Quantity::area, thoma_m2, {},
                    "ΣL/A/(2 g k H), all heads at this rest (Thoma 1910)");
                add(name, "Area over Thoma's", "", Quantity::factor, area_m2 / thoma_m2, {},
                    "1.5 and more is usual; common practice, no source");
            }
            return;
        }
    }

    // --- units ----------------------------------------------------------------------------------

    std::optional<double> levelOf(int reservoir) const {
        if (reservoir < 0) {
            return std::nullopt;
        }
        for (const auto& [reference, level] : study_.start.level_m) {
            if (reference.index == reservoir) {
                return level;
            }
        }
        return plant_.reservoirs[reservoir].level_m;
    }

    std::optional<double> surfaceAt(int point) const {
        for (int i = 0; i < plant_.reservoirs.size(); ++i) {
            if (plant_.reservoirs[i].at.index == point) {
                return levelOf(i);
            }
        }
        return std::nullopt;
    }

    /// Upper reservoir less tailwater, along ways that do not fork.
    std::optional<double> grossHead_m(const plant::Unit& unit) const {
        const auto way = wayToReservoir(unit.from.index);
        const auto upper = surfaceAt(way.empty() ? unit.from.index : upperEnd(way));
        const auto lower = unit.to.collection == plant::Collection::reservoirs
                               ? levelOf(unit.to.index)
                               : surfaceAt(unit.to.index);
        return upper && lower ? std::optional(*upper - *lower) : std::nullopt;
    }

    /// Gross head less the losses on the way and the velocity head at the draft tube's outlet.
    std::optional<double> netHead_m(const plant::Unit& unit, std::optional<double> flow) const {
        const auto gross = grossHead_m(unit);
        const auto loss_m = ownLosses_m(wayToReservoir(unit.from.index));
        if (!gross || !loss_m || !flow) {
            return std::nullopt;
        }
        const bool outlet = unit.draftTube && medium_.velocityHeads;
        return *gross - *loss_m -
               (outlet ? hydraulics::velocityHead_m(*flow, unit.draftTube->area_m2, g()) : 0.0);
    }

    void unitRows(int i) {
        const auto& name = plant_.units.name(i);
        const auto& unit = plant_.units[i];
        const Place place{Thing::unit, i};
        add(name, "Gross head", "", Quantity::head, grossHead_m(unit), {},
            "upper reservoir less tailwater");
        add(name, "Net head", "", Quantity::head,
            netHead_m(unit, rest_.find(Measure::discharge, place)),
            rest_.find(Measure::netHead, place),
            "gross head less losses and the velocity head at the draft tube's outlet");
        for (const auto measure : {Measure::discharge, Measure::opening,
                                   Measure::speed, Measure::shaftPower}) {
            if (const auto value = rest_.find(measure, place)) {
                add(name, std::string(info(measure).label), "", info(measure).quantity, {}, value,
                    "");
            }
        }
        if (const auto* francis = std::get_if<plant::FrancisTurbine>(&unit.turbine)) {
            machineRows(name, unit, *francis);
        }
    }

    double columnInertia_1m(const plant::Unit& unit, const std::vector<int>& way) const {
        double sum = inertia_1m(way);
        for (const auto& passage : {unit.spiral, unit.draftTube}) {
            if (passage) {
                sum += passage->length_m / passage->area_m2;
            }
        }
        return sum;
    }

    void machineRows(const std::string& name, const plant::Unit& unit,
                     const plant::FrancisTurbine& turbine) {
        const auto way = wayToSurface(unit.from.index, true);
        const double tw_s = hydraulics::waterStartingTime_s(
            columnInertia_1m(unit, way), turbine.ratedFlow_m3s, turbine.ratedHead_m, g());
        add(name, "Water starting time", "Tw", Quantity::time, tw_s, {},
            "ΣL/A · Q/(g H) to the nearest free surface, rated");
        if (unit.inertia_kgm2) {
            const double ta_s = hydraulics::machineStartingTime_s(
                *unit.inertia_kgm2, turbine.ratedSpeed_rads, turbine.ratedPower_W);
            add(name, "Machine starting time", "Ta", Quantity::time, ta_s, {}, "J ω²/P, rated");
            if (tw_s > 0.0) {
                add(name, "Machine over water", "Ta/Tw", Quantity::factor, ta_s / tw_s, {},
                    "3 to 4 and more is comfortable; common practice, no source");
            }
        }
        double travel_s = 0.0;
        for (const int conduit : way) {
            travel_s += line(conduit).travelTime_s();
        }
        if (travel_s > 0.0) {
            const auto& last = line(way.front());
            add(name, "Reflection time to the free surface", "2L/a", Quantity::time,
                2.0 * travel_s, {}, "twice the travel time of a wave");
            add(name, "Allievi's number", "ρ", Quantity::factor,
                hydraulics::allieviNumber(last.waveSpeed_mps(),
                                          turbine.ratedFlow_m3s / smallestArea_m2(way.front()),
                                          turbine.ratedHead_m, g()),
                {}, "a v/(2 g H), rated");
        }
        machines::TurbineDuty duty;
        duty.speed_rpm = turbine.ratedSpeed_rads * 30.0 / constants::pi;
        duty.flow_m3s = turbine.ratedFlow_m3s;
        duty.head_m = turbine.ratedHead_m;
        duty.gravity_mps2 = g();
        duty.density_kgm3 = medium_.density_kgm3;
        duty.diameter_m = turbine.runnerDiameter_m.value_or(1.0);
        add(name, "Specific speed", "nq", Quantity::factor, machines::specificSpeeds(duty).nq, {},
            "n √Q/H^0.75, rated, n in rpm");
    }

    const plant::Plant& plant_;
    const plant::Study& study_;
    const RestState& rest_;
    simulation::Medium medium_;
    std::vector<simulation::ConduitGeometry> lines_;
    std::vector<PlausibilityRow> rows_;
};

} // namespace

std::vector<PlausibilityRow> plausibility(const Snapshot& snapshot, int option, int study,
                                          const RestState& rest) {
    return Sheet(snapshot.variant(option), *snapshot.inputs(option, study).study, rest).rows();
}

} // namespace headroom::studies
