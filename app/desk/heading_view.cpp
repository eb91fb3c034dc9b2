// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/heading_view.h"

#include "desk/words.h"
#include "drawing/marks.h"

#include <QAccessible>
#include <QMouseEvent>
#include <QPainter>

namespace headroom::desk {

namespace {

using drawing::TextSize;
using drawing::TextWeight;

constexpr double keyLine_px = 24.0, keyGap_px = 8.0, keyBetween_px = 18.0, edge_px = 14.0;

} // namespace

HeadingView::HeadingView(Workbench& bench, QWidget* parent) : QWidget(parent), bench_(bench) {
    setObjectName(QStringLiteral("heading"));
    setSizePolicy(QSizePolicy::Expanding, QSizePolicy::Fixed);
    connect(&bench_, &Workbench::shownChanged, this, &HeadingView::refresh);
    connect(&bench_.document(), &Document::fileChanged, this, &HeadingView::refresh);
    connect(&bench_, &Workbench::lookChanged, this, [this] {
        updateGeometry();
        refresh();
    });
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (before.shown != bench_.now().shown || before.limit != bench_.now().limit) {
            refresh();
        }
    });
}

QSize HeadingView::sizeHint() const {
    const auto& look = bench_.look();
    const double height = look.lineHeight(TextSize::body) + look.lineHeight(TextSize::sentence) +
                          5.0 * look.space.unit;
    return {400, static_cast<int>(height)};
}

void HeadingView::refresh() {
    const auto words = sentence();
    if (accessibleName() != words) {
        setAccessibleName(words);
        QAccessibleEvent event(this, QAccessible::NameChanged);
        QAccessible::updateAccessibility(&event);
    }
    update();
}

QString HeadingView::changeWords() const {
    const auto& snapshot = bench_.snapshot();
    const auto base = text(snapshot.optionName(-1));
    const int option = bench_.optionInHand();
    return option < 0 ? tr("changes go into %1").arg(base)
                      : tr("changes go into %1, not into %2").arg(text(snapshot.optionName(option)), base);
}

QString HeadingView::projectWords() const {
    auto& document = bench_.document();
    if (!document.open()) {
        return tr("Headroom  ·  no project");
    }
    if (!document.readable()) {
        return document.name();
    }
    const auto& snapshot = bench_.snapshot();
    auto title = text(snapshot.project().title);
    title = title.isEmpty() ? document.name() : title;
    title += document.changed() ? tr(" (not saved)") : QString();
    return title + QStringLiteral("  ·  ") + changeWords();
}

QString HeadingView::sentence() const {
    return bench_.sentence();
}

std::vector<HeadingView::Key> HeadingView::keys() const {
    std::vector<Key> keys;
    const auto& look = bench_.look();
    const auto& shown = bench_.now().shown;
    double x = width() - edge_px * look.scale;
    for (std::size_t back = shown.size(); back-- > 0;) {
        const auto name = bench_.runName(shown[back]);
        const auto weight = back == 0 ? TextWeight::strong : TextWeight::normal;
        const double textWidth = QFontMetricsF(look.font(TextSize::body, weight)).horizontalAdvance(name) + 2.0;
        const double wide = (keyLine_px + keyGap_px) * look.scale + textWidth;
        x -= wide;
        if (x < width() * 0.4 || name.isEmpty()) {
            break; // the names at the left have the right of way
        }
        keys.insert(keys.begin(), {shown[back], QRectF(x, 2.0, wide, look.lineHeight(TextSize::body) + 6.0), name});
        x -= keyBetween_px * look.scale;
    }
    return keys;
}

void HeadingView::paintEvent(QPaintEvent*) {
    QPainter painter(this);
    const auto& look = bench_.look();
    painter.fillRect(rect(), look.sheet);
    painter.setRenderHint(QPainter::Antialiasing);
    paintTopLine(painter, keys());
    paintSentence(painter);
}

void HeadingView::paintTopLine(QPainter& painter, const std::vector<Key>& keys) const {
    const auto& look = bench_.look();
    if (bench_.optionInHand() >= 0) { // an option in the hand: the edge of the sheet is coloured
        painter.fillRect(QRectF(0, 0, width(), look.space.unit), look.accent);
    }
    const double right = keys.empty() ? width() - edge_px : keys.front().box.left() - 12.0;
    const QRectF line(edge_px * look.scale, 2.0 + look.space.unit, right - edge_px * look.scale, look.lineHeight(TextSize::body) + 2.0);
    painter.setFont(look.font(TextSize::body));
    painter.setPen(look.muted);
    // Where changes go has the right of way before the project's title.
    const QFontMetricsF metrics(painter.font());
    const bool all = metrics.horizontalAdvance(projectWords()) <= line.width() || !bench_.document().open() ||
                     !bench_.document().readable();
    const auto saved = bench_.document().changed() ? tr("not saved  ·  ") : QString();
    const auto words = metrics.elidedText(all ? projectWords() : saved + changeWords(), Qt::ElideRight, line.width());
    painter.drawText(line, Qt::AlignLeft | Qt::AlignVCenter, words);
    for (std::size_t i = 0; i < keys.size(); ++i) {
        const auto& shown = bench_.now().shown;
        const auto at = std::find(shown.begin(), shown.end(), keys[i].cell);
        const int run = static_cast<int>(at - shown.begin());
        const auto box = keys[i].box.translated(0, look.space.unit);
        painter.setPen(look.runPen(run));
        painter.drawLine(QPointF(box.left(), box.center().y()), QPointF(box.left() + keyLine_px * look.scale, box.center().y()));
        painter.setPen(look.text);
        painter.setFont(look.font(TextSize::body, run == 0 ? TextWeight::strong : TextWeight::normal));
        painter.drawText(box.adjusted((keyLine_px + keyGap_px) * look.scale, 0, 2, 0), Qt::AlignLeft | Qt::AlignVCenter, keys[i].name);
    }
}

void HeadingView::paintSentence(QPainter& painter) const {
    const auto& look = bench_.look();
    const double top = look.lineHeight(TextSize::body) + 3.0 * look.space.unit;
    QRectF line(edge_px * look.scale, top, width() - 2.0 * edge_px * look.scale, look.lineHeight(TextSize::sentence) + 2.0);
    if (const auto* cell = bench_.cellInHand()) {
        const double side = look.space.sentenceMark;
        const auto* verdict = verdictOf(bench_.board(), bench_.now());
        const bool done = cell->state == studies::CellState::done && verdict != nullptr;
        drawing::paintMark(painter, QRectF(line.left(), line.center().y() - side / 2.0, side, side),
                           done ? drawing::markOf(verdict->mark) : drawing::markOf(*cell), look, cell->progress);
        line.setLeft(line.left() + side + 2.0 * look.space.unit);
    }
    const auto words = sentence();
    painter.setPen(look.text);
    QFont font = look.font(TextSize::sentence, TextWeight::strong);
    // A long sentence is set smaller before any of it is left out.
    while (QFontMetricsF(font).horizontalAdvance(words) > line.width() && font.pixelSize() > look.font(TextSize::body).pixelSize()) {
        font.setPixelSize(font.pixelSize() - 1);
    }
    painter.setFont(font);
    painter.drawText(line, Qt::AlignLeft | Qt::AlignVCenter, QFontMetricsF(font).elidedText(words, Qt::ElideRight, line.width()));
}

void HeadingView::mousePressEvent(QMouseEvent* event) {
    for (const auto& key : keys()) {
        if (key.box.contains(event->position())) {
            emit runPressed(key.cell);
            return;
        }
    }
    QWidget::mousePressEvent(event);
}

} // namespace headroom::desk
