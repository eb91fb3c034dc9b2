// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "plant/tree.h"
#include "plant/project.h"

#include <QString>
#include <string_view>

/// Words that the window's parts share.
namespace headroom::desk {

QString text(std::string_view utf8);

/// "4 min", "20 s": rounded as a person would say it, never "0 s".
QString durationWords(double seconds);

/// "Surge shaft, diameter": the thing, then the value's label; the last key if unknown.
QString pathWords(const plant::Path& path);
/// The name of the thing a path leads to or through: "Surge shaft"; empty if none.
QString thingName(const plant::Path& path);
/// The part of a path that names a thing: plant/chambers/Surge shaft; the whole if none.
plant::Path thingPath(const plant::Path& path);

/// "no findings", "1 finding", "6 findings, 1 error".
QString findingsWords(int count, int errors);

/// Short tag of a run, printed beside what comes from it: "7Q-0418".
QString traceTag(const plant::Fingerprint& fingerprint);

} // namespace headroom::desk
