// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/workbench.h"

#include <QWidget>

namespace headroom::desk {

class Lanes;

/// The line below the sheet: values at the cursor, what is under the pointer, findings, the tag
/// of the run shown, and the caution that goes with every result.
class StatusLine final : public QWidget {
    Q_OBJECT
public:
    StatusLine(Workbench& bench, const Lanes& lanes, QWidget* parent = nullptr);

    QString cursorWords() const;
    QString tagWords() const;
    static QString caution();
    void setFindings(int count, int errors);
    /// What is under the pointer, or what F1 asked for; empty gives the cursor values back.
    void say(const QString& words);
    QSize sizeHint() const override;

signals:
    void findingsPressed();

protected:
    void paintEvent(QPaintEvent* event) override;
    void mousePressEvent(QMouseEvent* event) override;

private:
    Workbench& bench_;
    const Lanes& lanes_;
    QString said_;
    int count_ = 0, errors_ = 0;
    QRectF findingsBox_;
};

} // namespace headroom::desk
