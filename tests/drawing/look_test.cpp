// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/look.h"
#include "support/catch.h"

#include <QFontDatabase>
#include <QFontInfo>
#include <QFontMetricsF>

#include <cmath>
#include <filesystem>
#include <fstream>
#include <regex>
#include <set>

#include "sample.h"

using namespace headroom::drawing;

namespace {

// Thresholds: WCAG 2.1, 1.4.3 (text) and 1.4.11 (graphical objects).
constexpr double forText = 4.5, forMarks = 3.0;
/// Least CIE76 distance of runs and of marks under any vision; common practice, no source: about
/// ten times the distance two patches side by side can be told apart at.
constexpr double runsApart = 34.0, marksApart = 28.0;

const Scheme schemes[] = {Scheme::light, Scheme::dark, Scheme::print};
const Vision visions[] = {Vision::normal, Vision::protan, Vision::deutan, Vision::tritan};

double leastApart(const std::vector<QColor>& colours) {
    double least = 1e9;
    for (const Vision vision : visions) {
        for (std::size_t i = 0; i < colours.size(); ++i) {
            for (std::size_t j = i + 1; j < colours.size(); ++j) {
                least = std::min(least, colourDistance(seenWith(vision, colours[i]),
                                                       seenWith(vision, colours[j])));
            }
        }
    }
    return least;
}

std::vector<QColor> markColours(const Look& the) {
    return {the.mark(MarkState::held), the.mark(MarkState::tight), the.mark(MarkState::broken),
            the.mark(MarkState::undecided), the.mark(MarkState::notRun)};
}

} // namespace

TEST_CASE("Look: measures of colour agree with known values", "[drawing][analytic]") {
    // Black against white is 21:1 by the definition of WCAG 2.1.
    CHECK_THAT(contrast(QColor(0, 0, 0), QColor(255, 255, 255)), WithinAbs(21.0, 1e-4));
    // White has L* = 100, black 0, by the definition of CIELAB.
    CHECK_THAT(colourDistance(QColor(0, 0, 0), QColor(255, 255, 255)), WithinAbs(100.0, 0.02));
    // Grey has no hue to lose: every dichromat sees it as it is.
    for (const Vision vision : visions) {
        CHECK(colourDistance(seenWith(vision, QColor(120, 120, 120)), QColor(120, 120, 120)) < 0.5);
    }
}

TEST_CASE("Look: text is readable on every ground it stands on", "[drawing][invariant]") {
    for (const Scheme scheme : schemes) {
        const Look the = look(scheme);
        for (const QColor& ground :
             {the.sheet, the.titleBlock, the.lane, the.selection, the.rock, the.water}) {
            CAPTURE(static_cast<int>(scheme), ground.name().toStdString());
            CHECK(contrast(the.text, ground) >= forText);
            CHECK(contrast(the.muted, ground) >= forText);
        }
        CHECK(contrast(the.onAccent, the.accent) >= forText);
        CHECK(contrast(the.accent, the.titleBlock) >= forText); // name of the option in the hand
        CHECK(contrast(the.accent, the.sheet) >= forText);
    }
}

TEST_CASE("Look: marks, runs and lines stand out from their grounds", "[drawing][invariant]") {
    for (const Scheme scheme : schemes) {
        const Look the = look(scheme);
        for (const QColor& ground : {the.sheet, the.titleBlock, the.selection}) {
            for (const QColor& mark : markColours(the)) {
                CAPTURE(static_cast<int>(scheme), ground.name().toStdString(),
                        mark.name().toStdString());
                CHECK(contrast(mark, ground) >= forMarks);
            }
        }
        for (const QColor& ground : {the.sheet, the.lane}) {
            for (const QColor& run : the.runs) {
                CAPTURE(static_cast<int>(scheme), ground.name().toStdString(),
                        run.name().toStdString());
                CHECK(contrast(run, ground) >= forMarks);
            }
        }
        for (const QColor& line : {the.headLine, the.envelope, the.limit, the.lining, the.waterEdge,
                                   the.rockEdge, the.ribbonEdge, the.focus, the.amber}) {
            CAPTURE(static_cast<int>(scheme), line.name().toStdString());
            CHECK(contrast(line, the.sheet) >= forMarks);
        }
        for (const QColor& line : {the.headLine, the.limit, the.lining, the.accent}) {
            CAPTURE(static_cast<int>(scheme), line.name().toStdString());
            CHECK(contrast(line, the.rock) >= forMarks);
        }
    }
}

