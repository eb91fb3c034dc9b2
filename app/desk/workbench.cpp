// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/workbench.h"

#include "desk/words.h"
#include "studies/sentence.h"

#include <algorithm>

namespace headroom::desk {

Workbench::Workbench(int threads)
    : runs_(threads), board_(runs_), look_(&drawing::look(drawing::Scheme::light)) {
    connect(&document_, &Document::snapshotChanged, this, &Workbench::snapshotChanged);
    connect(&document_, &Document::opening, this, [this] {
        chosen_ = false; // nothing is chosen in it yet
        follows_ = true;
        selection_.set({});
    });
    connect(&board_, &BoardModel::replaced, this, [this] {
        choosePresent();
        emit shownChanged();
        emit boardChanged();
    });
    connect(&board_, &BoardModel::judged, this, &Workbench::judged);
    connect(&board_, &BoardModel::progressed, this, &Workbench::boardChanged);
    connect(&selection_, &SelectionModel::changed, this, &Workbench::selectionChanged);
}

void Workbench::setLook(const drawing::Look& look) {
    look_ = &look;
    emit lookChanged();
}

void Workbench::snapshotChanged() {
    board_.setSnapshot(document_.snapshot());
}

void Workbench::judged(const std::vector<CellId>& cells) {
    choosePresent();
    const auto& shown = now().shown;
    const bool seen = std::any_of(cells.begin(), cells.end(), [&](CellId cell) {
        return std::find(shown.begin(), shown.end(), cell) != shown.end();
    });
    if (seen) {
        emit shownChanged();
    }
    emit boardChanged();
}

/// What is chosen goes on being there, and follows the worst verdict where nothing else was asked.
void Workbench::choosePresent() {
    if (!chosen_) {
        selection_.set(unasked(board_, now()));
    } else {
        const auto kept = fitted(board_, now());
        selection_.set(follows_ ? withWorst(board_, kept) : kept);
    }
}

QString Workbench::runName(CellId cell) const {
    if (board_.cell(cell) == nullptr) {
        return {};
    }
    const auto& shown = now().shown;
    const bool oneStudy = std::all_of(shown.begin(), shown.end(), [&](CellId other) {
        return other.study == cell.study;
    });
    const auto option = text(snapshot().optionName(cell.option));
    return oneStudy ? option : option + QStringLiteral(" · ") + text(snapshot().studyName(cell.study));
}

QString Workbench::sentence() const {
    if (!document_.open()) {
        return tr("No project is open. Open the demo plant, or a project of your own (Ctrl+O).");
    }
    if (!document_.readable()) {
        return tr("The file could not be read; the findings say where and why.");
    }
    const auto* cell = cellInHand();
    if (cell == nullptr) {
        return text(studies::sentence(snapshot(), {}).text);
    }
    // The chosen limit speaks; pressing a cell chooses its worst one.
    studies::Cell spoken = *cell;
    if (const auto* verdict = verdictOf(board_, now())) {
        spoken.verdicts = {*verdict};
    }
    return text(studies::sentence(snapshot(), std::span(&spoken, 1)).text);
}

void Workbench::choose(Selection next) {
    chosen_ = true;
    selection_.set(std::move(next));
}

void Workbench::pressCell(CellId cell) {
    if (board_.holds(cell)) {
        follows_ = true;
        choose(withCell(board_, now(), cell));
    }
}

void Workbench::pressLimit(int limit) {
    follows_ = false; // what the user chose stays, whatever runs finish
    choose(withLimit(board_, now(), limit));
}

void Workbench::pressTime(double time_s, int limit) {
    follows_ = false;
    auto next = now();
    next.time_s = time_s;
    next.limit = limit >= 0 ? limit : next.limit;
    choose(std::move(next));
}

void Workbench::pressThing(const plant::Path& thing) {
    auto next = now();
    next.thing = thing;
    choose(std::move(next));
}

void Workbench::takeOption(int option) {
    if (option >= -1 && option < snapshot().options()) {
        follows_ = true;
        choose(withOption(board_, now(), option));
    }
}

void Workbench::toggleCompared(CellId cell) {
    if (board_.holds(cell)) {
        choose(toggled(now(), cell));
    }
}

void Workbench::goToNextProblem() {
    pressCell(nextProblem(board_, now().inHand()));
}

void Workbench::edit(const QString& label, const plant::Tree& next, int gesture) {
    chosen_ = true;
    document_.edit(label, next, gesture);
}

} // namespace headroom::desk
