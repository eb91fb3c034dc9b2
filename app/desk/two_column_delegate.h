// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <QStyledItemDelegate>

namespace headroom::desk {

/// A list's line with a second text at its right end: a command's keys, a value.
class TwoColumnDelegate final : public QStyledItemDelegate {
public:
    static constexpr int detailRole = Qt::UserRole + 1;
    using QStyledItemDelegate::QStyledItemDelegate;
    void paint(QPainter* painter, const QStyleOptionViewItem& option,
               const QModelIndex& index) const override;
};

} // namespace headroom::desk
