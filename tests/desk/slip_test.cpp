// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include "application.h"
#include "desk/document.h"
#include "desk/slip_entry.h"
#include "driver.h"

using namespace headroom;
using namespace headroom::desk;

namespace {

const plant::Path shaft{"plant", "chambers", "Surge shaft"};
const plant::Path diameter{"plant", "chambers", "Surge shaft", "shape", "throttled", "diameter_m"};

/// The demo, opened once.
Document& demo() {
    static drive::Bench* bench = nullptr;
    static Document* document = [] {
        application();
        bench = new drive::Bench;
        auto* made = new Document;
        made->openFile(bench->demo().toStdString());
        return made;
    }();
    return *document;
}

int option(const char* name) { return demo().snapshot()->project().options.indexOf(name); }

SlipReading read(int optionInHand, const plant::Path& path, const char* typed) {
    return SlipEntry(demo().snapshot(), optionInHand, path).read(QString::fromUtf8(typed));
}

} // namespace

TEST_CASE("Slip: a short name, arithmetic and units choose and change a value", "[desk][slip]") {
    for (const char* typed : {"dia 10", "dia = 8*1.25", "10", "=8*1.25", "+=2", "*=1.25", "10 m",
                              "diameter 1000 cm", "DIA 10,0"}) {
        INFO(typed);
        const auto reading = read(-1, shaft, typed);
        CHECK(reading.fault.toStdString() == "");
        CHECK(reading.changes);
        REQUIRE(reading.next.at(diameter) != nullptr);
        CHECK_THAT(reading.next.at(diameter)->asNumber(), WithinRel(10.0, 1e-12));
        CHECK(reading.shown.toStdString() == "10.00\u2009m");
    }
    const auto feet = read(-1, shaft, "dia 30 ft");
    CHECK_THAT(feet.next.at(diameter)->asNumber(), WithinRel(9.144, 1e-12));
}

TEST_CASE("Slip: with an option in the hand only the option changes", "[desk][slip]") {
    const int hand = option("Reload not before 300 s");
    const auto reading = read(hand, shaft, "dia 10");
    CHECK(reading.next.at(diameter)->asNumber() == 8.0);
    const auto* changes = reading.next.at({"options", "Reload not before 300 s", "changes"});
    REQUIRE(changes != nullptr);
    REQUIRE(changes->at(diameter) != nullptr);
    CHECK(changes->at(diameter)->asNumber() == 10.0);
}

TEST_CASE("Slip: a value of the base entered again is taken back", "[desk][slip]") {
    const int hand = option("Wider shaft");
    const SlipEntry entry(demo().snapshot(), hand, diameter);
    CHECK(entry.differs(entry.current()));
    const auto reading = entry.read(QStringLiteral("8"));
    CHECK(reading.changes);
    CHECK(reading.next.at({"options", "Wider shaft", "changes"})->members().empty());
    CHECK(entry.takenBack(entry.current()) == reading.next);
}

TEST_CASE("Slip: what cannot be taken says why and changes nothing", "[desk][slip]") {
    struct Case {
        const char* typed;
        const char* says;
    };
    for (const auto& [typed, says] : {Case{"dia 500", "lies within 0.1 to 200"},
                                      Case{"dia -3", "lies within"}, Case{"rim 450", ""},
                                      Case{"xyz 3", "No value of this name"},
                                      Case{"dia 8*", "no number"}, Case{"dia 8 MW", "not a number or a unit"},
                                      Case{"dia 1/0", "finite"}}) {
        INFO(typed);
        const auto reading = read(-1, shaft, typed);
        CHECK_FALSE(reading.fault.isEmpty());
        CHECK_THAT(reading.fault.toStdString(), ContainsSubstring(says));
    }
}

TEST_CASE("Slip: it tells what the value is, where it comes from and what is usual", "[desk][slip]") {
    const SlipEntry inBase(demo().snapshot(), -1, diameter);
    const auto facts = inBase.facts(inBase.current());
    CHECK(facts.what.toStdString() == "Surge shaft, diameter");
    CHECK_THAT(facts.origin.toStdString(), ContainsSubstring("As built 8.00") && ContainsSubstring("Shaft drawing DV-09"));
    CHECK_THAT(facts.usual.toStdString(), ContainsSubstring("2 to 40"));
    CHECK_THAT(facts.effect.toStdString(), ContainsSubstring("surge period"));
    CHECK(facts.stays.join(QLatin1Char('|')).contains(QStringLiteral("in Wider shaft")));
    const SlipEntry wider(demo().snapshot(), option("Wider shaft"), diameter);
    CHECK(wider.facts(wider.current()).differs);
}

TEST_CASE("Slip: every number of the project can be reached and entered", "[desk][slip]") {
    const auto snapshot = demo().snapshot();
    int numbers = 0;
    for (const auto& value : allValues(snapshot->project(), snapshot->variant(-1))) {
        if (!value.numeric() || !value.given) {
            continue;
        }
        ++numbers;
        SlipEntry entry(snapshot, -1, value.path);
        if (value.column >= 0) {
            entry.choose(value.row, value.column);
        }
        INFO(plant::join(value.path));
        REQUIRE(entry.current() < static_cast<int>(entry.values().size()));
        CHECK(entry.values()[static_cast<std::size_t>(entry.current())] == value);
        const auto same = entry.read(QStringLiteral("=") + entry.startText(entry.current()));
        CHECK(same.fault.toStdString() == "");
        CHECK_FALSE(same.changes); // entering what is there changes nothing, to the last digit
        const auto facts = entry.facts(entry.current());
        CHECK_FALSE(facts.what.isEmpty());
        CHECK_FALSE(facts.help.isEmpty());
    }
    // Counted in the demo's file: every number outside notes and options.
    CHECK(numbers > 150);
}

TEST_CASE("Slip: cells of a table change the table and nothing else", "[desk][slip]") {
    const plant::Path axis{"plant", "conduits", "Headrace", "axis"};
    SlipEntry entry(demo().snapshot(), -1, axis);
    entry.choose(1, 1);
    const auto reading = entry.read(QStringLiteral("458"));
    REQUIRE(reading.fault.toStdString() == "");
    const auto* rows = reading.next.at(axis);
    REQUIRE(rows->items().size() == 2);
    CHECK(rows->items()[1].items()[1].asNumber() == 458.0);
    CHECK(rows->items()[1].items()[0].asNumber() == 3600.0);
    CHECK(rows->items()[0] == demo().tree().at(axis)->items()[0]);
}

TEST_CASE("Slip: words are entered too", "[desk][slip]") {
    const plant::Path penstock{"plant", "conduits", "Penstock"};
    const auto rigid = read(-1, penstock, "model rigid");
    CHECK(rigid.fault.toStdString() == "");
    CHECK(rigid.next.at({"plant", "conduits", "Penstock", "model"})->asText() == "rigid");
    const auto wrong = read(-1, penstock, "model wobbly");
    CHECK_THAT(wrong.fault.toStdString(), ContainsSubstring("automatic, elastic, rigid"));
    const auto nowhere = read(-1, penstock, "to Nowhere");
    CHECK_FALSE(nowhere.fault.isEmpty());
}
