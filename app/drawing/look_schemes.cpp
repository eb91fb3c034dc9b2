// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/look_schemes.h"

namespace headroom::drawing {

namespace {

/// Dashes of the runs, in pen widths; the one in the hand is solid.
void setDashes(Look& look) {
    look.dashes = {QVector<qreal>{}, {9, 3}, {3, 2}, {9, 3, 2, 3}, {5, 3}, {1.5, 2.5}};
}

Look light() {
    Look look;
    look.scheme = Scheme::light;
    look.sheet = QColor(0xFAF8F3);
    look.titleBlock = QColor(0xF3F0E7);
    look.lane = QColor(0xFDFCF9);
    look.text = QColor(0x1C2126);
    look.muted = QColor(0x565C63);
    look.line = QColor(0xD6D0C2);
    look.track = QColor(0xE4DFD3);
    look.accent = QColor(0x3A4FD0);
    look.onAccent = QColor(0xFFFFFF);
    look.selection = QColor(0xEAE8F1);
    look.focus = QColor(0x3A4FD0);
    look.amber = QColor(0x9A5B00);
    look.rock = QColor(0xE7E0D3);
    look.rockEdge = QColor(0x8A8172);
    look.lining = QColor(0x6D665B);
    look.water = QColor(0xCFE3EA);
    look.waterEdge = QColor(0x2B6F8A);
    look.lake = QColor(0xE4EEF1);
    look.headLine = QColor(0x16233A);
    look.envelope = QColor(0x727D8A);
    look.envelopeFill = QColor(0x7C, 0x87, 0x94, 46);
    look.limit = QColor(0x701726);
    look.limitFill = QColor(0x70, 0x17, 0x26, 20);
    look.ribbon = QColor(0x2C, 0x4A, 0x7C, 51);
    look.ribbonEdge = QColor(0x2C4A7C);
    look.runs = {QColor(0x16233A), QColor(0xD84F0D), QColor(0x289AAA),
                 QColor(0x5E038B), QColor(0x974F42), QColor(0x7B4AFA)};
    const QColor held(0x24406F), tight(0xD95B09), broken(0x701726), undecided(0xA94CE8);
    const QColor none(0x72877F);
    look.marks = {held, tight, broken, undecided, none, none, none, none, none};
    setDashes(look);
    return look;
}

Look dark() {
    Look look;
    look.scheme = Scheme::dark;
    look.sheet = QColor(0x15191D);
    look.titleBlock = QColor(0x1C2127);
    look.lane = QColor(0x181C21);
    look.text = QColor(0xE9ECEF);
    look.muted = QColor(0xA7AFB8);
    look.line = QColor(0x363D45);
    look.track = QColor(0x2E353D);
    look.accent = QColor(0x9DB2FF);
    look.onAccent = QColor(0x15191D);
    look.selection = QColor(0x2A323C);
    look.focus = QColor(0x9DB2FF);
    look.amber = QColor(0xE6BC3C);
    look.rock = QColor(0x423B2F);
    look.rockEdge = QColor(0xB0A48E);
    look.lining = QColor(0xA69E91);
    look.water = QColor(0x1E4152);
    look.waterEdge = QColor(0x6CB7D0);
    look.lake = QColor(0x1D2F38);
    look.headLine = QColor(0xF2F5F8);
    look.envelope = QColor(0xA7AFB8);
    look.envelopeFill = QColor(0xA7, 0xAF, 0xB8, 46);
    look.limit = QColor(0xE8607A);
    look.limitFill = QColor(0xE8, 0x60, 0x7A, 26);
    look.ribbon = QColor(0x5C, 0x94, 0xC8, 77);
    look.ribbonEdge = QColor(0x5C94C8);
    look.runs = {QColor(0xF2F5F8), QColor(0xC37002), QColor(0x54BEF1),
                 QColor(0xF51D80), QColor(0xF5C187), QColor(0x9860F8)};
    const QColor held(0x5C94C8), tight(0xE6BC3C), broken(0xE8607A), undecided(0x9F66FF);
    const QColor none(0xC4D2D6);
    look.marks = {held, tight, broken, undecided, none, none, none, none, none};
    setDashes(look);
    return look;
}

/// Paper: the light scheme on white.
Look print() {
    Look look = light();
    look.scheme = Scheme::print;
    look.sheet = look.titleBlock = look.lane = QColor(0xFFFFFF);
    look.rock = QColor(0xEFEAE0);
    return look;
}

} // namespace

Look colours(Scheme scheme) {
    switch (scheme) {
    case Scheme::light:
        return light();
    case Scheme::dark:
        return dark();
    case Scheme::print:
        return print();
    }
    return light();
}

} // namespace headroom::drawing
