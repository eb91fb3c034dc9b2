// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/board_view.h"

#include "plant/fields.h"

#include <QKeyEvent>
#include <QPainter>
#include <QWheelEvent>
#include <algorithm>

namespace headroom::desk {

namespace {

using drawing::ItemKind;

const drawing::Items noItems;

bool isEnter(const QKeyEvent& event) {
    return event.key() == Qt::Key_Return || event.key() == Qt::Key_Enter;
}

} // namespace

BoardView::BoardView(Workbench& bench, QWidget* parent) : PictureView(parent), bench_(bench) {
    setObjectName(QStringLiteral("board"));
    setAccessibleName(tr("Board: studies down, options across"));
    connect(this, &PictureView::pressed, this, &BoardView::press);
    connect(&bench_, &Workbench::boardChanged, this, [this] { outdate(); });
    connect(&bench_, &Workbench::shownChanged, this, [this] { outdate(); });
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (before.shown != bench_.now().shown) {
            outdate();
            showCell(bench_.now().inHand());
        }
    });
}

const drawing::Items& BoardView::items() const {
    fresh();
    return picture_ ? picture_->items : noItems;
}

QSize BoardView::sizeHint() const {
    const double height = drawing::boardHeight(bench_.snapshot(), currentLook(), width());
    return {width(), static_cast<int>(height)};
}

void BoardView::remake() {
    const auto& bench = bench_;
    picture_ = drawing::boardPicture({bench.snapshot(), bench_.board().cells(), bench.now(),
                                      QSizeF(size()), currentLook(), firstRow_, firstColumn_,
                                      bench.optionInHand()});
    firstRow_ = picture_->firstRow;
    firstColumn_ = picture_->firstColumn;
}

void BoardView::paintEvent(QPaintEvent*) {
    fresh();
    QPainter painter(this);
    painter.fillRect(rect(), currentLook().titleBlock);
    painter.setRenderHint(QPainter::Antialiasing);
    if (picture_) {
        picture_->paint(painter);
    }
    paintFocus(painter);
}

void BoardView::press(const drawing::Item& item, Qt::KeyboardModifiers modifiers) {
    if (item.kind == ItemKind::cell) {
        const CellId cell{item.option, item.study};
        if (modifiers & (Qt::ControlModifier | Qt::ShiftModifier)) {
            bench_.toggleCompared(cell);
        } else {
            bench_.pressCell(cell);
        }
    } else if (item.kind == ItemKind::columnTitle) {
        bench_.takeOption(item.option);
    } else if (item.kind == ItemKind::rowTitle) {
        bench_.pressCell({bench_.optionInHand(), item.study});
    }
}

QRectF BoardView::cellBox(CellId cell) const {
    for (const auto& item : items()) {
        if (item.kind == ItemKind::cell && item.option == cell.option && item.study == cell.study) {
            return item.box;
        }
    }
    return {};
}

/// Scrolls until the cell is in sight.
void BoardView::showCell(CellId cell) {
    fresh();
    if (!picture_) {
        return;
    }
    const int row = cell.study, column = cell.option + 1;
    const int rows = std::max(1, picture_->rowsShown), columns = std::max(1, picture_->columnsShown);
    const int newRow = std::clamp(firstRow_, row - rows + 1, row);
    const int newColumn = std::clamp(firstColumn_, column - columns + 1, column);
    if (newRow != firstRow_ || newColumn != firstColumn_) {
        firstRow_ = newRow;
        firstColumn_ = newColumn;
        outdate();
    }
}

void BoardView::keyPressEvent(QKeyEvent* event) {
    auto cell = bench_.now().inHand();
    switch (event->key()) {
    case Qt::Key_Up: --cell.study; return bench_.pressCell(cell);
    case Qt::Key_Down: ++cell.study; return bench_.pressCell(cell);
    case Qt::Key_Left: --cell.option; return bench_.pressCell(cell);
    case Qt::Key_Right: ++cell.option; return bench_.pressCell(cell);
    case Qt::Key_Space: return bench_.toggleCompared(cell);
    case Qt::Key_Escape: return bench_.board().cancel(cell);
    default: break;
    }
    if (!isEnter(*event) || event->modifiers().testFlag(Qt::ControlModifier)) {
        return PictureView::keyPressEvent(event);
    }
    if (!event->modifiers().testFlag(Qt::ShiftModifier)) {
        return bench_.board().want({cell});
    }
    std::vector<CellId> row;
    for (int option = -1; option < bench_.snapshot().options(); ++option) {
        row.push_back({option, cell.study});
    }
    bench_.board().want(row);
}

