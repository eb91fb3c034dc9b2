// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/workbench.h"

#include <QWidget>

namespace headroom::desk {

/// The top of the picture: project, where changes go, the key of the runs shown, and the verdict
/// sentence with its mark. The sentence is the first thing that a screen reader says.
class HeadingView final : public QWidget {
    Q_OBJECT
public:
    explicit HeadingView(Workbench& bench, QWidget* parent = nullptr);

    QString projectWords() const;  ///< "Dorvane: one-second reserve · changes go into Wider shaft, not into As built"
    QString changeWords() const;   ///< "changes go into Wider shaft, not into As built"
    QString sentence() const;      ///< the verdict sentence as shown
    QSize sizeHint() const override;

signals:
    void runPressed(headroom::drawing::CellId cell);

protected:
    void paintEvent(QPaintEvent* event) override;
    void mousePressEvent(QMouseEvent* event) override;

private:
    struct Key {
        CellId cell;
        QRectF box;
        QString name;
    };
    std::vector<Key> keys() const;
    void refresh();
    void paintTopLine(QPainter& painter, const std::vector<Key>& keys) const;
    void paintSentence(QPainter& painter) const;

    Workbench& bench_;
};

} // namespace headroom::desk
