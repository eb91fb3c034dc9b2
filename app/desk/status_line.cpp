// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/status_line.h"

#include "desk/lanes.h"
#include "desk/words.h"
#include "units/text.h"

#include <QMouseEvent>
#include <QPainter>

namespace headroom::desk {

namespace {

using drawing::TextSize;
constexpr double edge_px = 14.0, between_px = 18.0;
constexpr std::size_t mostValues = 4;

} // namespace

StatusLine::StatusLine(Workbench& bench, const Lanes& lanes, QWidget* parent)
    : QWidget(parent), bench_(bench), lanes_(lanes) {
    setObjectName(QStringLiteral("status"));
    setSizePolicy(QSizePolicy::Expanding, QSizePolicy::Fixed);
    const auto refresh = [this] {
        setAccessibleName(cursorWords() + QStringLiteral(". ") + caution());
        update();
    };
    connect(&bench_, &Workbench::shownChanged, this, refresh);
    connect(&bench_, &Workbench::selectionChanged, this, refresh);
    connect(&bench_, &Workbench::lookChanged, this, [this, refresh] {
        updateGeometry();
        refresh();
    });
}

QSize StatusLine::sizeHint() const {
    const auto& look = bench_.look();
    return {400, static_cast<int>(look.lineHeight(TextSize::body) + 3.0 * look.space.unit)};
}

QString StatusLine::caution() {
    return tr("Study result. It supports a decision by responsible engineers; it does not permit operation.");
}

QString StatusLine::cursorWords() const {
    if (!bench_.document().open()) {
        return {};
    }
    QStringList parts{text(print(Quantity::time, bench_.now().time_s))};
    for (std::size_t i = 0; i < std::min(mostValues, lanes_.lanes().size()); ++i) {
        if (lanes_.value(static_cast<int>(i), 0)) {
            parts << lanes_.lanes()[i].name.toLower() + QLatin1Char(' ') + lanes_.valueText(static_cast<int>(i), 0);
        }
    }
    return parts.join(QStringLiteral("   "));
}

QString StatusLine::tagWords() const {
    const auto stored = bench_.board().latestRun(bench_.now().inHand());
    return stored ? tr("run %1").arg(traceTag(stored->fingerprint)) : QString();
}

void StatusLine::setFindings(int count, int errors) {
    count_ = count;
    errors_ = errors;
    update();
}

void StatusLine::say(const QString& words) {
    if (words != said_) {
        said_ = words;
        update();
    }
}

void StatusLine::paintEvent(QPaintEvent*) {
    QPainter painter(this);
    const auto& look = bench_.look();
    painter.fillRect(rect(), look.titleBlock);
    painter.fillRect(QRectF(0, 0, width(), look.width.hair), look.line);
    painter.setFont(look.font(TextSize::small));
    const QFontMetricsF metrics(painter.font());
    double right = width() - edge_px * look.scale;
    painter.setPen(look.muted);
    const auto addRight = [&](const QString& words) {
        const double wide = metrics.horizontalAdvance(words) + 2.0;
        const QRectF box(right - wide, 0, wide, height());
        painter.drawText(box, Qt::AlignRight | Qt::AlignVCenter, words);
        right -= wide + (words.isEmpty() ? 0.0 : between_px * look.scale);
        return box;
    };
    addRight(caution());
    addRight(tagWords());
    findingsBox_ = addRight(findingsWords(count_, errors_));
    painter.setPen(look.text);
    const double left = edge_px * look.scale;
    const auto words = said_.isEmpty() ? cursorWords() : said_;
    painter.drawText(QRectF(left, 0, right - left, height()), Qt::AlignLeft | Qt::AlignVCenter,
                     metrics.elidedText(words, Qt::ElideRight, right - left));
}

void StatusLine::mousePressEvent(QMouseEvent* event) {
    if (findingsBox_.contains(event->position())) {
        emit findingsPressed();
    }
}

} // namespace headroom::desk
