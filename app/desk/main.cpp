// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/application.h"
#include "desk/main_window.h"

int main(int count, char* words[]) {
    headroom::desk::Application application(count, words);
    headroom::desk::MainWindow window;
    application.watch(window);
    window.show();
    const auto arguments = application.arguments();
    window.start(arguments.size() > 1 ? arguments.at(1) : QString());
    return application.exec();
}
