// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::batch {

inline constexpr Message unknownOption{
    "batch.unknown-option", Severity::error, "The project has no option \"{name}\".",
    "Name one of: {known}."};
inline constexpr Message unknownOptionNear{
    "batch.unknown-option-near", Severity::error, "The project has no option \"{name}\".",
    "The nearest is \"{near}\"."};
inline constexpr Message unknownStudy{
    "batch.unknown-study", Severity::error, "The project has no study \"{name}\".",
    "Name one of: {known}."};
inline constexpr Message unknownStudyNear{
    "batch.unknown-study-near", Severity::error, "The project has no study \"{name}\".",
    "The nearest is \"{near}\"."};
inline constexpr Message badPart{
    "batch.bad-part", Severity::error, "\"{part}\" is no part of the matrix.",
    "Write it as i/n with 1 <= i <= n, for example 2/4."};
inline constexpr Message noStudy{
    "batch.no-study", Severity::error, "The project has no study to run.",
    "Add one under \"studies\"."};
inline constexpr Message noOutput{
    "batch.no-output", Severity::error, "Nothing says where the results go.",
    "Give --out with a folder, or --json."};
inline constexpr Message folderNotMade{
    "batch.folder-not-made", Severity::error, "The folder \"{folder}\" cannot be made: {reason}.",
    "Choose another folder, or check the permissions."};

/// Every message of the batch program.
std::span<const Message* const> messages();

} // namespace headroom::batch
