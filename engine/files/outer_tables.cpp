// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/outer_tables.h"

#include "files/messages.h"
#include "plant/fields.h"

#include <algorithm>
#include <cctype>
#include <cerrno>
#include <charconv>
#include <cmath>
#include <cstring>
#include <fstream>

namespace headroom::files {

namespace {

using plant::Field;
using plant::FieldKind;
using plant::Path;
using plant::Tree;
namespace fs = std::filesystem;

std::string_view trimmed(std::string_view text) {
    const auto isBlank = [](char letter) {
        return letter == ' ' || letter == '\t' || letter == '\r';
    };
    while (!text.empty() && isBlank(text.front())) {
        text.remove_prefix(1);
    }
    while (!text.empty() && isBlank(text.back())) {
        text.remove_suffix(1);
    }
    return text;
}

/// Reads one line of numbers; false if it holds something else or another count.
bool numbersIn(std::string_view line, int columns, std::vector<double>& out) {
    out.clear();
    while (true) {
        const auto comma = line.find(',');
        auto cell = trimmed(line.substr(0, comma));
        if (cell.size() >= 2 && cell.front() == '"' && cell.back() == '"') {
            cell = trimmed(cell.substr(1, cell.size() - 2));
        }
        double number = 0.0;
        const auto [end, fault] = std::from_chars(cell.data(), cell.data() + cell.size(), number);
        if (fault != std::errc() || end != cell.data() + cell.size() || !std::isfinite(number)) {
            return false;
        }
        out.push_back(number);
        if (comma == std::string_view::npos) {
            return out.size() == static_cast<std::size_t>(columns);
        }
        line.remove_prefix(comma + 1);
    }
}

Finding fault(const Message& message, const std::string& name,
              std::vector<std::pair<std::string, Argument>> more = {}) {
    Finding finding;
    finding.message = &message;
    finding.arguments = std::move(more);
    finding.arguments.emplace_back("file", name);
    return finding;
}

/// A line without end is cut here: no table has longer rows.
constexpr std::size_t longestLine_bytes = 4096;

bool nextLine(std::istream& in, std::string& line) {
    line.clear();
    std::streambuf* buffer = in.rdbuf();
    for (int letter = buffer->sbumpc(); letter != EOF; letter = buffer->sbumpc()) {
        if (letter == '\n') {
            return true;
        }
        line += static_cast<char>(letter);
        if (line.size() > longestLine_bytes) {
            return true;
        }
    }
    return !line.empty();
}

/// Whether `file` lies under `folder` when all links are followed.
bool isUnder(const fs::path& file, const fs::path& folder) {
    std::error_code failed;
    const auto root = fs::weakly_canonical(folder, failed);
    if (failed) {
        return false;
    }
    const auto target = fs::weakly_canonical(file, failed);
    if (failed) {
        return false;
    }
    const auto [end, rest] = std::mismatch(root.begin(), root.end(), target.begin(), target.end());
    return end == root.end() && rest != target.end();
}

class Loader {
public:
    Loader(const fs::path& folder, const plant::Places& places, Findings& findings)
        : folder_(folder.empty() ? fs::path(".") : folder), places_(places), findings_(findings) {}

    Tree inside(const Field& owner, bool names, const Tree& tree) {
        std::vector<Tree::Member> members = tree.members();
        bool same = true;
        for (auto& [key, value] : members) {
            const Field* row = names ? &owner : plant::rowInside(owner, key);
            if (row == nullptr || !value.isObject()) {
                continue;
            }
            path_.push_back(key);
            Tree next = member(*row, names, value);
            path_.pop_back();
            same = same && next.sameAs(value);
            value = std::move(next);
        }
        return same ? tree : Tree::object(std::move(members));
    }

private:
    Tree member(const Field& row, bool named, const Tree& value) {
        if (named) {
            return inside(row, false, value);
        }
        switch (row.kind) {
        case FieldKind::table:
            return loaded(row, value);
        case FieldKind::keyed:
            return inside(row, true, value);
        case FieldKind::patch:
            return inside(plant::varyingRow(), false, value);
        case FieldKind::group:
        case FieldKind::oneOf:
            return inside(row, false, value);
        default:
            return value;
        }
    }

    Tree loaded(const Field& row, const Tree& value) {
        const Tree* name = value.find(plant::outerTableKey);
        if (name == nullptr || !name->isText()) {
            return value; // the reader says what is wrong with it
        }
        const fs::path relative(name->asText());
        const fs::path file = folder_ / relative;
        if (relative.is_absolute() || !isUnder(file, folder_)) {
            tell({fault(say::tableOutside, name->asText())});
            return value;
        }
        auto read = readCsvTable(file, name->asText(), static_cast<int>(row.columns.size()));
        tell(std::move(read.findings));
        return read.table ? value.withOuterTable(std::move(read.table)) : value;
    }

    void tell(Findings found) {
        for (auto& finding : found) {
            finding.subject = plant::join(path_);
            finding.otherPlace = finding.place;
            finding.place = places_ ? places_(path_) : std::nullopt;
            findings_.push_back(std::move(finding));
        }
    }

    fs::path folder_;
    const plant::Places& places_;
    Findings& findings_;
    Path path_;
};

} // namespace

CsvTable readCsvTable(const fs::path& file, const std::string& name, int columns) {
    std::error_code failed;
    if (!fs::is_regular_file(file, failed)) {
        return {nullptr, {fault(say::tableNotFound, name)}};
    }
    std::ifstream in(file, std::ios::binary);
    if (!in) {
        return {
            nullptr,
            {fault(say::tableNotReadable, name, {{"reason", std::string(std::strerror(errno))}})}};
    }
    auto table = std::make_shared<plant::OuterTable>();
    table->columns = columns;
    std::string line;
    std::vector<double> row;
    for (std::int64_t number = 1; nextLine(in, line); ++number) {
        if (trimmed(line).empty()) {
            continue;
        }
        if (!numbersIn(line, columns, row)) {
            if (number == 1) {
                continue; // names of the columns
            }
            Finding finding =
                fault(say::tableRow, name, {{"line", number}, {"columns", std::int64_t{columns}}});
            finding.place = FilePlace{name, static_cast<int>(number), 1};
            return {nullptr, {std::move(finding)}};
        }
        if (table->rows() >= longestOuterTable) {
            return {nullptr, {fault(say::tableHuge, name, {{"most", longestOuterTable}})}};
        }
        table->values.insert(table->values.end(), row.begin(), row.end());
    }
    return {std::move(table), {}};
}

Tree withOuterTables(const Tree& project, const fs::path& folder, const plant::Places& places,
                     Findings& findings) {
    return Loader(folder, places, findings).inside(plant::projectRow(), false, project);
}

} // namespace headroom::files
