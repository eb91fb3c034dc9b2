// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/session.h"

#include <QSettings>
#include <QStandardPaths>
#include <algorithm>

namespace headroom::desk {

namespace {

QString placeOf(const QString& file) {
    return !file.isEmpty() ? file
                           : QStandardPaths::writableLocation(QStandardPaths::AppConfigLocation) +
                                 QStringLiteral("/session.ini");
}

} // namespace

void Session::remember(const QString& file) {
    lastFile = file;
    recent.removeAll(file);
    recent.prepend(file);
    while (recent.size() > mostRecent) {
        recent.removeLast();
    }
}

Session Session::load(const QString& file) {
    const QSettings settings(placeOf(file), QSettings::IniFormat);
    Session session;
    session.startedBefore = settings.value(QStringLiteral("startedBefore"), false).toBool();
    session.geometry = settings.value(QStringLiteral("geometry")).toByteArray();
    session.splitter = settings.value(QStringLiteral("splitter")).toByteArray();
    const auto dress = settings.value(QStringLiteral("dress")).toString();
    session.dress = dress == QLatin1String("light")  ? Dress::light
                    : dress == QLatin1String("dark") ? Dress::dark
                                                     : Dress::system;
    session.scale = std::clamp(settings.value(QStringLiteral("scale"), 1.0).toDouble(), 0.8, 2.0);
    session.lastFile = settings.value(QStringLiteral("lastFile")).toString();
    session.recent = settings.value(QStringLiteral("recent")).toStringList();
    return session;
}

void Session::save(const QString& file) const {
    QSettings settings(placeOf(file), QSettings::IniFormat);
    settings.setValue(QStringLiteral("startedBefore"), startedBefore);
    settings.setValue(QStringLiteral("geometry"), geometry);
    settings.setValue(QStringLiteral("splitter"), splitter);
    settings.setValue(QStringLiteral("dress"), dress == Dress::light  ? QStringLiteral("light")
                                               : dress == Dress::dark ? QStringLiteral("dark")
                                                                      : QStringLiteral("system"));
    settings.setValue(QStringLiteral("scale"), scale);
    settings.setValue(QStringLiteral("lastFile"), lastFile);
    settings.setValue(QStringLiteral("recent"), recent);
}

} // namespace headroom::desk
