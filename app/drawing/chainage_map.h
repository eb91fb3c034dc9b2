// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/plant.h"

#include <QString>

#include <optional>
#include <vector>

namespace headroom::drawing {

/// A stretch of the waterway that is drawn to one scale.
struct Span {
    enum class Kind { lead, headrace, pressure, bay, tailrace } kind = Kind::headrace;
    double from_m = 0.0, to_m = 0.0; ///< chainage, to > from
    double share = 0.0;              ///< of the width after the lead
    QString name;                    ///< of its longest conduit; empty for lead and bay
};

inline constexpr double headraceShare = 0.46, pressureShare = 0.40, bayShare = 0.14;
inline constexpr double leastSpan_px = 60.0;

/// Chainage ↔ picture, piecewise linear and rising: one object for Section, Ribbon, ruler, print
/// and hit test.
class ChainageMap {
public:
    /// `lead_px`: room left of the first chainage, for the reservoir, at the first span's scale.
    ChainageMap(std::vector<Span> spans, double left_px, double right_px, double lead_px = 0.0);

    double x_px(double chainage_m) const; ///< beyond the ends: goes on at the end's scale
    double chainage_m(double x_px) const; ///< inverse of `x_px`
    double left_px() const { return edges_px_.front(); }
    double right_px() const { return edges_px_.back(); }
    const std::vector<Span>& spans() const { return spans_; } ///< with the lead in front, if any
    double metresPerPixel(int span) const;
    double from_px(int span) const { return edges_px_[static_cast<std::size_t>(span)]; }
    double to_px(int span) const { return edges_px_[static_cast<std::size_t>(span) + 1]; }
    int spanAt(double x_px) const;
    const Span* find(Span::Kind kind) const;

    /// Middles of the spans that carry a break mark, because they are drawn shorter.
    std::vector<double> breaks_px() const;
    /// "drawn 7.5× shorter than along Penstock"; "not to scale" for the bay; empty for the span
    /// the others are compared with.
    QString compressionWords(int span) const;

private:
    int finestSpan() const;

    std::vector<Span> spans_;
    std::vector<double> edges_px_; // spans + 1, rising
};

enum class Scales { three, one };
/// The spans of a plant: headrace down to the last upstream chamber, pressure side to the units,
/// stretched unit bay, tailrace. `lastGround_m`: where the ground line ends, for the bay.
ChainageMap chainageMap(const plant::Plant& plant, double left_px, double right_px, double lead_px,
                        Scales scales = Scales::three, std::optional<double> lastGround_m = {});

} // namespace headroom::drawing
