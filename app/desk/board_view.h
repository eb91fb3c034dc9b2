// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/picture_view.h"
#include "desk/workbench.h"
#include "drawing/board_picture.h"
#include "drawing/strip_picture.h"

#include <optional>

namespace headroom::desk {

/// Studies down, options across. Arrows move the run in the hand, Enter runs it, Space takes it
/// into the comparison, Esc stops it.
class BoardView final : public PictureView {
    Q_OBJECT
public:
    explicit BoardView(Workbench& bench, QWidget* parent = nullptr);

    const drawing::Items& items() const override;
    QRectF cellBox(CellId cell) const; ///< null if out of sight
    QSize sizeHint() const override;

protected:
    void remake() override;
    void paintEvent(QPaintEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void wheelEvent(QWheelEvent* event) override;

private:
    void press(const drawing::Item& item, Qt::KeyboardModifiers modifiers);
    void showCell(CellId cell);

    Workbench& bench_;
    std::optional<drawing::BoardPicture> picture_;
    int firstRow_ = 0, firstColumn_ = 0;
};

/// One bar a limit, worst first. Arrows move the chosen limit, Enter opens its value.
class StripView final : public PictureView {
    Q_OBJECT
public:
    explicit StripView(Workbench& bench, QWidget* parent = nullptr);

    const drawing::Items& items() const override;
    QRectF barBox(int limit) const;

signals:
    void slipAsked(const headroom::plant::Path& limit);

protected:
    void remake() override;
    void paintEvent(QPaintEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void wheelEvent(QWheelEvent* event) override;

private:
    void showLimit(int limit);

    Workbench& bench_;
    std::optional<drawing::StripPicture> picture_;
    int firstRow_ = 0;
};

} // namespace headroom::desk
