// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/main_window.h"

#include "desk/demo.h"
#include "desk/findings_panel.h"
#include "desk/heading_view.h"
#include "desk/lanes.h"
#include "desk/messages.h"
#include "desk/search_panel.h"
#include "desk/section_view.h"
#include "desk/slip.h"
#include "desk/status_line.h"
#include "desk/style.h"
#include "desk/title_block.h"
#include "desk/words.h"

#include <QAction>
#include <QCloseEvent>
#include <QCoreApplication>
#include <QHBoxLayout>
#include <QPixmap>
#include <QSplitter>
#include <QToolTip>
#include <QVBoxLayout>

namespace headroom::desk {

namespace {

constexpr int ribbonHeight_px = 108;
constexpr int usualWidth_px = 1280, usualHeight_px = 800;
constexpr double sectionShare = 0.555; // of the picture's height, Ribbon included

} // namespace

MainWindow::MainWindow(const QString& sessionFile, int threads)
    : sessionFile_(sessionFile), session_(Session::load(sessionFile)), bench_(threads) {
    setObjectName(QStringLiteral("sheet"));
    assemble();
    makeActions();
    connectParts();
    setMinimumSize(800, 560);
    resize(usualWidth_px, usualHeight_px);
    if (!session_.geometry.isEmpty()) {
        restoreGeometry(session_.geometry);
    }
    if (!session_.splitter.isEmpty()) {
        splitter_->restoreState(session_.splitter);
    }
    applyLook();
}

MainWindow::~MainWindow() = default;

void MainWindow::assemble() {
    heading_ = new HeadingView(bench_, this);
    splitter_ = new QSplitter(Qt::Vertical, this);
    splitter_->setObjectName(QStringLiteral("splitter"));
    splitter_->setChildrenCollapsible(false);
    place_ = new QWidget(splitter_);
    section_ = new SectionView(bench_, place_);
    ribbon_ = new RibbonView(bench_, place_);
    auto* placeLayout = new QVBoxLayout(place_);
    placeLayout->setContentsMargins(0, 0, 0, 0);
    placeLayout->setSpacing(0);
    placeLayout->addWidget(section_, 1);
    placeLayout->addWidget(ribbon_);
    lanes_ = new Lanes(splitter_);
    splitter_->addWidget(place_);
    splitter_->addWidget(lanes_);
    splitter_->setStretchFactor(0, 3);
    splitter_->setStretchFactor(1, 2);
    titleBlock_ = new TitleBlock(bench_, this);
    status_ = new StatusLine(bench_, *lanes_, this);
    auto* picture = new QVBoxLayout;
    picture->setSpacing(0);
    picture->addWidget(heading_);
    picture->addWidget(splitter_, 1);
    auto* above = new QHBoxLayout;
    above->setSpacing(0);
    above->addLayout(picture, 1);
    above->addWidget(titleBlock_);
    auto* sheet = new QVBoxLayout(this);
    sheet->setContentsMargins(0, 0, 0, 0);
    sheet->setSpacing(0);
    sheet->addLayout(above, 1);
    sheet->addWidget(status_);
    findings_ = new FindingsPanel(bench_, this);
    findings_->hide();
    slip_ = new Slip(bench_, this);
    search_ = new SearchPanel(bench_, this);
}

void MainWindow::connectParts() {
    connect(&bench_, &Workbench::shownChanged, this, &MainWindow::showLanesSoon);
    connect(&bench_, &Workbench::shownChanged, this, &MainWindow::refreshFindings);
    connect(&bench_, &Workbench::selectionChanged, this, [this](const Selection& before) {
        const auto& now = bench_.now();
        if (before.shown != now.shown || before.limit != now.limit) {
            showLanesSoon();
            refreshFindings();
        } else if (before.time_s != now.time_s) {
            lanes_->setCursor(now.time_s);
        }
        status_->update();
    });
    connect(&bench_.document(), &Document::findingsChanged, this, &MainWindow::refreshFindings);
    connect(&bench_.document(), &Document::fileChanged, this, [this] {
        auto& document = bench_.document();
        setWindowTitle(document.open() ? document.name() + QStringLiteral("[*] – Headroom") : QStringLiteral("Headroom"));
        setWindowModified(document.changed());
    });
    connect(lanes_, &Lanes::timePressed, &bench_, &Workbench::pressTime);
    connect(lanes_, &Lanes::resized, this, &MainWindow::showLanesSoon);
    connect(heading_, &HeadingView::runPressed, &bench_, &Workbench::pressCell);
    connect(titleBlock_, &TitleBlock::commandAsked, this, [this](CommandId id) {
        const bool stop = id == CommandId::runDue && bench_.runs().busy();
        perform(stop ? CommandId::cancelRuns : id);
    });
    for (PictureView* view : {static_cast<PictureView*>(section_), static_cast<PictureView*>(ribbon_)}) {
        connect(view, &PictureView::pressed, this, [this](const drawing::Item& item) {
            if (item.limit >= 0) {
                bench_.pressLimit(item.limit);
            } else if (!item.thing.empty()) {
                bench_.pressThing(item.thing);
            } else if (item.label == QLatin1String(drawing::openDemoWords)) {
                perform(CommandId::openDemo);
            } else if (item.label == QLatin1String(drawing::openProjectWords)) {
                perform(CommandId::open);
            }
        });
    }
    connect(section_, &PictureView::pressedNothing, this, [this] { bench_.pressThing({}); });
    connect(section_, &SectionView::slipAsked, this, [this](const QString& typed) {
        openSlip(bench_.now().thing, typed);
    });
    connect(&titleBlock_->strip(), &StripView::slipAsked, this, [this](const plant::Path& path) { openSlip(path, {}); });
    for (PictureView* view : {static_cast<PictureView*>(section_), static_cast<PictureView*>(ribbon_),
                              static_cast<PictureView*>(&titleBlock_->board()), static_cast<PictureView*>(&titleBlock_->strip())}) {
        connect(view, &PictureView::described, status_, &StatusLine::say);
    }
    connect(slip_, &Slip::closed, section_, [this] { section_->setFocus(Qt::OtherFocusReason); });
    connect(search_, &SearchPanel::commandChosen, this, &MainWindow::perform);
    connect(search_, &SearchPanel::valueChosen, this, [this](const plant::Path& path, int row, int column) {
        bench_.pressThing(path);
        openSlip(path, {}, row, column);
    });
    connect(search_, &SearchPanel::closed, this, [this] { section_->setFocus(Qt::OtherFocusReason); });
    connect(findings_, &FindingsPanel::activated, this, &MainWindow::showCulprit);
    connect(findings_, &FindingsPanel::closeAsked, this, [this] { showFindings(false); });
    connect(status_, &StatusLine::findingsPressed, this, [this] { showFindings(!findings_->isVisible()); });
    splitter_->installEventFilter(this);
}

void MainWindow::makeActions() {
    for (const auto& row : commands()) {
        auto* action = new QAction(QCoreApplication::translate("desk", row.text), this);
        action->setObjectName(QString::fromLatin1(row.name));
        action->setShortcuts(keysOf(row.id));
        QWidget* where = row.place == CommandPlace::section ? static_cast<QWidget*>(section_)
                         : row.place == CommandPlace::lanes ? static_cast<QWidget*>(lanes_)
                                                            : this;
        action->setShortcutContext(where == this ? Qt::WindowShortcut : Qt::WidgetWithChildrenShortcut);
        where->addAction(action);
        connect(action, &QAction::triggered, this, [this, id = row.id] { perform(id); });
        actions_[row.id] = action;
    }
}

/// Once for all changes of this turn of the event loop.
void MainWindow::showLanesSoon() {
    if (!lanesTimer_.isActive()) {
        lanesTimer_.start(0, this);
    }
}

void MainWindow::timerEvent(QTimerEvent* event) {
    if (event->timerId() != lanesTimer_.timerId()) {
        return QWidget::timerEvent(event);
    }
    lanesTimer_.stop();
    showLanes();
}

/// The lanes of the run in the hand with every run that is shown in them.
void MainWindow::showLanes() {
    std::vector<LaneRun> runs;
    for (const auto cell : bench_.now().shown) {
        const auto stored = bench_.board().latestRun(cell);
        const auto* at = bench_.board().cell(cell);
        LaneRun run{bench_.runName(cell), stored ? bench_.runs().traces(*stored) : nullptr, false};
        run.stale = at != nullptr && stored != nullptr && at->stored != stored;
        runs.push_back(std::move(run));
    }
    lanes_->show(planLanes(bench_.board(), bench_.now(), lanes_->lanesThatFit()), std::move(runs));
    lanes_->setCursor(bench_.now().time_s);
    status_->update();
}

void MainWindow::refreshFindings() {
    const int count = findings_->count(), errors = findings_->errors();
    titleBlock_->setFindingsCount(count, errors);
    status_->setFindings(count, errors);
}

void MainWindow::openSlip(const plant::Path& path, const QString& typed, int row, int column) {
    if (path.empty()) {
        status_->say(tr("Choose a thing in the Section first, or find a value with /."));
        return;
    }
    slip_->open(path, placeFor(path), typed, row, column);
}

/// Where a value's thing stands in the window: a limit at its bar, anything else in the Section.
QRectF MainWindow::placeFor(const plant::Path& path) const {
    const auto limits = plant::pathOf(plant::Collection::limits);
    const QWidget* part = section_;
    QRectF box = section_->placeOf(path);
    if (path.size() > limits.size() && std::equal(limits.begin(), limits.end(), path.begin())) {
        const auto& known = bench_.snapshot().variant(bench_.optionInHand()).limits;
        const auto bar = titleBlock_->strip().barBox(known.indexOf(path[limits.size()]));
        part = bar.isNull() ? part : &titleBlock_->strip();
        box = bar.isNull() ? box : bar;
    }
    return QRectF(part->mapTo(this, box.topLeft().toPoint()), box.size());
}

void MainWindow::showFindings(bool shown) {
    placePanels();
    if (!shown && findings_->isVisible()) { // before hiding, which would hand the focus on by Tab
        section_->setFocus(Qt::OtherFocusReason);
    }
    findings_->setVisible(shown);
    if (shown) {
        findings_->refresh();
        findings_->raise();
        findings_->choose(0);
    }
}

void MainWindow::reportInternalError(const QString& what) {
    status_->say(tr("Internal error: %1. What you entered is kept; save it under another name.").arg(what));
}

/// Findings lie over the lanes.
void MainWindow::placePanels() {
    const QPoint corner = lanes_->isVisible() ? lanes_->mapTo(this, QPoint(0, 0)) : section_->mapTo(this, QPoint(0, section_->height() / 2));
    const int bottom = status_->geometry().top();
    findings_->setGeometry(corner.x() + 2, corner.y(), titleBlock_->x() - corner.x() - 4, std::max(120, bottom - corner.y() - 2));
}

/// Selects and shows what a finding is about; an option's change is shown with it in the hand.
void MainWindow::showCulprit(const plant::Path& path) {
    const auto& snapshot = bench_.snapshot();
    const auto& project = snapshot.project();
    plant::Path culprit = path;
    if (culprit.size() > 3 && culprit.front() == plant::pathOf(plant::Collection::options).front()) {
        bench_.takeOption(project.options.indexOf(culprit[1]));
        culprit.erase(culprit.begin(), culprit.begin() + 3);
    }
    if (culprit.size() > 1 && culprit.front() == plant::pathOf(plant::Collection::studies).front()) {
        bench_.pressCell({bench_.optionInHand(), project.studies.indexOf(culprit[1])});
    }
    if (culprit.size() > 1 && culprit.front() == plant::pathOf(plant::Collection::limits).front()) {
        bench_.pressLimit(snapshot.variant(bench_.optionInHand()).limits.indexOf(culprit[1]));
    }
    bench_.pressThing(culprit);
    showFindings(false);
    if (!valuesOf(project, snapshot.variant(bench_.optionInHand()), culprit).empty()) {
        openSlip(culprit, {});
    }
}

void MainWindow::showAlone(QWidget* part) {
    QWidget* other = part == place_ ? static_cast<QWidget*>(lanes_) : place_;
    const bool alone = part->isVisible() && !other->isVisible();
    part->show();
    other->setVisible(alone);
    showLanes();
}

void MainWindow::moveFocus(int steps) {
    const std::array<QWidget*, 5> regions{section_, ribbon_, lanes_, &titleBlock_->board(), &titleBlock_->strip()};
    int here = 0;
    for (std::size_t i = 0; i < regions.size(); ++i) {
        here = regions[i]->hasFocus() ? static_cast<int>(i) : here;
    }
    const int count = static_cast<int>(regions.size());
    for (int step = 1; step <= count; ++step) {
        auto* next = regions[static_cast<std::size_t>(((here + steps * step) % count + count) % count)];
        if (next->isVisible()) {
            next->setFocus(Qt::ShortcutFocusReason);
            return;
        }
    }
}

/// The chosen value, or every value of the chosen thing, goes back to the base.
void MainWindow::takeBack() {
    if (slip_->isOpen()) {
        return slip_->takeBack();
    }
    const auto& thing = bench_.now().thing;
    if (!thing.empty() && bench_.optionInHand() >= 0) {
        bench_.edit(tr("%1 taken back").arg(pathWords(thing)),
                    plant::takenBack(bench_.document().tree(), bench_.optionInHand(), thing));
    }
}

void MainWindow::describe() {
    const QWidget* part = focusWidget();
    if (const auto* view = qobject_cast<const PictureView*>(part)) {
        status_->say(view->description());
    } else if (part == lanes_) {
        status_->say(lanes_->description());
    } else {
        status_->say(bench_.sentence());
    }
}

void MainWindow::setDress(Session::Dress dress) {
    session_.dress = dress;
    applyLook();
}

void MainWindow::setScale(double scale) {
    session_.scale = std::clamp(scale, 0.8, 2.0);
    applyLook();
}

void MainWindow::applyLook() {
    const bool dark = session_.dress == Session::Dress::dark || (session_.dress == Session::Dress::system && systemIsDark());
    dressIn(drawing::look(dark ? drawing::Scheme::dark : drawing::Scheme::light, session_.scale));
}

void MainWindow::dressIn(const drawing::Look& look) {
    styling_ = true;
    setPalette(paletteFor(look));
    setStyleSheet(styleSheetFor(look));
    QToolTip::setPalette(paletteFor(look));
    styling_ = false;
    titleBlock_->setFixedWidth(static_cast<int>(TitleBlock::width_px * look.scale));
    ribbon_->setFixedHeight(static_cast<int>(ribbonHeight_px * look.scale));
    bench_.setLook(look);
    section_->setLook(look);
    ribbon_->setLook(look);
    lanes_->setLook(look);
    showLanes();
    update();
}

QPixmap MainWindow::printed() {
    dressIn(drawing::look(drawing::Scheme::print, session_.scale));
    QCoreApplication::sendPostedEvents();
    lanes_->paintNow();
    const auto picture = grab();
    applyLook();
    return picture;
}

void MainWindow::changeEvent(QEvent* event) {
    QWidget::changeEvent(event);
    if (event->type() == QEvent::ApplicationPaletteChange && !styling_ && heading_ != nullptr) {
        applyLook(); // the system changed between light and dark
    }
}

void MainWindow::resizeEvent(QResizeEvent* event) {
    QWidget::resizeEvent(event);
    if (session_.splitter.isEmpty() && splitter_ != nullptr) {
        const int all = height() - heading_->sizeHint().height() - status_->sizeHint().height();
        splitter_->setSizes({static_cast<int>(all * sectionShare), static_cast<int>(all * (1.0 - sectionShare))});
    }
    placePanels();
}

bool MainWindow::eventFilter(QObject* watched, QEvent* event) {
    if (watched == splitter_ && event->type() == QEvent::Resize) {
        placePanels();
    }
    return QWidget::eventFilter(watched, event);
}

} // namespace headroom::desk
