// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/text_table.h"

#include <algorithm>

namespace headroom::batch {

namespace {

std::string line(const std::vector<std::string>& cells, const std::vector<std::size_t>& widths,
                 const std::vector<std::size_t>& right) {
    std::string out;
    for (std::size_t i = 0; i < cells.size(); ++i) {
        const std::string blanks(widths[i] - displayWidth(cells[i]), ' ');
        const bool toRight = std::find(right.begin(), right.end(), i) != right.end();
        out += i == 0 ? "" : "  ";
        out += toRight ? blanks : "";
        out += cells[i];
        out += toRight ? "" : blanks;
    }
    out.erase(out.find_last_not_of(' ') + 1);
    return out + "\n";
}

} // namespace

std::size_t displayWidth(std::string_view text) {
    return static_cast<std::size_t>(std::count_if(text.begin(), text.end(), [](char letter) {
        return (static_cast<unsigned char>(letter) & 0xC0U) != 0x80U;
    }));
}

std::string textTable(const std::vector<std::vector<std::string>>& rows,
                      const std::vector<std::size_t>& right) {
    std::vector<std::size_t> widths(rows.front().size(), 0);
    for (const auto& row : rows) {
        for (std::size_t i = 0; i < row.size(); ++i) {
            widths[i] = std::max(widths[i], displayWidth(row[i]));
        }
    }
    std::vector<std::string> rule;
    for (const auto width : widths) {
        rule.emplace_back(width, '-');
    }
    std::string out = line(rows.front(), widths, right) + line(rule, widths, right);
    for (std::size_t i = 1; i < rows.size(); ++i) {
        out += line(rows[i], widths, right);
    }
    return out;
}

} // namespace headroom::batch
