// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/findings_panel.h"

#include "desk/two_column_delegate.h"
#include "desk/words.h"
#include "units/text.h"

#include <QHBoxLayout>
#include <QKeyEvent>
#include <QLabel>
#include <QListWidget>
#include <QPushButton>
#include <QVBoxLayout>
#include <algorithm>

namespace headroom::desk {

namespace {

QString severityWord(Severity severity) {
    switch (severity) {
    case Severity::error: return FindingsPanel::tr("Error");
    case Severity::warning: return FindingsPanel::tr("Unusual");
    case Severity::note: return FindingsPanel::tr("Note");
    }
    return {};
}

/// "line 12, column 5 of Dorvane.headroom.json"; empty if it does not come from a file.
QString placeWords(const Finding& finding) {
    if (!finding.place) {
        return {};
    }
    return FindingsPanel::tr("line %1, column %2 of %3")
        .arg(finding.place->line)
        .arg(finding.place->column)
        .arg(text(finding.place->file));
}

void sortWorstFirst(Findings& findings) {
    std::stable_sort(findings.begin(), findings.end(), [](const Finding& a, const Finding& b) {
        return static_cast<int>(a.severity()) > static_cast<int>(b.severity());
    });
}

/// What a run has to say: why it ended, where it left its range, what happened on the way.
Findings ofRun(const studies::Cell* cell) {
    Findings found;
    if (cell == nullptr) {
        return found;
    }
    if (cell->reason) {
        found.push_back(*cell->reason);
    }
    if (cell->stored && cell->stored->run) {
        const auto& run = *cell->stored->run;
        for (const auto& invalid : run.status.invalid) {
            found.push_back(invalid.why);
        }
        found.insert(found.end(), run.incidents.begin(), run.incidents.end());
        found.insert(found.end(), run.resolution.notes.begin(), run.resolution.notes.end());
    }
    return found;
}

} // namespace

FindingsPanel::FindingsPanel(Workbench& bench, QWidget* parent)
    : QFrame(parent), bench_(bench), heading_(new QLabel(this)), list_(new QListWidget(this)),
      text_(new QLabel(this)) {
    setObjectName(QStringLiteral("findings"));
    setAccessibleName(tr("Findings"));
    list_->setObjectName(QStringLiteral("findingsList"));
    list_->setAccessibleName(tr("List of findings"));
    list_->setUniformItemSizes(true);
    list_->setItemDelegate(new TwoColumnDelegate(list_));
    list_->setHorizontalScrollBarPolicy(Qt::ScrollBarAlwaysOff);
    text_->setObjectName(QStringLiteral("findingsText"));
    text_->setWordWrap(true);
    text_->setAlignment(Qt::AlignTop | Qt::AlignLeft);
    text_->setTextFormat(Qt::PlainText);
    text_->setTextInteractionFlags(Qt::TextSelectableByMouse);
    auto* close = new QPushButton(tr("Close"), this);
    close->setObjectName(QStringLiteral("findingsClose"));
    auto* top = new QHBoxLayout;
    top->addWidget(heading_, 1);
    top->addWidget(close);
    auto* below = new QHBoxLayout;
    below->addWidget(list_, 5);
    below->addWidget(text_, 4);
    auto* layout = new QVBoxLayout(this);
    layout->addLayout(top);
    layout->addLayout(below, 1);
    connect(close, &QPushButton::clicked, this, &FindingsPanel::closeAsked);
    connect(list_, &QListWidget::currentRowChanged, this, &FindingsPanel::showText);
    connect(list_, &QListWidget::itemActivated, this, [this] {
        const auto found = all();
        const auto row = static_cast<std::size_t>(list_->currentRow());
        if (row < found.size()) {
            emit activated(plant::split(found[row].subject));
        }
    });
    connect(&bench_.document(), &Document::findingsChanged, this, &FindingsPanel::refresh);
    connect(&bench_, &Workbench::shownChanged, this, &FindingsPanel::refresh);
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        if (before.shown != bench_.now().shown) {
            refresh();
        }
    });
    connect(&bench_, &Workbench::lookChanged, this, &FindingsPanel::showLook);
    showLook();
}

Findings FindingsPanel::all() const {
    auto found = bench_.document().findings();
    sortWorstFirst(found);
    auto run = ofRun(bench_.cellInHand());
    std::erase_if(run, [&](const Finding& finding) { // what stops a cell is often the project's
        return std::any_of(found.begin(), found.end(), [&](const Finding& known) {
            return known.message == finding.message && known.subject == finding.subject;
        });
    });
    sortWorstFirst(run);
    found.insert(found.end(), run.begin(), run.end());
    return found;
}

int FindingsPanel::errors() const {
    const auto found = all();
    return static_cast<int>(std::count_if(found.begin(), found.end(), [](const Finding& finding) {
        return finding.severity() == Severity::error;
    }));
}

void FindingsPanel::showLook() {
    const auto& look = bench_.look();
    heading_->setFont(look.font(drawing::TextSize::heading, drawing::TextWeight::strong));
    list_->setFont(look.font(drawing::TextSize::body));
    text_->setFont(look.font(drawing::TextSize::body));
}

void FindingsPanel::refresh() {
    if (!isVisible()) {
        return; // made when it is opened
    }
    const auto found = all();
    const int row = list_->currentRow();
    const QSignalBlocker quiet(list_);
    list_->clear();
    for (const auto& finding : found) {
        auto subject = pathWords(plant::split(finding.subject));
        if (subject.isEmpty()) {
            subject = finding.place ? placeWords(finding) : tr("project");
        }
        auto line = QStringLiteral("%1 · %2").arg(severityWord(finding.severity()), subject);
        auto* item = new QListWidgetItem(line + QStringLiteral(" · ") + text(whatText(finding)), list_);
        if (finding.time_s) {
            item->setData(TwoColumnDelegate::detailRole, text(print(Quantity::time, *finding.time_s)));
        }
    }
    heading_->setText(found.empty() ? tr("Nothing to report")
                                    : findingsWords(count(), errors()));
    list_->setCurrentRow(std::clamp(row, 0, static_cast<int>(found.size()) - 1));
    showText(list_->currentRow());
}

void FindingsPanel::choose(int row) {
    list_->setCurrentRow(row);
    list_->setFocus(Qt::OtherFocusReason);
}

void FindingsPanel::showText(int row) {
    const auto found = all();
    if (row < 0 || row >= static_cast<int>(found.size())) {
        text_->setText(tr("The project can be run as it is."));
        return;
    }
    const auto& finding = found[static_cast<std::size_t>(row)];
    QStringList lines{text(whatText(finding))};
    if (const auto mend = text(mendText(finding)); !mend.isEmpty()) {
        lines << mend;
    }
    if (const auto place = placeWords(finding); !place.isEmpty()) {
        lines << place;
    }
    text_->setText(lines.join(QStringLiteral("\n\n")));
}

void FindingsPanel::keyPressEvent(QKeyEvent* event) {
    if (event->key() == Qt::Key_Escape) {
        emit closeAsked();
        return;
    }
    QFrame::keyPressEvent(event);
}

} // namespace headroom::desk
