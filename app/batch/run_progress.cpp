// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/run_progress.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>

namespace headroom::batch {

using News = studies::Runner::News;

RunProgress::RunProgress(int wanted, std::function<std::string(const plant::Fingerprint&)> nameOf)
    : nameOf_(std::move(nameOf)), start_(std::chrono::steady_clock::now()), wanted_(wanted) {}

studies::Runner::Listener RunProgress::listener() {
    return [this](const News& news) { tell(news); };
}

void RunProgress::watch(const studies::Runner& runner) {
    const std::lock_guard lock(mutex_);
    runner_ = &runner;
}

void RunProgress::tell(const News& news) {
    if (news.kind == News::Kind::started || news.kind == News::Kind::progress) {
        return;
    }
    const std::lock_guard lock(mutex_);
    ++ended_;
    const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start_;
    const auto left = runner_ == nullptr ? std::nullopt
                                         : timeLeft_s(elapsed.count(), runner_->load());
    const char* how = news.kind == News::Kind::finished    ? "done"
                      : news.kind == News::Kind::cancelled ? "stopped"
                                                           : "failed";
    const auto line =
        fmt::format("[{}/{}] {}: {}{}\n", ended_, wanted_, nameOf_(news.fingerprint), how,
                    left && ended_ < wanted_ ? fmt::format(", {:.0f} s left", std::ceil(*left))
                                             : std::string());
    std::fwrite(line.data(), 1, line.size(), stderr);
}

std::optional<double> timeLeft_s(double elapsed_s, const studies::Runner::Load& load) {
    if (!(load.doneSeconds > 0.0)) {
        return std::nullopt;
    }
    return std::max(0.0, elapsed_s * (load.wantedSeconds - load.doneSeconds) / load.doneSeconds);
}

} // namespace headroom::batch
