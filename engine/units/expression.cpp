// SPDX-License-Identifier: GPL-3.0-or-later
#include "units/expression.h"

#include "units/text.h"

#include <array>
#include <charconv>
#include <cmath>
#include <optional>

namespace headroom::expression {

namespace {

constexpr Message nothingTyped{"units.nothing-typed", Severity::error, "There is no number yet.",
                               "Type a number, with a unit if you like."};
constexpr Message notUnderstood{"units.not-understood", Severity::error,
                                "\"{part}\" is not a number or a unit here.",
                                "Use numbers, + − * / ( ) and the units {units}."};
constexpr Message openParenthesis{"units.open-parenthesis", Severity::error,
                                  "A parenthesis is not closed.", "Add the missing one."};
constexpr Message wrongUnits{"units.wrong-units", Severity::error,
                             "The units of \"{part}\" do not make a {quantity}.",
                             "Multiply and divide by pure numbers."};
constexpr Message notFinite{"units.not-finite", Severity::error, "This is not a finite number.",
                            "Check what it is divided by."};
constexpr Message tooDeep{"units.too-deep", Severity::error,
                          "There are more than {most} parentheses within each other.",
                          "Work part of it out first."};
constexpr std::array<const Message*, 6> all{&nothingTyped, &notUnderstood, &openParenthesis,
                                            &wrongUnits,   &notFinite,     &tooDeep};

constexpr int deepest = 50;

/// A number so far: in SI once a unit word was read, else as typed.
struct Term {
    double value = 0.0;
    bool hasUnit = false;
};

std::string listed(Quantity quantity) {
    std::string text;
    for (const auto& unit : unitWords(quantity)) {
        text += (text.empty() ? "" : ", ") + std::string(unit.word);
    }
    return text.empty() ? "(none)" : text;
}

bool isDigit(char letter) { return letter >= '0' && letter <= '9'; }

/// Reads by recursive descent: sum → product → signed → atom with unit.
class Reader {
public:
    Reader(std::string_view text, Quantity quantity)
        : rest_(text), quantity_(quantity), words_(unitWords(quantity)) {}

    Result<double> whole() {
        skipBlanks();
        if (rest_.empty()) {
            return Finding{.message = &nothingTyped};
        }
        const Term term = sum();
        skipBlanks();
        if (!fault_ && !rest_.empty()) {
            refuse(notUnderstood, rest_);
        }
        if (fault_) {
            return *fault_;
        }
        const double si = term.hasUnit ? term.value : toSi(quantity_, term.value);
        if (!std::isfinite(si)) {
            return Finding{.message = &notFinite};
        }
        return si;
    }

private:
    bool take(std::string_view sign) {
        skipBlanks();
        if (!rest_.starts_with(sign)) {
            return false;
        }
        rest_.remove_prefix(sign.size());
        return true;
    }
    bool takeAny(std::initializer_list<std::string_view> signs) {
        for (const auto sign : signs) {
            if (take(sign)) {
                return true;
            }
        }
        return false;
    }
    void skipBlanks() {
        for (const std::string_view blank : {" ", "\t", "\u00a0", "\u2009", "\u202f"}) {
            if (rest_.starts_with(blank)) {
                rest_.remove_prefix(blank.size());
                return skipBlanks();
            }
        }
    }
    void refuse(const Message& message, std::string_view part) {
        if (!fault_) {
            fault_ = Finding{.message = &message};
            fault_->arguments = {{"part", std::string(part)},
                                 {"units", listed(quantity_)},
                                 {"quantity", std::string(info(quantity_).name)},
                                 {"most", std::int64_t{deepest}}};
        }
    }

    Term sum() {
        Term left = product();
        while (!fault_) {
            const bool plus = take("+");
            if (!plus && !takeAny({"-", "−"})) {
                break;
            }
            left = added(left, product(), plus ? 1.0 : -1.0);
        }
        return left;
    }
    /// A number beside one with a unit is in the quantity's own unit.
    Term added(Term left, Term right, double sign) const {
        if (left.hasUnit != right.hasUnit) {
            auto& bare = left.hasUnit ? right : left;
            bare = {toSi(quantity_, bare.value), true};
        }
        return {left.value + sign * right.value, left.hasUnit};
    }

    Term product() {
        const auto start = rest_;
        Term left = factor();
        while (!fault_) {
            const bool times = takeAny({"*", "×", "·"});
            if (!times && !takeAny({"/", "÷"})) {
                break;
            }
            const Term right = factor();
            left = times ? multiplied(left, right) : divided(left, right);
            if (wrong_) {
                refuse(wrongUnits, start.substr(0, start.size() - rest_.size()));
            }
        }
        return left;
    }
    Term multiplied(Term left, Term right) {
        wrong_ = wrong_ || (left.hasUnit && right.hasUnit);
        return {left.value * right.value, left.hasUnit || right.hasUnit};
    }
    Term divided(Term left, Term right) {
        wrong_ = wrong_ || (!left.hasUnit && right.hasUnit);
        return {left.value / right.value, left.hasUnit && !right.hasUnit};
    }

