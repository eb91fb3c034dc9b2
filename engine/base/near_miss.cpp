// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/near_miss.h"

#include <algorithm>
#include <vector>

namespace headroom {

namespace {

char lower(char letter) {
    return letter >= 'A' && letter <= 'Z' ? static_cast<char>(letter - 'A' + 'a') : letter;
}

std::size_t editDistance(std::string_view a, std::string_view b) {
    std::vector<std::size_t> row(b.size() + 1);
    for (std::size_t j = 0; j <= b.size(); ++j) {
        row[j] = j;
    }
    for (std::size_t i = 1; i <= a.size(); ++i) {
        std::size_t diagonal = row[0];
        row[0] = i;
        for (std::size_t j = 1; j <= b.size(); ++j) {
            const std::size_t kept = diagonal + (lower(a[i - 1]) == lower(b[j - 1]) ? 0 : 1);
            diagonal = row[j];
            row[j] = std::min({kept, row[j] + 1, row[j - 1] + 1});
        }
    }
    return row[b.size()];
}

} // namespace

std::optional<std::string> nearMiss(std::string_view wanted, std::span<const std::string> known) {
    std::optional<std::string> best;
    std::size_t least = wanted.size() * 2 / 5 + 1;
    for (const auto& name : known) {
        const auto distance = editDistance(wanted, name);
        if (distance <= least && (!best || distance < least)) {
            best = name;
            least = distance;
        }
    }
    return best;
}

} // namespace headroom
