// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/heading_view.h"
#include "desk/section_view.h"
#include "desk/slip.h"
#include "desk/title_block.h"
#include "drawing/marks.h"
#include "driver.h"
#include "results/verdict.h"

#include <QFile>
#include <QProcess>
#include <nlohmann/json.hpp>

using namespace headroom;
using namespace headroom::desk;

namespace {

constexpr const char* studyName = "Reject, then reload";
constexpr const char* optionName = "Reload not before 300 s";
const plant::Path shaft{"plant", "chambers", "Surge shaft"};

QList<QByteArray> linesOf(const QString& file) {
    QFile in(file);
    in.open(QIODevice::ReadOnly);
    return in.readAll().split('\n');
}

const studies::Cell& cellAt(MainWindow& window, CellId id) {
    const auto* cell = window.bench().board().cell(id);
    REQUIRE(cell != nullptr);
    return *cell;
}

/// Runs the cell in the hand by its key and waits for it.
void runByKey(MainWindow& window, CellId id) {
    QTest::keyClick(&window.titleBlock().board(), Qt::Key_Return);
    REQUIRE(drive::waitFor([&] { return cellAt(window, id).state == studies::CellState::done; }));
    drive::settle();
}

std::vector<results::Mark> marksOf(const studies::Cell& cell) {
    std::vector<results::Mark> marks;
    for (const auto& verdict : cell.verdicts) {
        marks.push_back(verdict.mark);
    }
    return marks;
}

/// The batch program's verdicts for the cell.
nlohmann::json batchVerdicts(const QString& project, const QString& out) {
    QProcess batch;
    batch.start(QStringLiteral(HEADROOM_BUILD_DIR "/bin/headroom-batch"),
                {QStringLiteral("run"), project, QStringLiteral("--option"), QString::fromUtf8(optionName),
                 QStringLiteral("--study"), QString::fromUtf8(studyName), QStringLiteral("--out"), out});
    REQUIRE(batch.waitForFinished(120000));
    INFO(batch.readAllStandardError().toStdString());
    REQUIRE(batch.exitCode() == 0);
    QFile file(out + QStringLiteral("/verdicts.json"));
    REQUIRE(file.open(QIODevice::ReadOnly));
    return nlohmann::json::parse(file.readAll().toStdString());
}

void compareWithBatch(MainWindow& window, CellId id, const nlohmann::json& list) {
    const auto& cell = cellAt(window, id);
    const auto& limits = window.bench().snapshot().variant(id.option).limits;
    REQUIRE(list.size() == cell.verdicts.size());
    for (const auto& verdict : cell.verdicts) {
        const auto& name = limits.name(verdict.limit);
        const auto found = std::find_if(list.begin(), list.end(), [&](const auto& entry) {
            return entry.at("limit").template get<std::string>() == name;
        });
        INFO(name);
        REQUIRE(found != list.end());
        CHECK(found->at("verdict").get<std::string>() == results::name(verdict.mark));
        if (found->contains("extreme") && found->at("extreme").is_number()) {
            const auto quantity = info(verdict.measure).quantity;
            // The same run on the same machine; the file prints 12 digits or more.
            CHECK_THAT(toSi(quantity, found->at("extreme").get<double>()), WithinRel(verdict.extreme, 1e-9));
        }
    }
}

} // namespace

TEST_CASE("The main job, driven by mouse and keys", "[desk][driven]") {
    application();
    drive::Bench bench;
    auto& window = *bench.window;
    const auto project = bench.demo();
    const auto before = linesOf(project);
    window.openFile(project);
    drive::settle();

    // Choose the cell on the Board and run it.
    const CellId id{drive::optionNamed(window, optionName), drive::studyNamed(window, studyName)};
    REQUIRE(id.option >= 0);
    REQUIRE(id.study >= 0);
    drive::pressCell(window, id);
    CHECK(window.bench().now().inHand() == id);
    CHECK(cellAt(window, id).state == studies::CellState::notRun);
    runByKey(window, id);
    const auto oldMarks = marksOf(cellAt(window, id));
    const auto oldSentence = window.heading().sentence();
    const auto oldMark = drawing::markOf(cellAt(window, id));
    const auto runs = window.bench().runs().store().count();
    CHECK(runs >= 1);

    // Choose the shaft in the Section; Enter opens the slip; a wider shaft.
    REQUIRE(drive::pressThing(window, shaft));
    CHECK(window.bench().now().thing == shaft);
    QTest::keyClick(&window.section(), Qt::Key_Return);
    REQUIRE(window.slip().isOpen());
    auto* line = window.findChild<QWidget*>(QStringLiteral("slipLine"));
    REQUIRE(line != nullptr);
    QTest::keyClicks(line, QStringLiteral("dia 10"));
    CHECK(window.slip().resultText().toStdString() == "10.00\u2009m");
    QTest::keyClick(line, Qt::Key_Return);
    drive::settle();
    CHECK_FALSE(window.slip().isOpen());
    CHECK(cellAt(window, id).state == studies::CellState::outdated);
    CHECK(drawing::markOf(cellAt(window, id)) == drawing::MarkState::outdated);

    // Run it again: decided, and the sentence says something else.
    drive::pressCell(window, id);
    runByKey(window, id);
    const auto newMarks = marksOf(cellAt(window, id));
    const auto newSentence = window.heading().sentence();
    CHECK(newSentence.toStdString() != oldSentence.toStdString());
    const auto runsNow = window.bench().runs().store().count();
    CHECK(runsNow > runs);

    // Undo: the old mark is back without a run.
    QTest::keyClick(&window, Qt::Key_Z, Qt::ControlModifier);
    drive::settle();
    CHECK(cellAt(window, id).state == studies::CellState::done);
    CHECK(drawing::markOf(cellAt(window, id)) == oldMark);
    CHECK(marksOf(cellAt(window, id)) == oldMarks);
    CHECK(window.heading().sentence().toStdString() == oldSentence.toStdString());
    CHECK(window.bench().runs().store().count() == runsNow);
    CHECK_FALSE(window.bench().document().changed());

    // Redo and save: one line of the file differs, and the batch program says the same.
    QTest::keyClick(&window, Qt::Key_Y, Qt::ControlModifier);
    drive::settle();
    CHECK(marksOf(cellAt(window, id)) == newMarks);
    CHECK(window.bench().runs().store().count() == runsNow);
    QTest::keyClick(&window, Qt::Key_S, Qt::ControlModifier);
    drive::settle();
    CHECK_FALSE(window.bench().document().changed());
    const auto after = linesOf(project);
    REQUIRE(after.size() == before.size());
    int different = 0;
    for (qsizetype i = 0; i < after.size(); ++i) {
        different += after[i] != before[i] ? 1 : 0;
    }
    CHECK(different == 1);
    compareWithBatch(window, id, batchVerdicts(project, bench.folder.filePath(QStringLiteral("out"))));
}
