// SPDX-License-Identifier: GPL-3.0-or-later
#include "hydraulics/chamber.h"

#include "base/ensure.h"
#include "hydraulics/messages.h"
#include "numerics/elementary.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>
#include <cstdint>

namespace headroom::hydraulics {

namespace {

using Rows = std::span<const std::pair<double, double>>;

std::int64_t rowNumber(std::size_t index) {
    return static_cast<std::int64_t>(index) + 1;
}

void checkRow(Rows rows, std::size_t i, const std::string& subject, Findings& findings) {
    const auto [level, area] = rows[i];
    if (!std::isfinite(level) || !std::isfinite(area)) {
        findings.push_back({.message = &chamberNotFinite,
                            .subject = subject,
                            .arguments = {{"row", rowNumber(i)}}});
        return;
    }
    if (!(area > 0.0)) {
        findings.push_back({.message = &chamberAreaNotPositive,
                            .subject = subject,
                            .arguments = {{"level", amount(Quantity::elevation, level)},
                                          {"area", amount(Quantity::area, area)}}});
    }
    if (i > 0 && level < rows[i - 1].first) {
        findings.push_back({.message = &chamberLevelsFall,
                            .subject = subject,
                            .arguments = {{"below", amount(Quantity::elevation, rows[i - 1].first)},
                                          {"level", amount(Quantity::elevation, level)},
                                          {"row", rowNumber(i)}}});
    }
    if (i > 1 && level == rows[i - 1].first && level == rows[i - 2].first
        && (i == 2 || level != rows[i - 3].first)) {
        findings.push_back({.message = &chamberLevelRepeated,
                            .subject = subject,
                            .arguments = {{"level", amount(Quantity::elevation, level)}}});
    }
}

Findings check(Rows rows, const std::string& subject) {
    Findings findings;
    if (rows.size() < 2) {
        findings.push_back({.message = &chamberTooFewRows,
                            .subject = subject,
                            .arguments = {{"rows", static_cast<std::int64_t>(rows.size())}}});
    }
    for (std::size_t i = 0; i < rows.size(); ++i) {
        checkRow(rows, i, subject, findings);
    }
    if (rows.size() >= 2 && rows.front().first >= rows.back().first) {
        findings.push_back(
            {.message = &chamberFloorAboveRim,
             .subject = subject,
             .arguments = {{"floor", amount(Quantity::elevation, rows.front().first)},
                           {"rim", amount(Quantity::elevation, rows.back().first)}}});
    }
    return findings;
}

} // namespace

Result<ChamberTable> ChamberTable::make(Rows rows, const std::string& subject) {
    if (Findings findings = check(rows, subject); !findings.empty()) {
        return findings;
    }
    ChamberTable table;
    double volume = 0.0;
    for (std::size_t i = 0; i < rows.size(); ++i) {
        if (i > 0) {
            volume +=
                0.5 * (rows[i].second + rows[i - 1].second) * (rows[i].first - rows[i - 1].first);
        }
        table.level_.push_back(rows[i].first);
        table.area_.push_back(rows[i].second);
        table.volume_.push_back(volume);
    }
    return table;
}

double ChamberTable::area_m2(double level_m) const {
    const auto above = std::upper_bound(level_.begin(), level_.end(), level_m);
    if (above == level_.begin()) {
        return area_.front();
    }
    if (above == level_.end()) {
        return area_.back();
    }
    const auto i = static_cast<std::size_t>(above - level_.begin()) - 1;
    const double slope = (area_[i + 1] - area_[i]) / (level_[i + 1] - level_[i]);
    return area_[i] + slope * (level_m - level_[i]);
}

double ChamberTable::volume_m3(double level_m) const {
    const auto above = std::upper_bound(level_.begin(), level_.end(), level_m);
    if (above == level_.begin()) {
        return area_.front() * (level_m - level_.front());
    }
    const auto i = static_cast<std::size_t>(above - level_.begin()) - 1;
    return volume_[i] + 0.5 * (area_[i] + area_m2(level_m)) * (level_m - level_[i]);
}

WaterSurface ChamberTable::surface(double volume_m3) const {
    const auto above = std::upper_bound(volume_.begin(), volume_.end(), volume_m3);
    if (above == volume_.begin()) {
        return {level_.front() + volume_m3 / area_.front(), area_.front()};
    }
    const auto i = static_cast<std::size_t>(above - volume_.begin()) - 1;
    const double part = volume_m3 - volume_[i];
    if (above == volume_.end()) {
        return {level_[i] + part / area_[i], area_[i]};
    }
    // part = A_i h + ½ s h²; the form without cancellation for either sign of s.
    const double slope = (area_[i + 1] - area_[i]) / (level_[i + 1] - level_[i]);
    const double area = numerics::sqrt(area_[i] * area_[i] + 2.0 * slope * part);
    return {level_[i] + 2.0 * part / (area_[i] + area), area};
}

ChamberBranch chamberBranch(const ChamberTable& table, const Throttle& throttle,
                            const ChamberStep& step) {
    ensure(step.step_s > 0.0, "a step takes time");
    const double half = 0.5 * step.step_s;
    const WaterSurface at = table.surface(step.volume_m3 + half * (step.flow_m3s + step.about_m3s));
    const double linear = half / at.area_m2;
    return {at.level_m - linear * step.about_m3s, linear, throttle};
}

} // namespace headroom::hydraulics
