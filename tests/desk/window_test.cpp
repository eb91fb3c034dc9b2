// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/commands.h"
#include "desk/findings_panel.h"
#include "desk/heading_view.h"
#include "desk/lanes.h"
#include "desk/search_panel.h"
#include "desk/section_view.h"
#include "desk/slip.h"
#include "desk/status_line.h"
#include "desk/title_block.h"
#include "driver.h"

#include <QAbstractButton>
#include <QAccessible>
#include <QCloseEvent>
#include <QDirIterator>
#include <QElapsedTimer>
#include <QEventLoop>
#include <QFile>
#include <QImage>
#include <QMessageBox>
#include <QStandardPaths>
#include <QTimer>
#include <QWheelEvent>
#include <set>

using namespace headroom;
using namespace headroom::desk;

namespace {

/// Waits in an event loop of its own, as the program does.
bool loopUntil(const std::function<bool()>& holds, int limit_ms) {
    QEventLoop loop;
    QTimer look;
    QElapsedTimer clock;
    clock.start();
    QObject::connect(&look, &QTimer::timeout, &loop, [&] {
        if (holds() || clock.elapsed() > limit_ms) {
            loop.quit();
        }
    });
    look.start(10);
    loop.exec();
    return holds();
}

QByteArray demoText(const drive::Bench& bench) {
    QFile file(bench.demo());
    file.open(QIODevice::ReadOnly);
    return file.readAll();
}

/// Pixels of an image that are not its corner's colour, as a share.
double inkShare(const QImage& image) {
    const auto ground = image.pixel(2, image.height() / 2);
    int other = 0;
    for (int y = 0; y < image.height(); y += 2) {
        for (int x = 0; x < image.width(); x += 2) {
            other += image.pixel(x, y) != ground ? 1 : 0;
        }
    }
    return 4.0 * other / (image.width() * image.height());
}

} // namespace

TEST_CASE("Window: at 1280×800 every part of the sheet is seen without scrolling", "[desk][window]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    drive::settle();
    REQUIRE(window.size() == QSize(1280, 800));
    CHECK(window.section().height() >= 240);
    CHECK(window.lanes().lanes().size() >= 4);
    std::set<drawing::ItemKind> kinds;
    for (const auto& item : window.section().items()) {
        kinds.insert(item.kind);
    }
    for (const auto kind : {drawing::ItemKind::ground, drawing::ItemKind::reservoir, drawing::ItemKind::conduit,
                            drawing::ItemKind::chamber, drawing::ItemKind::unit}) {
        CHECK(kinds.contains(kind));
    }
    const auto& snapshot = window.bench().snapshot();
    for (int option = -1; option < snapshot.options(); ++option) {
        for (int study = 0; study < snapshot.studies(); ++study) {
            INFO(option << " " << study);
            CHECK_FALSE(window.titleBlock().board().cellBox({option, study}).isNull());
        }
    }
    CHECK_FALSE(window.titleBlock().strip().items().empty());
    CHECK_FALSE(window.heading().sentence().isEmpty());
    CHECK(window.heading().projectWords().contains(QStringLiteral("changes go into As built")));
}

