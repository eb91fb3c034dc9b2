// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/commands.h"
#include "desk/workbench.h"

#include <QFrame>

class QLineEdit;
class QListWidget;

namespace headroom::desk {

/// One line over the sheet that finds commands by their words, and things and values by name.
class SearchPanel final : public QFrame {
    Q_OBJECT
public:
    enum class What { commands, values };
    SearchPanel(Workbench& bench, QWidget* parent);

    void open(What what);
    void close();

signals:
    void commandChosen(headroom::desk::CommandId id);
    void valueChosen(const headroom::plant::Path& path, int row, int column);
    void closed();

protected:
    bool eventFilter(QObject* watched, QEvent* event) override;

private:
    struct Entry {
        QString text, detail;
        int command = -1;
        plant::Path path;
        int row = -1, column = -1;
    };
    void showLook();
    void fill();
    void filter(const QString& words);
    void choose();

    Workbench& bench_;
    What what_ = What::commands;
    std::vector<Entry> entries_;
    std::vector<std::size_t> shown_;
    QLineEdit* line_;
    QListWidget* list_;
};

} // namespace headroom::desk
