// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/chainage_map.h"
#include "drawing/look.h"
#include "drawing/picture.h"
#include "drawing/selection.h"
#include "studies/board.h"

#include <QSizeF>

#include <memory>

class QPainter;

namespace headroom::drawing {

struct SectionInput {
    const studies::Snapshot& snapshot;
    const studies::Cell* inHand = nullptr; ///< nullptr: geometry only
    Selection selection;
    QSizeF size;
    const Look& look;
    Scales scales = Scales::three;
};

/// What the ways out of an empty project are called; each is an item of kind label.
inline constexpr const char* openDemoWords = "Open a demo plant";
inline constexpr const char* openProjectWords = "Open a project";

/// The plant's longitudinal section as data. Holds what it shows: neither snapshot nor cell need
/// to outlive it.
class SectionPicture {
public:
    Items items;
    int labelsLeftOut = 0; ///< names that found no room; said in the picture

    /// Everything that does not move with the cursor (for a pixmap), and what does.
    void paintStill(QPainter& painter) const;
    void paintMoving(QPainter& painter, double time_s) const;
    const ChainageMap& map() const;
    /// Elevation ↔ picture.
    double y_px(double elevation_m) const;
    double elevation_m(double y_px) const;
    /// One paragraph that says what is shown at a time.
    QString description(double time_s) const;

    struct Scene; ///< inside of the drawing only
private:
    friend SectionPicture sectionPicture(const SectionInput& input);
    std::shared_ptr<const Scene> scene_;
};

SectionPicture sectionPicture(const SectionInput& input);

} // namespace headroom::drawing
