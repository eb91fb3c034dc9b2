// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/section_view.h"

#include "desk/words.h"

#include <QKeyEvent>
#include <QPainter>
#include <algorithm>

namespace headroom::desk {

namespace {

using drawing::ItemKind;

const drawing::Items noItems;

bool isThing(const drawing::Item& item) {
    switch (item.kind) {
    case ItemKind::reservoir:
    case ItemKind::conduit:
    case ItemKind::chamber:
    case ItemKind::unit: return !item.thing.empty();
    default: return false;
    }
}

drawing::SectionInput inputFor(Workbench& bench, QSizeF size, const drawing::Look& look,
                               drawing::Scales scales) {
    return {bench.snapshot(), bench.cellInHand(), bench.now(), size, look, scales};
}

/// Whether only the cursor moved.
bool onlyTime(Selection before, const Selection& now) {
    before.time_s = now.time_s;
    return before == now;
}

/// The keys on which a slip opens with what was typed.
bool opensSlip(const QString& typed) {
    return typed.size() == 1 && (typed[0].isDigit() || QStringLiteral("=+-.").contains(typed[0]));
}

} // namespace

SectionView::SectionView(Workbench& bench, QWidget* parent) : PictureView(parent), bench_(bench) {
    setObjectName(QStringLiteral("section"));
    setAccessibleName(tr("Section"));
    connect(&bench_, &Workbench::shownChanged, this, [this] { outdate(); });
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (onlyTime(before, bench_.now())) {
            update();
        } else {
            outdate();
        }
    });
}

const drawing::Items& SectionView::items() const {
    fresh();
    return picture_ ? picture_->items : noItems;
}

QString SectionView::description() const {
    fresh();
    return picture_ ? picture_->description(bench_.now().time_s) : QString();
}

void SectionView::setScales(drawing::Scales scales) {
    scales_ = scales;
    outdate();
}

void SectionView::remake() {
    picture_ = drawing::sectionPicture(inputFor(bench_, QSizeF(size()), currentLook(), scales_));
    still_ = {};
}

void SectionView::paintEvent(QPaintEvent*) {
    fresh();
    QPainter painter(this);
    if (!picture_) {
        painter.fillRect(rect(), currentLook().sheet);
        return;
    }
    const double ratio = devicePixelRatioF();
    if (still_.isNull() || still_.devicePixelRatio() != ratio) {
        still_ = QPixmap(size() * ratio);
        still_.setDevicePixelRatio(ratio);
        still_.fill(currentLook().sheet);
        QPainter stillPainter(&still_);
        stillPainter.setRenderHint(QPainter::Antialiasing);
        picture_->paintStill(stillPainter);
    }
    painter.drawPixmap(QPointF(0, 0), still_);
    painter.setRenderHint(QPainter::Antialiasing);
    picture_->paintMoving(painter, bench_.now().time_s);
    paintFocus(painter);
}

void SectionView::keyPressEvent(QKeyEvent* event) {
    const bool enter = event->key() == Qt::Key_Return || event->key() == Qt::Key_Enter;
    const bool command = event->modifiers() & (Qt::ControlModifier | Qt::AltModifier);
    if (!command && (enter || opensSlip(event->text()))) {
        emit slipAsked(enter ? QString() : event->text());
        return;
    }
    if (event->key() == Qt::Key_Right || event->key() == Qt::Key_Left) {
        walk(event->key() == Qt::Key_Right ? 1 : -1);
        return;
    }
    PictureView::keyPressEvent(event);
}

void SectionView::walk(int steps) {
    std::vector<const drawing::Item*> things;
    for (const auto& item : items()) {
        const bool known = std::any_of(things.begin(), things.end(),
                                       [&](const auto* other) { return other->thing == item.thing; });
        if (isThing(item) && !known) {
            things.push_back(&item);
        }
    }
    if (things.empty()) {
        return;
    }
    std::stable_sort(things.begin(), things.end(), [](const auto* a, const auto* b) {
        return a->box.center().x() < b->box.center().x();
    });
    const auto here = std::find_if(things.begin(), things.end(), [&](const auto* item) {
        return item->thing == thingPath(bench_.now().thing);
    });
    const int count = static_cast<int>(things.size());
    const int at = here == things.end() ? (steps > 0 ? -1 : count)
                                        : static_cast<int>(here - things.begin());
    const auto next = static_cast<std::size_t>(((at + steps) % count + count) % count);
    bench_.pressThing(things[next]->thing);
}

QRectF SectionView::placeOf(const plant::Path& path) const {
    const auto thing = thingPath(path);
    const drawing::Item* best = nullptr;
    for (const auto& item : items()) {
        if (item.thing == thing && (best == nullptr || isThing(item))) {
            best = isThing(item) || best == nullptr ? &item : best;
        }
    }
    return best != nullptr ? best->box : QRectF(QRectF(rect()).center(), QSizeF(1, 1));
}

RibbonView::RibbonView(Workbench& bench, QWidget* parent) : PictureView(parent), bench_(bench) {
    setObjectName(QStringLiteral("ribbon"));
    setAccessibleName(tr("Margin ribbon"));
    connect(&bench_, &Workbench::shownChanged, this, [this] { outdate(); });
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (!onlyTime(before, bench_.now())) {
            outdate();
        }
    });
}

const drawing::Items& RibbonView::items() const {
    fresh();
    return picture_ ? picture_->items : noItems;
}

void RibbonView::setScales(drawing::Scales scales) {
    scales_ = scales;
    outdate();
}

void RibbonView::remake() {
    picture_ = drawing::ribbonPicture(inputFor(bench_, QSizeF(size()), currentLook(), scales_));
}

void RibbonView::paintEvent(QPaintEvent*) {
    fresh();
    QPainter painter(this);
    painter.fillRect(rect(), currentLook().sheet);
    painter.setRenderHint(QPainter::Antialiasing);
    if (picture_) {
        picture_->paint(painter);
    }
    paintFocus(painter);
}

} // namespace headroom::desk
