// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/messages.h"
#include "support/catch.h"
#include "units/text.h"

#include <fstream>
#include <iterator>
#include <set>

#include "project_support.h"

using namespace headroom;

namespace {

/// A finding with a value for every name in the message's texts.
Finding sampleOf(const Message& message) {
    Finding finding;
    finding.message = &message;
    finding.subject = "plant/chambers/Surge shaft";
    for (const auto part : {message.what, message.mend}) {
        for (std::size_t at = part.find('{'); at != std::string_view::npos;
             at = part.find('{', at + 1)) {
            const auto end = part.find('}', at);
            REQUIRE(end != std::string_view::npos);
            finding.arguments.emplace_back(std::string(part.substr(at + 1, end - at - 1)),
                                           amount(Quantity::elevation, -456.15));
        }
    }
    return finding;
}

} // namespace

TEST_CASE("messages: each of the plant's says what is so and what to do, in any style",
          "[plant][messages]") {
    const NumberStyle comma{',', false};
    std::set<std::string_view> codes;
    for (const auto* message : plant::messages()) {
        INFO(message->code);
        CHECK(codes.insert(message->code).second);
        CHECK(message->code.starts_with("plant."));
        CHECK((message->severity == Severity::note || !message->mend.empty()));
        CHECK((message->what.ends_with('.') || message->what.ends_with('}')));
        const auto finding = sampleOf(*message);
        const auto point = text(finding);
        const auto other = text(finding, comma);
        for (const auto& rendered : {point, other}) {
            CHECK(rendered.find('{') == std::string::npos);
            CHECK(rendered.find('!') == std::string::npos);
            CHECK(rendered.find("lease") == std::string::npos);
        }
        if (!finding.arguments.empty()) {
            CHECK_THAT(point, ContainsSubstring("−456.1"));
            CHECK_THAT(other, ContainsSubstring("-456,1"));
        }
    }
}

TEST_CASE("messages: the list holds every template of the header", "[plant][messages]") {
    std::ifstream in(HEADROOM_SOURCE_DIR "/engine/plant/messages.h");
    const std::string header((std::istreambuf_iterator<char>(in)),
                             std::istreambuf_iterator<char>());
    std::size_t declared = 0;
    for (std::size_t at = header.find("constexpr Message "); at != std::string::npos;
         at = header.find("constexpr Message ", at + 1)) {
        ++declared;
    }
    CHECK(declared == plant::messages().size());
}