    Term factor() {
        if (++depth_ > deepest) {
            refuse(tooDeep, rest_);
            return {};
        }
        Term term;
        if (take("+")) {
            term = factor();
        } else if (takeAny({"-", "−"})) {
            term = factor();
            term.value = -term.value;
        } else {
            term = withUnit(take("(") ? parenthesis() : number());
        }
        --depth_;
        return term;
    }
    Term parenthesis() {
        const Term inner = sum();
        if (!fault_ && !take(")")) {
            refuse(rest_.empty() ? openParenthesis : notUnderstood, rest_);
        }
        return inner;
    }

    Term number() {
        skipBlanks();
        std::string digits;
        takeWhole(digits);
        if (!rest_.empty() && (rest_.front() == '.' || rest_.front() == ',')) {
            digits += '.';
            rest_.remove_prefix(1);
            takeDigits(digits);
        }
        takeExponent(digits);
        double value = 0.0;
        const auto end = digits.data() + digits.size();
        const auto read = std::from_chars(digits.data(), end, value);
        if (read.ec == std::errc::result_out_of_range) {
            refuse(notFinite, digits);
        } else if (read.ec != std::errc{} || read.ptr != end) {
            refuse(rest_.empty() && digits.empty() ? nothingTyped : notUnderstood,
                   digits.empty() ? rest_ : std::string_view(digits));
        }
        return {value, false};
    }
    void takeDigits(std::string& digits) {
        while (!rest_.empty() && isDigit(rest_.front())) {
            digits += rest_.front();
            rest_.remove_prefix(1);
        }
    }
    /// Digits, with further groups of exactly three after a blank.
    void takeWhole(std::string& digits) {
        takeDigits(digits);
        if (digits.empty() || digits.size() > 3) {
            return;
        }
        while (true) {
            const auto before = rest_;
            skipBlanks();
            std::string group;
            takeDigits(group);
            if (group.size() != 3) {
                rest_ = before;
                return;
            }
            digits += group;
        }
    }
    void takeExponent(std::string& digits) {
        if (digits.empty() || rest_.empty() || (rest_.front() != 'e' && rest_.front() != 'E')) {
            return;
        }
        auto ahead = rest_.substr(1);
        std::string exponent = "e";
        if (!ahead.empty() && (ahead.front() == '-' || ahead.front() == '+')) {
            exponent += ahead.front() == '-' ? "-" : "";
            ahead.remove_prefix(1);
        }
        if (!ahead.empty() && isDigit(ahead.front())) {
            rest_ = ahead;
            takeDigits(exponent);
            digits += exponent;
        }
    }

    /// The longest unit word that stands here and is not the beginning of a longer word.
    const UnitWord* unitHere() const {
        const UnitWord* best = nullptr;
        for (const auto& unit : words_) {
            const bool longer = best == nullptr || unit.word.size() > best->word.size();
            if (longer && rest_.starts_with(unit.word) && endsWord(unit.word.size())) {
                best = &unit;
            }
        }
        return best;
    }
    bool endsWord(std::size_t length) const {
        if (length >= rest_.size()) {
            return true;
        }
        const char next = rest_[length];
        const bool letter = (next >= 'a' && next <= 'z') || (next >= 'A' && next <= 'Z');
        const bool higher = rest_.substr(length).starts_with("²") ||
                            rest_.substr(length).starts_with("³");
        return !letter && !isDigit(next) && !higher;
    }
    Term withUnit(Term term) {
        skipBlanks();
        const UnitWord* unit = fault_ ? nullptr : unitHere();
        if (unit == nullptr) {
            return term;
        }
        rest_.remove_prefix(unit->word.size());
        if (term.hasUnit) {
            refuse(wrongUnits, unit->word);
        }
        return {term.value * unit->toSi, true};
    }

    std::string_view rest_;
    Quantity quantity_;
    std::vector<UnitWord> words_;
    std::optional<Finding> fault_;
    int depth_ = 0;
    bool wrong_ = false;
};

/// A pure number for "*=" and "/=".
Result<double> pureNumber(std::string_view text) {
    return evaluate(text, Quantity::factor);
}

Result<double> finite(double value) {
    if (!std::isfinite(value)) {
        return Finding{.message = &notFinite};
    }
    return value;
}

} // namespace

Result<double> evaluate(std::string_view text, Quantity quantity) {
    return Reader(text, quantity).whole();
}

Result<double> entered(std::string_view text, Quantity quantity, double current_si) {
    while (!text.empty() && text.front() == ' ') {
        text.remove_prefix(1);
    }
    const auto after = [&](std::size_t count) { return text.substr(count); };
    if (text.starts_with("=")) {
        return evaluate(after(1), quantity);
    }
    if (text.starts_with("+=") || text.starts_with("-=")) {
        const auto change = evaluate(after(2), quantity);
        const double sign = text.front() == '+' ? 1.0 : -1.0;
        return change ? finite(current_si + sign * *change) : change;
    }
    if (text.starts_with("*=") || text.starts_with("/=")) {
        const auto share = pureNumber(after(2));
        if (!share) {
            return share;
        }
        return finite(text.front() == '*' ? current_si * *share : current_si / *share);
    }
    return evaluate(text, quantity);
}

std::span<const Message* const> messages() {
    return all;
}

} // namespace headroom::expression
