// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/conduit_geometry.h"

#include "base/overloaded.h"
#include "numerics/elementary.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

using plant::Conduit;

/// y at x along corners; corners at one x count as a jump that is reached from the left.
double along(const std::vector<double>& xs, const std::vector<double>& ys, double x) {
    const bool rising = xs.back() >= xs.front();
    for (std::size_t i = 1; i < xs.size(); ++i) {
        const bool inside = rising ? x <= xs[i] : x >= xs[i];
        if (inside && xs[i] != xs[i - 1]) {
            const double share = (x - xs[i - 1]) / (xs[i] - xs[i - 1]);
            return ys[i - 1] + std::clamp(share, 0.0, 1.0) * (ys[i] - ys[i - 1]);
        }
    }
    return ys.back();
}

void setAxis(ConduitGeometry& out, const plant::Plant& plant, const Conduit& conduit) {
    const auto& from = plant.points[conduit.from.index];
    const auto& to = plant.points[conduit.to.index];
    out.chainage_m.push_back(from.chainage_m);
    out.elevation_m.push_back(from.elevation_m);
    for (const auto& [chainage, elevation] : conduit.axis) {
        out.chainage_m.push_back(chainage);
        out.elevation_m.push_back(elevation);
    }
    out.chainage_m.push_back(to.chainage_m);
    out.elevation_m.push_back(to.elevation_m);
    out.along_m.push_back(0.0);
    for (std::size_t i = 1; i < out.chainage_m.size(); ++i) {
        const double along_m = out.chainage_m[i] - out.chainage_m[i - 1];
        const double up_m = out.elevation_m[i] - out.elevation_m[i - 1];
        out.along_m.push_back(out.along_m.back()
                              + numerics::sqrt(along_m * along_m + up_m * up_m));
    }
    const double drawn = out.along_m.back();
    out.length_m = conduit.length_m.value_or(drawn);
    for (std::size_t i = 0; i < out.along_m.size(); ++i) {
        out.along_m[i] =
            drawn > 0.0 ? out.along_m[i] * (out.length_m / drawn) : (i == 0 ? 0.0 : out.length_m);
    }
}

hydraulics::FrictionLaw frictionOf(const plant::Reach& reach, const Medium& medium,
                                   const std::string& subject, Findings& findings) {
    using hydraulics::FrictionLaw;
    const hydraulics::Bore bore{reach.area_m2, reach.hydraulicRadius_m};
    const double g = medium.gravity_mps2;
    auto made = std::visit(
        overloaded{
            [&](const plant::Roughness& r) {
                return FrictionLaw::make(
                    bore, FrictionLaw::ColebrookWhite{r.height_m, medium.viscosity_m2s, g},
                    subject);
            },
            [&](const plant::Strickler& s) {
                return FrictionLaw::make(bore, FrictionLaw::Strickler{s.number}, subject);
            },
            [&](const plant::DarcyFactor& f) {
                return FrictionLaw::make(bore, FrictionLaw::DarcyFactor{f.factor, g}, subject);
            },
            [&](const plant::LinearFriction& l) {
                return FrictionLaw::make(bore, FrictionLaw::Linear{l.rate_1s, g}, subject);
            }},
        reach.friction);
    findings.insert(findings.end(), made.findings().begin(), made.findings().end());
    return made ? *made : FrictionLaw{};
}

void setPieces(ConduitGeometry& out, const Conduit& conduit, const Medium& medium,
               const std::string& subject, Findings& findings) {
    double from = 0.0;
    for (int i = 0; i < conduit.reaches.size(); ++i) {
        const auto& reach = conduit.reaches[i];
        const bool last = i + 1 == conduit.reaches.size();
        const double to = reach.to_m && !last ? out.alongAt(*reach.to_m) : out.length_m;
        if (to <= from) {
            continue;
        }
        const std::string path = subject + "/reaches/" + conduit.reaches.name(i);
        out.pieces.push_back({from, to - from, reach.area_m2,
                              wallSpeed_mps(reach, medium, path, findings),
                              frictionOf(reach, medium, path, findings)});
        from = to;
    }
}

