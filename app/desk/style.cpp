// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/style.h"

#include <QGuiApplication>

namespace headroom::desk {

namespace {

QString filled(QString sheet, const std::vector<std::pair<const char*, QColor>>& colours) {
    for (const auto& [name, colour] : colours) {
        sheet.replace(QLatin1String("@") + QLatin1String(name) + QLatin1String("@"), colour.name());
    }
    return sheet;
}

} // namespace

QPalette paletteFor(const drawing::Look& look) {
    QPalette palette;
    palette.setColor(QPalette::Window, look.sheet);
    palette.setColor(QPalette::WindowText, look.text);
    palette.setColor(QPalette::Base, look.lane);
    palette.setColor(QPalette::AlternateBase, look.titleBlock);
    palette.setColor(QPalette::Text, look.text);
    palette.setColor(QPalette::PlaceholderText, look.muted);
    palette.setColor(QPalette::Button, look.lane);
    palette.setColor(QPalette::ButtonText, look.text);
    palette.setColor(QPalette::Highlight, look.accent);
    palette.setColor(QPalette::HighlightedText, look.onAccent);
    palette.setColor(QPalette::ToolTipBase, look.lane);
    palette.setColor(QPalette::ToolTipText, look.text);
    return palette;
}

QString styleSheetFor(const drawing::Look& look) {
    const auto sheet = QStringLiteral(R"(
QPushButton { background: @lane@; color: @text@; border: 1px solid @line@; border-radius: 4px; padding: 2px 10px; }
QPushButton:hover { border-color: @accent@; }
QPushButton:focus { border: 2px solid @focus@; padding: 1px 9px; }
QPushButton[alarming="true"] { border: 2px solid @limit@; padding: 1px 9px; }
QPushButton:disabled { color: @muted@; background: @titleBlock@; }
QPushButton#runDue { background: @accent@; color: @onAccent@; border-color: @accent@; }
QPushButton#runDue:disabled { background: @titleBlock@; color: @muted@; border-color: @line@; }
QFrame#slip { background: @lane@; border: 2px solid @focus@; border-radius: 5px; }
QFrame#slip[faulty="true"] { border-color: @limit@; }
QLineEdit#slipLine { background: transparent; border: none; color: @text@; }
QLabel#slipResult, QLabel#slipFacts { color: @muted@; }
QFrame#findings, QFrame#search { background: @lane@; border: 1px solid @line@; border-radius: 5px; }
QFrame#search { border: 2px solid @focus@; }
QListWidget { background: @lane@; color: @text@; border: none; outline: none; }
QListWidget::item { padding: 3px 6px; border: none; color: @text@; }
QListWidget::item:selected { background: @selection@; color: @text@; border: none; padding: 3px 6px; }
QLineEdit#searchLine { background: transparent; border: none; border-bottom: 1px solid @line@; padding: 6px; color: @text@; }
QSplitter::handle { background: @sheet@; }
QSplitter::handle:hover { background: @line@; }
QScrollBar:vertical { background: @lane@; width: 10px; margin: 0; }
QScrollBar::handle:vertical { background: @line@; border-radius: 4px; min-height: 24px; margin: 1px; }
QScrollBar::add-line:vertical, QScrollBar::sub-line:vertical { height: 0; }
QScrollBar::add-page:vertical, QScrollBar::sub-page:vertical { background: none; }
QToolTip { background: @lane@; color: @text@; border: 1px solid @line@; padding: 3px; }
)");
    return filled(sheet, {{"lane", look.lane}, {"text", look.text}, {"line", look.line},
                          {"accent", look.accent}, {"onAccent", look.onAccent},
                          {"focus", look.focus}, {"limit", look.limit}, {"muted", look.muted},
                          {"titleBlock", look.titleBlock}, {"selection", look.selection},
                          {"sheet", look.sheet}});
}

bool systemIsDark() {
    const auto palette = QGuiApplication::palette();
    return palette.color(QPalette::WindowText).lightness() > palette.color(QPalette::Window).lightness();
}

} // namespace headroom::desk
