// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/commands.h"

#include "base/ensure.h"

#include <QCoreApplication>
#include <array>

namespace headroom::desk {

namespace {

using Id = CommandId;
using Place = CommandPlace;

// clang-format off
constexpr std::array table{
    CommandInfo{Id::runDue, "run.due", "Run What Is Due", "Runs every cell that was not run for its present inputs, behind the window.", "Ctrl+Return; Ctrl+Enter"},
    CommandInfo{Id::runCell, "run.cell", "Run This Cell", "Runs the study and option in the hand.", "Ctrl+R"},
    CommandInfo{Id::cancelRuns, "run.cancel", "Cancel Runs", "Stops what runs and drops what waits; partial traces are kept.", "Ctrl+."},
    CommandInfo{Id::nextProblem, "board.next-problem", "Next Problem", "Goes to the next cell that is not held.", "N"},
    CommandInfo{Id::compare, "board.compare", "Compare or Stop Comparing", "Takes the cell in the hand into the comparison or out of it; Space on the Board, or Ctrl and a press on any cell.", ""},
    CommandInfo{Id::undo, "edit.undo", "Undo", "Takes the last change back; results of the earlier inputs return.", "Ctrl+Z"},
    CommandInfo{Id::redo, "edit.redo", "Redo", "Makes the change again.", "Ctrl+Y; Ctrl+Shift+Z"},
    CommandInfo{Id::open, "file.open", "Open Project…", "Opens a project file.", "Ctrl+O"},
    CommandInfo{Id::openDemo, "file.demo", "Open the Demo Plant", "Opens your own copy of the demo plant Dorvane.", ""},
    CommandInfo{Id::save, "file.save", "Save", "Writes the project into its file in one step.", "Ctrl+S"},
    CommandInfo{Id::saveAs, "file.save-as", "Save As…", "Writes the project into another file.", "Ctrl+Shift+S"},
    CommandInfo{Id::closeProject, "file.close", "Close Project", "Leaves the sheet empty.", "Ctrl+W"},
    CommandInfo{Id::openSlip, "edit.value", "Enter a Value", "Opens the slip at the thing chosen in the Section; or just type a digit, =, + or −.", ""},
    CommandInfo{Id::takeBack, "edit.take-back", "Take Back to the Base", "Returns the chosen value, or all values of the chosen thing, to the plant without the option.", "Ctrl+Backspace"},
    CommandInfo{Id::findValue, "find", "Find a Thing or Value", "Lists every value of the project by name.", "/; Ctrl+F"},
    CommandInfo{Id::searchCommands, "commands", "Command…", "Lists all commands with their keys.", "Ctrl+K"},
    CommandInfo{Id::findings, "view.findings", "Findings", "What is wrong or unusual, and how to mend it.", "Ctrl+Shift+F"},
    CommandInfo{Id::switchScheme, "view.scheme", "Light or Dark", "Changes between light and dark.", "Ctrl+\\"},
    CommandInfo{Id::sectionAlone, "view.section", "Section Alone", "Section and Ribbon fill the picture, or give room again.", "F11"},
    CommandInfo{Id::lanesAlone, "view.lanes", "Lanes Alone", "The Lanes fill the picture, or give room again.", "F12"},
    CommandInfo{Id::nextRegion, "view.next", "Next Region", "Moves the keyboard on: Section, Ribbon, Lanes, Board, Strip.", "F6"},
    CommandInfo{Id::previousRegion, "view.previous", "Previous Region", "Moves the keyboard back.", "Shift+F6"},
    CommandInfo{Id::stepForward, "cursor.forward", "Cursor One Instant On", "Moves the cursor by one recorded instant.", ".", Place::lanes},
    CommandInfo{Id::stepBack, "cursor.back", "Cursor One Instant Back", "Moves the cursor back by one recorded instant.", ",", Place::lanes},
    CommandInfo{Id::stepFarForward, "cursor.far-forward", "Cursor Ten Instants On", "Moves the cursor by ten recorded instants.", "Shift+.; >", Place::lanes},
    CommandInfo{Id::stepFarBack, "cursor.far-back", "Cursor Ten Instants Back", "Moves the cursor back by ten recorded instants.", "Shift+,; <", Place::lanes},
    CommandInfo{Id::allTime, "lanes.all-time", "All Time", "Shows the whole run in the Lanes.", "1", Place::lanes},
    CommandInfo{Id::upstream, "section.upstream", "Next Thing Upstream", "Chooses the next thing of the plant upstream.", "[", Place::section},
    CommandInfo{Id::downstream, "section.downstream", "Next Thing Downstream", "Chooses the next thing of the plant downstream.", "]", Place::section},
    CommandInfo{Id::fitSection, "section.fit", "Section in Three Scales", "Headrace, pressure side and units each to their own scale.", "Alt+1"},
    CommandInfo{Id::trueScale, "section.one-scale", "Section in One Scale", "All chainage to one scale.", "Alt+0"},
    CommandInfo{Id::describe, "help.describe", "Say What Is Shown", "Says in words what the part with the keyboard shows.", "F1"},
    CommandInfo{Id::largerText, "view.larger", "Larger", "Draws everything larger.", "Ctrl++; Ctrl+="},
    CommandInfo{Id::smallerText, "view.smaller", "Smaller", "Draws everything smaller.", "Ctrl+-"},
    CommandInfo{Id::quit, "quit", "Quit", "Closes the window; asks if something is not saved.", "Ctrl+Q"},
};
// clang-format on

} // namespace

std::span<const CommandInfo> commands() { return table; }

const CommandInfo& info(CommandId id) {
    const auto& row = table.at(static_cast<std::size_t>(id));
    ensure(row.id == id, "the rows of commands are in the order of the list");
    return row;
}

QList<QKeySequence> keysOf(CommandId id) {
    // A command without keys has none, not an empty one.
    const auto keys = QString::fromLatin1(info(id).keys);
    return keys.isEmpty() ? QList<QKeySequence>() : QKeySequence::listFromString(keys);
}

QString keyWords(CommandId id) {
    const auto keys = keysOf(id);
    return keys.isEmpty() ? QString() : keys.front().toString(QKeySequence::NativeText);
}

QString tooltip(CommandId id) {
    const auto& row = info(id);
    auto words = QCoreApplication::translate("desk", row.help);
    const auto keys = keyWords(id);
    return keys.isEmpty() ? words : QStringLiteral("%1 (%2)").arg(words, keys);
}

} // namespace headroom::desk
