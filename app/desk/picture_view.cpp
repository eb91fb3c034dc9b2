// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/picture_view.h"

#include <QAccessible>
#include <QHelpEvent>
#include <QMouseEvent>
#include <QPainter>
#include <QToolTip>

namespace headroom::desk {

PictureView::PictureView(QWidget* parent)
    : QWidget(parent), look_(&drawing::look(drawing::Scheme::light)) {
    setFocusPolicy(Qt::StrongFocus);
    setMouseTracking(true);
}

bool byKeyboard(Qt::FocusReason reason) {
    return reason == Qt::TabFocusReason || reason == Qt::BacktabFocusReason ||
           reason == Qt::ShortcutFocusReason;
}

QString PictureView::description() const {
    QStringList parts;
    for (const auto& item : items()) {
        if (!item.description.isEmpty()) {
            parts << item.description;
        }
    }
    return parts.join(QStringLiteral(". "));
}

const drawing::Item* PictureView::find(drawing::ItemKind kind, const plant::Path& thing) const {
    for (const auto& item : items()) {
        if (item.kind == kind && item.thing == thing) {
            return &item;
        }
    }
    return nullptr;
}

void PictureView::setLook(const drawing::Look& look) {
    look_ = &look;
    outdate();
}

void PictureView::outdate() {
    stale_ = true;
    update();
    if (QAccessible::isActive()) {
        QAccessibleEvent event(this, QAccessible::ObjectReorder);
        QAccessible::updateAccessibility(&event);
    }
}

void PictureView::fresh() const {
    if (stale_ && width() > 1 && height() > 1) {
        auto* self = const_cast<PictureView*>(this); // a cache: the state shown is not this object's
        self->stale_ = false;
        self->remake();
    }
}

void PictureView::paintFocus(QPainter& painter) const {
    if (!hasFocus() || !ring_) {
        return;
    }
    const double half = look_->width.focus / 2.0;
    painter.setRenderHint(QPainter::Antialiasing);
    painter.setBrush(Qt::NoBrush);
    painter.setPen(look_->pen(look_->focus, look_->width.focus));
    painter.drawRoundedRect(QRectF(rect()).adjusted(half, half, -half, -half), look_->space.corner,
                            look_->space.corner);
}

void PictureView::mousePressEvent(QMouseEvent* event) {
    if (event->button() != Qt::LeftButton) {
        return QWidget::mousePressEvent(event);
    }
    if (const auto* item = drawing::itemAt(items(), event->position())) {
        const drawing::Item copy = *item; // pressing may remake the picture
        emit pressed(copy, event->modifiers());
    } else {
        emit pressedNothing();
    }
}

void PictureView::mouseMoveEvent(QMouseEvent* event) {
    const auto* item = drawing::itemAt(items(), event->position());
    emit described(item == nullptr ? QString() : item->description);
    setCursor(item == nullptr ? Qt::ArrowCursor : Qt::PointingHandCursor);
}

void PictureView::leaveEvent(QEvent* event) {
    QWidget::leaveEvent(event);
    emit described({});
}

void PictureView::resizeEvent(QResizeEvent* event) {
    QWidget::resizeEvent(event);
    outdate();
}

void PictureView::focusInEvent(QFocusEvent* event) {
    QWidget::focusInEvent(event);
    ring_ = byKeyboard(event->reason());
    update();
}
void PictureView::focusOutEvent(QFocusEvent* event) {
    QWidget::focusOutEvent(event);
    update();
}

bool PictureView::event(QEvent* event) {
    if (event->type() == QEvent::ToolTip) {
        auto* help = static_cast<QHelpEvent*>(event);
        const auto* item = drawing::itemAt(items(), QPointF(help->pos()));
        QToolTip::showText(help->globalPos(), item == nullptr ? QString() : item->description, this);
        return true;
    }
    return QWidget::event(event);
}

} // namespace headroom::desk
