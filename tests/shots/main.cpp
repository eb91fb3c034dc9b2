// SPDX-License-Identifier: GPL-3.0-or-later
#include "driver.h"

#include "desk/application.h"
#include "desk/findings_panel.h"
#include "desk/lanes.h"
#include "desk/section_view.h"
#include "desk/slip.h"
#include "drawing/picture_export.h"

#include <QDir>
#include <QFile>
#include <QPixmap>
#include <QProcess>
#include <cstdio>
#include <map>

/// Named states of the window as pictures.
namespace {

using namespace headroom;
using namespace headroom::desk;

QString folder;

void keep(MainWindow& window, const QString& name) {
    drive::settle();
    window.lanes().paintNow();
    const auto file = folder + QLatin1Char('/') + name + QStringLiteral(".png");
    if (!window.grab().save(file)) {
        std::fprintf(stderr, "cannot write %s\n", qPrintable(file));
        std::exit(1);
    }
    std::printf("%s\n", qPrintable(file));
}

void openDemo(drive::Bench& bench) {
    bench.window->openFile(bench.demo());
    drive::settle();
}

void chooseBroken(MainWindow& window) {
    window.bench().pressCell({-1, drive::studyNamed(window, "Reject, then reload")});
}

const plant::Path shaft{"plant", "chambers", "Surge shaft"};

/// Everything that needs the runs of the demo, on one window so that they are run once.
void runStates() {
    drive::Bench bench;
    auto& window = *bench.window;
    openDemo(bench);
    keep(window, QStringLiteral("not_run"));
    window.bench().board().runDue();
    drive::waitFor([&] { return window.bench().board().done() >= 17; }, 300000);
    keep(window, QStringLiteral("running"));
    drive::runAll(window);
    keep(window, QStringLiteral("first_start"));
    chooseBroken(window);
    keep(window, QStringLiteral("broken_chosen"));
    window.bench().pressCell({drive::optionNamed(window, "Reload not before 300 s"), drive::studyNamed(window, "Reject, then reload")});
    window.section().setFocus();
    drive::pressThing(window, shaft);
    QTest::keyClick(&window.section(), Qt::Key_Return);
    QTest::keyClicks(window.findChild<QWidget*>(QStringLiteral("slipLine")), QStringLiteral("dia = 8*1.25"));
    keep(window, QStringLiteral("slip_open"));
    QTest::keyClicks(window.findChild<QWidget*>(QStringLiteral("slipLine")), QStringLiteral("*20"));
    keep(window, QStringLiteral("slip_fault"));
    window.slip().close();
    QTest::keyClick(&window.section(), Qt::Key_Return);
    QTest::keyClicks(window.findChild<QWidget*>(QStringLiteral("slipLine")), QStringLiteral("dia 10"));
    QTest::keyClick(window.findChild<QWidget*>(QStringLiteral("slipLine")), Qt::Key_Return);
    keep(window, QStringLiteral("outdated"));
    window.perform(CommandId::undo);
    window.showFindings(true);
    keep(window, QStringLiteral("findings"));
    window.showFindings(false);
    window.perform(CommandId::searchCommands);
    keep(window, QStringLiteral("commands"));
    window.perform(CommandId::findValue);
    keep(window, QStringLiteral("find_value"));
    QTest::keyClick(window.findChild<QWidget*>(QStringLiteral("searchLine")), Qt::Key_Escape);
    chooseBroken(window);
    window.setDress(Session::Dress::dark);
    keep(window, QStringLiteral("dark"));
    window.setDress(Session::Dress::light);
    window.perform(CommandId::sectionAlone);
    keep(window, QStringLiteral("section_alone"));
    window.perform(CommandId::sectionAlone);
    drawing::grey(window.printed().toImage()).save(folder + QStringLiteral("/grey_print.png"));
    window.showFindings(false);
    window.resize(1920, 1080);
    keep(window, QStringLiteral("1920x1080"));
    window.resize(1280, 800);
    window.setScale(1.5);
    window.resize(1920, 1200);
    keep(window, QStringLiteral("text_scale_1.5"));
}

/// What a screen of another density shows.
void denseState(const QString& name) {
    drive::Bench bench;
    openDemo(bench);
    auto& board = bench.window->bench().board();
    const int study = drive::studyNamed(*bench.window, "Reject, then reload");
    for (int option = -1; option < bench.window->bench().snapshot().options(); ++option) {
        board.want({{option, study}});
    }
    drive::waitFor([&] { return !bench.window->bench().runs().busy(); }, 300000);
    keep(*bench.window, name);
}

void faultyState() {
    drive::Bench bench;
    QFile demo(bench.demo());
    demo.open(QIODevice::ReadOnly);
    auto text = demo.readAll();
    text.replace("\"strickler\": 34", "\"stricler\": 34");
    text.replace("\"rim_m\": 536", "\"rim_m\": 430");
    text.replace("\"kp\": 2.2", "\"kp\": 9999");
    text.replace("\"waveSpeed_mps\": 1200", "\"waveSpeed_mps\": 700");
    bench.window->openFile(bench.file(QStringLiteral("Faulty.headroom.json"), text));
    keep(*bench.window, QStringLiteral("faulty_file"));
    bench.window->openFile(bench.file(QStringLiteral("Cut short.headroom.json"), text.left(900)));
    keep(*bench.window, QStringLiteral("truncated_file"));
}

void emptyState() {
    drive::Bench bench;
    keep(*bench.window, QStringLiteral("empty_project"));
}

void again(const char* ratio, const QString& name) {
    QProcess process;
    auto environment = QProcessEnvironment::systemEnvironment();
    environment.insert(QStringLiteral("QT_SCALE_FACTOR"), QString::fromLatin1(ratio));
    process.setProcessEnvironment(environment);
    process.setProcessChannelMode(QProcess::ForwardedChannels);
    process.start(QCoreApplication::applicationFilePath(), {folder, name});
    process.waitForFinished(300000);
}

} // namespace

int main(int count, char* words[]) {
    qputenv("QT_QPA_PLATFORM", "offscreen");
    Application application(count, words);
    const auto arguments = application.arguments();
    if (arguments.size() < 2) {
        std::fprintf(stderr, "shots FOLDER [STATE]\n");
        return 2;
    }
    folder = arguments.at(1);
    QDir().mkpath(folder);
    if (arguments.size() > 2) {
        denseState(arguments.at(2));
        return 0;
    }
    emptyState();
    faultyState();
    runStates();
    again("1.5", QStringLiteral("screen_scale_1.5"));
    again("2", QStringLiteral("screen_scale_2"));
    return 0;
}