TEST_CASE("Look: rock is told from the sheet in the dark as well", "[drawing][invariant]") {
    CHECK(contrast(look(Scheme::dark).rock, look(Scheme::dark).sheet) >= 1.5);
    CHECK(contrast(look(Scheme::light).rock, look(Scheme::light).sheet) >= 1.2);
}

TEST_CASE("Look: runs and marks stay apart for every vision", "[drawing][invariant]") {
    for (const Scheme scheme : schemes) {
        const Look the = look(scheme);
        CAPTURE(static_cast<int>(scheme));
        CHECK(leastApart({the.runs.begin(), the.runs.end()}) >= runsApart);
        CHECK(leastApart(markColours(the)) >= marksApart);
    }
}

TEST_CASE("Look: no mark is green and none is plain red", "[drawing][invariant]") {
    for (const Scheme scheme : schemes) {
        for (const QColor& mark : markColours(look(scheme))) {
            const int hue = mark.hsvHue();
            const bool vivid = mark.hsvSaturation() > 90;
            CAPTURE(mark.name().toStdString());
            CHECK_FALSE((vivid && hue > 75 && hue < 165));
        }
    }
}

TEST_CASE("Look: digits are of equal width and signs are in the font", "[drawing][invariant]") {
    test::startGui();
    for (const TextSize size :
         {TextSize::small, TextSize::body, TextSize::heading, TextSize::sentence}) {
        const QFontMetricsF metrics(look(Scheme::light).font(size));
        const double wide = metrics.horizontalAdvance(QLatin1Char('0'));
        for (char digit = '1'; digit <= '9'; ++digit) {
            CHECK_THAT(metrics.horizontalAdvance(QLatin1Char(digit)), WithinAbs(wide, 1e-9));
        }
        for (const char16_t sign : {u'\u2212', u'×', u'·', u'°', u'±', u'²'}) {
            CHECK(metrics.inFont(QChar(sign)));
        }
    }
    CHECK_FALSE(fontFamily().isEmpty());
}

TEST_CASE("Look: print has dashes for all runs but the one in the hand", "[drawing][invariant]") {
    const Look& paper = look(Scheme::print);
    CHECK(paper.runPen(0).style() == Qt::SolidLine);
    std::set<std::vector<qreal>> patterns;
    for (int run = 1; run < runColourCount; ++run) {
        const auto pen = paper.runPen(run);
        CHECK(pen.style() == Qt::CustomDashLine);
        const auto pattern = pen.dashPattern();
        patterns.insert({pattern.begin(), pattern.end()});
        CHECK(look(Scheme::light).runPen(run).style() == Qt::SolidLine);
    }
    CHECK(patterns.size() == runColourCount - 1);
}

TEST_CASE("Look: a scale scales every distance and is kept within reason", "[drawing][limit]") {
    const Look& one = look(Scheme::dark);
    const Look& two = look(Scheme::dark, 2.0);
    CHECK(&two == &look(Scheme::dark, 2.0));
    CHECK_THAT(two.space.leftMargin, WithinAbs(2 * one.space.leftMargin, 1e-12));
    CHECK_THAT(two.width.lining, WithinAbs(2 * one.width.lining, 1e-12));
    CHECK(look(Scheme::light, 1e9).scale <= 4.0);
    CHECK(look(Scheme::light, 0.0).scale >= 0.5);
    CHECK(look(Scheme::light, std::nan("")).scale == 1.0);
}

TEST_CASE("Look: colours are written in one place only", "[drawing][architecture]") {
    const std::filesystem::path app = std::filesystem::path(HEADROOM_SOURCE_DIR) / "app";
    const std::regex literal(
        R"(QColor\s*\(\s*(0x|\d|")|QColor\s*\{\s*(0x|\d|")|Qt::(red|green|blue|black|white|gray|grey|yellow|cyan|magenta|darkGray|lightGray)\b|qRgba?\(|#[0-9A-Fa-f]{6}\b|\brgba?\()");
    int files = 0;
    for (const auto& entry : std::filesystem::recursive_directory_iterator(app)) {
        const auto name = entry.path().filename().string();
        const auto kind = entry.path().extension().string();
        if ((kind != ".cpp" && kind != ".h") || name == "look_schemes.cpp") {
            continue;
        }
        ++files;
        std::ifstream source(entry.path());
        std::string line;
        for (int number = 1; std::getline(source, line); ++number) {
            INFO(entry.path().string() << ":" << number << ": " << line);
            CHECK_FALSE(std::regex_search(line, literal));
        }
    }
    CHECK(files > 20);
}
