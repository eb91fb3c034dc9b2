// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/traces_writer.h"

#include "files/csv_writer.h"
#include "limits/place.h"

#include <fmt/format.h>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <limits>

namespace headroom::files {

namespace {

using results::Channel;
using results::Trace;

/// The number with the fewest digits that reads back as this single-precision value, so that a
/// file does not show digits that were never stored.
double fewestDigits(float value) {
    if (!std::isfinite(value)) {
        return std::numeric_limits<double>::quiet_NaN();
    }
    char digits[32];
    const auto end = std::to_chars(digits, digits + sizeof digits, value).ptr;
    double parsed = 0.0;
    std::from_chars(digits, end, parsed);
    return parsed;
}

/// Least, greatest and last value of each row of the file.
struct Column {
    std::vector<float> low, high, last;
};

Column gathered(const Trace& trace, std::size_t together) {
    Column column;
    for (std::size_t i = 0; i < trace.last.size(); i += together) {
        const std::size_t from = i == 0 ? 0 : i - together + 1;
        const auto begin = static_cast<std::ptrdiff_t>(from);
        const auto end = static_cast<std::ptrdiff_t>(i + 1);
        column.low.push_back(*std::min_element(trace.low.begin() + begin, trace.low.begin() + end));
        column.high.push_back(
            *std::max_element(trace.high.begin() + begin, trace.high.begin() + end));
        column.last.push_back(trace.last[i]);
    }
    return column;
}

/// Whether the least or greatest of some row lies visibly beyond the values at its ends.
bool rings(const Column& column) {
    const auto [least, greatest] = std::minmax_element(column.last.begin(), column.last.end());
    const float visible = 1e-3F * (*greatest - *least); // of the whole range of the trace
    for (std::size_t i = 1; i < column.last.size(); ++i) {
        const float low = std::min(column.last[i - 1], column.last[i]);
        const float high = std::max(column.last[i - 1], column.last[i]);
        if (column.low[i] < low - visible || column.high[i] > high + visible) {
            return true;
        }
    }
    return false;
}

} // namespace

std::string writeTraces(const results::Run& run, const plant::Plant& plant, int mostRows) {
    std::vector<CsvWriter::Column> columns{{"time", Quantity::time}};
    std::vector<std::vector<float>> values;
    std::size_t together = 1;
    for (const Channel& channel : run.channels) {
        if (channel.trace.last.empty()) {
            continue;
        }
        const auto rows = static_cast<std::size_t>(std::max(1, mostRows - 1));
        together = std::max<std::size_t>(1, (channel.trace.last.size() - 1 + rows - 1) / rows);
        auto column = gathered(channel.trace, together);
        const auto& measure = info(channel.measure);
        const auto name =
            fmt::format("{}, {}", limits::nameOf(channel.place, plant), measure.label);
        const auto add = [&](const std::string& title, std::vector<float>& numbers) {
            columns.push_back({title, measure.quantity});
            values.push_back(std::move(numbers));
        };
        const bool ringing = rings(column);
        add(name, column.last);
        if (ringing) {
            add(fmt::format("{}, least", name), column.low);
            add(fmt::format("{}, greatest", name), column.high);
        }
    }
    CsvWriter writer(std::move(columns));
    const std::size_t rows = values.empty() ? 0 : values.front().size();
    std::vector<double> row(values.size() + 1);
    for (std::size_t i = 0; i < rows; ++i) {
        row[0] = static_cast<double>(i * together) * run.recordInterval_s;
        for (std::size_t c = 0; c < values.size(); ++c) {
            row[c + 1] = fewestDigits(values[c][i]);
        }
        writer.row(row);
    }
    return writer.text();
}

} // namespace headroom::files
