// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/words.h"

#include "plant/fields.h"

#include <QCoreApplication>
#include <algorithm>
#include <cmath>

namespace headroom::desk {

namespace {

/// Keys up to and with the first name of the user's; the whole path if there is none.
std::size_t thingLength(const plant::Path& path) {
    plant::Path part;
    for (std::size_t i = 0; i < path.size(); ++i) {
        const auto* owner = part.empty() ? nullptr : plant::fieldAt(part);
        part.push_back(path[i]);
        if (owner != nullptr && owner->kind == plant::FieldKind::keyed) {
            return i + 1;
        }
    }
    return path.size();
}

QString tr(const char* words) { return QCoreApplication::translate("desk", words); }

} // namespace

QString text(std::string_view utf8) {
    return QString::fromUtf8(utf8.data(), static_cast<qsizetype>(utf8.size()));
}

QString durationWords(double seconds) {
    if (seconds < 1.5) {
        return tr("1 s");
    }
    if (seconds < 20.0) {
        return tr("%1 s").arg(std::lround(seconds));
    }
    if (seconds < 90.0) {
        return tr("%1 s").arg(std::lround(seconds / 10.0) * 10);
    }
    if (seconds < 90.0 * 60.0) {
        return tr("%1 min").arg(std::lround(seconds / 60.0));
    }
    return tr("%1 h").arg(std::lround(seconds / 3600.0));
}

plant::Path thingPath(const plant::Path& path) {
    const auto length = static_cast<std::ptrdiff_t>(thingLength(path));
    return {path.begin(), path.begin() + length};
}

QString thingName(const plant::Path& path) {
    const auto part = thingPath(path);
    if (part.empty()) {
        return {};
    }
    const auto* field = plant::fieldAt(part);
    const bool named = field != nullptr && field->kind == plant::FieldKind::keyed && part.size() > 1;
    return named || field == nullptr ? text(part.back()) : text(field->label);
}

QString pathWords(const plant::Path& path) {
    const auto thing = thingPath(path);
    QString words = thingName(path);
    for (std::size_t i = thing.size(); i < path.size(); ++i) {
        const plant::Path part(path.begin(), path.begin() + static_cast<std::ptrdiff_t>(i) + 1);
        const plant::Path owner(part.begin(), part.end() - 1);
        const auto* field = plant::fieldAt(part);
        const auto* above = plant::fieldAt(owner);
        const bool isName = above != nullptr && above == field;
        const bool container = field != nullptr && field->kind == plant::FieldKind::keyed && !isName;
        const bool kind = (field != nullptr && field->kind == plant::FieldKind::oneOf) ||
                          (above != nullptr && above->kind == plant::FieldKind::oneOf);
        if (container || kind) {
            continue; // "Reaches", "Turbine", "Francis turbine": what stands below says enough
        }
        QString word = isName || field == nullptr ? text(part.back()) : text(field->label).toLower();
        words += words.isEmpty() ? word : QStringLiteral(", ") + word;
    }
    return words;
}

QString findingsWords(int count, int errors) {
    if (count == 0) {
        return tr("no findings");
    }
    auto words = count == 1 ? tr("1 finding") : tr("%1 findings").arg(count);
    if (errors > 0) {
        words += errors == 1 ? tr(", 1 error") : tr(", %1 errors").arg(errors);
    }
    return words;
}

QString traceTag(const plant::Fingerprint& fingerprint) {
    // Letters and digits that are not taken for each other.
    constexpr std::string_view letters = "ACDEFGHJKLMNPQRTUVWXY";
    constexpr std::string_view digits = "23456789";
    const auto number = fingerprint.high;
    QString tag;
    tag += QChar::fromLatin1(digits[number % digits.size()]);
    tag += QChar::fromLatin1(letters[(number >> 8) % letters.size()]);
    return tag + QStringLiteral("-%1").arg((number >> 16) % 10000, 4, 10, QLatin1Char('0'));
}

} // namespace headroom::desk
