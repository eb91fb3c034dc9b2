// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace headroom::plant {

/// The user's own names with their values, in the order of the file.
template <class Value>
class Keyed {
public:
    using Item = std::pair<std::string, Value>;

    bool empty() const { return items_.empty(); }
    int size() const { return static_cast<int>(items_.size()); }
    auto begin() const { return items_.begin(); }
    auto end() const { return items_.end(); }
    auto begin() { return items_.begin(); }
    auto end() { return items_.end(); }

    const Value& operator[](int index) const {
        return items_[static_cast<std::size_t>(index)].second;
    }
    Value& operator[](int index) { return items_[static_cast<std::size_t>(index)].second; }
    const std::string& name(int index) const {
        return items_[static_cast<std::size_t>(index)].first;
    }

    /// Index of a name, or -1.
    int indexOf(std::string_view name) const {
        for (std::size_t i = 0; i < items_.size(); ++i) {
            if (items_[i].first == name) {
                return static_cast<int>(i);
            }
        }
        return -1;
    }
    const Value* find(std::string_view name) const {
        const int index = indexOf(name);
        return index < 0 ? nullptr : &(*this)[index];
    }
    Value& add(std::string name, Value value = {}) {
        items_.emplace_back(std::move(name), std::move(value));
        return items_.back().second;
    }
    std::vector<std::string> names() const {
        std::vector<std::string> out;
        for (const auto& item : items_) {
            out.push_back(item.first);
        }
        return out;
    }

private:
    std::vector<Item> items_;
};

} // namespace headroom::plant
