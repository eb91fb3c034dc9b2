// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/picture_export.h"
#include "drawing/section_picture.h"
#include "support/catch.h"

#include <QPainter>

#include <algorithm>
#include <chrono>

#include "picture_checks.h"
#include "sample.h"

using namespace headroom;
using namespace headroom::drawing;

namespace {

const QSizeF usual(928, 285);

struct Shot {
    std::shared_ptr<const studies::Snapshot> snapshot;
    studies::Cell cell;
    SectionPicture picture;
};

Shot sample(QSizeF size = usual, Selection selection = {{{-1, 4}}, 0, 151.0, {}},
            Scheme scheme = Scheme::light) {
    test::startGui();
    auto snapshot = test::snapshotOf(test::sampleProject());
    auto cell = test::doneCell(*snapshot, -1, 4);
    auto picture = sectionPicture({*snapshot, &cell, std::move(selection), size, look(scheme)});
    return {std::move(snapshot), std::move(cell), std::move(picture)};
}

const Item* find(const Items& items, ItemKind kind, const std::string& name) {
    const auto found = std::find_if(items.begin(), items.end(), [&](const Item& item) {
        return item.kind == kind && !item.thing.empty() && item.thing.back() == name;
    });
    return found == items.end() ? nullptr : &*found;
}

int count(const Items& items, ItemKind kind) {
    return static_cast<int>(std::count_if(items.begin(), items.end(),
                                          [&](const Item& item) { return item.kind == kind; }));
}

} // namespace

TEST_CASE("Section: everything of the plant is an item that can be pressed",
          "[drawing][invariant]") {
    const auto shot = sample();
    const auto& items = shot.picture.items;
    for (const auto& [kind, name] : {std::pair(ItemKind::reservoir, "Upper lake"),
                                     {ItemKind::reservoir, "Tailwater"},
                                     {ItemKind::conduit, "Headrace"},
                                     {ItemKind::conduit, "Penstock"},
                                     {ItemKind::chamber, "Surge shaft"},
                                     {ItemKind::unit, "U1"},
                                     {ItemKind::point, "Intake"}}) {
        CAPTURE(name);
        const Item* item = find(items, kind, name);
        REQUIRE(item != nullptr);
        if (kind == ItemKind::unit) {
            CHECK(itemAt(items, item->box.center(), 0.0) == item);
        }
    }
    // Middle of tunnel, shaft and unit answer with themselves.
    const auto& map = shot.picture.map();
    const Item* tunnel = itemAt(items, {map.x_px(1800), shot.picture.y_px(466.7)});
    REQUIRE(tunnel != nullptr);
    CHECK(tunnel->thing.back() == "Headrace");
    const Item* shaft = itemAt(items, {map.x_px(5000), shot.picture.y_px(505.0)});
    REQUIRE(shaft != nullptr);
    CHECK(shaft->thing.back() == "Surge shaft");
    CHECK(count(items, ItemKind::envelope) == 2);
    CHECK(count(items, ItemKind::limitZone) >= 4);
    CHECK(count(items, ItemKind::breakMark) == 1);
}

TEST_CASE("Section: the lozenge says value, time and distance", "[drawing][messages]") {
    const auto shot = sample();
    const auto& items = shot.picture.items;
    const auto labelled = std::find_if(items.begin(), items.end(), [](const Item& item) {
        return item.kind == ItemKind::lozenge && !item.label.isEmpty();
    });
    REQUIRE(labelled != items.end());
    CHECK(labelled->limit == 0);
    CHECK(labelled->time_s == 151.0);
    CHECK(labelled->label.toStdString() == "456.1\u2009m at 151\u2009s, 1.9\u2009m below");
    CHECK_THAT(labelled->description.toStdString(), ContainsSubstring("broken"));
    // It sits at the shaft, at its value.
    const auto place = std::find_if(items.begin(), items.end(), [](const Item& item) {
        return item.kind == ItemKind::lozenge && item.limit == 0 && item.label.isEmpty();
    });
    REQUIRE(place != items.end());
    CHECK_THAT(place->box.center().x(), WithinAbs(shot.picture.map().x_px(5000.0), 1e-6));
    CHECK_THAT(place->box.center().y(), WithinAbs(shot.picture.y_px(456.1), 1e-6));
}

