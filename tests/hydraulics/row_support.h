// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "hydraulics/branch.h"
#include "hydraulics/elastic_row.h"
#include "hydraulics/sections.h"

/// Small boundary conditions for rows, for tests only.
namespace headroom::hydraulics::rows {

inline constexpr double g = 9.81;

inline FrictionLaw colebrook(double diameter, double roughness, double viscosity = 1.307e-6) {
    const Section section = circle(diameter);
    return FrictionLaw::make({section.area_m2, section.hydraulicRadius_m()},
                             FrictionLaw::ColebrookWhite{roughness, viscosity, g})
        .value();
}
inline FrictionLaw darcy(double diameter, double factor, double gravity = g) {
    const Section section = circle(diameter);
    return FrictionLaw::make({section.area_m2, section.hydraulicRadius_m()},
                             FrictionLaw::DarcyFactor{factor, gravity})
        .value();
}

inline void startAtHead(const ElasticRows& rows, ElasticState& state, std::size_t j, double head) {
    const EndLaw& law = rows.startLaw(state, j);
    const double w = head - law.arriving_m;
    const double r = w < 0 ? law.reverse_s2m5 : law.forward_s2m5;
    rows.setStart(state, j, head, solveBranch(law.linear_sm2, r, w).flow_m3s);
}
inline void endAtHead(const ElasticRows& rows, ElasticState& state, std::size_t j, double head) {
    const EndLaw& law = rows.endLaw(state, j);
    const double w = law.arriving_m - head;
    const double r = w < 0 ? law.reverse_s2m5 : law.forward_s2m5;
    rows.setEnd(state, j, head, solveBranch(law.linear_sm2, r, w).flow_m3s);
}
inline void endAtFlow(const ElasticRows& rows, ElasticState& state, std::size_t j, double flow) {
    const EndLaw& law = rows.endLaw(state, j);
    const double r = flow < 0 ? law.reverse_s2m5 : law.forward_s2m5;
    const double size = flow < 0 ? -flow : flow;
    rows.setEnd(state, j, law.arriving_m - (law.linear_sm2 + r * size) * flow, flow);
}

} // namespace headroom::hydraulics::rows
