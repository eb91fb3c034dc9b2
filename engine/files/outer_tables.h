// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/project.h"

#include <cstdint>
#include <filesystem>
#include <memory>
#include <string>

namespace headroom::files {

inline constexpr std::int64_t longestOuterTable = 2'000'000;

/// A table of numbers from a CSV file (RFC 4180): an optional first line of names, then rows of
/// `columns` numbers with a decimal point. Reading stops at the first fault.
struct CsvTable {
    std::shared_ptr<const plant::OuterTable> table; ///< nullptr: see the findings
    Findings findings;
};
/// @param name as the project writes it, for findings
CsvTable readCsvTable(const std::filesystem::path& file, const std::string& name, int columns);

/// Reads every table that a project keeps in a CSV file and hangs it on the object that names it.
/// A file that, links resolved, does not lie under `folder` is refused.
plant::Tree withOuterTables(const plant::Tree& project, const std::filesystem::path& folder,
                            const plant::Places& places, Findings& findings);

} // namespace headroom::files
