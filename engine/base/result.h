// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/ensure.h"
#include "base/finding.h"

#include <optional>
#include <utility>

namespace headroom {

/// A value, or the findings that prevented it; notes and warnings may stand beside a value.
template <class Value>
class [[nodiscard]] Result {
public:
    Result(Value value, Findings findings = {}) // NOLINT: meant to convert
        : value_(std::move(value)), findings_(std::move(findings)) {}
    Result(Findings findings) : findings_(std::move(findings)) { // NOLINT: meant to convert
        ensure(!findings_.empty(), "a result without value says why");
    }
    Result(Finding finding) : Result(Findings{std::move(finding)}) {} // NOLINT: meant to convert

    explicit operator bool() const { return value_.has_value(); }
    const Value& value() const& { ensure(value_.has_value(), "value of a failed result"); return *value_; }
    Value& value() & { ensure(value_.has_value(), "value of a failed result"); return *value_; }
    Value&& value() && { ensure(value_.has_value(), "value of a failed result"); return std::move(*value_); }
    const Value& operator*() const& { return value(); }
    const Value* operator->() const { return &value(); }
    const Findings& findings() const { return findings_; }

private:
    std::optional<Value> value_;
    Findings findings_;
};

} // namespace headroom
