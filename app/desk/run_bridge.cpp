// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/run_bridge.h"

#include "desk/words.h"

#include <QDateTime>
#include <algorithm>

namespace headroom::desk {

namespace {
constexpr int tellEvery_ms = 33; // thirty times a second
} // namespace

RunBridge::RunBridge(int threads)
    : store_(studies::makeMemoryStore()) {
    teller_.setSingleShot(true);
    teller_.setInterval(tellEvery_ms);
    connect(&teller_, &QTimer::timeout, this, &RunBridge::tell);
    runner_ = std::make_unique<studies::Runner>(*store_, threads,
                                                [this](const News& news) { hear(news); });
}

RunBridge::~RunBridge() {
    runner_.reset(); // ends the workers before anything they use goes
}

void RunBridge::hear(const News& news) {
    std::shared_ptr<const RunTraces> traces;
    const bool ended = news.kind == News::Kind::finished || news.kind == News::Kind::cancelled;
    if (const auto stored = ended ? store_->find(news.fingerprint) : nullptr) {
        traces = stored->run ? makeRunTraces(stored->run) : nullptr;
    }
    QMetaObject::invokeMethod(
        this, [this, news, traces] { take(news, traces); }, Qt::QueuedConnection);
}

void RunBridge::take(const News& news, std::shared_ptr<const RunTraces> traces) {
    if (traces) {
        traces_[news.fingerprint] = std::move(traces);
    }
    pending_.insert(news.fingerprint);
    if (!teller_.isActive()) {
        teller_.start();
    }
}

void RunBridge::tell() {
    emit changed(std::exchange(pending_, {}));
}

void RunBridge::want(std::shared_ptr<const studies::Snapshot> snapshot,
                     const std::vector<studies::Runner::Wanted>& cells) {
    if (!busy()) {
        batchStart_ms_ = QDateTime::currentMSecsSinceEpoch();
    }
    runner_->want(std::move(snapshot), cells);
}

void RunBridge::cancel() { runner_->cancel(); }
void RunBridge::cancel(const plant::Fingerprint& fingerprint) { runner_->cancel(fingerprint); }

std::shared_ptr<const RunTraces> RunBridge::traces(const studies::StoredRun& stored) {
    auto& known = traces_[stored.fingerprint];
    if (stored.run && (!known || known->run != stored.run)) {
        known = makeRunTraces(stored.run);
    }
    return known;
}

bool RunBridge::busy() const {
    const auto load = runner_->load();
    return load.waiting > 0 || load.running > 0;
}

QString RunBridge::timeLeft() const {
    const auto load = runner_->load();
    const double done_s = load.doneSeconds;
    const double spent_s =
        static_cast<double>(QDateTime::currentMSecsSinceEpoch() - batchStart_ms_) * 1e-3;
    if ((load.waiting == 0 && load.running == 0) || !(done_s > 0.0) || spent_s < 0.3) {
        return {};
    }
    const double left_s = (load.wantedSeconds - load.doneSeconds) * spent_s / done_s;
    return tr("about %1 left").arg(durationWords(std::max(0.0, left_s)));
}

} // namespace headroom::desk
