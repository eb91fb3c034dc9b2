// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/look.h"

#include <QByteArray>
#include <QString>
#include <QStringList>

namespace headroom::desk {

/// What the window remembers for a user between two starts; losing it is harmless. Nothing of it
/// is part of a project.
struct Session {
    enum class Dress { system, light, dark };

    bool startedBefore = false;
    QByteArray geometry, splitter;
    Dress dress = Dress::system;
    double scale = 1.0;
    QString lastFile;
    QStringList recent; ///< latest first, at most `mostRecent`

    static constexpr int mostRecent = 8;
    void remember(const QString& file);

    /// From and to a small file in the user's settings folder, or one that is named.
    static Session load(const QString& file = {});
    void save(const QString& file = {}) const;
};

} // namespace headroom::desk
