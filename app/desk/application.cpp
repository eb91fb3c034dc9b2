// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/application.h"

#include "base/ensure.h"
#include "desk/main_window.h"
#include "desk/picture_view.h"
#include "drawing/look.h"

#include <exception>

namespace headroom::desk {

Application::Application(int& count, char** words) : QApplication(count, words) {
    setApplicationName(QStringLiteral("headroom"));
    setApplicationDisplayName(QStringLiteral("Headroom"));
    setApplicationVersion(QStringLiteral(HEADROOM_VERSION));
    setDesktopFileName(QStringLiteral("headroom"));
    setFont(drawing::look(drawing::Scheme::light).font(drawing::TextSize::body));
    installAccessiblePictures();
}

void Application::watch(MainWindow& window) { window_ = &window; }

bool Application::notify(QObject* receiver, QEvent* event) {
    try {
        return QApplication::notify(receiver, event);
    } catch (const std::exception& fault) {
        if (window_) {
            window_->reportInternalError(QString::fromUtf8(fault.what()));
        }
        qCritical("%s", fault.what());
    }
    return true;
}

} // namespace headroom::desk