TEST_CASE("Window: pressing any part moves all the others", "[desk][window]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    auto& workbench = window.bench();
    window.openFile(bench.demo());
    const CellId cell{-1, drive::studyNamed(window, "Reject, then reload")};
    workbench.board().want({cell});
    REQUIRE(drive::waitFor([&] { return workbench.board().cell(cell)->state == studies::CellState::done; }));
    drive::settle();

    drive::pressCell(window, cell);
    CHECK(workbench.now().inHand() == cell);
    const auto sentence = window.heading().sentence();
    const int worst = workbench.now().limit;
    REQUIRE(worst >= 0);
    CHECK_THAT(workbench.now().time_s, WithinAbs(verdictOf(workbench.board(), workbench.now())->time_s, 1e-9));

    // A bar of the Strip.
    auto& strip = window.titleBlock().strip();
    int other = -1;
    for (const auto& item : strip.items()) {
        other = item.kind == drawing::ItemKind::bar && item.limit != worst ? item.limit : other;
    }
    REQUIRE(other >= 0);
    QTest::mouseClick(&strip, Qt::LeftButton, Qt::NoModifier, strip.barBox(other).center().toPoint());
    drive::settle();
    CHECK(workbench.now().limit == other);
    CHECK(window.heading().sentence() != sentence);
    bool chosen = false;
    for (const auto& lane : window.lanes().lanes()) {
        for (const auto& bound : lane.bounds) {
            chosen = chosen || (lane.chosen && bound.limit == other);
        }
    }
    CHECK(chosen);

    // A lozenge of the Section brings its own limit and time.
    const auto items = window.section().items();
    const auto lozenge = std::find_if(items.begin(), items.end(), [](const auto& item) {
        return item.kind == drawing::ItemKind::lozenge;
    });
    REQUIRE(lozenge != items.end());
    workbench.pressLimit(other);
    QTest::mouseClick(&window.section(), Qt::LeftButton, Qt::NoModifier, lozenge->box.center().toPoint());
    drive::settle();
    CHECK(workbench.now().limit == lozenge->limit);

    // A lane: its limit and the time under the pointer.
    window.lanes().paintNow();
    const auto box = window.lanes().laneRect(0);
    auto* plot = window.lanes().findChildren<QWidget*>().front();
    QTest::mouseClick(plot, Qt::LeftButton, Qt::NoModifier, box.center().toPoint());
    drive::settle();
    CHECK(workbench.now().limit == window.lanes().lanes().front().limit());
    CHECK_THAT(workbench.now().time_s, WithinAbs(window.lanes().timeAt(box.center().toPoint().x()), 1e-6));
    CHECK(window.status().cursorWords().contains(QStringLiteral("level")));
}

TEST_CASE("Window: the event loop is never stuck while runs go on", "[desk][window]") {
    auto& timed = application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    drive::settle();
    timed.forget();
    window.bench().board().runDue();
    CHECK(loopUntil([&] { return window.bench().board().done() >= 8; }, 120000));
    window.perform(CommandId::cancelRuns);
    CHECK(loopUntil([&] { return !window.bench().runs().busy(); }, 5000));
    CHECK(timed.longest_s() > 0.0);
    WARN("longest event: " << timed.longest_s() * 1e3 << " ms of processor time");
    CHECK(timed.longest_s() < 0.2); // a turn that a user would feel
}

TEST_CASE("Window: a faulty file opens, shows its findings and what is usable", "[desk][window][files]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    auto text = demoText(bench);
    text.replace("\"strickler\": 34", "\"stricler\": 34");
    text.replace("\"kp\": 2.2", "\"kp\": 9999");
    window.openFile(bench.file(QStringLiteral("faulty.headroom.json"), text));
    drive::settle();
    CHECK(window.findings().isVisible());
    CHECK(window.findings().errors() >= 2);
    bool kinds = false;
    for (const auto& item : window.section().items()) {
        kinds = kinds || item.kind == drawing::ItemKind::chamber;
    }
    CHECK(kinds); // the plant is drawn as far as it is known
    window.findings().choose(0);
    auto* list = window.findings().findChild<QWidget*>(QStringLiteral("findingsList"));
    REQUIRE(list != nullptr);
    QTest::keyClick(list, Qt::Key_Return);
    drive::settle();
    CHECK_FALSE(window.bench().now().thing.empty());
    for (const char* broken : {"", "{", "[1, 2", "not json at all"}) {
        window.openFile(bench.file(QStringLiteral("broken.headroom.json"), broken));
        drive::settle();
        INFO(broken);
        CHECK(window.findings().errors() >= 1);
        CHECK_FALSE(window.grab().isNull());
    }
}