TEST_CASE("Section: a chosen limit leads instead of the worst", "[drawing][invariant]") {
    const auto shot = sample(usual, {{{-1, 4}}, 2, 10.0, {}});
    const auto& items = shot.picture.items;
    const auto labelled = std::find_if(items.begin(), items.end(), [](const Item& item) {
        return item.kind == ItemKind::lozenge && !item.label.isEmpty();
    });
    REQUIRE(labelled != items.end());
    CHECK(labelled->limit == 2);
}

TEST_CASE("Section: labels keep their boxes and leave each other alone", "[drawing][invariant]") {
    for (const QSizeF size :
         {QSizeF(928, 285), QSizeF(600, 200), QSizeF(1400, 480), QSizeF(380, 150)}) {
        for (const double scale : {1.0, 1.5}) {
            test::startGui();
            for (const auto& project :
                 {test::sampleProject(), test::branchedProject(), test::startedProject()}) {
                const auto snapshot = test::snapshotOf(project);
                const auto cell =
                    snapshot->studies() > 0 ? test::doneCell(*snapshot, -1, 0) : studies::Cell{};
                const Look& the = look(Scheme::light, scale);
                for (const auto* shown : {&cell, static_cast<const studies::Cell*>(nullptr)}) {
                    const auto picture =
                        sectionPicture({*snapshot, shown, {{{-1, 0}}, -1, 20.0, {}}, size, the});
                    CAPTURE(size.width(), size.height(), scale, project.title);
                    CHECK(test::faults(picture.items, size, the).toStdString() == "");
                }
            }
        }
    }
}

TEST_CASE("Section: names are left out only in want of room, and counted", "[drawing][limit]") {
    CHECK(sample().picture.labelsLeftOut == 0);
    CHECK(sample({300, 90}).picture.labelsLeftOut > 0);
}

TEST_CASE("Section: elevation and chainage there and back", "[drawing][invariant]") {
    const auto shot = sample();
    for (const double elevation : {262.0, 456.1, 590.0}) {
        CHECK_THAT(shot.picture.elevation_m(shot.picture.y_px(elevation)),
                   WithinAbs(elevation, 1e-9));
    }
    CHECK(shot.picture.y_px(500.0) < shot.picture.y_px(300.0));
}

TEST_CASE("Section: without results the plant is drawn all the same", "[drawing][limit]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::sampleProject());
    const auto picture = sectionPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    CHECK(find(picture.items, ItemKind::chamber, "Surge shaft") != nullptr);
    CHECK(count(picture.items, ItemKind::envelope) == 0);
    CHECK(count(picture.items, ItemKind::lozenge) == 0);
    CHECK_THAT(picture.description(3.0).toStdString(), ContainsSubstring("No results"));
}

TEST_CASE("Section: an empty project says how to begin", "[drawing][messages]") {
    test::startGui();
    const auto snapshot = test::snapshotOf({});
    const auto picture = sectionPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    for (const char* words : {"Start where the water does.", openDemoWords, openProjectWords}) {
        const auto found =
            std::find_if(picture.items.begin(), picture.items.end(),
                         [&](const Item& item) { return item.label == QString::fromUtf8(words); });
        REQUIRE(found != picture.items.end());
        CHECK(itemAt(picture.items, found->box.center()) == &*found);
    }
    CHECK(test::faults(picture.items, usual, look(Scheme::light)).toStdString() == "");
    CHECK_THAT(picture.description(0).toStdString(), ContainsSubstring("Empty project"));
}

