// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/strip_picture.h"

#include "drawing/label_placer.h"
#include "drawing/marks.h"
#include "drawing/shown.h"
#include "drawing/words.h"
#include "limits/judge.h"
#include "units/text.h"

#include <QPainter>

#include <algorithm>
#include <cmath>
#include <numeric>

namespace headroom::drawing {

struct StripBar {
    int limit = -1;
    MarkState mark = MarkState::notRun;
    bool selected = false;
    bool measured = false; ///< there is a share to draw
    double share = 0.0;    ///< m; 1: at rest, 0: at the limit
    double whisker = 0.0;  ///< U as a share
    QRectF row, markBox, track;
    Label letter, name, value;
};

struct StripPicture::Scene {
    explicit Scene(const Look& style) : look(style) {}
    const Look& look;
    std::vector<StripBar> bars;
    Label heading, legend;
    std::vector<Label> counts;
    double zeroShare = 0.2; ///< of a track: where the limit stands
};

namespace {

using Scene = StripPicture::Scene;

constexpr double leastRow = 0.66; ///< rows are pressed together to this before any is left out

struct Making {
    const StripInput& input;
    Scene& scene;
    StripPicture& picture;
    Shown what;
};

std::vector<int> worstFirst(const Shown& what) {
    std::vector<int> order(static_cast<std::size_t>(what.variant->limits.size()));
    std::iota(order.begin(), order.end(), 0);
    std::stable_sort(order.begin(), order.end(), [&](int a, int b) {
        const auto* first = what.verdict(a);
        const auto* second = what.verdict(b);
        if (first == nullptr || second == nullptr) {
            return first != nullptr && second == nullptr;
        }
        return limits::worse(*first, *second);
    });
    return order;
}

bool measured(const results::Verdict& verdict) {
    return verdict.mark != results::Mark::notRun && verdict.mark != results::Mark::notApplicable
           && std::isfinite(verdict.share) && std::isfinite(verdict.extreme);
}

/// U in shares: by the distance that makes up one share.
double whiskerOf(const results::Verdict& verdict) {
    const double one = verdict.share != 0.0 ? verdict.margin / verdict.share
                                            : std::abs(verdict.bound - verdict.rest);
    return one > 0.0 && std::isfinite(one) ? verdict.uncertainty / one : 0.0;
}

QString valueWords(const plant::Limit& limit, const results::Verdict* verdict) {
    if (verdict == nullptr || !measured(*verdict)) {
        const auto state = verdict == nullptr ? MarkState::notRun : markOf(verdict->mark);
        return words(state);
    }
    return extremeOfBound(limit, *verdict);
}

QString spoken(const QString& letter, const QString& name, const plant::Limit& limit,
               const results::Verdict* verdict) {
    QString out = letter + QStringLiteral(", ");
    if (verdict == nullptr) {
        return out + name + QStringLiteral(": not run.");
    }
    out += spokenVerdict(name, limit, *verdict);
    if (measured(*verdict)) {
        out += QStringLiteral(" Share left %1 per cent.").arg(percent(verdict->share));
    }
    if (verdict->unsignedLimit) {
        out += QStringLiteral(" The limit is unsigned.");
    }
    return out;
}

void placeBar(Making& making, StripBar& bar, const QRectF& row) {
    const auto& look = making.input.look;
    const double gap = look.space.unit;
    const double line = look.lineHeight(TextSize::small);
    const double first = row.top() + std::max(0.0, (row.height() - line - 2.5 * gap) / 2);
    bar.row = row;
    bar.markBox = QRectF(row.left() + gap, row.center().y() - look.space.mark / 2, look.space.mark,
                         look.space.mark);
    const double left = bar.markBox.right() + gap;
    const double wide = textSize(bar.value.text, look.font(TextSize::small)).width();
    const double letter = textSize(bar.letter.text, look.font(TextSize::small)).width() + 1.5 * gap;
    bar.value.box = QRectF(std::max(left, row.right() - gap - wide), first, wide, line);
    bar.letter.box = QRectF(left, first, letter, line);
    bar.name.box = QRectF(left + letter, first,
                          std::max(1.0, bar.value.box.left() - 2 * gap - left - letter), line);
    bar.track =
        QRectF(left, first + line + 0.4 * gap, std::max(1.0, row.right() - gap - left), 1.8 * gap);
}

void addBar(Making& making, int limit, const QRectF& row) {
    const auto& limits = making.what.variant->limits;
    const auto* verdict = making.what.verdict(limit);
    const QString name = text(limits.name(limit));
    const QString letter =
        limitLetter(making.input.snapshot.project(), *making.what.variant, limit);
    StripBar bar;
    bar.limit = limit;
    bar.selected = making.input.selection.limit == limit;
    bar.mark = verdict == nullptr ? MarkState::notRun : markOf(verdict->mark);
    bar.measured = verdict != nullptr && measured(*verdict);
    if (bar.measured) {
        bar.share = verdict->share;
        bar.whisker = whiskerOf(*verdict);
    }
    bar.letter = quietLabel(letter, {});
    bar.name = {name, {}, TextSize::small, TextWeight::strong};
    bar.value = {valueWords(limits[limit], verdict), {}};
    placeBar(making, bar, row);
    Item item;
    item.kind = ItemKind::bar;
    item.limit = limit;
    item.thing = {"limits", limits.name(limit)};
    item.time_s = bar.measured ? verdict->time_s : -1.0;
    item.box = row;
    item.shape.addRect(row);
    item.label = name + QLatin1Char(' ') + bar.value.text;
    item.description = spoken(letter, name, limits[limit], verdict);
    making.picture.items.push_back(std::move(item));
    making.scene.bars.push_back(std::move(bar));
}

void addCount(Making& making, const QString& words, const QRectF& where) {
    const Label label = quietLabel(words, where);
    Item item;
    item.kind = ItemKind::label;
    item.box = where;
    item.shape.addRect(where);
    item.label = item.description = words;
    making.picture.items.push_back(std::move(item));
    making.scene.counts.push_back(std::move(label));
}

void addHeading(Making& making, double height) {
    const auto& look = making.input.look;
    const double gap = look.space.unit, wide = making.input.size.width();
    const QString legend = QStringLiteral("0 = limit · full = at rest");
    const double legendWide =
        std::min(textSize(legend, look.font(TextSize::small)).width(), 0.7 * wide);
    making.scene.heading = {QStringLiteral("Headroom"),
                            QRectF(gap, 0, std::max(1.0, wide - legendWide - 4 * gap), height),
                            TextSize::heading, TextWeight::strong};
    making.scene.legend =
        quietLabel(legend, QRectF(wide - legendWide - gap, 0, legendWide, height));
}

void addRows(Making& making, double top) {
    const auto& look = making.input.look;
    auto& picture = making.picture;
    const double line = look.lineHeight(TextSize::small) + look.space.unit;
    const double room = std::max(0.0, making.input.size.height() - top);
    const int count = static_cast<int>(picture.order.size());
    double height = look.space.bar;
    if (count * height > room) {
        height = std::max(leastRow * look.space.bar, count > 0 ? room / count : height);
    }
    const bool all = count * height <= room + 0.5;
    const auto fitting = [&](double space) {
        return std::max(0, static_cast<int>(space / height));
    };
    const double above = !all && making.input.firstRow > 0 ? line : 0.0;
    picture.rowsShown = all ? count : fitting(room - line - above);
    picture.firstRow = std::clamp(making.input.firstRow, 0, std::max(0, count - picture.rowsShown));
    double y = top;
    const double wide = making.input.size.width() - 2 * look.space.unit;
    if (picture.firstRow > 0) {
        addCount(making, QStringLiteral("%1 more above").arg(picture.firstRow),
                 QRectF(look.space.unit, y, wide, line));
        y += above;
    }
    for (int i = 0; i < picture.rowsShown; ++i, y += height) {
        addBar(making, picture.order[static_cast<std::size_t>(picture.firstRow + i)],
               QRectF(0, y, making.input.size.width(), height));
    }
    const int below = count - picture.firstRow - picture.rowsShown;
    if (below > 0) {
        addCount(making, QStringLiteral("%1 more below").arg(below),
                 QRectF(look.space.unit, y, wide, line));
    }
    if (count == 0) {
        addCount(making, QStringLiteral("No limits yet."), QRectF(look.space.unit, y, wide, line));
    }
}

// --- painting -----------------------------------------------------------------------------------

void paintBar(QPainter& painter, const StripBar& bar, const Scene& scene) {
    const auto& look = scene.look;
    const double zero = bar.track.left() + scene.zeroShare * bar.track.width();
    const double full = bar.track.right() - zero;
    painter.fillRect(QRectF(zero, bar.track.top(), full, bar.track.height()), look.track);
    const double middle = bar.track.center().y();
    if (bar.measured) {
        const double least = -(zero - bar.track.left()) / full;
        const auto x = [&](double share) { return zero + std::clamp(share, least, 1.0) * full; };
        painter.fillRect(QRectF(QPointF(std::min(zero, x(bar.share)), bar.track.top()),
                                QPointF(std::max(zero, x(bar.share)), bar.track.bottom())),
                         look.mark(bar.mark));
        if (bar.whisker > 0.0) {
            const double from = x(bar.share - bar.whisker), to = x(bar.share + bar.whisker);
            const double end = 0.5 * bar.track.height();
            painter.setPen(look.pen(look.text, look.width.hair));
            painter.drawLine(QPointF(from, middle), QPointF(to, middle));
            painter.drawLine(QPointF(from, middle - end), QPointF(from, middle + end));
            painter.drawLine(QPointF(to, middle - end), QPointF(to, middle + end));
        }
        if (bar.share < least) { // goes on beyond the edge: an arrow head
            QPainterPath head(QPointF(bar.track.left() - 0.5 * bar.track.height(), middle));
            head.lineTo(bar.track.left(), bar.track.top());
            head.lineTo(bar.track.left(), bar.track.bottom());
            head.closeSubpath();
            painter.fillPath(head, look.mark(bar.mark));
        }
    }
    painter.setPen(look.pen(look.text, look.width.data));
    painter.drawLine(QPointF(zero, bar.track.top() - 2), QPointF(zero, bar.track.bottom() + 2));
}

} // namespace

StripPicture stripPicture(const StripInput& input) {
    auto scene = std::make_shared<StripPicture::Scene>(input.look);
    StripPicture picture;
    Making making{input, *scene, picture, shown(input.snapshot, input.inHand, input.selection)};
    picture.order = worstFirst(making.what);
    const double heading = input.look.lineHeight(TextSize::heading) + 1.5 * input.look.space.unit;
    addHeading(making, heading);
    addRows(making, heading);
    picture.scene_ = std::move(scene);
    return picture;
}

void StripPicture::paint(QPainter& painter) const {
    const Scene& scene = *scene_;
    const auto& look = scene.look;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing);
    paintPlain(painter, scene.heading, look, Qt::AlignLeft);
    paintPlain(painter, scene.legend, look, Qt::AlignRight);
    for (const auto& bar : scene.bars) {
        if (bar.selected) {
            painter.setPen(look.pen(look.accent, look.width.data));
            painter.setBrush(look.selection);
            painter.drawRoundedRect(bar.row.adjusted(1, 1, -1, -1), look.space.corner,
                                    look.space.corner);
        }
        paintMark(painter, bar.markBox, bar.mark, look);
        paintPlain(painter, bar.letter, look, Qt::AlignLeft);
        paintPlain(painter, bar.name, look, Qt::AlignLeft);
        paintPlain(painter, bar.value, look, Qt::AlignRight);
        paintBar(painter, bar, scene);
    }
    for (const auto& count : scene.counts) {
        paintPlain(painter, count, look, Qt::AlignLeft);
    }
    painter.restore();
}

} // namespace headroom::drawing
