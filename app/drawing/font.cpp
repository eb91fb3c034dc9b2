// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/look.h"

#include <QCoreApplication>
#include <QFile>
#include <QFontDatabase>
#include <QStringList>
#include <QtGlobal>

#ifdef HEADROOM_FONT_INSIDE
/// Outside all namespaces, as the resource compiler wants it.
static void openFontResource() {
    Q_INIT_RESOURCE(headroom_font);
}
#endif

namespace headroom::drawing {

namespace {

constexpr const char* fontFiles[] = {"OpenSans-Regular.ttf", "OpenSans-Semibold.ttf"};

/// Where the font may lie: inside the program, beside it as packaged, in the system.
QStringList fontFolders() {
    const QString program = QCoreApplication::applicationDirPath();
    return {QStringLiteral(":/font"), program + QStringLiteral("/font"),
            program + QStringLiteral("/../share/headroom/font"),
            QStringLiteral("/usr/share/fonts/truetype/open-sans"),
            QStringLiteral("/usr/share/fonts/open-sans")};
}

QString loadFrom(const QString& folder) {
    QString family;
    for (const char* name : fontFiles) {
        const QString file = folder + QLatin1Char('/') + QLatin1String(name);
        const int id = QFile::exists(file) ? QFontDatabase::addApplicationFont(file) : -1;
        const QStringList families =
            id >= 0 ? QFontDatabase::applicationFontFamilies(id) : QStringList();
        if (family.isEmpty() && !families.isEmpty()) {
            family = families.front();
        }
    }
    return family;
}

QString load() {
#ifdef HEADROOM_FONT_INSIDE
    openFontResource();
#endif
    for (const QString& folder : fontFolders()) {
        const QString family = loadFrom(folder);
        if (!family.isEmpty()) {
            return family;
        }
    }
    return QFontDatabase::systemFont(QFontDatabase::GeneralFont).family();
}

} // namespace

const QString& fontFamily() {
    static const QString family = load();
    return family;
}

} // namespace headroom::drawing
