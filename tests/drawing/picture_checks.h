// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"
#include "drawing/picture.h"

#include <QImage>
#include <QString>

#include <functional>

class QPainter;

namespace headroom::drawing::test {

/// "" if all is well, else what is wrong: an item without description, a box outside the picture,
/// a label wider than its box, two labels over each other.
QString faults(const Items& items, QSizeF size, const Look& look);

/// Share of pixels that differ by more than a shade.
double differing(const QImage& a, const QImage& b);

/// Writes a picture into the build folder, for people to look at.
void keep(const QImage& image, const QString& name);

} // namespace headroom::drawing::test
