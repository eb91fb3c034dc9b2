// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/lane_plan.h"
#include "desk/run_traces.h"
#include "drawing/look.h"

#include <QVector>
#include <functional>
#include <qcustomplot.h>

/// What is painted in the lanes: traces through their extents, forbidden zones, cursor and words.
/// All own painting, because the library's graphs take half a second with pens over one pixel.
namespace headroom::desk {

/// The segments of a trace over an axis: what the pixel columns of `rect` show of it.
QVector<QLineF> traceSegments(const RunTraces& traces, int channel, QCPAxis& time, QCPAxis& value,
                              Quantity quantity, double columnWidth);

/// One run's trace in one lane.
class TraceLayer final : public QCPAbstractPlottable {
public:
    TraceLayer(QCPAxis* time, QCPAxis* value) : QCPAbstractPlottable(time, value) {}
    void show(std::shared_ptr<const RunTraces> traces, int channel, Quantity quantity);

    double selectTest(const QPointF&, bool, QVariant*) const override { return -1.0; }
    QCPRange getKeyRange(bool& found, QCP::SignDomain) const override;
    QCPRange getValueRange(bool& found, QCP::SignDomain, const QCPRange&) const override;

protected:
    void draw(QCPPainter* painter) override;
    void drawLegendIcon(QCPPainter*, const QRectF&) const override {}

private:
    std::shared_ptr<const RunTraces> traces_;
    int channel_ = -1;
    Quantity quantity_ = Quantity::factor;
};

/// Paints something of ours over one rect or the whole plot.
class PaintLayer final : public QCPLayerable {
public:
    using Paint = std::function<void(QPainter&)>;
    PaintLayer(QCustomPlot* plot, const QString& layer, Paint paint)
        : QCPLayerable(plot, layer), paint_(std::move(paint)) {}

protected:
    void applyDefaultAntialiasingHint(QCPPainter* painter) const override {
        painter->setAntialiasing(true);
    }
    QRect clipRect() const override { return parentPlot()->rect(); }
    void draw(QCPPainter* painter) override { paint_(*painter); }

private:
    Paint paint_;
};

/// Few round ticks with a true minus.
class LaneTicker final : public QCPAxisTicker {
protected:
    QString getTickLabel(double tick, const QLocale&, QChar, int) override;
};

} // namespace headroom::desk
