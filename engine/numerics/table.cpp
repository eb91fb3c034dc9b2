// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/table.h"

#include "numerics/elementary.h"
#include "numerics/messages.h"
#include "numerics/roots.h"
#include "units/text.h"

#include <algorithm>
#include <cmath>

namespace headroom::numerics {

namespace {

std::size_t segmentOf(const std::vector<double>& x, double at) {
    const auto above = std::upper_bound(x.begin(), x.end(), at);
    const auto index = static_cast<std::size_t>(above - x.begin());
    return std::clamp<std::size_t>(index, 1, x.size() - 1) - 1;
}

Finding rowFinding(const Message& message, const std::string& subject, std::size_t row) {
    return {.message = &message,
            .subject = subject,
            .arguments = {{"row", static_cast<std::int64_t>(row + 1)}}};
}

Findings faults(const std::vector<double>& x, const std::vector<double>& y,
                const std::string& subject) {
    Findings found;
    if (x.size() < 2 || x.size() != y.size()) {
        found.push_back(
            {.message = &tableTooShort,
             .subject = subject,
             .arguments = {{"rows", static_cast<std::int64_t>(std::min(x.size(), y.size()))}}});
        return found;
    }
    for (std::size_t i = 0; i < x.size(); ++i) {
        if (!std::isfinite(x[i]) || !std::isfinite(y[i])) {
            found.push_back(rowFinding(tableNotFinite, subject, i));
        } else if (i > 0 && !(x[i] > x[i - 1])) {
            found.push_back(rowFinding(tableNotRising, subject, i));
        }
    }
    return found;
}

} // namespace

Result<Table> Table::make(std::vector<double> x, std::vector<double> y, Outside outside,
                          const std::string& subject) {
    Findings found = faults(x, y, subject);
    if (!found.empty()) {
        return found;
    }
    return Table(std::move(x), std::move(y), outside);
}

Result<Table> Table::make(std::span<const std::pair<double, double>> rows, Outside outside,
                          const std::string& subject) {
    std::vector<double> x, y;
    for (const auto& [left, right] : rows) {
        x.push_back(left);
        y.push_back(right);
    }
    return make(std::move(x), std::move(y), outside, subject);
}

Table::Table(std::vector<double> x, std::vector<double> y, Outside outside)
    : x_(std::move(x)), y_(std::move(y)), area_(x_.size(), 0.0), outside_(outside) {
    for (std::size_t i = 1; i < x_.size(); ++i) {
        area_[i] = area_[i - 1] + 0.5 * (y_[i - 1] + y_[i]) * (x_[i] - x_[i - 1]);
    }
}

std::size_t Table::segment(double x) const {
    ensure(outside_ == Outside::hold || covers(x), "the table covers what it is asked for");
    return segmentOf(x_, x);
}

double Table::value(double x) const {
    const std::size_t i = segment(x);
    if (!(x > x_.front())) {
        return y_.front();
    }
    if (x >= x_.back()) {
        return y_.back();
    }
    const double share = (x - x_[i]) / (x_[i + 1] - x_[i]);
    return y_[i] + share * (y_[i + 1] - y_[i]);
}

double Table::slope(double x) const {
    const std::size_t i = segment(x);
    if (x < x_.front() || x > x_.back()) {
        return 0.0;
    }
    return (y_[i + 1] - y_[i]) / (x_[i + 1] - x_[i]);
}

double Table::integralFromStart(double x) const {
    const std::size_t i = segment(x);
    if (x < x_.front()) {
        return (x - x_.front()) * y_.front();
    }
    if (x > x_.back()) {
        return area_.back() + (x - x_.back()) * y_.back();
    }
    return area_[i] + 0.5 * (y_[i] + value(x)) * (x - x_[i]);
}

double Table::integral(double from, double to) const {
    return integralFromStart(to) - integralFromStart(from);
}

bool Table::rising() const {
    return std::adjacent_find(y_.begin(), y_.end(), [](double a, double b) { return !(b > a); })
           == y_.end();
}

bool Table::falling() const {
    return std::adjacent_find(y_.begin(), y_.end(), [](double a, double b) { return !(b < a); })
           == y_.end();
}

std::optional<double> Table::inverse(double y) const {
    const bool up = rising();
    const double lowest = up ? y_.front() : y_.back();
    const double highest = up ? y_.back() : y_.front();
    if ((!up && !falling()) || !(y >= lowest && y <= highest)) {
        return std::nullopt;
    }
    std::size_t i = 0;
    while (i + 2 < y_.size() && (up ? y_[i + 1] < y : y_[i + 1] > y)) {
        ++i;
    }
    return x_[i] + (y - y_[i]) / (y_[i + 1] - y_[i]) * (x_[i + 1] - x_[i]);
}

Result<MonotoneCurve> MonotoneCurve::make(std::vector<double> x, std::vector<double> y,
                                          const std::string& subject) {
    Findings found = faults(x, y, subject);
    for (std::size_t i = 1; found.empty() && i < y.size(); ++i) {
        if (!(y[i] > y[i - 1])) {
            found.push_back(rowFinding(curveNotRising, subject, i));
        }
    }
    if (!found.empty()) {
        return found;
    }
    return MonotoneCurve(std::move(x), std::move(y));
}

MonotoneCurve::MonotoneCurve(std::vector<double> x, std::vector<double> y)
    : x_(std::move(x)), y_(std::move(y)), slope_(x_.size(), 0.0) {
    const std::size_t last = x_.size() - 1;
    std::vector<double> secant(last);
    for (std::size_t i = 0; i < last; ++i) {
        secant[i] = (y_[i + 1] - y_[i]) / (x_[i + 1] - x_[i]);
    }
    slope_.front() = secant.front();
    slope_.back() = secant.back();
    for (std::size_t i = 1; i < last; ++i) {
        // Weighted by the neighbouring widths, so that a straight line stays straight.
        const double left = x_[i] - x_[i - 1];
        const double right = x_[i + 1] - x_[i];
        slope_[i] = (secant[i - 1] * right + secant[i] * left) / (left + right);
    }
    constexpr double circle = 3.0; // within this circle a cubic piece is monotone
    for (std::size_t i = 0; i < last; ++i) {
        const double a = slope_[i] / secant[i];
        const double b = slope_[i + 1] / secant[i];
        const double radius = sqrt(a * a + b * b);
        if (radius > circle) {
            slope_[i] = circle / radius * a * secant[i];
            slope_[i + 1] = circle / radius * b * secant[i];
        }
    }
}

std::size_t MonotoneCurve::segment(double x) const {
    return segmentOf(x_, x);
}

double MonotoneCurve::value(double x) const {
    if (!(x > x_.front())) {
        return y_.front();
    }
    if (x >= x_.back()) {
        return y_.back();
    }
    const std::size_t i = segment(x);
    const double width = x_[i + 1] - x_[i];
    const double t = (x - x_[i]) / width;
    const double rise = y_[i + 1] - y_[i];
    const double bend0 = width * slope_[i] - rise;
    const double bend1 = rise - width * slope_[i + 1];
    return y_[i] + t * rise + t * (1.0 - t) * ((1.0 - t) * bend0 + t * bend1);
}

double MonotoneCurve::slope(double x) const {
    if (x < x_.front() || x > x_.back()) {
        return 0.0;
    }
    const std::size_t i = segment(x);
    const double width = x_[i + 1] - x_[i];
    const double t = (x - x_[i]) / width;
    const double rise = y_[i + 1] - y_[i];
    const double bend0 = width * slope_[i] - rise;
    const double bend1 = rise - width * slope_[i + 1];
    const double cubic = (1.0 - t) * (1.0 - 3.0 * t) * bend0 + t * (2.0 - 3.0 * t) * bend1;
    return (rise + cubic) / width;
}

double MonotoneCurve::inverse(double y) const {
    if (!(y > y_.front())) {
        return x_.front();
    }
    if (y >= y_.back()) {
        return x_.back();
    }
    const std::size_t i = segmentOf(y_, y);
    const auto difference = [&](double x) { return ValueAndSlope{value(x) - y, slope(x)}; };
    const double share = (y - y_[i]) / (y_[i + 1] - y_[i]);
    const auto root =
        bracketedNewton(difference, x_[i], x_[i + 1], x_[i] + share * (x_[i + 1] - x_[i]));
    ensure(root.has_value(), "a rising curve has an inverse inside its rows");
    return *root;
}

} // namespace headroom::numerics
