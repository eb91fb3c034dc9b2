// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/constants.h"
#include "base/ensure.h"
#include "base/finding.h"
#include "base/overloaded.h"
#include "base/result.h"

#include "support/catch.h"

#include <string>
#include <variant>

using namespace headroom;

namespace {

constexpr Message note{"test.note", Severity::note, "A note.", ""};
constexpr Message fault{"test.fault", Severity::error, "A fault.", "Mend it."};

Finding finding(const Message& message) {
    Finding made;
    made.message = &message;
    return made;
}

} // namespace

TEST_CASE("ensure: a broken promise names the file and what was promised", "[base][messages]") {
    CHECK_NOTHROW(ensure(true, "never said"));
    try {
        ensure(false, "water runs downhill");
        FAIL("a broken promise throws");
    } catch (const Bug& bug) {
        CHECK_THAT(bug.what(), ContainsSubstring("finding_test.cpp"));
        CHECK_THAT(bug.what(), ContainsSubstring("water runs downhill"));
    }
}

TEST_CASE("Result: has a value or says why not, never neither", "[base][invariant]") {
    const Result<int> good(7, {finding(note)});
    REQUIRE(good);
    CHECK(good.value() == 7);
    CHECK(good.findings().size() == 1);

    const Result<int> bad(finding(fault));
    REQUIRE_FALSE(bad);
    CHECK(bad.findings().front().message == &fault);
    CHECK_THROWS_AS(bad.value(), Bug);
    CHECK_THROWS_AS(Result<int>(Findings{}), Bug);
}

TEST_CASE("Findings: only an error stops", "[base][invariant]") {
    CHECK_FALSE(anyError({}));
    CHECK_FALSE(anyError({finding(note)}));
    CHECK(anyError({finding(note), finding(fault)}));
}

TEST_CASE("overloaded: every alternative finds its own lambda", "[base][invariant]") {
    const auto kind = [](const std::variant<int, std::string>& value) {
        return std::visit(overloaded{[](int) { return 1; }, [](const std::string&) { return 2; }},
                          value);
    };
    CHECK(kind(3) == 1);
    CHECK(kind("three") == 2);
}
