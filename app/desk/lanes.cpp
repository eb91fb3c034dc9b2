// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/lanes.h"

#include "desk/lane_layers.h"
#include "desk/picture_view.h"
#include "desk/words.h"
#include "drawing/label_placer.h"
#include "drawing/texture.h"

#include <QBasicTimer>
#include <QKeyEvent>
#include <QMouseEvent>
#include <QPainter>
#include <QVBoxLayout>
#include <QWheelEvent>
#include <algorithm>
#include <cmath>
#include <limits>

namespace headroom::desk {

namespace {

constexpr double leastLane_px = 50.0, axis_px = 30.0, between_px = 7.0;
constexpr double gutterLine_px = 14.0;
constexpr double nameClear_px = 1.0; // least room around a run's name, less its trace's slope
constexpr double shortestView_s = 0.05;
constexpr double wheelFactor = 0.85; // of the time range, one notch
constexpr double keyStep = 0.01;     // of the time range, one arrow key
constexpr int dragStart_px = 4;

const QString background = QStringLiteral("background"), gridLayer = QStringLiteral("grid");
const QString traceLayer = QStringLiteral("main");
const QString overLayer = QStringLiteral("over"), cursorLayer = QStringLiteral("cursor");

using drawing::TextSize;
using drawing::TextWeight;

} // namespace

struct Lanes::Hidden {
    QCustomPlot* plot = nullptr;
    const drawing::Look* look = nullptr;
    std::vector<Lane> lanes;
    std::vector<LaneRun> runs;
    std::vector<QCPAxisRect*> rects;
    std::vector<LaneRange> ranges;
    double cursor_s = 0.0;
    QBasicTimer cursorTimer;
    double from_s = 0.0, to_s = 1.0;
    bool allTime = true;
    std::optional<QPointF> pressedAt;
    double pressedFrom_s = 0.0;
    bool dragging = false;
    std::vector<QRectF> names; ///< of runs, as painted last
    bool ring = false; ///< the keyboard brought the focus here

