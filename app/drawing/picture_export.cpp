// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/picture_export.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

QImage paintToImage(QSizeF size, double ratio, const Look& look,
                    const std::function<void(QPainter&)>& paint) {
    const int width = std::max(1, static_cast<int>(std::ceil(size.width() * ratio)));
    const int height = std::max(1, static_cast<int>(std::ceil(size.height() * ratio)));
    QImage image(width, height, QImage::Format_ARGB32_Premultiplied);
    image.setDevicePixelRatio(ratio);
    image.fill(look.sheet);
    QPainter painter(&image);
    painter.setRenderHint(QPainter::Antialiasing);
    painter.setRenderHint(QPainter::TextAntialiasing);
    paint(painter);
    return image;
}

QImage grey(const QImage& picture) {
    QImage out = picture.convertToFormat(QImage::Format_Grayscale8);
    out.setDevicePixelRatio(picture.devicePixelRatio());
    return out;
}

} // namespace headroom::drawing