TEST_CASE("Window: every size and both schemes paint without fault", "[desk][window]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    for (const auto dress : {Session::Dress::light, Session::Dress::dark}) {
        window.setDress(dress);
        for (const QSize size : {QSize(800, 560), QSize(1024, 700), QSize(1280, 800), QSize(1366, 768),
                                 QSize(1920, 1080), QSize(2560, 1440), QSize(900, 1400)}) {
            window.resize(size);
            drive::settle();
            window.lanes().paintNow();
            const auto picture = window.grab().toImage();
            INFO(size.width() << "×" << size.height());
            CHECK(picture.size() == size);
            CHECK(inkShare(picture) > 0.1);
            const bool dark = QColor(picture.pixel(5, 60)).lightness() < 128;
            CHECK(dark == (dress == Session::Dress::dark));
        }
    }
    for (const double scale : {0.8, 1.5, 2.0}) {
        window.setScale(scale);
        drive::settle();
        CHECK_FALSE(window.grab().isNull());
    }
}

TEST_CASE("Window: the keyboard reaches every region and command", "[desk][window][keys]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    window.section().setFocus();
    drive::settle();
    std::set<QString> reached;
    for (int i = 0; i < 5; ++i) {
        REQUIRE(window.focusWidget() != nullptr);
        reached.insert(window.focusWidget()->objectName());
        CHECK_FALSE(window.focusWidget()->accessibleName().isEmpty());
        QTest::keyClick(&window, Qt::Key_F6);
        drive::settle();
    }
    CHECK(reached == std::set<QString>{QStringLiteral("section"), QStringLiteral("ribbon"), QStringLiteral("lanes"),
                                       QStringLiteral("board"), QStringLiteral("strip")});
    std::set<QString> names, keys;
    for (const auto& row : commands()) {
        INFO(row.name);
        CHECK(names.insert(QString::fromLatin1(row.name)).second);
        CHECK(std::string_view(row.help).ends_with("."));
        for (const auto& key : keysOf(row.id)) {
            CHECK_FALSE(key.toString().isEmpty());
            CHECK(keys.insert(key.toString() + QString::number(static_cast<int>(row.place))).second);
        }
    }
    // A command by its words.
    QTest::keyClick(&window, Qt::Key_K, Qt::ControlModifier);
    REQUIRE(window.search().isVisible());
    auto* line = window.findChild<QWidget*>(QStringLiteral("searchLine"));
    QTest::keyClicks(line, QStringLiteral("light or"));
    const auto before = window.bench().look().scheme;
    QTest::keyClick(line, Qt::Key_Return);
    drive::settle();
    CHECK(window.bench().look().scheme != before);
    // A value by its name.
    window.section().setFocus();
    QTest::keyClick(&window.section(), Qt::Key_Slash);
    REQUIRE(window.search().isVisible());
    QTest::keyClicks(line, QStringLiteral("u1 moment inertia"));
    QTest::keyClick(line, Qt::Key_Return);
    drive::settle();
    REQUIRE(window.slip().isOpen());
    CHECK_THAT(window.slip().factsText().toStdString(), ContainsSubstring("moment of inertia"));
}

TEST_CASE("Window: Esc leaves everything as it was, take back returns to the base", "[desk][window][slip]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    const auto before = window.bench().document().tree();
    window.bench().takeOption(drive::optionNamed(window, "Wider shaft"));
    window.bench().pressThing({"plant", "chambers", "Surge shaft"});
    window.section().setFocus();
    QTest::keyClick(&window.section(), Qt::Key_9);
    auto* line = window.findChild<QWidget*>(QStringLiteral("slipLine"));
    REQUIRE(window.slip().isOpen());
    CHECK(window.slip().entryText().toStdString() == "9");
    QTest::keyClicks(line, QStringLiteral("99999"));
    CHECK(window.slip().faulty());
    QTest::keyClick(line, Qt::Key_Return);
    CHECK(window.slip().isOpen()); // a fault is not taken
    QTest::keyClick(line, Qt::Key_Escape);
    drive::settle();
    CHECK_FALSE(window.slip().isOpen());
    CHECK(window.bench().document().tree().sameAs(before));
    window.bench().pressThing({"plant", "chambers", "Surge shaft"});
    window.perform(CommandId::takeBack);
    CHECK(window.bench().document().changed());
    CHECK(window.bench().document().tree().at({"options", "Wider shaft", "changes"})->members().empty());
}

