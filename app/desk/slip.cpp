// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/slip.h"

#include "desk/words.h"

#include <QHBoxLayout>
#include <QKeyEvent>
#include <QLabel>
#include <QLineEdit>
#include <QStyle>
#include <QVBoxLayout>
#include <cmath>

namespace headroom::desk {

namespace {

constexpr int width_px = 320;
constexpr double nudgeShare = 0.01; // of the value, one arrow key, rounded to a round step

/// 1, 2 or 5 times a power of ten, near a hundredth of the value.
double roundStep(double value) {
    const double wanted = std::max(std::abs(value) * nudgeShare, 1e-6);
    const double power = std::pow(10.0, std::floor(std::log10(wanted)));
    const double first = wanted / power;
    return (first < 2.0 ? 1.0 : first < 5.0 ? 2.0 : 5.0) * power;
}

} // namespace

Slip::Slip(Workbench& bench, QWidget* parent)
    : QFrame(parent), bench_(bench), line_(new QLineEdit(this)), result_(new QLabel(this)),
      facts_(new QLabel(this)) {
    setObjectName(QStringLiteral("slip"));
    setAccessibleName(tr("Entry of one value"));
    line_->setObjectName(QStringLiteral("slipLine"));
    line_->setAccessibleName(tr("Value"));
    line_->setFrame(false);
    result_->setObjectName(QStringLiteral("slipResult"));
    facts_->setObjectName(QStringLiteral("slipFacts"));
    facts_->setWordWrap(true);
    facts_->setTextFormat(Qt::PlainText);
    auto* top = new QHBoxLayout;
    top->addWidget(line_, 1);
    top->addWidget(result_);
    auto* layout = new QVBoxLayout(this);
    layout->setSpacing(6);
    layout->addLayout(top);
    layout->addWidget(facts_);
    line_->installEventFilter(this);
    connect(line_, &QLineEdit::textChanged, this, [this] { reread(); });
    connect(&bench_, &Workbench::lookChanged, this, [this] { showLook(); });
    showLook();
    hide();
}

void Slip::showLook() {
    const auto& look = bench_.look();
    line_->setFont(look.font(drawing::TextSize::heading));
    result_->setFont(look.font(drawing::TextSize::heading));
    facts_->setFont(look.font(drawing::TextSize::small));
    const auto margin = static_cast<int>(2.0 * look.space.unit);
    layout()->setContentsMargins(margin + 2, margin, margin + 2, margin);
}

void Slip::open(const plant::Path& path, const QRectF& place, const QString& typed, int row,
                int column) {
    entry_ = std::make_unique<SlipEntry>(bench_.board().shared(), bench_.optionInHand(), path);
    if (column >= 0) {
        entry_->choose(row, column);
    }
    place_ = place;
    const bool any = !entry_->values().empty();
    const QSignalBlocker quiet(line_);
    line_->setText(typed.isEmpty() && any ? entry_->startText(entry_->current()) : typed);
    if (typed.isEmpty()) {
        line_->selectAll();
    }
    reread();
    show();
    raise();
    line_->setFocus(Qt::OtherFocusReason);
    this->place();
}

void Slip::close() {
    if (isVisible()) {
        line_->clearFocus(); // else hiding would hand the focus on as if by Tab
        hide();
        emit closed();
    }
}

QString Slip::entryText() const { return line_->text(); }
QString Slip::resultText() const { return result_->text(); }
QString Slip::factsText() const { return facts_->text(); }

/// What the line means now; a fault is marked in place with its reason, never corrected.
void Slip::reread() {
    reading_ = entry_->read(line_->text());
    result_->setText(reading_.shown);
    setProperty("faulty", faulty());
    style()->unpolish(this);
    style()->polish(this);
    const int index = reading_.value >= 0 ? reading_.value : entry_->current();
    showFacts(index);
    place();
}

void Slip::showFacts(int index) {
    if (entry_->values().empty()) {
        facts_->setText(reading_.fault);
        return;
    }
    const auto facts = entry_->facts(index);
    QStringList lines;
    if (faulty()) {
        lines << reading_.fault;
    }
    lines << facts.what;
    lines << (facts.differs ? QStringLiteral("• ") : QString()) + facts.origin;
    QStringList more;
    for (const auto& part : {facts.usual, facts.effect}) {
        if (!part.isEmpty()) {
            more << part;
        }
    }
    if (!more.isEmpty()) {
        lines << more.join(QStringLiteral(" · "));
    }
    lines << facts.stays;
    if (entry_->values().size() > 1) {
        const auto next = static_cast<std::size_t>(index + 1) % entry_->values().size();
        lines << tr("Tab: %1 %2").arg(entry_->values()[next].label.toLower(),
                                      entry_->valueText(static_cast<int>(next)));
    }
    facts_->setText(lines.join(QLatin1Char('\n')));
    setAccessibleDescription(facts_->text());
}

/// Beside the thing if there is room, inside the window in any case.
void Slip::place() {
    const double scale = bench_.look().scale;
    setFixedWidth(static_cast<int>(width_px * scale));
    facts_->setFixedWidth(width() - 2 * layout()->contentsMargins().left());
    adjustSize();
    const auto room = QRectF(parentWidget()->rect()).adjusted(6, 6, -6, -6);
    double x = place_.right() + 12.0;
    if (x + width() > room.right()) {
        x = place_.left() - 12.0 - width();
    }
    const double y = place_.center().y() - line_->height();
    x = std::clamp(x, room.left(), std::max(room.left(), room.right() - width()));
    move(static_cast<int>(x), static_cast<int>(std::clamp(y, room.top(), std::max(room.top(), room.bottom() - height()))));
}

bool Slip::commit() {
    if (faulty()) {
        return false;
    }
    if (reading_.changes) {
        const auto path = entry_->values()[static_cast<std::size_t>(reading_.value)].path;
        bench_.edit(reading_.label, reading_.next);
        bench_.pressThing(path);
    }
    return true;
}

void Slip::walk(int steps) {
    if (!commit()) {
        return;
    }
    const int from = reading_.value >= 0 ? reading_.value : entry_->current();
    const auto count = static_cast<int>(entry_->values().size());
    if (count == 0) {
        return;
    }
    const auto next = static_cast<std::size_t>(((from + steps) % count + count) % count);
    const auto value = entry_->values()[next];
    entry_ = std::make_unique<SlipEntry>(bench_.board().shared(), bench_.optionInHand(), value.path);
    entry_->setCurrent(static_cast<int>(next));
    line_->setText(entry_->startText(entry_->current()));
    reread();
    line_->selectAll();
}

/// Steps the number in the line by a sensible amount; nothing is taken before Enter.
void Slip::nudge(int direction) {
    bool isNumber = false;
    const double value = QString(line_->text()).replace(QLatin1Char(','), QLatin1Char('.')).toDouble(&isNumber);
    if (isNumber) {
        const double step = roundStep(value);
        line_->setText(QString::number(std::round(value / step + direction) * step, 'g', 12));
    }
}

void Slip::takeBack() {
    if (!isOpen() || entry_->values().empty()) {
        return;
    }
    const int index = reading_.value >= 0 ? reading_.value : entry_->current();
    bench_.edit(tr("%1 taken back").arg(entry_->facts(index).what), entry_->takenBack(index));
    close();
}

bool Slip::eventFilter(QObject* watched, QEvent* event) {
    if (watched != line_ || event->type() != QEvent::KeyPress) {
        return QFrame::eventFilter(watched, event);
    }
    switch (static_cast<QKeyEvent*>(event)->key()) {
    case Qt::Key_Return:
    case Qt::Key_Enter:
        if (commit()) {
            close();
        }
        return true;
    case Qt::Key_Escape: close(); return true;
    case Qt::Key_Tab: walk(1); return true;
    case Qt::Key_Backtab: walk(-1); return true;
    case Qt::Key_Up: nudge(1); return true;
    case Qt::Key_Down: nudge(-1); return true;
    default: return false;
    }
}

} // namespace headroom::desk
