// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/board_model.h"
#include "desk/choices.h"
#include "desk/document.h"
#include "desk/run_bridge.h"
#include "desk/selection_model.h"
#include "drawing/look.h"

#include <QObject>

namespace headroom::desk {

/// What the window works with: the document, the runs behind it, what their cells say, and the one
/// selection. Parts of the window read from here and ask here; no part knows another.
class Workbench final : public QObject {
    Q_OBJECT
public:
    explicit Workbench(int threads = studies::windowThreads());

    Document& document() { return document_; }
    RunBridge& runs() { return runs_; }
    BoardModel& board() { return board_; }
    SelectionModel& selection() { return selection_; }
    const drawing::Look& look() const { return *look_; }

    const studies::Snapshot& snapshot() const { return board_.snapshot(); }
    const Selection& now() const { return selection_.now(); }
    /// The option that receives changes: that of the run in the hand.
    int optionInHand() const { return now().inHand().option; }
    const studies::Cell* cellInHand() const { return board_.cell(now().inHand()); }
    /// Name of a compared run among the others shown: the option, with the study if they differ.
    QString runName(CellId cell) const;

    /// The verdict sentence of the present choice: option, study, what, how much ± U, when.
    QString sentence() const;

    void setLook(const drawing::Look& look);

    // What pressing means, whoever is pressed.
    void pressCell(CellId cell);
    void pressLimit(int limit);
    void pressTime(double time_s, int limit);
    void pressThing(const plant::Path& thing);
    void takeOption(int option);
    void toggleCompared(CellId cell);
    void goToNextProblem();

    /// Puts an edit into the document and marks the selection as the user's own.
    void edit(const QString& label, const plant::Tree& next, int gesture = -1);

signals:
    void shownChanged();     ///< snapshot, or what a shown run says
    void boardChanged();     ///< any cell, or the progress of one
    void selectionChanged(const headroom::drawing::Selection& before);
    void lookChanged();

private:
    void snapshotChanged();
    void judged(const std::vector<CellId>& cells);
    void choosePresent();
    void choose(Selection next);

    Document document_;
    RunBridge runs_;
    BoardModel board_;
    SelectionModel selection_;
    const drawing::Look* look_;
    bool follows_ = true; ///< limit and cursor go to the worst verdict of the run in the hand
    bool chosen_ = false; ///< the user has pressed something; until then the worst is shown
};

} // namespace headroom::desk
