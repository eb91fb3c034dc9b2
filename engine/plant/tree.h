// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cstddef>
#include <memory>
#include <string>
#include <string_view>
#include <utility>
#include <variant>
#include <vector>

namespace headroom::plant {

/// A path in a project: keys from the top, "plant", "chambers", "Surge shaft".
using Path = std::vector<std::string>;

/// "plant/chambers/Surge shaft"; a slash or backslash inside a name is written after a backslash.
std::string join(const Path& path);
Path split(std::string_view joined);

/// A table that stands in a file of its own, row by row in the units of the project file.
struct OuterTable {
    int columns = 0;
    std::vector<double> values; ///< rows × columns
    int rows() const { return columns > 0 ? static_cast<int>(values.size()) / columns : 0; }
};

/// An immutable value tree: what a project file says, and what an option's patch says.
///
/// Copies are cheap; an edit copies only the objects along its path and shares the rest, so a
/// thousand undo steps beside a long table cost little. Object members keep their order.
class Tree {
public:
    enum class Type { null, boolean, number, text, array, object };
    using Member = std::pair<std::string, Tree>;

    Tree() = default; ///< null
    static Tree boolean(bool value);
    static Tree number(double value);
    static Tree text(std::string value);
    static Tree array(std::vector<Tree> items);
    static Tree object(std::vector<Member> members);

    Type type() const;
    bool isNull() const { return type() == Type::null; }
    bool isObject() const { return type() == Type::object; }
    bool isArray() const { return type() == Type::array; }
    bool isNumber() const { return type() == Type::number; }
    bool isText() const { return type() == Type::text; }

    bool asBoolean() const;                     ///< `Bug` if it is something else
    double asNumber() const;                    ///< `Bug` if it is something else
    const std::string& asText() const;          ///< `Bug` if it is something else
    const std::vector<Tree>& items() const;     ///< of an array; empty for others
    const std::vector<Member>& members() const; ///< of an object; empty for others

    const Tree* find(std::string_view key) const; ///< member of an object or nullptr
    const Tree* at(const Path& path) const;       ///< walks objects; nullptr if absent

    /// An object that names an outer table, `{"csv": "shaft.csv"}`, carries what was read from it
    /// along through every copy; it is never written and takes no part in comparisons.
    Tree withOuterTable(std::shared_ptr<const OuterTable> table) const;
    const OuterTable* outerTable() const; ///< nullptr: none read

    /// This tree with `value` at `path`; missing objects on the way are made, a new key goes last.
    Tree with(const Path& path, Tree value) const;
    /// This tree without the member at `path`; itself if absent. `pruneEmpty` drops objects that
    /// become empty on the way up (used when an option takes a value back).
    Tree without(const Path& path, bool pruneEmpty = false) const;
    /// Renames a key in place, keeping its position. `Bug` if `from` is absent or `to` exists.
    Tree renamed(const Path& parent, std::string_view from, std::string_view to) const;

    bool sameAs(const Tree& other) const;     ///< same node: equal without looking
    bool operator==(const Tree& other) const; ///< deep; order of members matters
    std::size_t nodeCount() const;            ///< for limits and tests

private:
    struct Node;
    using NodePtr = std::shared_ptr<const Node>;
    explicit Tree(NodePtr node) : value_(std::move(node)) {}
    static Tree objectWith(std::vector<Member> members, std::shared_ptr<const OuterTable> table);
    const Node* node() const;
    Tree withFrom(const Path& path, std::size_t depth, Tree value) const;
    Tree withoutFrom(const Path& path, std::size_t depth, bool pruneEmpty) const;

    std::variant<std::monostate, bool, double, NodePtr> value_; // numbers stand in line
};

/// Deep equality that lets members of objects stand in any order.
bool sameContent(const Tree& a, const Tree& b);

/// JSON Merge Patch (RFC 7396): `null` deletes, objects merge, all else replaces.
Tree mergePatch(const Tree& target, const Tree& patch);
/// The patch that leads from `before` to `after`: merge(before, patch) has the content of `after`.
/// `after` holds no null (a patch cannot say one).
Tree makePatch(const Tree& before, const Tree& after);

/// One value that differs between two trees.
struct Difference {
    Path path;
    const Tree* before; ///< nullptr: absent
    const Tree* after;  ///< nullptr: absent
};
/// Leaves (numbers, texts, tables whole) that differ, in the order of `after`.
std::vector<Difference> differences(const Tree& before, const Tree& after);

} // namespace headroom::plant
