// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_writer.h"
#include "support/catch.h"

#include "project_support.h"

using namespace headroom;
using namespace headroom::plant;
using support::dorvane;
using support::json;

namespace {

/// Fingerprints of all cells of a project.
std::vector<std::string> cells(const Project& project) {
    std::vector<std::string> out;
    for (int option = -1; option < project.options.size(); ++option) {
        const auto plant = variant(project, option);
        for (const auto& study : project.studies) {
            out.push_back(fingerprint(plant, study.second, project.numerics, 1).text());
        }
    }
    return out;
}

std::vector<Path> thingsOf(const Tree& tree) {
    std::vector<Path> things;
    for (const auto collection :
         {Collection::points, Collection::reservoirs, Collection::conduits, Collection::chambers,
          Collection::units, Collection::limits, Collection::options, Collection::studies}) {
        for (const auto& member : tree.at(pathOf(collection))->members()) {
            things.push_back(pathOf(collection));
            things.back().push_back(member.first);
        }
    }
    for (const auto& study : tree.find("studies")->members()) {
        for (const auto& event : study.second.find("events")->members()) {
            things.push_back({"studies", study.first, "events", event.first});
        }
    }
    for (const auto& conduit : tree.find("plant")->find("conduits")->members()) {
        for (const auto& reach : conduit.second.find("reaches")->members()) {
            things.push_back({"plant", "conduits", conduit.first, "reaches", reach.first});
        }
    }
    return things;
}

} // namespace

TEST_CASE("renamed: nothing is outdated by a new name, and it can be taken back",
          "[plant][invariant]") {
    const auto before = cells(bind(dorvane()).project);
    const std::string bytes = files::writeProject(dorvane());
    const auto things = thingsOf(dorvane());
    CHECK(things.size() > 40);
    for (const auto& thing : things) {
        INFO(join(thing));
        const auto next = renamed(dorvane(), thing, "A new name");
        REQUIRE(next);
        CHECK(next->at(thing) == nullptr);
        const auto bound = bind(*next);
        INFO(support::texts(bound.findings));
        CHECK(bound.findings.empty());
        CHECK(cells(bound.project) == before);
        Path there = thing;
        there.back() = "A new name";
        const auto back = renamed(*next, there, thing.back());
        REQUIRE(back);
        CHECK(files::writeProject(*back) == bytes);
    }
}

TEST_CASE("renamed: the walk reaches every place that names the thing", "[plant][invariant]") {
    const auto next = renamed(dorvane(), split("plant/units/U1"), "Set 1");
    REQUIRE(next);
    const std::string text = files::writeProject(*next);
    CHECK(text.find("\"U1\"") == std::string::npos);
    CHECK(next->at(split("options/Flywheel/changes/plant/units/Set 1/inertia/j_tm2")) != nullptr);
    const auto kept =
        dorvane().with(split("ranges/Rough/of"), json(R"(["plant", "units", "U1", "inertia"])"));
    const auto moved = renamed(kept, split("plant/units/U1"), "Set 1");
    REQUIRE(moved);
    CHECK(*moved->at(split("ranges/Rough/of"))
          == json(R"(["plant", "units", "Set 1", "inertia"])"));
}

TEST_CASE("renamed: a bad or taken name is refused", "[plant][messages]") {
    const auto code = [](const Path& thing, const char* to) {
        const auto result = renamed(dorvane(), thing, to);
        return result ? std::string("done") : std::string(result.findings().front().message->code);
    };
    CHECK(code(split("plant/units/U1"), "") == "plant.name-empty");
    CHECK(code(split("plant/units/U1"), "intake") == "plant.name-taken");
    CHECK(code(split("plant/units/U1"), "u1") == "done");
    CHECK(code(split("plant/units/U1"), "Flywheel") == "done");
    CHECK(code(split("options/Flywheel"), "wider SHAFT") == "plant.name-taken");
    CHECK(code(split("plant/units/U9"), "x") == "plant.nothing-to-rename");
    CHECK(code(split("plant/units/U1/servo"), "x") == "plant.nothing-to-rename");
    CHECK(code(split("site"), "x") == "plant.nothing-to-rename");
}
