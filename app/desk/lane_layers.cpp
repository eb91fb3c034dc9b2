// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/lane_layers.h"

#include <algorithm>
#include <cmath>

namespace headroom::desk {

namespace {

/// Instants of a trace inside a stretch of time.
struct Instants {
    std::size_t first, last;
};
Instants between(double from_s, double to_s, double interval_s, std::size_t size) {
    const auto at = [&](double time_s) {
        const double place = std::clamp(time_s / interval_s, 0.0, static_cast<double>(size));
        return static_cast<std::size_t>(place);
    };
    return {at(std::ceil(from_s / interval_s) * interval_s), at(to_s + interval_s)};
}

/// Line by line between instants, for a view with fewer instants than columns.
QVector<QLineF> instantSegments(const std::vector<float>& values, double interval_s,
                                const Instants& shown,
                                const std::function<QPointF(double, double)>& pixel) {
    QVector<QLineF> lines;
    const std::size_t first = shown.first > 0 ? shown.first - 1 : 0;
    const std::size_t last = std::min(values.size(), shown.last + 1);
    for (std::size_t i = first; i + 1 < last; ++i) {
        lines.append(QLineF(pixel(static_cast<double>(i) * interval_s, static_cast<double>(values[i])),
                            pixel(static_cast<double>(i + 1) * interval_s,
                                  static_cast<double>(values[i + 1]))));
    }
    return lines;
}

/// Two segments a column: from the end of the one before to the nearer of its extremes, and on to
/// the other one.
class ColumnLines {
public:
    QVector<QLineF> lines;
    void add(double x, double yOne, double yOther) {
        if (hasEnd_ && std::abs(yOther - end_.y()) < std::abs(yOne - end_.y())) {
            std::swap(yOne, yOther);
        }
        const QPointF near(x, yOne), far(x, yOther);
        if (hasEnd_) {
            lines.append(QLineF(end_, near));
        }
        if (std::abs(yOther - yOne) > 0.3) {
            lines.append(QLineF(near, far));
        }
        end_ = far;
        hasEnd_ = true;
    }

private:
    QPointF end_;
    bool hasEnd_ = false;
};

} // namespace

QVector<QLineF> traceSegments(const RunTraces& traces, int channel, QCPAxis& time, QCPAxis& value,
                              Quantity quantity, double columnWidth) {
    const auto at = static_cast<std::size_t>(channel);
    const auto& extents = traces.extents[at];
    const auto& values = traces.run->channels[at].trace.last;
    const double interval_s = traces.run->recordInterval_s;
    if (extents.size() < 2 || !(interval_s > 0.0)) {
        return {};
    }
    const auto y = [&](double si) { return value.coordToPixel(fromSi(quantity, si)); };
    const auto range = time.range();
    const auto shown = between(range.lower, range.upper, interval_s, extents.size());
    const double left = time.coordToPixel(range.lower), right = time.coordToPixel(range.upper);
    const double columns = (right - left) / columnWidth;
    if (static_cast<double>(shown.last - shown.first) < columns && !values.empty()) {
        return instantSegments(values, interval_s, shown, [&](double time_s, double si) {
            return QPointF(time.coordToPixel(time_s), y(si));
        });
    }
    ColumnLines made;
    const double perColumn_s = (range.upper - range.lower) / columns;
    for (int column = 0; column < static_cast<int>(columns); ++column) {
        const double from_s = range.lower + column * perColumn_s;
        const auto inside = between(from_s, from_s + perColumn_s, interval_s, extents.size());
        const auto extent = extents.over(inside.first, inside.last);
        if (!extent.empty()) {
            made.add(left + (column + 0.5) * columnWidth, y(static_cast<double>(extent.low)),
                     y(static_cast<double>(extent.high)));
        }
    }
    return made.lines;
}

void TraceLayer::show(std::shared_ptr<const RunTraces> traces, int channel, Quantity quantity) {
    traces_ = std::move(traces);
    channel_ = channel;
    quantity_ = quantity;
}

QCPRange TraceLayer::getKeyRange(bool& found, QCP::SignDomain) const {
    found = traces_ != nullptr;
    return found ? QCPRange(0.0, traces_->run->duration_s) : QCPRange();
}

QCPRange TraceLayer::getValueRange(bool& found, QCP::SignDomain, const QCPRange&) const {
    found = traces_ != nullptr && channel_ >= 0;
    if (!found) {
        return {};
    }
    const auto& channel = traces_->run->channels[static_cast<std::size_t>(channel_)];
    return {fromSi(quantity_, channel.least.value), fromSi(quantity_, channel.greatest.value)};
}

void TraceLayer::draw(QCPPainter* painter) {
    if (!traces_ || channel_ < 0) {
        return;
    }
    const double ratio = mParentPlot->bufferDevicePixelRatio();
    const auto lines =
        traceSegments(*traces_, channel_, *mKeyAxis, *mValueAxis, quantity_, 1.0 / ratio);
    painter->setAntialiasing(true);
    QPen pen = mPen;
    // Segments meet without notches; round caps would leave the painter's quick way for lines.
    pen.setCapStyle(Qt::SquareCap);
    painter->setPen(pen);
    painter->drawLines(lines);
}

QString LaneTicker::getTickLabel(double tick, const QLocale&, QChar, int) {
    const double kept = std::abs(tick) < 1e-9 * std::abs(getTickStep(QCPRange(0, 1))) ? 0.0 : tick;
    auto label = QString::number(kept, 'g', 6);
    return label.replace(QLatin1Char('-'), QChar(0x2212));
}

} // namespace headroom::desk
