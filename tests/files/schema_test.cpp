// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/project_file.h"
#include "files/schema.h"
#include "support/catch.h"

using namespace headroom;
using namespace headroom::files;

TEST_CASE("schema: resources/project.schema.json is what the rows say", "[files][files]") {
    const auto stored = readFile(HEADROOM_SOURCE_DIR "/resources/project.schema.json");
    REQUIRE(stored);
    // Not CHECK(a == b): half a megabyte on both sides helps nobody.
    const bool same = *stored == projectSchemaText();
    INFO("write the output of `headroom-batch schema` to resources/project.schema.json");
    CHECK(same);
}

TEST_CASE("schema: keys are closed, own ones are free, patches require nothing",
          "[files][invariant]") {
    const auto schema = projectSchema();
    CHECK(schema.find("$schema")->asText() == "https://json-schema.org/draft/2020-12/schema");
    CHECK_FALSE(schema.find("additionalProperties")->asBoolean());
    CHECK(schema.at({"patternProperties", "^x-"}) != nullptr);
    const auto* patch =
        schema.at({"properties", "options", "additionalProperties", "properties", "changes"});
    REQUIRE(patch != nullptr);
    CHECK(patch->at({"properties", "studies"}) == nullptr);
    CHECK(patch->at({"properties", "plant"}) != nullptr);
    CHECK(patch->find("required") == nullptr);
}
