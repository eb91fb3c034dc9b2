// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/demo.h"

#include "desk/messages.h"

#include <QCoreApplication>
#include <QStandardPaths>

namespace headroom::desk {

namespace {

namespace fs = std::filesystem;

constexpr const char* projectName = "Dorvane.headroom.json";
constexpr const char* plantFolder = "dorvane";

} // namespace

fs::path demoFolder() {
    const fs::path program = QCoreApplication::applicationDirPath().toStdString();
    const fs::path places[] = {program / "../share/headroom/studies", program / "../../studies",
                               fs::path(HEADROOM_STUDIES_FOLDER)};
    for (const auto& place : places) {
        std::error_code ignored;
        if (fs::exists(place / plantFolder / projectName, ignored)) {
            return place;
        }
    }
    return {};
}

Result<fs::path> ownDemo(const fs::path& documents) {
    const auto source = demoFolder();
    if (source.empty()) {
        return Finding{.message = &say::demoMissing};
    }
    const auto own = documents / "Headroom" / "Dorvane";
    std::error_code failed;
    if (fs::exists(own / projectName, failed)) {
        return own / projectName;
    }
    fs::create_directories(own, failed);
    if (!failed) {
        fs::copy(source / plantFolder, own,
                 fs::copy_options::recursive | fs::copy_options::skip_existing, failed);
    }
    if (failed) {
        return Finding{.message = &say::demoNotCopied,
                       .arguments = {{"folder", own.string()}, {"reason", failed.message()}}};
    }
    return own / projectName;
}

fs::path documentsFolder() {
    return QStandardPaths::writableLocation(QStandardPaths::DocumentsLocation).toStdString();
}

} // namespace headroom::desk