void setLosses(ConduitGeometry& out, const Conduit& conduit, const Medium& medium) {
    for (const auto& [name, loss] : conduit.losses) {
        const double at = out.alongAt(loss.chainage_m);
        const double area = out.area_m2(at);
        const double perFlow = 1.0 / (2.0 * medium.gravity_mps2 * area * area);
        out.losses.push_back(
            {at, loss.coefficient * perFlow, loss.reverse.value_or(loss.coefficient) * perFlow});
    }
}

/// Physics of a node: leaving, H − h = (1+ζ)v²/2g; arriving, h − H = (ζ−1)v²/2g, with ζ = 1 into a
/// reservoir and 0 straight through. A given ζ holds for the direction from → to, and for the way
/// back too where no reservoir is. Without velocity heads only given losses remain.
EndLoss endLoss(double area, const Medium& medium, std::optional<double> leaving,
                std::optional<double> arriving, bool reservoir) {
    const double perFlow = 1.0 / (2.0 * medium.gravity_mps2 * area * area);
    const double kinetic = medium.velocityHeads ? 1.0 : 0.0;
    const double exit = medium.velocityHeads && reservoir ? 1.0 : 0.0;
    return {(kinetic + leaving.value_or(0.0)) * perFlow,
            (arriving.value_or(exit) - kinetic) * perFlow};
}

} // namespace

double ConduitGeometry::travelTime_s() const {
    double sum = 0.0;
    for (const auto& piece : pieces) {
        sum += piece.length_m / piece.waveSpeed_mps;
    }
    return sum;
}

double ConduitGeometry::travelTimeTo_s(double along) const {
    double sum = 0.0;
    for (const auto& piece : pieces) {
        sum += std::clamp(along - piece.from_m, 0.0, piece.length_m) / piece.waveSpeed_mps;
    }
    return sum;
}

double ConduitGeometry::inertia_s2m2(double gravity) const {
    double sum = 0.0;
    for (const auto& piece : pieces) {
        sum += piece.length_m / (gravity * piece.area_m2);
    }
    return sum;
}

double ConduitGeometry::storage_m2(double gravity) const {
    double sum = 0.0;
    for (const auto& piece : pieces) {
        sum +=
            gravity * piece.area_m2 * piece.length_m / (piece.waveSpeed_mps * piece.waveSpeed_mps);
    }
    return sum;
}

double ConduitGeometry::chainageAt(double s) const {
    return along(along_m, chainage_m, s);
}
double ConduitGeometry::elevationAt(double s) const {
    return along(along_m, elevation_m, s);
}
double ConduitGeometry::alongAt(double chainage) const {
    return along(chainage_m, along_m, chainage);
}

double ConduitGeometry::area_m2(double s) const {
    for (const auto& piece : pieces) {
        if (s <= piece.from_m + piece.length_m) {
            return piece.area_m2;
        }
    }
    return pieces.back().area_m2;
}

ConduitGeometry conduitGeometry(const plant::Plant& plant, int index, const Medium& medium,
                                const ConduitEnds& ends, Findings& findings) {
    const Conduit& conduit = plant.conduits[index];
    const std::string subject = "plant/conduits/" + plant.conduits.name(index);
    ConduitGeometry out;
    setAxis(out, plant, conduit);
    setPieces(out, conduit, medium, subject, findings);
    if (out.pieces.empty()) {
        return out;
    }
    setLosses(out, conduit, medium);
    const auto& entering = conduit.enteringLoss;
    const auto& leaving = conduit.leavingLoss;
    out.from = endLoss(out.pieces.front().area_m2, medium, entering,
                       ends.fromReservoir ? std::nullopt : entering, ends.fromReservoir);
    out.to = endLoss(out.pieces.back().area_m2, medium, ends.toReservoir ? std::nullopt : leaving,
                     leaving, ends.toReservoir);
    return out;
}

} // namespace headroom::simulation
