// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <QApplication>
#include <QPointer>

namespace headroom::desk {

class MainWindow;

/// The one place of the window where faults of ours are caught: said, not shown in a box, and the
/// project stays as it is.
class Application : public QApplication {
    Q_OBJECT
public:
    Application(int& count, char** words);
    void watch(MainWindow& window);
    bool notify(QObject* receiver, QEvent* event) override;

private:
    QPointer<MainWindow> window_;
};

} // namespace headroom::desk
