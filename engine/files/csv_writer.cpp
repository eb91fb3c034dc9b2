// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/csv_writer.h"

#include "base/ensure.h"
#include "files/json_writer.h"

#include <cmath>

namespace headroom::files {

std::string csvCell(std::string_view text) {
    if (text.find_first_of(",\"\r\n") == std::string_view::npos) {
        return std::string(text);
    }
    std::string out = "\"";
    for (const char letter : text) {
        out += letter;
        if (letter == '"') {
            out += '"';
        }
    }
    return out + '"';
}

std::string csvHeading(std::string_view name, Quantity quantity) {
    const auto symbol = info(quantity).symbol;
    std::string heading(name);
    if (!symbol.empty()) {
        heading += " [";
        heading += symbol;
        heading += ']';
    }
    return heading;
}

CsvWriter::CsvWriter(std::vector<Column> columns) : columns_(std::move(columns)) {
    for (std::size_t i = 0; i < columns_.size(); ++i) {
        text_ += i > 0 ? "," : "";
        text_ += csvCell(csvHeading(columns_[i].name, columns_[i].quantity));
    }
    text_ += "\r\n";
}

void CsvWriter::row(const std::vector<double>& si) {
    ensure(si.size() == columns_.size(), "a row has a number for each column");
    for (std::size_t i = 0; i < si.size(); ++i) {
        text_ += i > 0 ? "," : "";
        if (std::isfinite(si[i])) {
            text_ += shortest(fromSi(columns_[i].quantity, si[i]));
        }
    }
    text_ += "\r\n";
}

} // namespace headroom::files
