// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/lane_plan.h"
#include "desk/run_traces.h"
#include "drawing/look.h"

#include <QWidget>
#include <functional>
#include <memory>

class QCustomPlot;

namespace headroom::desk {

/// One run shown in the lanes; the first of several is the one in the hand.
struct LaneRun {
    QString name;
    std::shared_ptr<const RunTraces> traces; ///< nullptr: nothing recorded
    bool stale = false;                      ///< of earlier inputs
};

/// Stacked traces over one time axis, with forbidden zones and one cursor through all.
class Lanes final : public QWidget {
    Q_OBJECT
public:
    explicit Lanes(QWidget* parent = nullptr);
    ~Lanes() override;

    void setLook(const drawing::Look& look);
    void show(std::vector<Lane> lanes, std::vector<LaneRun> runs);
    void setCursor(double time_s);

    const std::vector<Lane>& lanes() const;
    /// Value of a run at the cursor in a lane [SI], if recorded.
    std::optional<double> value(int lane, int run) const;
    QString valueText(int lane, int run) const;
    /// Lanes that this height shows at a readable size, the chosen one counted twice.
    int lanesThatFit() const;
    QRectF laneRect(int lane) const; ///< inside this widget
    double timeAt(double x_px) const;
    double timeToPixel(double time_s) const;
    std::pair<double, double> shownTime() const;
    QString description() const; ///< for a screen reader

    void showAllTime();
    void paintNow(); ///< what is queued for the next turn of the event loop
    void stepCursor(int samples); ///< asks for the cursor that many recorded instants on

signals:
    /// The cursor is asked to go there; `limit` is that of the lane pressed, −1 if none.
    void timePressed(double time_s, int limit);
    void resized();

protected:
    void resizeEvent(QResizeEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    bool eventFilter(QObject* watched, QEvent* event) override;
    void timerEvent(QTimerEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;

private:
    struct Hidden;
    void rebuild();
    void applyRanges();
    void zoomTime(double factor, double around_s);
    void setTimeRange(double from_s, double to_s);
    bool handleMouse(QEvent* event);
    void paintStill(QPainter& painter);
    void paintOver(QPainter& painter);
    std::vector<double> heights(std::size_t lane, std::size_t run, double left, double right) const;
    void paintRunName(QPainter& painter, std::size_t lane, std::size_t run);
    void paintMoving(QPainter& painter);
    void replotLater();
    void paintLane(QPainter& painter, int lane);
    void paintGutter(QPainter& painter, int lane);
    int laneAt(double y_px) const;
    double longest_s() const;

    std::unique_ptr<Hidden> hidden_;
};

} // namespace headroom::desk
