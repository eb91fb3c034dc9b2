// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/application.h"

/// The one application of this test program, on the platform without a screen. It notes the
/// longest stretch of processor time that the window's thread spent on one event: what a user
/// feels as a stuck window, without what other programs take.
class TimedApplication final : public headroom::desk::Application {
public:
    using Application::Application;
    bool notify(QObject* receiver, QEvent* event) override;

    void forget() { longest_s_ = 0.0; }
    double longest_s() const { return longest_s_; }

private:
    int depth_ = 0;
    double longest_s_ = 0.0;
};

TimedApplication& application();

/// Processor time of this thread [s].
double threadTime_s();