TEST_CASE("Section: a plant under way says what is missing next", "[drawing][messages]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::startedProject());
    const auto picture = sectionPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    const bool said = std::any_of(picture.items.begin(), picture.items.end(), [](const Item& item) {
        return item.label.contains(QStringLiteral("no unit yet"));
    });
    CHECK(said);
}

TEST_CASE("Section: branches on one way stand beside each other, units on shelves",
          "[drawing][invariant]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::branchedProject());
    const auto picture = sectionPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    const Item* first = find(picture.items, ItemKind::conduit, "Penstock");
    const Item* second = find(picture.items, ItemKind::conduit, "Penstock 2");
    REQUIRE(first != nullptr);
    REQUIRE(second != nullptr);
    CHECK(first->shape.boundingRect() != second->shape.boundingRect());
    std::vector<QRectF> units;
    for (const char* name : {"U1", "U2", "U3"}) {
        const Item* unit = find(picture.items, ItemKind::unit, name);
        REQUIRE(unit != nullptr);
        for (const auto& other : units) {
            CHECK_FALSE(other.intersects(unit->box));
        }
        units.push_back(unit->box);
    }
}

TEST_CASE("Section: what is selected is seen", "[drawing][invariant]") {
    const auto plain = sample();
    const auto chosen =
        sample(usual, {{{-1, 4}}, 0, 151.0, {"plant", "chambers", "Surge shaft", "shape"}});
    const auto still = [](const SectionPicture& picture) {
        return paintToImage(usual, 1.0, look(Scheme::light),
                            [&](QPainter& p) { picture.paintStill(p); });
    };
    CHECK(test::differing(still(plain.picture), still(chosen.picture)) > 0.0005);
}

TEST_CASE("Section: time moves water and head line, and nothing else", "[drawing][invariant]") {
    const auto shot = sample();
    const auto moving = [&](double time) {
        return paintToImage(usual, 1.0, look(Scheme::light),
                            [&](QPainter& p) { shot.picture.paintMoving(p, time); });
    };
    CHECK(test::differing(moving(0.0), moving(45.0)) > 0.001);
    CHECK(test::differing(moving(45.0), moving(45.0)) == 0.0);
    CHECK_THAT(shot.picture.description(45.0).toStdString(),
               ContainsSubstring("Surge shaft stands at"));
}

TEST_CASE("Section: painting is quick", "[drawing][run]") {
    const auto shot = sample();
    QImage image(928, 285, QImage::Format_ARGB32_Premultiplied);
    const auto best_ms = [&](const std::function<void(QPainter&)>& paint) {
        double best = 1e9;
        for (int i = 0; i < 20; ++i) {
            QPainter painter(&image);
            const auto start = std::chrono::steady_clock::now();
            paint(painter);
            const std::chrono::duration<double, std::milli> spent =
                std::chrono::steady_clock::now() - start;
            best = std::min(best, spent.count());
        }
        return best;
    };
    const double still = best_ms([&](QPainter& p) { shot.picture.paintStill(p); });
    const double moving = best_ms([&](QPainter& p) { shot.picture.paintMoving(p, 45.0); });
    const auto start = std::chrono::steady_clock::now();
    const auto again = sample();
    const std::chrono::duration<double, std::milli> made = std::chrono::steady_clock::now() - start;
    WARN("still " << still << " ms, moving " << moving << " ms, making with its test data "
                  << made.count() << " ms");
    // Six times the aim, for busy machines and sanitisers.
    CHECK(still < 36.0);
    CHECK(moving < 6.0);
}

TEST_CASE("Section: a unit on a shelf keeps its own centre line in words", "[drawing][messages]") {
    test::startGui();
    const auto snapshot = test::snapshotOf(test::branchedProject());
    const auto picture = sectionPicture({*snapshot, nullptr, {}, usual, look(Scheme::light)});
    for (const char* name : {"U1", "U2", "U3"}) {
        const Item* unit = find(picture.items, ItemKind::unit, name);
        REQUIRE(unit != nullptr);
        CHECK_THAT(unit->description.toStdString(), ContainsSubstring("262.0\u2009m"));
    }
}
