// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <QKeySequence>
#include <QString>
#include <span>

class QAction;

/// Every command of the window, once: what it is called, what it does, its keys and where they act.
/// Shortcuts, the search, tooltips and the list of keys come from this table.
namespace headroom::desk {

enum class CommandId {
    runDue, runCell, cancelRuns, nextProblem, compare,
    undo, redo, open, openDemo, save, saveAs, closeProject,
    openSlip, takeBack, findValue, searchCommands,
    findings, switchScheme, sectionAlone, lanesAlone, nextRegion, previousRegion,
    stepForward, stepBack, stepFarForward, stepFarBack, allTime,
    upstream, downstream, fitSection, trueScale, describe, largerText, smallerText, quit,
};

/// Where the keys of a command act.
enum class CommandPlace { window, section, lanes };

struct CommandInfo {
    CommandId id;
    const char* name;  ///< stable, for tests and settings
    const char* text;  ///< title
    const char* help;  ///< one sentence
    const char* keys;  ///< portable text, several with "; "
    CommandPlace place = CommandPlace::window;
};

std::span<const CommandInfo> commands();
const CommandInfo& info(CommandId id);
QList<QKeySequence> keysOf(CommandId id);
/// "Ctrl+Return", the first of its keys as this system writes it; empty if it has none.
QString keyWords(CommandId id);
/// Text, help and keys in one tooltip.
QString tooltip(CommandId id);

} // namespace headroom::desk