void BoardView::wheelEvent(QWheelEvent* event) {
    const auto delta = event->angleDelta();
    firstRow_ -= (delta.y() > 0) - (delta.y() < 0);
    firstColumn_ -= (delta.x() > 0) - (delta.x() < 0);
    firstRow_ = std::max(0, firstRow_);
    firstColumn_ = std::max(0, firstColumn_);
    outdate();
}

StripView::StripView(Workbench& bench, QWidget* parent) : PictureView(parent), bench_(bench) {
    setObjectName(QStringLiteral("strip"));
    setAccessibleName(tr("Headroom strip: limits, worst first"));
    connect(this, &PictureView::pressed, this, [this](const drawing::Item& item) {
        if (item.limit >= 0) {
            bench_.pressLimit(item.limit);
        }
    });
    connect(&bench_, &Workbench::shownChanged, this, [this] { outdate(); });
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (before.limit != bench_.now().limit || before.shown != bench_.now().shown) {
            outdate();
            showLimit(bench_.now().limit);
        }
    });
}

const drawing::Items& StripView::items() const {
    fresh();
    return picture_ ? picture_->items : noItems;
}

void StripView::remake() {
    picture_ = drawing::stripPicture({bench_.snapshot(), bench_.cellInHand(), bench_.now(),
                                      QSizeF(size()), currentLook(), firstRow_});
    firstRow_ = picture_->firstRow;
}

void StripView::paintEvent(QPaintEvent*) {
    fresh();
    QPainter painter(this);
    painter.fillRect(rect(), currentLook().titleBlock);
    painter.setRenderHint(QPainter::Antialiasing);
    if (picture_) {
        picture_->paint(painter);
    }
    paintFocus(painter);
}

QRectF StripView::barBox(int limit) const {
    for (const auto& item : items()) {
        if (item.kind == ItemKind::bar && item.limit == limit) {
            return item.box;
        }
    }
    return {};
}

void StripView::showLimit(int limit) {
    fresh();
    if (!picture_) {
        return;
    }
    const auto at = std::find(picture_->order.begin(), picture_->order.end(), limit);
    if (at == picture_->order.end()) {
        return;
    }
    const int row = static_cast<int>(at - picture_->order.begin());
    const int first = std::clamp(firstRow_, row - std::max(1, picture_->rowsShown) + 1, row);
    if (first != firstRow_) {
        firstRow_ = first;
        outdate();
    }
}

void StripView::keyPressEvent(QKeyEvent* event) {
    fresh();
    if (!picture_ || picture_->order.empty()) {
        return PictureView::keyPressEvent(event);
    }
    const auto& order = picture_->order;
    const auto at = std::find(order.begin(), order.end(), bench_.now().limit);
    const int here = at == order.end() ? 0 : static_cast<int>(at - order.begin());
    const int last = static_cast<int>(order.size()) - 1;
    const auto limitAt = [&](int row) {
        return order[static_cast<std::size_t>(std::clamp(row, 0, last))];
    };
    switch (event->key()) {
    case Qt::Key_Up: return bench_.pressLimit(limitAt(here - 1));
    case Qt::Key_Down: return bench_.pressLimit(limitAt(here + 1));
    case Qt::Key_Home: return bench_.pressLimit(limitAt(0));
    case Qt::Key_End: return bench_.pressLimit(limitAt(last));
    default: break;
    }
    const auto& limits = bench_.snapshot().variant(bench_.optionInHand()).limits;
    if (isEnter(*event) && bench_.now().limit >= 0 && bench_.now().limit < limits.size() &&
        !event->modifiers().testFlag(Qt::ControlModifier)) {
        auto path = plant::pathOf(plant::Collection::limits);
        path.push_back(limits.name(bench_.now().limit));
        emit slipAsked(path);
        return;
    }
    PictureView::keyPressEvent(event);
}

void StripView::wheelEvent(QWheelEvent* event) {
    const auto delta = event->angleDelta().y();
    firstRow_ = std::max(0, firstRow_ - ((delta > 0) - (delta < 0)));
    outdate();
}

} // namespace headroom::desk
