// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/chainage_map.h"

#include "base/ensure.h"

#include <algorithm>
#include <cmath>

namespace headroom::drawing {

namespace {

/// Widths that follow the shares, none under the least, the rest taken from the wide ones.
std::vector<double> widths_px(const std::vector<Span>& spans, double width_px) {
    const double count = static_cast<double>(spans.size());
    const double least = std::min(leastSpan_px, width_px / count);
    double shares = 0.0;
    for (const auto& span : spans) {
        shares += span.share;
    }
    std::vector<double> out;
    double missing = 0.0, spare = 0.0;
    for (const auto& span : spans) {
        const double wanted = shares > 0.0 ? width_px * span.share / shares : width_px / count;
        out.push_back(std::max(wanted, least));
        missing += std::max(0.0, least - wanted);
        spare += std::max(0.0, wanted - least);
    }
    for (double& width : out) {
        width -= spare > 0.0 ? missing * (width - least) / spare : 0.0;
    }
    return out;
}

} // namespace

ChainageMap::ChainageMap(std::vector<Span> spans, double left_px, double right_px, double lead_px)
    : spans_(std::move(spans)) {
    ensure(!spans_.empty(), "a chainage map has at least one span");
    const double width_px = std::max(1.0, right_px - left_px);
    const double lead = std::clamp(lead_px, 0.0, width_px / 2.0);
    const auto widths = widths_px(spans_, width_px - lead);
    edges_px_.push_back(left_px);
    if (lead > 0.0) {
        const auto& first = spans_.front();
        const double scale = (first.to_m - first.from_m) / widths.front();
        spans_.insert(spans_.begin(),
                      {Span::Kind::lead, first.from_m - lead * scale, first.from_m, 0.0, {}});
        edges_px_.push_back(left_px + lead);
    }
    for (const double width : widths) {
        edges_px_.push_back(edges_px_.back() + width);
    }
}

double ChainageMap::metresPerPixel(int span) const {
    const auto& the = spans_[static_cast<std::size_t>(span)];
    return (the.to_m - the.from_m) / (to_px(span) - from_px(span));
}

double ChainageMap::x_px(double chainage_m) const {
    const int last = static_cast<int>(spans_.size()) - 1;
    int span = 0;
    while (span < last && chainage_m > spans_[static_cast<std::size_t>(span)].to_m) {
        ++span;
    }
    return from_px(span)
           + (chainage_m - spans_[static_cast<std::size_t>(span)].from_m) / metresPerPixel(span);
}

int ChainageMap::spanAt(double x_px) const {
    const int last = static_cast<int>(spans_.size()) - 1;
    int span = 0;
    while (span < last && x_px > to_px(span)) {
        ++span;
    }
    return span;
}

double ChainageMap::chainage_m(double x_px) const {
    const int span = spanAt(x_px);
    return spans_[static_cast<std::size_t>(span)].from_m
           + (x_px - from_px(span)) * metresPerPixel(span);
}

const Span* ChainageMap::find(Span::Kind kind) const {
    for (const auto& span : spans_) {
        if (span.kind == kind) {
            return &span;
        }
    }
    return nullptr;
}

int ChainageMap::finestSpan() const {
    int finest = -1;
    for (int i = 0; i < static_cast<int>(spans_.size()); ++i) {
        const auto kind = spans_[static_cast<std::size_t>(i)].kind;
        const bool toScale = kind != Span::Kind::lead && kind != Span::Kind::bay;
        if (toScale && (finest < 0 || metresPerPixel(i) < metresPerPixel(finest))) {
            finest = i;
        }
    }
    return finest;
}

namespace {
constexpr double noticeable = 1.2; ///< below this factor two scales pass for one
}

std::vector<double> ChainageMap::breaks_px() const {
    std::vector<double> out;
    const int finest = finestSpan();
    for (int i = 0; i < static_cast<int>(spans_.size()); ++i) {
        const auto kind = spans_[static_cast<std::size_t>(i)].kind;
        const bool toScale = kind != Span::Kind::lead && kind != Span::Kind::bay;
        if (toScale && metresPerPixel(i) > noticeable * metresPerPixel(finest)) {
            out.push_back((from_px(i) + to_px(i)) / 2.0);
        }
    }
    return out;
}

QString ChainageMap::compressionWords(int span) const {
    const auto kind = spans_[static_cast<std::size_t>(span)].kind;
    if (kind == Span::Kind::bay) {
        return QStringLiteral("not to scale");
    }
    const int finest = finestSpan();
    if (kind == Span::Kind::lead || finest < 0 || span == finest) {
        return {};
    }
    const double factor = metresPerPixel(span) / metresPerPixel(finest);
    if (factor <= noticeable) {
        return {};
    }
    const QString& name = spans_[static_cast<std::size_t>(finest)].name;
    return QStringLiteral("drawn %1× shorter than %2")
        .arg(QString::number(factor, 'f', factor < 10.0 ? 1 : 0),
             name.isEmpty() ? QStringLiteral("the pressure side") : name);
}

} // namespace headroom::drawing
