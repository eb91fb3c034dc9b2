// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/section_scene.h"
#include "drawing/words.h"

namespace headroom::drawing::section {

namespace {

QString listOfThings(const Scene& scene) {
    QStringList parts;
    const auto& plant = scene.shown.variant->plant;
    for (const auto& drawing : scene.layout.reservoirs) {
        parts << text(plant.reservoirs.name(drawing.reservoir)) + QStringLiteral(" at ")
                     + numberText(Quantity::elevation, drawing.level_m);
    }
    for (const auto& shape : scene.layout.conduits) {
        parts << text(plant.conduits.name(shape.conduit)) + QLatin1Char(' ')
                     + wholeAmount(Quantity::length, shape.length_m);
    }
    for (const auto& drawing : scene.layout.chambers) {
        parts << text(plant.chambers.name(drawing.chamber));
    }
    for (const auto& drawing : scene.layout.units) {
        parts << text(plant.units.name(drawing.unit));
    }
    return parts.join(QStringLiteral(", "));
}

QString levelsAt(const Scene& scene, double time_s) {
    QString out;
    const auto& plant = scene.shown.variant->plant;
    for (const auto& moving : scene.levels) {
        const auto& drawing = scene.layout.chambers[moving.chamber];
        const double level = valueAt(*moving.channel, scene.shown.run->recordInterval_s, time_s);
        out +=
            QStringLiteral(" At %1 the water in %2 stands at %3.")
                .arg(numberText(Quantity::time, time_s), text(plant.chambers.name(drawing.chamber)),
                     numberText(Quantity::elevation, level));
    }
    return out;
}

} // namespace

QString describe(const Scene& scene, double time_s) {
    if (scene.empty) {
        return QStringLiteral(
            "Empty project: no waterway is drawn yet. Start where the water does.");
    }
    QString out = QStringLiteral("Longitudinal section of %1: %2.")
                      .arg(text(scene.shown.variant->name), listOfThings(scene));
    if (scene.shown.run == nullptr) {
        return out + QStringLiteral(" No results are shown.");
    }
    if (scene.shown.study != nullptr) {
        out += levelsAt(scene, time_s);
    }
    for (const auto& lozenge : scene.lozenges) {
        if (lozenge.leading) {
            const auto& limits = scene.shown.variant->limits;
            out += QLatin1Char(' ')
                   + spokenVerdict(text(limits.name(lozenge.limit)), limits[lozenge.limit],
                                   *scene.shown.verdict(lozenge.limit));
        }
    }
    return out;
}

} // namespace headroom::drawing::section
