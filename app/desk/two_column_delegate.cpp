// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/two_column_delegate.h"

#include <QPainter>

namespace headroom::desk {

namespace {
constexpr int edge_px = 8;
} // namespace

void TwoColumnDelegate::paint(QPainter* painter, const QStyleOptionViewItem& option,
                              const QModelIndex& index) const {
    const auto detail = index.data(detailRole).toString();
    const int wide = detail.isEmpty() ? 0 : option.fontMetrics.horizontalAdvance(detail) + 3 * edge_px;
    QStyleOptionViewItem first = option;
    initStyleOption(&first, index);
    first.text = option.fontMetrics.elidedText(first.text, Qt::ElideRight, option.rect.width() - wide - 2 * edge_px);
    const auto* style = option.widget != nullptr ? option.widget->style() : nullptr;
    if (style != nullptr) {
        style->drawControl(QStyle::CE_ItemViewItem, &first, painter, option.widget);
    }
    painter->save();
    painter->setFont(option.font);
    painter->setPen(option.palette.color(QPalette::PlaceholderText));
    painter->drawText(option.rect.adjusted(edge_px, 0, -edge_px, 0), Qt::AlignRight | Qt::AlignVCenter, detail);
    painter->restore();
}

} // namespace headroom::desk
