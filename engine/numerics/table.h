// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"

#include <cstddef>
#include <optional>
#include <span>
#include <utility>
#include <vector>

namespace headroom::numerics {

/// What a table says beyond its first and last row.
enum class Outside {
    refuse, ///< asking there is a fault of the caller (`Bug`); ask `covers` first
    hold,   ///< the nearest row's value, slope 0
};

/// Two columns, x strictly increasing, joined by straight lines. Units are the caller's.
/// Looking up costs one bisection over the rows.
class Table {
public:
    /// Refuses fewer than two rows, columns of different length, values that are not finite and
    /// x that does not rise. `subject` names the table in the findings.
    static Result<Table> make(std::vector<double> x, std::vector<double> y, Outside outside,
                              const std::string& subject = {});
    static Result<Table> make(std::span<const std::pair<double, double>> rows, Outside outside,
                              const std::string& subject = {});

    bool covers(double x) const { return x >= x_.front() && x <= x_.back(); }
    double value(double x) const;
    /// Slope of the segment that begins at or before x (the right-hand one at a row).
    double slope(double x) const;
    /// ∫ y dx from `from` to `to`, exact for the straight segments; signed.
    double integral(double from, double to) const;
    /// The x with value(x) = y of a strictly monotone table; nothing if y is outside its range or
    /// the table is not strictly monotone.
    std::optional<double> inverse(double y) const;
    bool rising() const;  ///< y strictly increasing
    bool falling() const; ///< y strictly decreasing

    std::span<const double> x() const { return x_; }
    std::span<const double> y() const { return y_; }

private:
    Table(std::vector<double> x, std::vector<double> y, Outside outside);
    std::size_t segment(double x) const;
    double integralFromStart(double x) const;

    std::vector<double> x_, y_, area_; // area_[i] = integral from x_[0] to x_[i]
    Outside outside_ = Outside::hold;
};

/// A monotone curve through the rows with continuous slope: cubic pieces whose slopes are limited
/// so that no piece turns back (Fritsch & Carlson 1980, SIAM J. Numer. Anal. 17, from memory).
/// Beyond the ends the value is held.
class MonotoneCurve {
public:
    /// As `Table::make`, and y must rise strictly.
    static Result<MonotoneCurve> make(std::vector<double> x, std::vector<double> y,
                                      const std::string& subject = {});

    double value(double x) const;
    double slope(double x) const;
    /// The x with value(x) = y; held at the ends.
    double inverse(double y) const;

    std::span<const double> x() const { return x_; }
    std::span<const double> y() const { return y_; }

private:
    MonotoneCurve(std::vector<double> x, std::vector<double> y);
    std::size_t segment(double x) const;

    std::vector<double> x_, y_, slope_;
};

} // namespace headroom::numerics
