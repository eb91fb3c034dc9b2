// SPDX-License-Identifier: GPL-3.0-or-later
#include "picture_checks.h"

#include "drawing/look.h"

#include <QDir>
#include <QFontMetricsF>
#include <QPainter>

#include <cmath>

namespace headroom::drawing::test {

namespace {

bool printed(const Item& item) {
    return !item.label.isEmpty() && item.kind != ItemKind::bar && item.kind != ItemKind::cell
           && item.kind != ItemKind::ribbon;
}

bool isTitle(const Item& item) {
    return item.kind == ItemKind::columnTitle;
}

/// Boxes may touch. Slanted titles are compared by their shapes.
bool over(const Item& a, const Item& b) {
    if (isTitle(a) || isTitle(b)) {
        return a.shape.intersects(b.shape);
    }
    return a.box.adjusted(0.5, 0.5, -0.5, -0.5).intersects(b.box.adjusted(0.5, 0.5, -0.5, -0.5));
}

} // namespace

QString faults(const Items& items, QSizeF size, const Look& look) {
    QString out;
    const QRectF picture = QRectF(QPointF(), size).adjusted(-0.5, -0.5, 0.5, 0.5);
    const QFontMetricsF metrics(look.font(TextSize::small));
    for (std::size_t i = 0; i < items.size(); ++i) {
        const Item& item = items[i];
        if (item.description.isEmpty()) {
            out += QStringLiteral("item %1 says nothing; ").arg(i);
        }
        if (!printed(item)) {
            continue;
        }
        if (!picture.contains(item.box)) {
            out += QStringLiteral("“%1” leaves the picture; ").arg(item.label);
        }
        if (!isTitle(item) && item.kind != ItemKind::rowTitle
            && metrics.horizontalAdvance(item.label) > item.box.width() + 1.5) {
            out += QStringLiteral("“%1” is wider than its box; ").arg(item.label);
        }
        for (std::size_t j = i + 1; j < items.size(); ++j) {
            if (printed(items[j]) && over(item, items[j])) {
                out += QStringLiteral("“%1” lies over “%2”; ").arg(item.label, items[j].label);
            }
        }
    }
    return out;
}

double differing(const QImage& a, const QImage& b) {
    if (a.size() != b.size() || a.isNull()) {
        return 1.0;
    }
    const QImage first = a.convertToFormat(QImage::Format_Grayscale8);
    const QImage second = b.convertToFormat(QImage::Format_Grayscale8);
    int count = 0;
    for (int y = 0; y < first.height(); ++y) {
        for (int x = 0; x < first.width(); ++x) {
            count += std::abs(first.constScanLine(y)[x] - second.constScanLine(y)[x]) > 24 ? 1 : 0;
        }
    }
    return static_cast<double>(count) / (static_cast<double>(first.width()) * first.height());
}

void keep(const QImage& image, const QString& name) {
    const QString folder = QStringLiteral(HEADROOM_BUILD_DIR "/pictures");
    QDir().mkpath(folder);
    image.save(folder + QLatin1Char('/') + name + QStringLiteral(".png"));
}

} // namespace headroom::drawing::test
