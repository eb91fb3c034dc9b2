// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/board_model.h"
#include "drawing/selection.h"

#include <QString>
#include <optional>
#include <vector>

/// Which lanes are shown, and what stands in each; without painting.
namespace headroom::desk {

/// A bound of one limit as the class of the study in the hand judges it [SI].
struct LaneBound {
    int limit = -1;
    bool upper = true;
    double value = 0.0;
    bool timed = false;             ///< may be passed for some time
};

struct Lane {
    Measure measure = Measure::level;
    results::Place place;
    QString name;                   ///< "Level", what is shown
    QString where;                  ///< "Surge shaft"
    std::vector<LaneBound> bounds;
    bool chosen = false;            ///< of the chosen limit: twice as tall

    Quantity quantity() const { return info(measure).quantity; }
    /// The limit that stands for this lane when it is pressed; −1 if none.
    int limit() const { return bounds.empty() ? -1 : bounds.front().limit; }
};

/// A lane's range of values with the notes for what lies beyond it [SI].
struct LaneRange {
    double low = 0.0, high = 1.0;
    QString above, below;           ///< "limit 39 m above"
};

/// Lanes for the run in the hand, the most wanted first: chamber level, speed, head at the unit,
/// gate, power, then what other limits watch, then what else was recorded. At most `most`, and
/// the chosen limit's lane is always among them.
std::vector<Lane> planLanes(const BoardModel& board, const drawing::Selection& selection,
                            int most);

/// Range for values between `low` and `high` [SI]: bounds come in while the whole stays within
/// three times the data's own range.
LaneRange laneRange(const Lane& lane, double low, double high);

} // namespace headroom::desk
