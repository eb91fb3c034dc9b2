// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "units/quantity.h"

#include <string>
#include <string_view>
#include <vector>

namespace headroom::files {

/// Writes a table as CSV by RFC 4180: a first line of names with their units in brackets, lines
/// ended by CR LF, cells with comma, quote or line end in quotes. Numbers are given in SI and
/// written in the file's unit of their quantity, shortest exact, with a decimal point.
class CsvWriter {
public:
    struct Column {
        std::string name;
        Quantity quantity;
    };
    explicit CsvWriter(std::vector<Column> columns);

    /// One number a column, in SI; NaN leaves the cell empty.
    void row(const std::vector<double>& si);
    const std::string& text() const { return text_; }

private:
    std::vector<Column> columns_;
    std::string text_;
};

/// A cell with quotes where RFC 4180 asks for them.
std::string csvCell(std::string_view text);
/// "level [m]"
std::string csvHeading(std::string_view name, Quantity quantity);

} // namespace headroom::files
