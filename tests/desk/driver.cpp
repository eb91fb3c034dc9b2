// SPDX-License-Identifier: GPL-3.0-or-later
#include "driver.h"

#include "desk/demo.h"
#include "desk/lanes.h"
#include "desk/section_view.h"
#include "desk/title_block.h"

#include <QCoreApplication>
#include <QElapsedTimer>
#include <QFile>

namespace headroom::desk::drive {

Bench::Bench(QSize size, int threads) {
    window = std::make_unique<MainWindow>(session(), threads);
    window->resize(size);
    window->show();
    window->activateWindow();
    settle();
}

QString Bench::demo() const {
    const auto own = ownDemo(folder.path().toStdString());
    return own ? QString::fromStdString(own->string()) : QString();
}

QString Bench::file(const QString& name, const QByteArray& text) const {
    QFile file(folder.filePath(name));
    if (file.open(QIODevice::WriteOnly)) {
        file.write(text);
    }
    return file.fileName();
}

bool waitFor(const std::function<bool()>& holds, int limit_ms) {
    QElapsedTimer clock;
    clock.start();
    while (!holds()) {
        if (clock.elapsed() > limit_ms) {
            return false;
        }
        QTest::qWait(5);
    }
    return true;
}

void settle() {
    for (int i = 0; i < 3; ++i) {
        QCoreApplication::processEvents();
        QCoreApplication::sendPostedEvents();
    }
}

bool runAll(MainWindow& window) {
    window.bench().board().runDue();
    const bool done = waitFor(
        [&] { return window.bench().board().due().empty() && !window.bench().runs().busy(); },
        600000);
    settle();
    return done;
}

int optionNamed(MainWindow& window, const char* name) {
    const auto& snapshot = window.bench().snapshot();
    for (int option = -1; option < snapshot.options(); ++option) {
        if (snapshot.optionName(option) == name) {
            return option;
        }
    }
    return -2;
}

int studyNamed(MainWindow& window, const char* name) {
    return window.bench().snapshot().project().studies.indexOf(name);
}

void pressCell(MainWindow& window, CellId cell) {
    auto& board = window.titleBlock().board();
    const auto box = board.cellBox(cell);
    QTest::mouseClick(&board, Qt::LeftButton, Qt::NoModifier, box.center().toPoint());
    settle();
}

bool pressThing(MainWindow& window, const plant::Path& thing) {
    auto& section = window.section();
    for (const auto& item : section.items()) {
        // A point of the thing's shape that nothing else covers.
        for (int x = static_cast<int>(item.box.left()); item.thing == thing && x < static_cast<int>(item.box.right()) + 1; ++x) {
            for (int y = static_cast<int>(item.box.top()); y < static_cast<int>(item.box.bottom()) + 1; y += 2) {
                const auto* hit = drawing::itemAt(section.items(), QPointF(x, y));
                if (hit != nullptr && hit->thing == thing && hit->limit < 0) {
                    QTest::mouseClick(&section, Qt::LeftButton, Qt::NoModifier, QPoint(x, y));
                    settle();
                    return true;
                }
            }
        }
    }
    return false;
}

} // namespace headroom::desk::drive
