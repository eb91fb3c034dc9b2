// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/section_picture.h"

namespace headroom::drawing {

/// Metres left to the nearest upper and lower limit along the waterway, and the ruler.
class RibbonPicture {
public:
    Items items;
    void paint(QPainter& painter) const;

    struct Scene; ///< inside of the drawing only
private:
    friend RibbonPicture ribbonPicture(const SectionInput& input);
    std::shared_ptr<const Scene> scene_;
};

/// Takes the Section's input with its own size; width and look as the Section's, so that the
/// chainages stand below each other.
RibbonPicture ribbonPicture(const SectionInput& input);

} // namespace headroom::drawing
