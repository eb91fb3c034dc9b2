// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/tree.h"

#include "base/ensure.h"

#include <algorithm>

namespace headroom::plant {

struct Tree::Node {
    struct Object {
        std::vector<Member> members;
        std::shared_ptr<const OuterTable> table;
    };
    std::variant<std::string, std::vector<Tree>, Object> content;
};

std::string join(const Path& path) {
    std::string out;
    for (std::size_t i = 0; i < path.size(); ++i) {
        if (i > 0) {
            out += '/';
        }
        for (const char letter : path[i]) {
            if (letter == '/' || letter == '\\') {
                out += '\\';
            }
            out += letter;
        }
    }
    return out;
}

Path split(std::string_view joined) {
    if (joined.empty()) {
        return {};
    }
    Path path(1);
    for (std::size_t i = 0; i < joined.size(); ++i) {
        if (joined[i] == '\\' && i + 1 < joined.size()) {
            path.back() += joined[++i];
        } else if (joined[i] == '/') {
            path.emplace_back();
        } else {
            path.back() += joined[i];
        }
    }
    return path;
}

// --- making -------------------------------------------------------------------------------------

Tree Tree::boolean(bool value) {
    Tree tree;
    tree.value_ = value;
    return tree;
}

Tree Tree::number(double value) {
    Tree tree;
    tree.value_ = value;
    return tree;
}

Tree Tree::text(std::string value) {
    return Tree(std::make_shared<const Node>(Node{std::move(value)}));
}

Tree Tree::array(std::vector<Tree> items) {
    return Tree(std::make_shared<const Node>(Node{std::move(items)}));
}

Tree Tree::object(std::vector<Member> members) {
    return objectWith(std::move(members), nullptr);
}

Tree Tree::objectWith(std::vector<Member> members, std::shared_ptr<const OuterTable> table) {
    return Tree(
        std::make_shared<const Node>(Node{Node::Object{std::move(members), std::move(table)}}));
}

// --- questions ----------------------------------------------------------------------------------

const Tree::Node* Tree::node() const {
    const auto* pointer = std::get_if<NodePtr>(&value_);
    return pointer ? pointer->get() : nullptr;
}

Tree::Type Tree::type() const {
    if (std::holds_alternative<bool>(value_)) {
        return Type::boolean;
    }
    if (std::holds_alternative<double>(value_)) {
        return Type::number;
    }
    const Node* inner = node();
    if (inner == nullptr) {
        return Type::null;
    }
    constexpr Type byIndex[] = {Type::text, Type::array, Type::object};
    return byIndex[inner->content.index()];
}

bool Tree::asBoolean() const {
    ensure(std::holds_alternative<bool>(value_), "asBoolean of a truth value");
    return std::get<bool>(value_);
}

double Tree::asNumber() const {
    ensure(std::holds_alternative<double>(value_), "asNumber of a number");
    return std::get<double>(value_);
}

const std::string& Tree::asText() const {
    ensure(isText(), "asText of a text");
    return std::get<std::string>(node()->content);
}

const std::vector<Tree>& Tree::items() const {
    static const std::vector<Tree> none;
    return isArray() ? std::get<std::vector<Tree>>(node()->content) : none;
}

const std::vector<Tree::Member>& Tree::members() const {
    static const std::vector<Member> none;
    return isObject() ? std::get<Node::Object>(node()->content).members : none;
}

const Tree* Tree::find(std::string_view key) const {
    for (const auto& member : members()) {
        if (member.first == key) {
            return &member.second;
        }
    }
    return nullptr;
}

const Tree* Tree::at(const Path& path) const {
    const Tree* here = this;
    for (const auto& key : path) {
        here = here->find(key);
        if (here == nullptr) {
            return nullptr;
        }
    }
    return here;
}

const OuterTable* Tree::outerTable() const {
    return isObject() ? std::get<Node::Object>(node()->content).table.get() : nullptr;
}

bool Tree::sameAs(const Tree& other) const {
    return value_ == other.value_;
}

bool Tree::operator==(const Tree& other) const {
    if (sameAs(other)) {
        return true;
    }
    if (type() != other.type()) {
        return false;
    }
    switch (type()) {
    case Type::text:
        return asText() == other.asText();
    case Type::array:
        return items() == other.items();
    case Type::object:
        return members() == other.members();
    default:
        return false; // scalars were compared above
    }
}

bool sameContent(const Tree& a, const Tree& b) {
    if (a.sameAs(b)) {
        return true;
    }
    if (a.isArray() && b.isArray()) {
        return std::equal(a.items().begin(), a.items().end(), b.items().begin(), b.items().end(),
                          sameContent);
    }
    if (!a.isObject() || !b.isObject()) {
        return a == b;
    }
    return a.members().size() == b.members().size()
           && std::all_of(a.members().begin(), a.members().end(), [&](const Tree::Member& member) {
                  const Tree* other = b.find(member.first);
                  return other != nullptr && sameContent(member.second, *other);
              });
}

std::size_t Tree::nodeCount() const {
    std::size_t count = 1;
    for (const auto& item : items()) {
        count += item.nodeCount();
    }
    for (const auto& member : members()) {
        count += member.second.nodeCount();
    }
    return count;
}

// --- edits --------------------------------------------------------------------------------------

Tree Tree::withOuterTable(std::shared_ptr<const OuterTable> table) const {
    ensure(isObject(), "an outer table is carried by the object that names it");
    return objectWith(members(), std::move(table));
}

Tree Tree::with(const Path& path, Tree value) const {
    return withFrom(path, 0, std::move(value));
}

Tree Tree::withFrom(const Path& path, std::size_t depth, Tree value) const {
    if (depth == path.size()) {
        return value;
    }
    std::vector<Member> next = members();
    for (auto& member : next) {
        if (member.first == path[depth]) {
            member.second = member.second.withFrom(path, depth + 1, std::move(value));
            return object(std::move(next));
        }
    }
    next.emplace_back(path[depth], Tree().withFrom(path, depth + 1, std::move(value)));
    return object(std::move(next));
}

Tree Tree::without(const Path& path, bool pruneEmpty) const {
    if (path.empty() || at(path) == nullptr) {
        return *this;
    }
    return withoutFrom(path, 0, pruneEmpty);
}

Tree Tree::withoutFrom(const Path& path, std::size_t depth, bool pruneEmpty) const {
    std::vector<Member> next = members();
    const auto found = std::find_if(next.begin(), next.end(), [&](const Member& member) {
        return member.first == path[depth];
    });
    if (depth + 1 == path.size()) {
        next.erase(found);
        return object(std::move(next));
    }
    found->second = found->second.withoutFrom(path, depth + 1, pruneEmpty);
    if (pruneEmpty && found->second.members().empty()) {
        next.erase(found);
    }
    return object(std::move(next));
}

Tree Tree::renamed(const Path& parent, std::string_view from, std::string_view to) const {
    const Tree* owner = at(parent);
    ensure(owner != nullptr && owner->find(from) != nullptr, "the renamed key exists");
    ensure(from == to || owner->find(to) == nullptr, "the new key is free");
    std::vector<Member> next = owner->members();
    for (auto& member : next) {
        if (member.first == from) {
            member.first = std::string(to);
        }
    }
    return with(parent, object(std::move(next)));
}

} // namespace headroom::plant
