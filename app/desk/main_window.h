// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/commands.h"
#include "desk/session.h"
#include "desk/workbench.h"

#include <QBasicTimer>
#include <QWidget>
#include <map>

class QAction;
class QSplitter;

namespace headroom::desk {

class FindingsPanel;
class HeadingView;
class Lanes;
class RibbonView;
class SearchPanel;
class SectionView;
class Slip;
class StatusLine;
class TitleBlock;

/// The sheet: it puts the parts together and carries their wishes to the workbench.
class MainWindow final : public QWidget {
    Q_OBJECT
public:
    /// @param sessionFile  where the session is kept; empty: the user's settings folder
    explicit MainWindow(const QString& sessionFile = {}, int threads = studies::windowThreads());
    ~MainWindow() override;

    Workbench& bench() { return bench_; }
    SectionView& section() { return *section_; }
    RibbonView& ribbon() { return *ribbon_; }
    Lanes& lanes() { return *lanes_; }
    TitleBlock& titleBlock() { return *titleBlock_; }
    HeadingView& heading() { return *heading_; }
    StatusLine& status() { return *status_; }
    Slip& slip() { return *slip_; }
    FindingsPanel& findings() { return *findings_; }
    SearchPanel& search() { return *search_; }

    /// What the program does when it is started: a named file, else the file of last time, else
    /// (first start) the user's own copy of the demo, whose cells then run.
    void start(const QString& file);
    void openFile(const QString& file);
    void perform(CommandId id);
    void setDress(Session::Dress dress);
    void setScale(double scale);
    void openSlip(const plant::Path& path, const QString& typed, int row = -1, int column = -1);
    void showFindings(bool shown);
    void reportInternalError(const QString& what);
    /// The sheet as it is printed: in the print scheme, whatever the window's.
    QPixmap printed();

protected:
    void closeEvent(QCloseEvent* event) override;
    void resizeEvent(QResizeEvent* event) override;
    void changeEvent(QEvent* event) override;
    bool eventFilter(QObject* watched, QEvent* event) override;
    void timerEvent(QTimerEvent* event) override;

private:
    void assemble();
    void connectParts();
    void makeActions();
    void showLanes();
    void showLanesSoon();
    void refreshFindings();
    void placePanels();
    void showCulprit(const plant::Path& path);
    void showAlone(QWidget* part);
    void moveFocus(int steps);
    void takeBack();
    void chooseFileToOpen();
    void chooseFileToSave();
    void openDemo(bool runToo);
    void describe();
    bool mayLeave();
    void applyLook();
    void dressIn(const drawing::Look& look);
    QRectF placeFor(const plant::Path& path) const;
    bool performEdit(CommandId id);
    bool performView(CommandId id);
    bool performFile(CommandId id);

    QString sessionFile_;
    Session session_;
    Workbench bench_;
    HeadingView* heading_ = nullptr;
    SectionView* section_ = nullptr;
    RibbonView* ribbon_ = nullptr;
    Lanes* lanes_ = nullptr;
    TitleBlock* titleBlock_ = nullptr;
    StatusLine* status_ = nullptr;
    Slip* slip_ = nullptr;
    FindingsPanel* findings_ = nullptr;
    SearchPanel* search_ = nullptr;
    QSplitter* splitter_ = nullptr;
    QWidget* place_ = nullptr; // Section and Ribbon
    std::map<CommandId, QAction*> actions_;
    QBasicTimer lanesTimer_;
    bool styling_ = false;
};

} // namespace headroom::desk