    QRectF rect(std::size_t lane) const { return QRectF(rects[lane]->rect()); }
    double x(double time_s) const { return rects.front()->axis(QCPAxis::atBottom)->coordToPixel(time_s); }
};

Lanes::Lanes(QWidget* parent) : QWidget(parent), hidden_(std::make_unique<Hidden>()) {
    setObjectName(QStringLiteral("lanes"));
    setAccessibleName(tr("Lanes"));
    setFocusPolicy(Qt::StrongFocus);
    auto* layout = new QVBoxLayout(this);
    layout->setContentsMargins(0, 0, 0, 0);
    auto* plot = new QCustomPlot(this);
    hidden_->plot = plot;
    hidden_->look = &drawing::look(drawing::Scheme::light);
    plot->setFocusPolicy(Qt::NoFocus);
    plot->setNoAntialiasingOnDrag(false);
    plot->setPlottingHint(QCP::phFastPolylines, false);
    plot->plotLayout()->clear();
    plot->plotLayout()->setRowSpacing(static_cast<int>(between_px));
    plot->plotLayout()->setMargins(QMargins(0, 0, 0, 0));
    plot->addLayer(overLayer);
    plot->addLayer(cursorLayer);
    plot->layer(cursorLayer)->setMode(QCPLayer::lmBuffered);
    new PaintLayer(plot, gridLayer, [this](QPainter& painter) { paintStill(painter); });
    new PaintLayer(plot, overLayer, [this](QPainter& painter) { paintOver(painter); });
    new PaintLayer(plot, cursorLayer, [this](QPainter& painter) { paintMoving(painter); });
    plot->installEventFilter(this);
    plot->setMouseTracking(true);
    layout->addWidget(plot);
}

Lanes::~Lanes() = default;

const std::vector<Lane>& Lanes::lanes() const { return hidden_->lanes; }

void Lanes::setLook(const drawing::Look& look) {
    hidden_->look = &look;
    hidden_->plot->setBackground(QBrush(look.sheet));
    rebuild();
}

void Lanes::show(std::vector<Lane> lanes, std::vector<LaneRun> runs) {
    hidden_->lanes = std::move(lanes);
    hidden_->runs = std::move(runs);
    rebuild();
}

double Lanes::longest_s() const {
    double longest = 0.0;
    for (const auto& run : hidden_->runs) {
        longest = run.traces ? std::max(longest, run.traces->run->duration_s) : longest;
    }
    return longest > 0.0 ? longest : 1.0;
}

void Lanes::rebuild() {
    auto& h = *hidden_;
    const auto& look = *h.look;
    h.plot->clearPlottables();
    h.plot->plotLayout()->clear();
    h.rects.clear();
    const auto margin = static_cast<int>(look.space.leftMargin);
    const auto gutter = static_cast<int>(look.space.laneGutter);
    for (std::size_t i = 0; i < h.lanes.size(); ++i) {
        const bool last = i + 1 == h.lanes.size();
        h.plot->setCurrentLayer(background); // a new rect lands on the current layer
        auto* rect = new QCPAxisRect(h.plot);
        rect->setAutoMargins(QCP::msNone);
        rect->setMargins(QMargins(margin, i == 0 ? 4 : 0, gutter, last ? static_cast<int>(axis_px * look.scale) - 8 : 0));
        rect->setBackground(QBrush(look.lane));
        h.plot->plotLayout()->addElement(static_cast<int>(i), 0, rect);
        h.plot->plotLayout()->setRowStretchFactor(static_cast<int>(i), h.lanes[i].chosen ? 2.0 : 1.0);
        h.rects.push_back(rect);
        for (auto* axis : rect->axes()) {
            axis->setLayer(background);
            axis->grid()->setLayer(background);
            const bool time = axis->axisType() == QCPAxis::atBottom;
            const bool shown = (time && last) || axis->axisType() == QCPAxis::atLeft;
            auto ticker = QSharedPointer<LaneTicker>::create();
            ticker->setTickCount(time ? 8 : h.lanes[i].chosen ? 4 : 2);
            axis->setTicker(ticker);
            axis->setTickLabels(shown);
            axis->setTicks(shown); // labels come with ticks; those of values have no length
            axis->setTickLength(0, time ? 4 : 0);
            axis->setSubTicks(false);
            axis->setBasePen(Qt::NoPen);
            axis->setTickPen(look.hairPen(look.line));
            axis->setTickLabelFont(look.font(TextSize::small));
            axis->setTickLabelColor(look.muted);
            axis->grid()->setPen(look.hairPen(look.line));
            axis->grid()->setZeroLinePen(Qt::NoPen);
            axis->grid()->setVisible(axis->axisType() == QCPAxis::atLeft || time);
        }
        h.plot->setCurrentLayer(traceLayer);
        // The run in the hand is painted last, over the others.
        for (std::size_t back = h.runs.size(); back-- > 0;) {
            const auto& run = h.runs[back];
            const int channel = run.traces ? run.traces->indexOf(h.lanes[i].measure, h.lanes[i].place) : -1;
            if (channel < 0) {
                continue;
            }
            auto* trace = new TraceLayer(rect->axis(QCPAxis::atBottom), rect->axis(QCPAxis::atLeft));
            trace->show(run.traces, channel, h.lanes[i].quantity());
            QPen pen = look.runPen(static_cast<int>(back));
            if (run.stale) {
                pen.setDashPattern({4.0, 3.0});
                pen.setWidthF(look.width.hair);
            }
            trace->setPen(pen);
        }
    }
    applyRanges();
}

void Lanes::applyRanges() {
    auto& h = *hidden_;
    if (h.allTime) {
        h.from_s = 0.0;
        h.to_s = longest_s();
    }
    h.ranges.clear();
    for (std::size_t i = 0; i < h.lanes.size(); ++i) {
        double low = std::numeric_limits<double>::infinity(), high = -low;
        for (const auto& run : h.runs) {
            const int channel = run.traces ? run.traces->indexOf(h.lanes[i].measure, h.lanes[i].place) : -1;
            if (channel >= 0) {
                const auto& at = run.traces->run->channels[static_cast<std::size_t>(channel)];
                low = std::min(low, at.least.value);
                high = std::max(high, at.greatest.value);
            }
        }
        if (low > high) {
            low = high = h.lanes[i].bounds.empty() ? 0.0 : h.lanes[i].bounds.front().value;
        }
        h.ranges.push_back(laneRange(h.lanes[i], low, high));
        const auto quantity = h.lanes[i].quantity();
        h.rects[i]->axis(QCPAxis::atLeft)->setRange(fromSi(quantity, h.ranges[i].low), fromSi(quantity, h.ranges[i].high));
        h.rects[i]->axis(QCPAxis::atBottom)->setRange(h.from_s, h.to_s);
    }
    replotLater();
}

/// A plot without room has nothing to paint into.
void Lanes::replotLater() {
    if (!hidden_->plot->viewport().isEmpty()) {
        hidden_->plot->replot(QCustomPlot::rpQueuedReplot);
    }
}

/// Only the cursor's own layer is painted again, at the next turn of the event loop.
void Lanes::setCursor(double time_s) {
    hidden_->cursor_s = time_s;
    if (!hidden_->cursorTimer.isActive()) {
        hidden_->cursorTimer.start(0, this);
    }
}

void Lanes::timerEvent(QTimerEvent* event) {
    if (event->timerId() != hidden_->cursorTimer.timerId()) {
        return QWidget::timerEvent(event);
    }
    hidden_->cursorTimer.stop();
    if (!hidden_->plot->viewport().isEmpty()) {
        hidden_->plot->layer(cursorLayer)->replot();
        hidden_->plot->update();
    }
}

std::optional<double> Lanes::value(int lane, int run) const {
    if (lane >= static_cast<int>(hidden_->lanes.size()) || run >= static_cast<int>(hidden_->runs.size())) {
        return std::nullopt;
    }
    const auto& at = hidden_->lanes[static_cast<std::size_t>(lane)];
    const auto& traces = hidden_->runs[static_cast<std::size_t>(run)].traces;
    const int channel = traces ? traces->indexOf(at.measure, at.place) : -1;
    return channel < 0 ? std::nullopt : std::optional(traces->valueAt(channel, hidden_->cursor_s));
}

QString Lanes::valueText(int lane, int run) const {
    const auto at = value(lane, run);
    return at ? text(print(hidden_->lanes[static_cast<std::size_t>(lane)].quantity(), *at)) : QStringLiteral("–");
}

int Lanes::lanesThatFit() const {
    const double scale = hidden_->look->scale;
    const double room = height() - axis_px * scale;
    const double least = leastLane_px * scale;
    return std::max(1, static_cast<int>((room - least + between_px) / (least + between_px)));
}

QRectF Lanes::laneRect(int lane) const {
    const auto index = static_cast<std::size_t>(lane);
    return index < hidden_->rects.size() ? hidden_->rect(index) : QRectF();
}

double Lanes::timeAt(double x_px) const {
    return hidden_->rects.empty() ? 0.0 : hidden_->rects.front()->axis(QCPAxis::atBottom)->pixelToCoord(x_px);
}
double Lanes::timeToPixel(double time_s) const {
    return hidden_->rects.empty() ? 0.0 : hidden_->x(time_s);
}
std::pair<double, double> Lanes::shownTime() const { return {hidden_->from_s, hidden_->to_s}; }

int Lanes::laneAt(double y_px) const {
    for (std::size_t i = 0; i < hidden_->rects.size(); ++i) {
        if (y_px <= hidden_->rect(i).bottom() + between_px / 2.0) {
            return static_cast<int>(i);
        }
    }
    return static_cast<int>(hidden_->rects.size()) - 1;
}

// --- painting -----------------------------------------------------------------------------------

void Lanes::paintStill(QPainter& painter) {
    auto& h = *hidden_;
    painter.setRenderHint(QPainter::Antialiasing);
    if (h.lanes.empty()) {
        painter.setPen(h.look->muted);
        painter.setFont(h.look->font(TextSize::body));
        painter.drawText(QRectF(rect()), Qt::AlignCenter, tr("No lanes: the plant has nothing to record yet."));
        return;
    }
    for (std::size_t i = 0; i < h.lanes.size(); ++i) {
        paintLane(painter, static_cast<int>(i));
    }
}

/// Forbidden zones from the bound outward, edge notes, and a word where nothing is drawn.
void Lanes::paintLane(QPainter& painter, int lane) {
    auto& h = *hidden_;
    const auto& look = *h.look;
    const auto index = static_cast<std::size_t>(lane);
    const auto box = h.rect(index);
    auto* axis = h.rects[index]->axis(QCPAxis::atLeft);
    painter.save();
    painter.setClipRect(box);
    for (const auto& bound : h.lanes[index].bounds) {
        const double y = axis->coordToPixel(fromSi(h.lanes[index].quantity(), bound.value));
        if (y < box.top() || y > box.bottom()) {
            continue;
        }
        const double edge = bound.upper ? box.top() : box.bottom();
        const QPolygonF line{QPointF(box.left(), y), QPointF(box.right(), y)};
        const double depth = std::min(std::abs(edge - y), look.space.textureDepth);
        drawing::paintTexture(painter, drawing::zoneBeside(line, depth, bound.upper),
                              bound.timed ? drawing::Texture::rules : drawing::Texture::hatch, look);
        painter.setPen(look.pen(look.limit, look.width.data));
        painter.drawPolyline(line);
    }
    painter.restore();
    painter.setFont(look.font(TextSize::small));
    painter.setPen(look.muted);
    const auto inner = box.adjusted(6, 1, -6, -1);
    painter.drawText(inner, Qt::AlignTop | Qt::AlignRight, h.ranges[index].above);
    painter.drawText(inner, Qt::AlignBottom | Qt::AlignRight, h.ranges[index].below);
    const bool anything = std::any_of(h.runs.begin(), h.runs.end(), [&](const LaneRun& run) {
        return run.traces && run.traces->indexOf(h.lanes[index].measure, h.lanes[index].place) >= 0;
    });
    if (!anything) {
        painter.drawText(inner, Qt::AlignCenter, h.runs.empty() || !h.runs.front().traces ? tr("not run yet") : tr("not recorded here"));
    }
}

/// Names at the compared traces, where they stand apart, and what is outdated; in the tall lane.
void Lanes::paintOver(QPainter& painter) {
    auto& h = *hidden_;
    painter.setRenderHint(QPainter::Antialiasing);
    h.names.clear();
    for (std::size_t lane = 0; lane < h.lanes.size(); ++lane) {
        if (!h.lanes[lane].chosen) {
            continue;
        }
        for (std::size_t run = 0; h.runs.size() > 1 && run < h.runs.size(); ++run) {
            paintRunName(painter, lane, run);
        }
        if (!h.runs.empty() && h.runs.front().stale) {
            painter.setFont(h.look->font(TextSize::small, TextWeight::strong));
            painter.setPen(h.look->text);
            painter.drawText(h.rect(lane).adjusted(6, 2, -6, -2), Qt::AlignTop | Qt::AlignLeft,
                             tr("outdated: run for earlier inputs"));
        }
    }
}

/// Heights of a lane's traces over a stretch of pixels, for finding room between them.
std::vector<double> Lanes::heights(std::size_t lane, std::size_t run, double left, double right) const {
    constexpr int looks = 9;
    const auto& h = *hidden_;
    const auto& traces = h.runs[run].traces;
    const int channel = traces ? traces->indexOf(h.lanes[lane].measure, h.lanes[lane].place) : -1;
    std::vector<double> found;
    for (int i = 0; channel >= 0 && i < looks; ++i) {
        const double time_s = timeAt(left + (right - left) * i / (looks - 1));
        const double value = fromSi(h.lanes[lane].quantity(), traces->valueAt(channel, time_s));
        found.push_back(h.rects[lane]->axis(QCPAxis::atLeft)->coordToPixel(value));
    }
    return found;
}

/// The name of one run close to its trace, where no other trace, bound or edge is in the way.
void Lanes::paintRunName(QPainter& painter, std::size_t lane, std::size_t run) {
    auto& h = *hidden_;
    const auto box = h.rect(lane);
    painter.setFont(h.look->font(TextSize::small));
    const QSizeF size(QFontMetricsF(painter.font()).horizontalAdvance(h.runs[run].name) + 4, h.look->lineHeight(TextSize::small) - 2);
    std::vector<double> bounds;
    for (const auto& bound : h.lanes[lane].bounds) {
        bounds.push_back(h.rects[lane]->axis(QCPAxis::atLeft)->coordToPixel(fromSi(h.lanes[lane].quantity(), bound.value)));
    }
    std::optional<QRectF> best;
    double bestClear = nameClear_px;
    for (double x = box.left() + 8; x + size.width() < box.right() - 8; x += 12) {
        const auto own = heights(lane, run, x, x + size.width());
        if (own.empty()) {
            return;
        }
        const auto [low, high] = std::minmax_element(own.begin(), own.end());
        for (const double top : {*low - size.height() - 2, *high + 2}) {
            const QRectF place(QPointF(x, top), size);
            double clear = std::min(place.top() - box.top(), box.bottom() - place.bottom());
            const auto keepOff = [&](double y) { clear = std::min(clear, std::max(place.top() - y, y - place.bottom())); };
            std::for_each(bounds.begin(), bounds.end(), keepOff);
            for (std::size_t other = 0; other < h.runs.size(); ++other) {
                const auto ys = other == run ? std::vector<double>{} : heights(lane, other, x, x + size.width());
                std::for_each(ys.begin(), ys.end(), keepOff);
            }
            const double slope = *high - *low; // a name beside a steep stretch is far from its trace
            const bool free = std::none_of(h.names.begin(), h.names.end(), [&](const QRectF& name) { return name.intersects(place); });
            if (free && slope < size.height() && clear - slope > bestClear) {
                bestClear = clear - slope;
                best = place;
            }
        }
    }
    if (best) {
        h.names.push_back(best->adjusted(-4, -2, 4, 2));
        painter.setPen(run == 0 ? h.look->text : h.look->runs[run]);
        painter.drawText(*best, Qt::AlignCenter, h.runs[run].name);
    }
}

void Lanes::paintMoving(QPainter& painter) {
    auto& h = *hidden_;
    if (h.lanes.empty()) {
        return;
    }
    const auto& look = *h.look;
    painter.setRenderHint(QPainter::Antialiasing);
    for (std::size_t i = 0; i < h.lanes.size(); ++i) {
        paintGutter(painter, static_cast<int>(i));
    }
    const auto last = h.rect(h.lanes.size() - 1);
    const double x = h.x(h.cursor_s);
    if (x >= last.left() && x <= last.right()) {
        painter.setPen(look.pen(look.accent, look.width.data));
        painter.drawLine(QPointF(x, h.rect(0).top()), QPointF(x, last.bottom()));
    }
    painter.setPen(look.muted);
    painter.setFont(look.font(TextSize::small));
    painter.drawText(QRectF(last.right() + 24, last.bottom() + 3, look.space.laneGutter - 8, look.lineHeight(TextSize::small) + 2),
                     Qt::AlignLeft | Qt::AlignVCenter, tr("s after start"));
    if (hasFocus() && h.ring) {
        painter.setPen(look.pen(look.focus, look.width.focus));
        painter.drawRoundedRect(QRectF(rect()).adjusted(1.5, 1.5, -1.5, -1.5), look.space.corner, look.space.corner);
    }
}

/// Name, then the values at the cursor, one a run in its ink; as many as the lane's height holds.
void Lanes::paintGutter(QPainter& painter, int lane) {
    auto& h = *hidden_;
    const auto& look = *h.look;
    const auto index = static_cast<std::size_t>(lane);
    const auto box = h.rect(index);
    const double line = gutterLine_px * look.scale; // closer than running text: one block a lane
    QRectF row(box.right() + 8, box.top() - 3, look.space.laneGutter - 10, line);
    painter.setFont(look.font(TextSize::small, TextWeight::strong));
    painter.setPen(look.text);
    const QFontMetricsF metrics(painter.font());
    painter.drawText(row, Qt::AlignLeft | Qt::AlignVCenter, metrics.elidedText(h.lanes[index].name, Qt::ElideRight, row.width()));
    painter.setFont(look.font(TextSize::small));
    row.translate(0, line);
    const double bottom = box.bottom() + between_px;
    const int room = static_cast<int>((bottom - row.top()) / line);
    if (room > static_cast<int>(h.runs.size())) {
        painter.setPen(look.muted);
        painter.drawText(row, Qt::AlignLeft | Qt::AlignVCenter, QFontMetricsF(painter.font()).elidedText(h.lanes[index].where, Qt::ElideRight, row.width()));
        row.translate(0, line);
    }
    for (std::size_t run = 0; run < h.runs.size() && row.bottom() <= bottom; ++run) {
        painter.setPen(run == 0 ? look.text : look.runs[run]);
        painter.drawText(row, Qt::AlignLeft | Qt::AlignVCenter, valueText(lane, static_cast<int>(run)));
        row.translate(0, line);
    }
}

QString Lanes::description() const {
    const auto& h = *hidden_;
    if (h.lanes.empty() || h.runs.empty()) {
        return tr("No lanes.");
    }
    QStringList parts;
    for (std::size_t i = 0; i < h.lanes.size(); ++i) {
        parts << QStringLiteral("%1 %2 %3").arg(h.lanes[i].where, h.lanes[i].name.toLower(), valueText(static_cast<int>(i), 0));
    }
    return tr("At %1: %2.").arg(text(print(Quantity::time, h.cursor_s)), parts.join(QStringLiteral("; ")));
}

// --- handling -----------------------------------------------------------------------------------

void Lanes::setTimeRange(double from_s, double to_s) {
    auto& h = *hidden_;
    const double all = longest_s();
    const double span = std::clamp(to_s - from_s, std::min(shortestView_s, all), all);
    h.from_s = std::clamp(from_s, 0.0, all - span);
    h.to_s = h.from_s + span;
    h.allTime = span >= all;
    for (auto* rect : h.rects) {
        rect->axis(QCPAxis::atBottom)->setRange(h.from_s, h.to_s);
    }
    replotLater();
}

void Lanes::showAllTime() { setTimeRange(0.0, longest_s()); }

void Lanes::paintNow() {
    if (!hidden_->plot->viewport().isEmpty()) {
        hidden_->plot->replot(QCustomPlot::rpImmediateRefresh);
    }
}

void Lanes::zoomTime(double factor, double around_s) {
    const auto& h = *hidden_;
    setTimeRange(around_s - (around_s - h.from_s) * factor, around_s + (h.to_s - around_s) * factor);
}

void Lanes::stepCursor(int samples) {
    const auto& h = *hidden_;
    const auto traces = h.runs.empty() ? nullptr : h.runs.front().traces;
    if (!traces || !(traces->run->recordInterval_s > 0.0)) {
        return;
    }
    const double interval_s = traces->run->recordInterval_s;
    const double instant = std::round(h.cursor_s / interval_s) + samples;
    const double last = std::floor(traces->run->status.reached_s / interval_s + 0.5);
    const double time_s = std::clamp(instant, 0.0, last) * interval_s;
    if (time_s < h.from_s || time_s > h.to_s) {
        const double span = h.to_s - h.from_s;
        setTimeRange(time_s - span / 2.0, time_s + span / 2.0);
    }
    emit timePressed(time_s, -1);
}

void Lanes::focusInEvent(QFocusEvent* event) {
    QWidget::focusInEvent(event);
    hidden_->ring = byKeyboard(event->reason());
    setCursor(hidden_->cursor_s);
}

void Lanes::focusOutEvent(QFocusEvent* event) {
    QWidget::focusOutEvent(event);
    setCursor(hidden_->cursor_s);
}

void Lanes::resizeEvent(QResizeEvent* event) {
    QWidget::resizeEvent(event);
    emit resized();
}

void Lanes::keyPressEvent(QKeyEvent* event) {
    const auto& h = *hidden_;
    const auto traces = h.runs.empty() ? nullptr : h.runs.front().traces;
    const double interval_s = traces ? traces->run->recordInterval_s : 1.0;
    const bool shift = event->modifiers().testFlag(Qt::ShiftModifier);
    const double share = shift ? 10.0 * keyStep : keyStep;
    const int samples = std::max(1, static_cast<int>((h.to_s - h.from_s) * share / interval_s));
    switch (event->key()) {
    case Qt::Key_Left: return stepCursor(-samples);
    case Qt::Key_Right: return stepCursor(samples);
    case Qt::Key_Home: return emit timePressed(0.0, -1);
    case Qt::Key_End: return emit timePressed(longest_s(), -1);
    case Qt::Key_Plus: return zoomTime(wheelFactor, h.cursor_s);
    case Qt::Key_Minus: return zoomTime(1.0 / wheelFactor, h.cursor_s);
    default: QWidget::keyPressEvent(event);
    }
}

bool Lanes::eventFilter(QObject* watched, QEvent* event) {
    return watched == hidden_->plot && handleMouse(event) ? true : QWidget::eventFilter(watched, event);
}

/// Wheel zooms time at the pointer, a drag pans it, a click sets the cursor.
bool Lanes::handleMouse(QEvent* event) {
    auto& h = *hidden_;
    if (h.rects.empty()) {
        return false;
    }
    if (event->type() == QEvent::Wheel) {
        auto* wheel = static_cast<QWheelEvent*>(event);
        const double notches = wheel->angleDelta().y() / 120.0;
        zoomTime(std::pow(wheelFactor, notches), timeAt(wheel->position().x()));
        return true;
    }
    auto* mouse = dynamic_cast<QMouseEvent*>(event);
    if (mouse == nullptr) {
        return false;
    }
    if (event->type() == QEvent::MouseButtonDblClick) {
        showAllTime();
    } else if (event->type() == QEvent::MouseButtonPress && mouse->button() == Qt::LeftButton) {
        setFocus(Qt::MouseFocusReason);
        h.pressedAt = mouse->position();
        h.pressedFrom_s = h.from_s;
        h.dragging = false;
    } else if (event->type() == QEvent::MouseMove && h.pressedAt) {
        const double moved = mouse->position().x() - h.pressedAt->x();
        h.dragging = h.dragging || std::abs(moved) >= dragStart_px;
        if (h.dragging) {
            const double span = h.to_s - h.from_s;
            const double from_s = h.pressedFrom_s - moved * span / h.rect(0).width();
            setTimeRange(from_s, from_s + span);
        }
    } else if (event->type() == QEvent::MouseButtonRelease && h.pressedAt) {
        const auto at = *std::exchange(h.pressedAt, std::nullopt);
        if (!h.dragging) {
            const int lane = laneAt(at.y());
            emit timePressed(std::clamp(timeAt(at.x()), 0.0, longest_s()), h.lanes[static_cast<std::size_t>(lane)].limit());
        }
    }
    return true;
}

} // namespace headroom::desk
