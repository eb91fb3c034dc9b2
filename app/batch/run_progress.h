// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/runner.h"

#include <chrono>
#include <functional>
#include <mutex>
#include <string>

namespace headroom::batch {

/// Tells on standard error how far the matrix is: a line for each finished run, with the time
/// left from the simulated seconds done of all wanted.
class RunProgress {
public:
    /// @param nameOf cell that is shown for a fingerprint
    RunProgress(int wanted, std::function<std::string(const plant::Fingerprint&)> nameOf);

    studies::Runner::Listener listener();
    /// The runner whose load is asked; known only after the listener was handed to it.
    void watch(const studies::Runner& runner);

private:
    void tell(const studies::Runner::News& news);

    std::mutex mutex_;
    const studies::Runner* runner_ = nullptr;
    std::function<std::string(const plant::Fingerprint&)> nameOf_;
    std::chrono::steady_clock::time_point start_;
    int wanted_ = 0, ended_ = 0;
};

/// Time left [s] at the pace so far; 0 when nothing is left, never below; nothing before there
/// is a pace.
std::optional<double> timeLeft_s(double elapsed_s, const studies::Runner::Load& load);

} // namespace headroom::batch
