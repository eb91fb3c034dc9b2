// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/slip_entry.h"
#include "desk/workbench.h"

#include <QFrame>

class QLabel;
class QLineEdit;

namespace headroom::desk {

/// The one-line entry at a thing's place. Enter puts the value into the option in the hand as one
/// undo step, Tab walks the thing's values, Esc leaves everything as it was.
class Slip final : public QFrame {
    Q_OBJECT
public:
    Slip(Workbench& bench, QWidget* parent);

    /// Opens at `place` (in the parent's pixels) for a thing or value, with what was typed so far.
    void open(const plant::Path& path, const QRectF& place, const QString& typed, int row = -1,
              int column = -1);
    void close(); ///< without taking anything
    bool isOpen() const { return isVisible(); }
    /// Takes the shown value back to the base, as one undo step.
    void takeBack();

    QString entryText() const;
    QString resultText() const;
    QString factsText() const;
    bool faulty() const { return !reading_.fault.isEmpty(); }

signals:
    void closed();

protected:
    bool eventFilter(QObject* watched, QEvent* event) override;

private:
    void showLook();
    void reread();
    void showFacts(int index);
    bool commit();
    void walk(int steps);
    void nudge(int direction);
    void place();

    Workbench& bench_;
    std::unique_ptr<SlipEntry> entry_;
    SlipReading reading_;
    QRectF place_;
    QLineEdit* line_;
    QLabel* result_;
    QLabel* facts_;
};

} // namespace headroom::desk
