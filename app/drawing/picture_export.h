// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

#include <QImage>
#include <QSizeF>

#include <functional>

class QPainter;

namespace headroom::drawing {

/// Paints into an image of `size` logical pixels at `ratio` device pixels each, on the sheet's
/// ground. The same paint functions serve screen, picture files and print.
QImage paintToImage(QSizeF size, double ratio, const Look& look,
                    const std::function<void(QPainter&)>& paint);

/// The picture as a printer without colour gives it.
QImage grey(const QImage& picture);

} // namespace headroom::drawing
