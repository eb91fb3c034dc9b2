// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_writer.h"

#include "base/ensure.h"
#include "plant/fields.h"

#include <algorithm>
#include <charconv>
#include <cmath>

namespace headroom::files {

namespace {

using plant::Field;
using plant::FieldKind;
using plant::Tree;

constexpr int indentation = 2;
/// Rows of a table that still stand on one line, and members of an object with one inner object.
constexpr std::size_t shortTable = 8, shortObject = 4;

bool isThing(const Tree& value) {
    return value.isObject() && !value.members().empty();
}

bool shortArray(const Tree& value) {
    const auto& items = value.items();
    const bool nested = std::any_of(items.begin(), items.end(), [](const Tree& item) {
        return item.isArray() || item.isObject();
    });
    return !nested
           || (items.size() <= shortTable && std::none_of(items.begin(), items.end(), isThing));
}

class Writer {
public:
    std::string take() { return std::move(out_); }

    void write(const Tree& value, const Field* row, bool isName, int depth) {
        if (value.isObject() && !onOneLine(value, row, isName)) {
            return writeObject(value, row, isName, depth);
        }
        if (value.isArray() && !shortArray(value)) {
            return writeRows(value, depth);
        }
        writeLine(value);
    }

private:
    /// Row of a member; nullptr where the rows say nothing.
    static const Field* rowFor(const Field* owner, bool isName, const std::string& key) {
        if (owner == nullptr) {
            return nullptr;
        }
        if (isName) {
            return owner; // a user's name: the collection's row holds for the thing
        }
        return plant::rowInside(*owner, key);
    }
    static bool holdsNames(const Field* row) {
        return row != nullptr && row->kind == FieldKind::keyed;
    }

    /// @param isName the members of this object are the user's names
    bool onOneLine(const Tree& value, const Field* row, bool isName) const {
        if (row != nullptr && row->kind == FieldKind::patch) {
            return true;
        }
        if (isName && isThing(value)) {
            return false;
        }
        std::size_t inner = 0;
        for (const auto& [key, member] : value.members()) {
            const Field* memberRow = rowFor(row, isName, key);
            if (memberRow != nullptr && memberRow->kind == FieldKind::patch) {
                return false;
            }
            if (member.isArray() && !shortArray(member)) {
                return false;
            }
            if (isThing(member)) {
                ++inner;
                const bool alone = value.members().size() == 1;
                if (inner > 1 || value.members().size() > shortObject
                    || !onOneLine(member, memberRow, holdsNames(memberRow))
                    || (!alone && holdsThings(member))) {
                    return false;
                }
            }
        }
        return true;
    }
    static bool holdsThings(const Tree& value) {
        return std::any_of(value.members().begin(), value.members().end(),
                           [](const Tree::Member& member) { return isThing(member.second); });
    }

    void newLine(int depth) {
        out_ += '\n';
        out_.append(static_cast<std::size_t>(depth * indentation), ' ');
    }

    void writeObject(const Tree& value, const Field* row, bool isName, int depth) {
        out_ += '{';
        bool first = true;
        for (const auto& [key, member] : value.members()) {
            out_ += first ? "" : ",";
            first = false;
            newLine(depth + 1);
            out_ += quoted(key) + ": ";
            const Field* memberRow = rowFor(row, isName, key);
            write(member, memberRow, !isName && holdsNames(memberRow), depth + 1);
        }
        newLine(depth);
        out_ += '}';
    }

    void writeRows(const Tree& value, int depth) {
        out_ += '[';
        bool first = true;
        for (const auto& item : value.items()) {
            out_ += first ? "" : ",";
            first = false;
            newLine(depth + 1);
            write(item, nullptr, false, depth + 1);
        }
        newLine(depth);
        out_ += ']';
    }

    void writeLine(const Tree& value) {
        switch (value.type()) {
        case Tree::Type::null:
            out_ += "null";
            return;
        case Tree::Type::boolean:
            out_ += value.asBoolean() ? "true" : "false";
            return;
        case Tree::Type::number:
            out_ += shortest(value.asNumber());
            return;
        case Tree::Type::text:
            out_ += quoted(value.asText());
            return;
        case Tree::Type::array:
            return writeList(value);
        case Tree::Type::object:
            break;
        }
        out_ += '{';
        bool first = true;
        for (const auto& [key, member] : value.members()) {
            out_ += (first ? "" : ", ") + quoted(key) + ": ";
            first = false;
            writeLine(member);
        }
        out_ += '}';
    }

    void writeList(const Tree& value) {
        out_ += '[';
        bool first = true;
        for (const auto& item : value.items()) {
            out_ += first ? "" : ", ";
            first = false;
            writeLine(item);
        }
        out_ += ']';
    }

    std::string out_;
};

} // namespace

std::string quoted(std::string_view text) {
    constexpr std::string_view digits = "0123456789abcdef";
    std::string out = "\"";
    for (const char letter : text) {
        const auto code = static_cast<unsigned char>(letter);
        if (letter == '"' || letter == '\\') {
            out += '\\';
            out += letter;
        } else if (letter == '\n') {
            out += "\\n";
        } else if (letter == '\t') {
            out += "\\t";
        } else if (code < 0x20U) {
            out += "\\u00";
            out += digits[code >> 4U];
            out += digits[code & 0xFU];
        } else {
            out += letter;
        }
    }
    return out + '"';
}

std::string shortest(double number) {
    ensure(std::isfinite(number), "a file holds finite numbers");
    char buffer[32];
    const auto end = std::to_chars(buffer, buffer + sizeof buffer, number).ptr;
    return {buffer, end};
}

std::string writeProject(const Tree& project) {
    Writer writer;
    writer.write(project, &plant::projectRow(), false, 0);
    return writer.take() + "\n";
}

std::string writeJson(const Tree& tree) {
    Writer writer;
    writer.write(tree, nullptr, false, 0);
    return writer.take() + "\n";
}

} // namespace headroom::files
