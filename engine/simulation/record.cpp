// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/record.h"

#include <algorithm>
#include <limits>
#include <utility>

namespace headroom::simulation {
namespace {

constexpr std::size_t block = 32;

} // namespace

Record::Record(const Plan& plan, const hydraulics::SweepLoops& loops) : plan_(plan), loops_(loops) {
    if (plan.traces) {
        const auto instants = static_cast<std::size_t>(plan.steps / plan.every) + 1;
        low_.assign(plan.channels, std::numeric_limits<double>::infinity());
        high_.assign(plan.channels, -std::numeric_limits<double>::infinity());
        for (auto* part : {&blockLow_, &blockHigh_, &blockLast_}) {
            part->resize(block * plan.channels);
        }
        traces_.resize(plan.channels);
        for (results::Trace& trace : traces_) {
            trace.low.reserve(instants);
            trace.high.reserve(instants);
            trace.last.reserve(instants);
        }
    }
    if (plan.lines) {
        lines_.resize((static_cast<std::size_t>(plan.steps / plan.lineEvery) + 1) * plan.stations);
    }
}

void Record::take(std::int64_t n, const double* row) {
    if (plan_.traces) {
        loops_.widen(row, low_.data(), high_.data(), plan_.channels);
        if (n % plan_.every == 0) {
            store(row);
        }
    }
    if (plan_.lines && n % plan_.lineEvery == 0) {
        const double* heads = row + plan_.channels;
        float* out = lines_.data() + lineCount_ * plan_.stations;
        for (std::size_t i = 0; i < plan_.stations; ++i) {
            out[i] = static_cast<float>(heads[i]);
        }
        ++lineCount_;
    }
}

void Record::store(const double* row) {
    const std::size_t from = inBlock_ * plan_.channels;
    for (std::size_t i = 0; i < plan_.channels; ++i) {
        blockLow_[from + i] = static_cast<float>(low_[i]);
        blockHigh_[from + i] = static_cast<float>(high_[i]);
        blockLast_[from + i] = static_cast<float>(row[i]);
        low_[i] = high_[i] = row[i]; // an interval includes both its ends
    }
    if (++inBlock_ == block) {
        flush();
    }
}

void Record::flush() {
    for (std::size_t i = 0; i < plan_.channels; ++i) {
        results::Trace& trace = traces_[i];
        for (std::size_t k = 0; k < inBlock_; ++k) {
            trace.low.push_back(blockLow_[k * plan_.channels + i]);
            trace.high.push_back(blockHigh_[k * plan_.channels + i]);
            trace.last.push_back(blockLast_[k * plan_.channels + i]);
        }
    }
    inBlock_ = 0;
}

void Record::finish() {
    flush();
}

results::Trace Record::trace(std::size_t channel) {
    return plan_.traces ? std::move(traces_[channel]) : results::Trace{};
}

std::vector<float> Record::line(std::size_t first, std::size_t count) const {
    std::vector<float> out;
    if (!plan_.lines) {
        return out;
    }
    out.reserve(lineCount_ * count);
    for (std::size_t k = 0; k < lineCount_; ++k) {
        const float* row = lines_.data() + k * plan_.stations + first;
        out.insert(out.end(), row, row + count);
    }
    return out;
}

} // namespace headroom::simulation
