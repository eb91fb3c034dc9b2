// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/board_view.h"
#include "desk/commands.h"

#include <QWidget>

class QPushButton;

namespace headroom::desk {

/// The block at the right of the sheet: buttons, progress, Board, Headroom strip.
class TitleBlock final : public QWidget {
    Q_OBJECT
public:
    static constexpr int width_px = 350;
    explicit TitleBlock(Workbench& bench, QWidget* parent = nullptr);

    BoardView& board() { return *board_; }
    StripView& strip() { return *strip_; }
    void setFindingsCount(int count, int errors);
    QString progressWords() const;

signals:
    void commandAsked(headroom::desk::CommandId id);

protected:
    void paintEvent(QPaintEvent* event) override;
    void resizeEvent(QResizeEvent* event) override;

private:
    void showLook();
    void refresh();
    void arrange();
    QRect progressRect() const;

    Workbench& bench_;
    QPushButton* run_;
    QPushButton* findings_;
    QPushButton* command_;
    BoardView* board_;
    StripView* strip_;
    QWidget* buttons_;
};

} // namespace headroom::desk
