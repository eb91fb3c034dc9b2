// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/main_window.h"

#include <QTemporaryDir>
#include <QTest>
#include <functional>
#include <memory>

/// Drives the window by mouse and keys, for the tests and the pictures.
namespace headroom::desk::drive {

/// A window with a folder, a session and documents of its own.
struct Bench {
    QTemporaryDir folder;
    std::unique_ptr<MainWindow> window;

    explicit Bench(QSize size = {1280, 800}, int threads = 1);
    QString session() const { return folder.filePath(QStringLiteral("session.ini")); }
    /// A copy of the demo in this bench's folder.
    QString demo() const;
    /// Writes a project file and returns its path.
    QString file(const QString& name, const QByteArray& text) const;
};

/// Lets events happen until something holds; false after `limit_ms`.
bool waitFor(const std::function<bool()>& holds, int limit_ms = 60000);
/// Lets pending paints and queued replots happen.
void settle();
/// Runs everything that is due and waits for it.
bool runAll(MainWindow& window);

int optionNamed(MainWindow& window, const char* name); ///< −1: the base; −2: none
int studyNamed(MainWindow& window, const char* name);

/// Presses the Board's cell with the mouse.
void pressCell(MainWindow& window, CellId cell);
/// Presses a thing in the Section with the mouse; false if it is not drawn.
bool pressThing(MainWindow& window, const plant::Path& thing);

} // namespace headroom::desk::drive
