// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

#include <QLineF>
#include <QPolygonF>
#include <QRectF>
#include <QString>

#include <optional>
#include <utility>
#include <vector>

class QPainter;

namespace headroom::drawing {

/// A printed text with its place.
struct Label {
    QString text;
    QRectF box; ///< the text lies inside
    TextSize size = TextSize::small;
    TextWeight weight = TextWeight::normal;
    bool quiet = false;  ///< in the muted colour
    bool framed = false; ///< on a ground of its own, with a frame in the limit's colour
    std::optional<QPointF> leader = {}; ///< hair line from the box to here
};

/// A small text in the muted colour.
inline Label quietLabel(QString words, QRectF box) {
    return {std::move(words), box, TextSize::small, TextWeight::normal, true};
}

/// Width and height a text needs.
QSizeF textSize(const QString& text, const QFont& font);

/// A name on at most two lines, as even as they get; a number stays with the unit behind it.
std::vector<QString> folded(const QString& name, const QFont& font);

/// Paints text with a halo of the ground, or framed.
void paintLabel(QPainter& painter, const Label& label, const Look& look);
/// The same text without halo, elided to its box.
void paintPlain(QPainter& painter, const Label& label, const Look& look, Qt::Alignment alignment);

/// Finds room for labels: none ever overlaps another or leaves the area; lines, bodies and zones
/// are avoided where a candidate allows it.
class LabelPlacer {
public:
    explicit LabelPlacer(QRectF area) : area_(area) {}

    void avoid(const QRectF& body) { bodies_.push_back(body); }
    void avoid(const QPolygonF& line, double halfWidth);
    /// The first candidate that is free of everything, else the first that is free of labels and
    /// bodies, else (unless `strict`) of labels only; taken from then on.
    std::optional<QRectF> place(const std::vector<QRectF>& candidates, bool strict = false);
    void take(const QRectF& box) { labels_.push_back(box); }

private:
    bool inside(const QRectF& box) const { return area_.contains(box); }
    bool freeOfLabels(const QRectF& box) const;
    bool freeOfBodies(const QRectF& box) const;
    bool freeOfLines(const QRectF& box) const;

    struct Line {
        QLineF line;
        double half;
    };
    QRectF area_;
    std::vector<QRectF> labels_, bodies_;
    std::vector<Line> lines_;
};

/// Boxes of a size above, below, right and left of something, at a distance; first choice first.
std::vector<QRectF> around(const QRectF& thing, QSizeF size, double gap);

} // namespace headroom::drawing
