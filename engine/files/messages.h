// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

/// What can be wrong with a file before it is looked at as a project.
namespace headroom::files {

std::span<const Message* const> messages();

namespace say {

inline constexpr Message notFound{"files.not-found", Severity::error, "There is no file “{file}”.",
                                  "Check the name and the folder."};
inline constexpr Message notReadable{"files.not-readable", Severity::error,
                                     "The file “{file}” cannot be read: {reason}.",
                                     "Check the permissions of the file and its folder."};
inline constexpr Message tooLarge{"files.too-large", Severity::error,
                                  "The file has {size} megabytes; at most {most} are read.",
                                  "Put long tables in CSV files beside the project."};
inline constexpr Message truncated{
    "files.truncated", Severity::error, "The file ends before it is complete.",
    "Use an earlier copy, or close the open braces and brackets at its end."};
inline constexpr Message notJson{
    "files.not-json", Severity::error, "Here the file does not follow the rules of JSON: {found}.",
    "Look for a missing comma, quote or brace just before this place."};
inline constexpr Message notUtf8{"files.not-utf8", Severity::error,
                                 "The file is not written in UTF-8.",
                                 "Save it as UTF-8 without a byte order mark."};
inline constexpr Message byteOrderMark{
    "files.byte-order-mark", Severity::note,
    "The file begins with a byte order mark; it is left out at the next save.", ""};
inline constexpr Message notANumber{"files.not-a-number", Severity::error,
                                    "“{found}” is not a number that a file may hold.",
                                    "Give a number, or remove the key."};
inline constexpr Message numberTooLarge{"files.number-too-large", Severity::error,
                                        "The number “{found}” is too large to be computed with.",
                                        "Check its digits and its exponent."};
inline constexpr Message duplicateKey{
    "files.duplicate-key", Severity::error,
    "The key “{key}” stands twice in one object, first in line {line}.", "Keep one of the two."};
inline constexpr Message tooDeep{"files.too-deep", Severity::error,
                                 "Objects and lists stand more than {most} deep inside each other.",
                                 "Check for braces or brackets that were never closed."};
inline constexpr Message tableTooLong{
    "files.table-too-long", Severity::error, "This list has more than {most} rows.",
    "Put it in a CSV beside the file and name that file under “csv”."};
inline constexpr Message notAProject{"files.not-a-project", Severity::error,
                                     "The file holds {found}, not a project.",
                                     "Open a file whose first key is “headroom”."};
inline constexpr Message newerFormat{
    "files.newer-format", Severity::error,
    "The file has format {found}; this program reads formats up to {known}.",
    "Use a newer version of the program, or save the project in the older format there."};
inline constexpr Message migrated{"files.migrated", Severity::note,
                                  "The file had format {from} and was read as format {to}: {what}",
                                  ""};

inline constexpr Message tableOutside{
    "files.table-outside", Severity::error, "The table “{file}” lies outside the project's folder.",
    "Copy it into the folder of the project and name it by a path inside it."};
inline constexpr Message tableNotFound{"files.table-not-found", Severity::error,
                                       "The table “{file}” is not in the project's folder.",
                                       "Put the file there, or correct its name."};
inline constexpr Message tableNotReadable{"files.table-not-readable", Severity::error,
                                          "The table “{file}” cannot be read: {reason}.",
                                          "Check the permissions of the file."};
inline constexpr Message tableRow{
    "files.table-row", Severity::error, "Line {line} of “{file}” does not hold {columns} numbers.",
    "Write the numbers of each row with a point as decimal sign and a comma between them."};
inline constexpr Message tableHuge{
    "files.table-huge", Severity::error, "The table “{file}” has more than {most} rows.",
    "Leave out rows that a straight line between their neighbours would give."};

inline constexpr Message notWritten{
    "files.not-written", Severity::error,
    "The file “{file}” was not written: {reason}. What was there before is unchanged.",
    "Choose another folder, or make room and check the permissions."};
inline constexpr Message notReplaced{
    "files.not-replaced", Severity::error,
    "The folder does not let “{file}” be replaced: {reason}. What was there before is unchanged.",
    "Save to another folder, or write the file directly."};

} // namespace say
} // namespace headroom::files
