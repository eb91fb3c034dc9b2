// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <variant>
#include <vector>

namespace headroom {

enum class Severity { note, warning, error };

/// One kind of finding: what is so and the next thing to try, in whole sentences.
/// `{name}` in a text is replaced by the argument of that name. Each floor declares its own
/// templates as `inline constexpr Message` in `<floor>/messages.h` and lists them in a
/// `std::span<const Message* const> messages()` so that one test can render all of them.
struct Message {
    std::string_view code; ///< stable, for example "plant.unknown-key"
    Severity severity;
    std::string_view what; ///< what is so, with value and limit
    std::string_view mend; ///< the next thing to try; "" only for notes
};

/// A number that keeps its quantity until it is printed. `quantity` is a `headroom::Quantity`
/// as its integer (base lies below units; `units/text.h` prints it).
struct Amount {
    int quantity = 0;
    double si = 0.0;
};

using Argument = std::variant<Amount, std::int64_t, std::string>;

/// Line and column in a file, both from 1.
struct FilePlace {
    std::string file;
    int line = 0;
    int column = 0;
};

/// What a user can mend: where, what, with which numbers. Never finished text.
struct Finding {
    const Message* message = nullptr; ///< never null in a finding that is handed on
    std::string subject = {};         ///< path in the project, "plant/chambers/Surge shaft"
    std::vector<std::pair<std::string, Argument>> arguments = {};
    std::optional<FilePlace> place = {};
    std::optional<FilePlace> otherPlace = {}; ///< for a clash: the second place
    std::optional<double> time_s = {};   ///< simulated time, when it has one
    std::vector<std::string> related = {}; ///< further paths the finding is about

    Severity severity() const { return message->severity; }
};

using Findings = std::vector<Finding>;

inline bool anyError(const Findings& findings) {
    for (const auto& finding : findings) {
        if (finding.severity() == Severity::error) {
            return true;
        }
    }
    return false;
}

} // namespace headroom
