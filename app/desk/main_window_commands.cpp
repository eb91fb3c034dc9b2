// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/main_window.h"

#include "desk/demo.h"
#include "desk/lanes.h"
#include "desk/search_panel.h"
#include "desk/section_view.h"
#include "desk/findings_panel.h"
#include "desk/status_line.h"
#include "desk/words.h"
#include "units/text.h"

#include <QCloseEvent>
#include <QFileDialog>
#include <QMessageBox>
#include <QSplitter>

/// What each command does: files, edits, views.
namespace headroom::desk {

namespace {

constexpr double scaleStep = 0.1;
const QString projectFilter = QStringLiteral("*.headroom.json");

} // namespace

void MainWindow::start(const QString& file) {
    const bool first = !session_.startedBefore;
    session_.startedBefore = true;
    if (!file.isEmpty()) {
        openFile(file);
    } else if (first) {
        openDemo(true);
    } else if (!session_.lastFile.isEmpty() && std::filesystem::exists(session_.lastFile.toStdString())) {
        openFile(session_.lastFile);
    }
    section_->setFocus(Qt::OtherFocusReason);
}

void MainWindow::openFile(const QString& file) {
    bench_.document().openFile(file.toStdString());
    session_.remember(file);
    lanes_->showAllTime();
    showFindings(anyError(bench_.document().findings()));
}

/// Opens the user's own copy of the demo; on the very first start its cells are run at once.
void MainWindow::openDemo(bool runToo) {
    const auto own = ownDemo(documentsFolder());
    if (!own) {
        status_->say(text(headroom::text(own.findings().front())));
        return;
    }
    openFile(QString::fromStdString(own->string()));
    if (runToo) {
        bench_.board().runDue();
    }
}

/// Asks only when something would be lost: the one question this window ever asks in a box.
bool MainWindow::mayLeave() {
    if (!bench_.document().changed()) {
        return true;
    }
    const auto answer = QMessageBox::question(
        this, tr("Headroom"), tr("%1 has changes that are not saved.").arg(bench_.document().name()),
        QMessageBox::Save | QMessageBox::Discard | QMessageBox::Cancel, QMessageBox::Save);
    if (answer == QMessageBox::Save) {
        return bench_.document().save();
    }
    return answer == QMessageBox::Discard;
}

void MainWindow::closeEvent(QCloseEvent* event) {
    if (!mayLeave()) {
        event->ignore();
        return;
    }
    session_.geometry = saveGeometry();
    session_.splitter = splitter_->saveState();
    session_.save(sessionFile_);
    bench_.runs().cancel();
    event->accept();
}

void MainWindow::chooseFileToOpen() {
    const auto file = QFileDialog::getOpenFileName(this, tr("Open Project"), session_.lastFile, projectFilter);
    if (!file.isEmpty()) {
        openFile(file);
    }
}

void MainWindow::chooseFileToSave() {
    const auto now = QString::fromStdString(bench_.document().path().string());
    const auto file = QFileDialog::getSaveFileName(this, tr("Save Project As"), now, projectFilter);
    if (!file.isEmpty() && bench_.document().saveAs(file.toStdString())) {
        session_.remember(file);
    }
}

bool MainWindow::performFile(CommandId id) {
    switch (id) {
    case CommandId::open:
        if (mayLeave()) {
            chooseFileToOpen();
        }
        return true;
    case CommandId::openDemo:
        if (mayLeave()) {
            openDemo(false);
        }
        return true;
    case CommandId::save:
        if (!bench_.document().save()) {
            showFindings(true);
        }
        return true;
    case CommandId::saveAs: chooseFileToSave(); return true;
    case CommandId::closeProject:
        if (mayLeave()) {
            bench_.document().close();
        }
        return true;
    case CommandId::quit: close(); return true;
    default: return false;
    }
}

bool MainWindow::performEdit(CommandId id) {
    auto& board = bench_.board();
    switch (id) {
    case CommandId::runDue: board.runDue(); return true;
    case CommandId::runCell: board.want({bench_.now().inHand()}); return true;
    case CommandId::cancelRuns: bench_.runs().cancel(); return true;
    case CommandId::nextProblem: bench_.goToNextProblem(); return true;
    case CommandId::compare: bench_.toggleCompared(bench_.now().inHand()); return true;
    case CommandId::undo: bench_.document().undo().undo(); return true;
    case CommandId::redo: bench_.document().undo().redo(); return true;
    case CommandId::openSlip: openSlip(bench_.now().thing, {}); return true;
    case CommandId::takeBack: takeBack(); return true;
    default: return false;
    }
}

bool MainWindow::performView(CommandId id) {
    switch (id) {
    case CommandId::findValue: search_->open(SearchPanel::What::values); return true;
    case CommandId::searchCommands: search_->open(SearchPanel::What::commands); return true;
    case CommandId::findings: showFindings(!findings_->isVisible()); return true;
    case CommandId::switchScheme:
        setDress(bench_.look().scheme == drawing::Scheme::dark ? Session::Dress::light : Session::Dress::dark);
        return true;
    case CommandId::sectionAlone: showAlone(place_); return true;
    case CommandId::lanesAlone: showAlone(lanes_); return true;
    case CommandId::nextRegion: moveFocus(1); return true;
    case CommandId::previousRegion: moveFocus(-1); return true;
    case CommandId::stepForward: lanes_->stepCursor(1); return true;
    case CommandId::stepBack: lanes_->stepCursor(-1); return true;
    case CommandId::stepFarForward: lanes_->stepCursor(10); return true;
    case CommandId::stepFarBack: lanes_->stepCursor(-10); return true;
    case CommandId::allTime: lanes_->showAllTime(); return true;
    case CommandId::upstream: section_->walk(-1); return true;
    case CommandId::downstream: section_->walk(1); return true;
    case CommandId::fitSection:
    case CommandId::trueScale: {
        const auto scales = id == CommandId::trueScale ? drawing::Scales::one : drawing::Scales::three;
        section_->setScales(scales);
        ribbon_->setScales(scales);
        return true;
    }
    case CommandId::describe: describe(); return true;
    case CommandId::largerText: setScale(session_.scale + scaleStep); return true;
    case CommandId::smallerText: setScale(session_.scale - scaleStep); return true;
    default: return false;
    }
}

void MainWindow::perform(CommandId id) {
    if (!performEdit(id) && !performView(id)) {
        performFile(id);
    }
}

} // namespace headroom::desk
