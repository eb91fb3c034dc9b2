// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/title_block.h"

#include <QHBoxLayout>
#include <QPainter>
#include <QPushButton>
#include <QStyle>

namespace headroom::desk {

namespace {

using drawing::TextSize;
constexpr double edge_px = 12.0, progressLine_px = 3.0;

} // namespace

TitleBlock::TitleBlock(Workbench& bench, QWidget* parent)
    : QWidget(parent), bench_(bench), run_(new QPushButton(this)), findings_(new QPushButton(this)),
      command_(new QPushButton(this)), board_(new BoardView(bench, this)),
      strip_(new StripView(bench, this)), buttons_(new QWidget(this)) {
    setObjectName(QStringLiteral("titleBlock"));
    auto* row = new QHBoxLayout(buttons_);
    row->setContentsMargins(0, 0, 0, 0);
    row->setSpacing(8);
    const auto add = [&](QPushButton* button, const char* name, CommandId id) {
        button->setObjectName(QString::fromLatin1(name));
        button->setToolTip(tooltip(id));
        button->setFocusPolicy(Qt::TabFocus);
        row->addWidget(button);
        connect(button, &QPushButton::clicked, this, [this, id] { emit commandAsked(id); });
    };
    add(run_, "runDue", CommandId::runDue);
    add(findings_, "findingsButton", CommandId::findings);
    add(command_, "commandButton", CommandId::searchCommands);
    row->addStretch(1);
    command_->setText(tr("Command…"));
    setFindingsCount(0, 0);
    connect(&bench_, &Workbench::boardChanged, this, &TitleBlock::refresh);
    connect(&bench_, &Workbench::lookChanged, this, &TitleBlock::showLook);
    refresh();
    showLook();
}

void TitleBlock::showLook() {
    const auto& look = bench_.look();
    board_->setLook(look);
    strip_->setLook(look);
    for (auto* button : {run_, findings_, command_}) {
        button->setFont(look.font(TextSize::body, button == run_ ? drawing::TextWeight::strong : drawing::TextWeight::normal));
        button->setMinimumHeight(static_cast<int>(look.space.target) + 4);
    }
    // Either of its two texts fits the main button, so that its neighbours stay where they are.
    const QFontMetrics metrics(run_->font());
    run_->setMinimumWidth(std::max(metrics.horizontalAdvance(tr("Run what is due")), metrics.horizontalAdvance(tr("Cancel runs"))) + 30);
    arrange();
    update();
}

void TitleBlock::refresh() {
    const bool busy = bench_.runs().busy();
    run_->setText(busy ? tr("Cancel runs") : tr("Run what is due"));
    run_->setToolTip(tooltip(busy ? CommandId::cancelRuns : CommandId::runDue));
    run_->setEnabled(busy || !bench_.board().due().empty());
    arrange();
    update();
}

void TitleBlock::setFindingsCount(int count, int errors) {
    findings_->setText(count == 0 ? tr("Findings") : tr("Findings %1").arg(count));
    findings_->setProperty("alarming", errors > 0);
    findings_->style()->unpolish(findings_);
    findings_->style()->polish(findings_);
}

QString TitleBlock::progressWords() const {
    return bench_.document().open() ? bench_.board().progressWords() : QString();
}

QRect TitleBlock::progressRect() const {
    const auto& look = bench_.look();
    const int edge = static_cast<int>(edge_px * look.scale);
    const int line = static_cast<int>(look.lineHeight(TextSize::body));
    return {edge, buttons_->geometry().bottom() + 6, width() - 2 * edge, line + 8};
}

/// Buttons and progress keep their height; the Board takes what its rows need, up to three fifths
/// of the rest; the Strip has what is left.
void TitleBlock::arrange() {
    const auto& look = bench_.look();
    const int edge = static_cast<int>(edge_px * look.scale);
    buttons_->setGeometry(edge, edge - 2, width() - 2 * edge, buttons_->sizeHint().height());
    const int top = progressRect().bottom() + static_cast<int>(2.0 * look.space.unit);
    const int rest = std::max(0, height() - top);
    const double wanted = drawing::boardHeight(bench_.snapshot(), look, width());
    const int boardHeight = std::min(static_cast<int>(wanted), rest * 3 / 5);
    board_->setGeometry(0, top, width(), boardHeight);
    strip_->setGeometry(0, top + boardHeight, width(), rest - boardHeight);
}

void TitleBlock::resizeEvent(QResizeEvent* event) {
    QWidget::resizeEvent(event);
    arrange();
}

void TitleBlock::paintEvent(QPaintEvent*) {
    QPainter painter(this);
    const auto& look = bench_.look();
    painter.fillRect(rect(), look.titleBlock);
    painter.fillRect(QRectF(0, 0, look.width.hair, height()), look.line);
    const auto place = progressRect();
    painter.setFont(look.font(TextSize::small));
    painter.setPen(look.muted);
    painter.drawText(place, Qt::AlignLeft | Qt::AlignTop, progressWords());
    const QRectF track(place.left(), place.bottom() - progressLine_px, place.width(), progressLine_px);
    painter.fillRect(track, look.track);
    QRectF done = track;
    done.setWidth(track.width() * bench_.board().progressShare());
    painter.fillRect(done, look.accent);
}

} // namespace headroom::desk
