// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/search_panel.h"

#include "desk/thing_values.h"
#include "desk/two_column_delegate.h"
#include "desk/words.h"

#include <QCoreApplication>
#include <QKeyEvent>
#include <QLineEdit>
#include <QListWidget>
#include <QVBoxLayout>
#include <algorithm>

namespace headroom::desk {

namespace {

constexpr int width_px = 560, height_px = 380;
constexpr std::size_t mostShown = 300;

/// Whether each word begins some word of the text.
bool fits(const QString& text, const QStringList& words) {
    return std::all_of(words.begin(), words.end(), [&](const QString& word) {
        const auto at = text.indexOf(word, 0, Qt::CaseInsensitive);
        return at >= 0;
    });
}

/// The chosen thing's values first, then what options may change, then the rest; the number of
/// the file's format is nothing to enter.
std::vector<EditableValue> inReadingOrder(std::vector<EditableValue> values, const plant::Path& thing) {
    std::erase_if(values, [](const EditableValue& value) {
        return value.path.size() == 1 && value.field->kind == plant::FieldKind::whole;
    });
    const auto rank = [&](const EditableValue& value) {
        const auto* top = plant::rowOf(plant::projectFields(), value.path.front());
        const bool ofThing = !thing.empty() && thingPath(value.path) == thingPath(thing);
        return ofThing ? 0 : top != nullptr && top->varies && value.path.size() > 2 ? 1 : 2;
    };
    std::stable_sort(values.begin(), values.end(), [&](const auto& a, const auto& b) { return rank(a) < rank(b); });
    return values;
}

} // namespace

SearchPanel::SearchPanel(Workbench& bench, QWidget* parent)
    : QFrame(parent), bench_(bench), line_(new QLineEdit(this)), list_(new QListWidget(this)) {
    setObjectName(QStringLiteral("search"));
    line_->setObjectName(QStringLiteral("searchLine"));
    list_->setObjectName(QStringLiteral("searchList"));
    list_->setFocusPolicy(Qt::NoFocus);
    list_->setUniformItemSizes(true);
    list_->setHorizontalScrollBarPolicy(Qt::ScrollBarAlwaysOff);
    list_->setItemDelegate(new TwoColumnDelegate(list_));
    auto* layout = new QVBoxLayout(this);
    layout->addWidget(line_);
    layout->addWidget(list_);
    line_->installEventFilter(this);
    connect(line_, &QLineEdit::textChanged, this, &SearchPanel::filter);
    connect(list_, &QListWidget::itemClicked, this, [this] { choose(); });
    connect(&bench_, &Workbench::lookChanged, this, &SearchPanel::showLook);
    showLook();
    hide();
}

void SearchPanel::showLook() {
    line_->setFont(bench_.look().font(drawing::TextSize::heading));
    list_->setFont(bench_.look().font(drawing::TextSize::body));
}

void SearchPanel::open(What what) {
    what_ = what;
    const bool commands = what == What::commands;
    setAccessibleName(commands ? tr("Commands") : tr("Things and values"));
    line_->setAccessibleName(accessibleName());
    line_->setPlaceholderText(commands ? tr("Type part of a command") : tr("Type part of a name, for example: shaft dia"));
    fill();
    line_->clear();
    filter({});
    const double scale = bench_.look().scale;
    const auto room = parentWidget()->size();
    resize(std::min(static_cast<int>(width_px * scale), room.width() - 20),
           std::min(static_cast<int>(height_px * scale), room.height() - 40));
    move((room.width() - width()) / 2, 32);
    show();
    raise();
    line_->setFocus(Qt::OtherFocusReason);
}

void SearchPanel::close() {
    if (isVisible()) {
        line_->clearFocus(); // else hiding would hand the focus on as if by Tab
        hide();
        emit closed();
    }
}

void SearchPanel::fill() {
    entries_.clear();
    if (what_ == What::commands) {
        for (const auto& row : commands()) {
            Entry entry;
            entry.text = QCoreApplication::translate("desk", row.text);
            entry.detail = keyWords(row.id);
            entry.command = static_cast<int>(row.id);
            entries_.push_back(std::move(entry));
        }
        return;
    }
    const auto& variant = bench_.snapshot().variant(bench_.optionInHand());
    for (const auto& value : inReadingOrder(allValues(bench_.snapshot().project(), variant), bench_.now().thing)) {
        Entry entry;
        const auto thing = thingName(value.path);
        entry.text = thing + QStringLiteral(", ") + value.label.toLower();
        if (!value.numeric() || value.column < 0) {
            entry.text = pathWords(value.path);
        }
        entry.detail = printed(value, valueAt(bench_.snapshot().project(), variant, value.path));
        entry.path = value.path;
        entry.row = value.row;
        entry.column = value.column;
        entries_.push_back(std::move(entry));
    }
}

void SearchPanel::filter(const QString& typed) {
    const auto words = typed.split(QLatin1Char(' '), Qt::SkipEmptyParts);
    list_->clear();
    shown_.clear();
    for (std::size_t i = 0; i < entries_.size() && shown_.size() < mostShown; ++i) {
        const auto& entry = entries_[i];
        if (fits(entry.text, words)) {
            shown_.push_back(i);
            auto* item = new QListWidgetItem(entry.text, list_);
            item->setData(TwoColumnDelegate::detailRole, entry.detail);
        }
    }
    list_->setCurrentRow(0);
}

void SearchPanel::choose() {
    const int row = list_->currentRow();
    if (row < 0 || row >= static_cast<int>(shown_.size())) {
        return;
    }
    const auto entry = entries_[shown_[static_cast<std::size_t>(row)]];
    close();
    if (entry.command >= 0) {
        emit commandChosen(static_cast<CommandId>(entry.command));
    } else {
        emit valueChosen(entry.path, entry.row, entry.column);
    }
}

bool SearchPanel::eventFilter(QObject* watched, QEvent* event) {
    if (watched != line_ || event->type() != QEvent::KeyPress) {
        return QFrame::eventFilter(watched, event);
    }
    const int last = list_->count() - 1;
    const int row = list_->currentRow();
    switch (static_cast<QKeyEvent*>(event)->key()) {
    case Qt::Key_Escape: close(); return true;
    case Qt::Key_Return:
    case Qt::Key_Enter: choose(); return true;
    case Qt::Key_Down: list_->setCurrentRow(std::min(last, row + 1)); return true;
    case Qt::Key_Up: list_->setCurrentRow(std::max(0, row - 1)); return true;
    case Qt::Key_PageDown: list_->setCurrentRow(std::min(last, row + 10)); return true;
    case Qt::Key_PageUp: list_->setCurrentRow(std::max(0, row - 10)); return true;
    default: return false;
    }
}

} // namespace headroom::desk
