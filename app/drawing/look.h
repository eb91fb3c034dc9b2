// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <QColor>
#include <QFont>
#include <QPen>
#include <QString>
#include <QVector>

#include <array>

/// The only place of colours, pens, fonts and spacings. Everything that paints asks here; a test
/// greps for literal colours elsewhere and measures contrast and colour-vision distance.
namespace headroom::drawing {

enum class Scheme { light, dark, print };

/// The nine shapes of a cell or a limit. The shape says it; the tint only helps.
enum class MarkState {
    held,
    tight,
    broken,
    undecided,
    notValid,
    notRun,
    outdated,
    running,
    notApplicable,
};
inline constexpr int markStateCount = 9;

inline constexpr int runColourCount = 6;

enum class TextSize { small, body, heading, sentence };
enum class TextWeight { normal, strong };

/// Distances in logical pixels at scale 1. Section, Ribbon and Lanes share the left margin.
struct Spacing {
    double leftMargin = 52;  ///< axis labels of Section, Ribbon and Lanes stand in it
    double rightMargin = 10; ///< of Section and Ribbon
    double laneGutter = 96;  ///< right of the Lanes: names and cursor values
    double unit = 4;         ///< all other gaps are multiples of it
    double row = 34;         ///< of the Board: a share over a letter
    double bar = 40;         ///< of the Headroom strip, with its text
    double mark = 20;        ///< side of a mark in Board and Strip
    double sentenceMark = 28;
    double target = 28;       ///< least side of something to press
    double textureStep = 6;   ///< between the lines of a texture
    double textureDepth = 14; ///< a texture reaches this far outward from its bound
    double corner = 4;        ///< radius of frames
};

/// Widths of pens in logical pixels at scale 1.
struct Widths {
    double hair = 1.0;   ///< grid, texture, leader
    double data = 1.4;   ///< a compared run
    double inHand = 2.0; ///< the run in the hand, the head line
    double selected = 2.25;
    double lining = 7.5; ///< a conduit's lining, water of `water` on top
    double water = 4.5;
    double focus = 3.0;
};

struct Look {
    Scheme scheme = Scheme::light;
    double scale = 1.0;

    // Grounds, and what is written on them.
    QColor sheet, titleBlock, lane; ///< drawing sheet; block at the right; ground of a lane
    QColor text, muted;             ///< ≥ 4.5:1 on each ground
    QColor line;                    ///< hair lines, frames, grid (decoration)
    QColor track;                   ///< empty part of a bar (decoration)
    QColor accent, onAccent;        ///< main button, option in the hand, cursor; text on it
    QColor selection;               ///< fill behind what is selected
    QColor focus;                   ///< ring of the keyboard
    QColor amber;                   ///< a change not yet accepted

    // The plant.
    QColor rock, rockEdge, lining, water, waterEdge, lake; ///< `lake`: the pale first reservoir
    QColor headLine, envelope, envelopeFill;
    QColor limit, limitFill; ///< bound and texture lines; fill behind the texture
    QColor ribbon, ribbonEdge;

    std::array<QColor, runColourCount> runs;
    std::array<QVector<qreal>, runColourCount> dashes; ///< in pen widths; used in print only
    std::array<QColor, markStateCount> marks;

    Spacing space; ///< scaled
    Widths width;  ///< scaled

    const QColor& mark(MarkState state) const { return marks[static_cast<std::size_t>(state)]; }
    /// Pen of a compared run, 0: the one in the hand. Dashed in print only.
    QPen runPen(int run) const;
    QPen pen(const QColor& colour, double width) const; ///< `width` as in `Widths`, scaled already
    QPen hairPen(const QColor& colour) const { return pen(colour, width.hair); }
    QFont font(TextSize size, TextWeight weight = TextWeight::normal) const;
    /// Height of a line of text in logical pixels.
    double lineHeight(TextSize size) const;
};

/// The look of a scheme at a user's scale (0.8 … 2). References stay valid; main thread only.
const Look& look(Scheme scheme, double scale = 1.0);

/// Loads the program's font once and returns its family; the system's sans if it is not there.
const QString& fontFamily();

/// Relative luminance contrast of two colours, 1 … 21 (WCAG 2.1).
double contrast(const QColor& a, const QColor& b);

enum class Vision { normal, protan, deutan, tritan };
/// The colour as seen with a colour-vision deficiency.
QColor seenWith(Vision vision, const QColor& colour);
/// CIE76 distance in CIELAB (D65).
double colourDistance(const QColor& a, const QColor& b);

} // namespace headroom::drawing