TEST_CASE("Window: the pictures' items are children for a screen reader", "[desk][window]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    drive::settle();
    auto* board = QAccessible::queryAccessibleInterface(&window.titleBlock().board());
    REQUIRE(board != nullptr);
    const int cells = (window.bench().snapshot().options() + 1) * window.bench().snapshot().studies();
    CHECK(board->childCount() >= cells);
    for (int i = 0; i < board->childCount(); ++i) {
        REQUIRE(board->child(i) != nullptr);
        CHECK_FALSE(board->child(i)->text(QAccessible::Name).isEmpty());
        CHECK(board->indexOfChild(board->child(i)) == i);
    }
    auto* heading = QAccessible::queryAccessibleInterface(&window.heading());
    REQUIRE(heading != nullptr);
    CHECK(heading->text(QAccessible::Name) == window.heading().sentence());
}

TEST_CASE("Window: the session is remembered, the first start opens a copy of the demo",
          "[desk][window][files]") {
    application();
    QTemporaryDir home;
    const auto oldHome = qgetenv("HOME");
    qputenv("HOME", home.path().toUtf8());
    const auto session = home.filePath(QStringLiteral("session.ini"));
    {
        MainWindow window(session, 1);
        window.show();
        window.start({});
        CHECK(window.bench().document().open());
        CHECK(window.bench().runs().busy()); // its cells fill before the eyes
        CHECK(QString::fromStdString(window.bench().document().path().string())
                  .endsWith(QStringLiteral("Headroom/Dorvane/Dorvane.headroom.json")));
        window.setDress(Session::Dress::dark);
        window.close();
    }
    {
        MainWindow window(session, 1);
        window.show();
        window.start({});
        CHECK(window.bench().document().open());
        CHECK_FALSE(window.bench().runs().busy()); // nothing starts unasked
        CHECK(window.bench().look().scheme == drawing::Scheme::dark);
        window.close();
    }
    qputenv("HOME", oldHome);
}

TEST_CASE("Window: only unsaved changes ask in a box", "[desk][window]") {
    application();
    int places = 0;
    QDirIterator sources(QStringLiteral(HEADROOM_SOURCE_DIR "/app"), {QStringLiteral("*.cpp"), QStringLiteral("*.h")},
                         QDir::Files, QDirIterator::Subdirectories);
    while (sources.hasNext()) {
        QFile file(sources.next());
        file.open(QIODevice::ReadOnly);
        places += static_cast<int>(file.readAll().count("QMessageBox::question("));
        file.seek(0);
        const auto text = file.readAll();
        for (const char* other : {"QMessageBox::warning", "QMessageBox::critical", "QMessageBox::information",
                                  "QErrorMessage", "QInputDialog", "QMessageBox box"}) {
            INFO(file.fileName().toStdString());
            CHECK_FALSE(text.contains(other));
        }
    }
    CHECK(places == 1);

    drive::Bench bench;
    auto& window = *bench.window;
    window.openFile(bench.demo());
    window.bench().edit(QStringLiteral("t"), plant::edited(window.bench().document().tree(), -1, {"title"}, plant::Tree::text("Other")));
    bool asked = false;
    QTimer::singleShot(50, &window, [&] {
        auto* box = qobject_cast<QMessageBox*>(QApplication::activeModalWidget());
        asked = box != nullptr;
        if (box != nullptr) {
            box->button(QMessageBox::Cancel)->click();
        }
    });
    window.close();
    CHECK(asked);
    CHECK(window.isVisible()); // cancelled: nothing is lost
    window.perform(CommandId::undo);
    window.close();
    CHECK_FALSE(window.isVisible());
}
