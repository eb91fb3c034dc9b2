// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/workbench.h"

#include <QFrame>

class QLabel;
class QListWidget;

namespace headroom::desk {

/// What is wrong or unusual, over the lanes: of the project first, then of the run in the hand.
/// Choosing one says how to mend it; activating it selects and shows the culprit.
class FindingsPanel final : public QFrame {
    Q_OBJECT
public:
    FindingsPanel(Workbench& bench, QWidget* parent);

    /// Findings of the project and of the run in the hand, worst first within each.
    Findings all() const;
    int errors() const;
    int count() const { return static_cast<int>(all().size()); }
    void refresh();
    void choose(int row);

signals:
    void activated(const headroom::plant::Path& culprit);
    void closeAsked();

protected:
    void keyPressEvent(QKeyEvent* event) override;

private:
    void showLook();
    void showText(int row);

    Workbench& bench_;
    QLabel* heading_;
    QListWidget* list_;
    QLabel* text_;
};

} // namespace headroom::desk
