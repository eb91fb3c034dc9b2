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

/// Whether the least or greatest of some interval lies visibly beyond the values at its ends.
bool rings(const Trace& trace) {
    const auto [least, greatest] = std::minmax_element(trace.last.begin(), trace.last.end());
    const float visible = 1e-3F * (*greatest - *least); // of the whole range of the trace
    for (std::size_t i = 1; i < trace.last.size(); ++i) {
        const float low = std::min(trace.last[i - 1], trace.last[i]);
        const float high = std::max(trace.last[i - 1], trace.last[i]);
        if (trace.low[i] < low - visible || trace.high[i] > high + visible) {
            return true;
        }
    }
    return false;
}

} // namespace

std::string writeTraces(const results::Run& run, const plant::Plant& plant) {
    std::vector<CsvWriter::Column> columns{{"time", Quantity::time}};
    std::vector<const std::vector<float>*> shown;
    for (const Channel& channel : run.channels) {
        if (channel.trace.last.empty()) {
            continue;
        }
        const auto& measure = info(channel.measure);
        const auto name =
            fmt::format("{}, {}", limits::nameOf(channel.place, plant), measure.label);
        const auto add = [&](const std::string& title, const std::vector<float>& values) {
            columns.push_back({title, measure.quantity});
            shown.push_back(&values);
        };
        add(name, channel.trace.last);
        if (rings(channel.trace)) {
            add(name + ", least", channel.trace.low);
            add(name + ", greatest", channel.trace.high);
        }
    }
    CsvWriter writer(std::move(columns));
    const std::size_t instants = shown.empty() ? 0 : shown.front()->size();
    std::vector<double> row(shown.size() + 1);
    for (std::size_t i = 0; i < instants; ++i) {
        row[0] = static_cast<double>(i) * run.recordInterval_s;
        for (std::size_t c = 0; c < shown.size(); ++c) {
            row[c + 1] = fewestDigits((*shown[c])[i]);
        }
        writer.row(row);
    }
    return writer.text();
}

} // namespace headroom::files
