// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "machines/francis_form.h"

#include <optional>

/// Steady points of a form, per unit. Each is one bracketed scalar equation.
namespace headroom::machines {

/// The flow at which the runner takes head h at speed n and inverse opening c. The head rises
/// without bound with the flow in either direction, so there is always one.
double flowAt(const FrancisForm& form, double h, double n, double c);

/// The inverse opening that passes flow q > 0 at rated head and speed; nothing if the runner
/// cannot swallow so much with the gate 1.6 times its rated opening.
std::optional<double> inverseOpeningFor(const FrancisForm& form, double q);

/// The speed without torque at rated head: runaway at this opening.
double runawayAt(const FrancisForm& form, double c);

/// A steady point at rated head and speed.
struct RatedHeadPoint {
    double c = 0.0, q = 0.0, m = 0.0;
    double efficiency(const FrancisForm& form) const {
        return q > 0.0 ? form.ratedEfficiency * m / q : 0.0;
    }
};
RatedHeadPoint ratedHeadPoint(const FrancisForm& form, double c);
/// The point that gives torque m at rated head and speed, on the rising part of torque over
/// opening; nothing if it is not reached.
std::optional<RatedHeadPoint> pointOfTorque(const FrancisForm& form, double m);
/// The point of best efficiency at rated head and speed; nothing if it does not lie between
/// three tenths and thirteen tenths of the rated opening.
std::optional<RatedHeadPoint> bestPoint(const FrancisForm& form);

} // namespace headroom::machines
