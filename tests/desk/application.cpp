// SPDX-License-Identifier: GPL-3.0-or-later
#include "application.h"

headroom::desk::Application& application() {
    static int count = 1;
    static char name[] = "test_desk";
    static char* words[] = {name, nullptr};
    static auto* made = [] {
        qputenv("QT_QPA_PLATFORM", "offscreen");
        return new headroom::desk::Application(count, words); // lives as long as the program
    }();
    return *made;
}
