// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/document.h"
#include "desk/messages.h"
#include "driver.h"
#include "units/text.h"

#include <QFile>

using namespace headroom;
using namespace headroom::desk;

namespace {

const plant::Path diameter{"plant", "chambers", "Surge shaft", "shape", "throttled", "diameter_m"};

plant::Tree withDiameter(const Document& document, double value) {
    return plant::edited(document.tree(), -1, diameter, plant::Tree::number(value));
}

QByteArray bytesOf(const QString& file) {
    QFile in(file);
    in.open(QIODevice::ReadOnly);
    return in.readAll();
}

} // namespace

TEST_CASE("Document: an edit is one step, and undo brings the same value back", "[desk][invariant]") {
    application();
    drive::Bench bench;
    Document document;
    document.openFile(bench.demo().toStdString());
    REQUIRE(document.snapshot()->bound->usable());
    const auto before = document.tree();
    document.edit(QStringLiteral("wider"), withDiameter(document, 10));
    CHECK(document.changed());
    CHECK(document.undo().count() == 1);
    document.edit(QStringLiteral("the same"), withDiameter(document, 10));
    CHECK(document.undo().count() == 1); // nothing changed: no step
    document.undo().undo();
    CHECK(document.tree().sameAs(before));
    CHECK_FALSE(document.changed());
}

TEST_CASE("Document: steps of one gesture are one, and can be taken back together",
          "[desk][invariant]") {
    application();
    drive::Bench bench;
    Document document;
    document.openFile(bench.demo().toStdString());
    const auto before = document.tree();
    const int gesture = document.newGesture();
    for (const double value : {8.5, 9.0, 9.5}) {
        document.edit(QStringLiteral("drag"), withDiameter(document, value), gesture);
    }
    CHECK(document.undo().count() == 1);
    document.edit(QStringLiteral("other"), withDiameter(document, 12), document.newGesture());
    CHECK(document.undo().count() == 2);
    document.undo().undo();
    CHECK(document.tree().at(diameter)->asNumber() == 9.5);
    document.undoGesture(gesture);
    CHECK(document.tree() == before);
}

TEST_CASE("Document: unchanged variants are shared by the next snapshot", "[desk][invariant]") {
    application();
    drive::Bench bench;
    Document document;
    document.openFile(bench.demo().toStdString());
    const auto before = document.snapshot();
    const auto next = plant::edited(document.tree(), 0, diameter, plant::Tree::number(9));
    document.edit(QStringLiteral("option only"), next);
    const auto& after = *document.snapshot();
    CHECK(after.variants[0] == before->variants[0]);
    CHECK(after.variants[1] != before->variants[1]);
    CHECK(after.variants[2] == before->variants[2]);
}

TEST_CASE("Document: what was opened is saved byte for byte", "[desk][files]") {
    application();
    drive::Bench bench;
    const auto file = bench.demo();
    const auto before = bytesOf(file);
    Document document;
    document.openFile(file.toStdString());
    REQUIRE(document.save());
    CHECK(bytesOf(file) == before);
}

TEST_CASE("Document: a file that cannot be read is shown empty and never written over",
          "[desk][files]") {
    application();
    drive::Bench bench;
    const auto file = bench.file(QStringLiteral("broken.headroom.json"), "{\"headroom\": 1, ");
    Document document;
    document.openFile(file.toStdString());
    CHECK(anyError(document.findings()));
    CHECK_FALSE(document.save());
    CHECK(document.findings().front().message == &say::notOverwritten);
    CHECK(bytesOf(file) == "{\"headroom\": 1, ");
}

TEST_CASE("Document: a folder that cannot be written gives a finding, not a box", "[desk][files]") {
    application();
    drive::Bench bench;
    Document document;
    document.openFile(bench.demo().toStdString());
    CHECK_FALSE(document.saveAs(bench.folder.filePath(QStringLiteral("missing/deep/x.headroom.json")).toStdString()));
    CHECK(anyError(document.findings()));
}

TEST_CASE("desk: every message of the window renders", "[desk][messages]") {
    for (const auto* message : messages()) {
        Finding finding{.message = message};
        finding.arguments = {{"file", std::string("a.json")}, {"what", std::string("w")},
                             {"folder", std::string("f")}, {"reason", std::string("r")}};
        CHECK_FALSE(text(finding).empty());
    }
}
