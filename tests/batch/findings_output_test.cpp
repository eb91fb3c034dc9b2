// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/findings_output.h"

#include "batch/messages.h"
#include "units/text.h"

#include "support/catch.h"

using namespace headroom;
using namespace headroom::batch;

TEST_CASE("a finding shows its place, the line and a mark under it", "[batch][messages]") {
    Finding finding;
    finding.message = &badPart;
    finding.arguments = {{"part", std::string("x")}};
    finding.place = FilePlace{"a.json", 2, 7};
    const auto out = findingText(finding, "{\n  \"ä\": nonsense,\n}\n", "As built – Trip");
    CHECK_THAT(out, ContainsSubstring("a.json:2:7: error: As built – Trip: "));
    CHECK_THAT(out, ContainsSubstring("[batch.bad-part]"));
    CHECK_THAT(out, ContainsSubstring("      \"ä\": nonsense,\n         ^\n"));
}

TEST_CASE("a finding in a long line shows the part around it", "[batch][messages]") {
    Finding finding;
    finding.message = &noOutput;
    finding.place = FilePlace{"a.json", 1, 500};
    const auto out = findingText(finding, std::string(1000, 'x'));
    CHECK(out.size() < 400);
    CHECK_THAT(out, ContainsSubstring("^"));
    finding.place->column = 5000; // a place beyond the line has no excerpt
    CHECK(findingText(finding, "short").find('^') == std::string::npos);
}

TEST_CASE("a finding as data has every part", "[batch][files]") {
    Finding finding;
    finding.message = &noOutput;
    finding.subject = "plant/units/U1";
    const auto tree = findingTree(finding);
    CHECK(tree.find("severity")->asText() == "error");
    CHECK(tree.find("code")->asText() == "batch.no-output");
    CHECK(tree.find("subject")->asText() == "plant/units/U1");
    CHECK(tree.find("line")->isNull());
    CHECK_FALSE(tree.find("mend")->asText().empty());
}

TEST_CASE("batch: every message renders and ends as a sentence", "[batch][messages]") {
    for (const Message* message : messages()) {
        Finding finding;
        finding.message = message;
        for (const char* name : {"name", "known", "near", "part", "folder", "reason"}) {
            finding.arguments.emplace_back(name, std::string(name));
        }
        const auto sentence = text(finding);
        CAPTURE(sentence);
        CHECK(sentence.find('{') == std::string::npos);
        CHECK((sentence.back() == '.' || sentence.back() == '"'));
    }
}
