// SPDX-License-Identifier: GPL-3.0-or-later
#include "application.h"

#include <algorithm>
#include <ctime>

double threadTime_s() {
    timespec time{};
    clock_gettime(CLOCK_THREAD_CPUTIME_ID, &time);
    return static_cast<double>(time.tv_sec) + static_cast<double>(time.tv_nsec) * 1e-9;
}

bool TimedApplication::notify(QObject* receiver, QEvent* event) {
    const double before = depth_++ == 0 ? threadTime_s() : -1.0; // events of other threads do not
    const bool taken = Application::notify(receiver, event);     // come here: no window of theirs
    if (--depth_ == 0 && before >= 0.0) {
        longest_s_ = std::max(longest_s_, threadTime_s() - before);
    }
    return taken;
}

TimedApplication& application() {
    static int count = 1;
    static char name[] = "test_desk";
    static char* words[] = {name, nullptr};
    static auto* made = [] {
        qputenv("QT_QPA_PLATFORM", "offscreen");
        return new TimedApplication(count, words); // lives as long as the program
    }();
    return *made;
}
