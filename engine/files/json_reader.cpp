// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/json_reader.h"

#include "files/messages.h"
#include "plant/fields.h"

#include <nlohmann/json.hpp>

#include <cmath>
#include <iterator>
#include <map>
#include <optional>
#include <unordered_map>

namespace headroom::files {

namespace {

using plant::Tree;

/// Where the keys of a file stand; the children of a list are its rows by number.
struct PlaceNode {
    int line = 1, column = 1;
    std::map<std::string, PlaceNode, std::less<>> inside;
};

/// An iterator over the text that tells how far it has been read.
class Cursor {
public:
    using iterator_category = std::input_iterator_tag;
    using value_type = char;
    using difference_type = std::ptrdiff_t;
    using pointer = const char*;
    using reference = const char&;

    Cursor(const char* at, std::size_t* count) : at_(at), count_(count) {}
    reference operator*() const { return *at_; }
    Cursor& operator++() {
        ++at_;
        ++*count_;
        return *this;
    }
    Cursor operator++(int) {
        Cursor before = *this;
        ++*this;
        return before;
    }
    bool operator==(const Cursor& other) const { return at_ == other.at_; }
    bool operator!=(const Cursor& other) const { return at_ != other.at_; }

private:
    const char* at_;
    std::size_t* count_;
};

/// Line and column of growing offsets; columns count letters, not bytes.
class LineCounter {
public:
    explicit LineCounter(std::string_view text) : text_(text) {}
    std::pair<int, int> at(std::size_t offset) {
        if (offset < done_) {
            done_ = 0;
            line_ = column_ = 1;
        }
        for (; done_ < offset && done_ < text_.size(); ++done_) {
            if (text_[done_] == '\n') {
                ++line_;
                column_ = 1;
            } else if ((static_cast<unsigned char>(text_[done_]) & 0xC0U) != 0x80U) {
                ++column_;
            }
        }
        return {line_, column_};
    }

private:
    std::string_view text_;
    std::size_t done_ = 0;
    int line_ = 1, column_ = 1;
};

/// Builds the tree and the places from the parser's events.
class Builder {
public:
    Builder(std::string_view text, const std::string& file, const std::size_t& read, Parsed& out)
        : text_(text), file_(file), read_(read), lines_(text), out_(out),
          root_(std::make_shared<PlaceNode>()) {}

    std::shared_ptr<const PlaceNode> places() const { return root_; }

    bool null() { return add(Tree(), wordStart()); }
    bool boolean(bool value) { return add(Tree::boolean(value), wordStart()); }
    bool number_integer(std::int64_t value) { return number(static_cast<double>(value)); }
    bool number_unsigned(std::uint64_t value) { return number(static_cast<double>(value)); }
    bool number_float(double value, const std::string&) { return number(value); }
    bool string(std::string& value) { return add(Tree::text(std::move(value)), textStart()); }
    bool binary(nlohmann::json::binary_t&) { return false; }
    bool start_object(std::size_t) { return open(true); }
    bool start_array(std::size_t) { return open(false); }
    bool end_object() { return close(); }
    bool end_array() { return close(); }

    bool key(std::string& name) {
        Frame& frame = frames_.back();
        const auto [line, column] = lines_.at(textStart());
        frame.skip = false;
        if (const auto known = frame.keys.find(name); known != frame.keys.end()) {
            Finding finding = at(say::duplicateKey, line, column);
            finding.arguments = {{"key", name}, {"line", std::int64_t{known->second.first}}};
            finding.otherPlace = FilePlace{file_, known->second.first, known->second.second};
            out_.findings.push_back(std::move(finding));
            frame.skip = true;
        } else {
            frame.keys.emplace(name, std::pair(line, column));
        }
        frame.key = name;
        frame.keyLine = line;
        frame.keyColumn = column;
        return true;
    }

    bool parse_error(std::size_t position, const std::string& token,
                     const nlohmann::json::exception& fault) {
        constexpr int overflow = 406;
        const std::size_t offset = position > 0 ? position - 1 : 0;
        if (fault.id == overflow) {
            return fail(say::numberTooLarge, offset - std::min(offset, token.size()),
                        {{"found", token}});
        }
        const std::size_t last = text_.find_last_not_of(" \t\r\n");
        if (last == std::string_view::npos || offset > last) {
            return fail(say::truncated, last == std::string_view::npos ? 0 : last, {});
        }
        if (std::string_view(fault.what()).find("UTF-8") != std::string_view::npos) {
            return fail(say::notUtf8, offset, {});
        }
        const auto word = wordAround(offset);
        for (const auto* name : {"NaN", "nan", "Infinity", "-Infinity", "inf", "-inf", "Inf"}) {
            if (word == name) {
                return fail(say::notANumber, offset, {{"found", word}});
            }
        }
        return fail(say::notJson, offset, {{"found", "“" + word + "” is not expected"}});
    }

private:
    struct Frame {
        bool isObject = true;
        std::vector<Tree::Member> members;
        std::vector<Tree> items;
        PlaceNode* place = nullptr;
        std::string key;
        int keyLine = 1, keyColumn = 1;
        bool skip = false; ///< the value belongs to a key that stood before
        std::unordered_map<std::string, std::pair<int, int>> keys;
        std::size_t count = 0;
    };

    bool number(double value) { return add(Tree::number(value), numberStart()); }

    Finding at(const Message& message, int line, int column) const {
        Finding finding;
        finding.message = &message;
        finding.place = FilePlace{file_, line, column};
        return finding;
    }

    bool fail(const Message& message, std::size_t offset,
              std::vector<std::pair<std::string, Argument>> arguments) {
        const auto [line, column] = lines_.at(offset);
        Finding finding = at(message, line, column);
        finding.arguments = std::move(arguments);
        out_.findings.push_back(std::move(finding));
        return false;
    }

    /// The place node of a value that begins at `offset` in the innermost open thing.
    PlaceNode* placeFor(std::size_t offset) {
        if (frames_.empty()) {
            return root_.get();
        }
        Frame& frame = frames_.back();
        if (frame.place == nullptr || frame.skip) {
            return nullptr;
        }
        auto& node = frame.place->inside[frame.isObject ? frame.key : std::to_string(frame.count)];
        if (frame.isObject) {
            node.line = frame.keyLine;
            node.column = frame.keyColumn;
        } else {
            std::tie(node.line, node.column) = lines_.at(offset);
        }
        return &node;
    }

    /// Whether the next item of an open list still counts.
    bool within(std::size_t offset) {
        if (frames_.empty() || frames_.back().isObject) {
            return true;
        }
        constexpr auto most = static_cast<std::size_t>(plant::longestInlineTable);
        if (frames_.back().count == most) {
            fail(say::tableTooLong, offset, {{"most", std::int64_t{plant::longestInlineTable}}});
        }
        return frames_.back().count < most;
    }

    bool open(bool isObject) {
        const std::size_t offset = read_ - 1;
        if (frames_.size() >= static_cast<std::size_t>(deepestNesting)) {
            return fail(say::tooDeep, offset, {{"most", std::int64_t{deepestNesting}}});
        }
        Frame frame;
        frame.isObject = isObject;
        if (within(offset)) {
            // The rows of a list have a place, the numbers inside a row share it.
            const bool inRow = frames_.size() > 1 && !frames_.back().isObject
                               && !frames_[frames_.size() - 2].isObject;
            frame.place = inRow ? nullptr : placeFor(offset);
        }
        frames_.push_back(std::move(frame));
        return true;
    }

    bool close() {
        Frame frame = std::move(frames_.back());
        frames_.pop_back();
        put(frame.isObject ? Tree::object(std::move(frame.members))
                           : Tree::array(std::move(frame.items)));
        return true;
    }

    bool add(Tree value, std::size_t offset) {
        if (within(offset)) {
            const bool leafOfList = !frames_.empty() && !frames_.back().isObject;
            if (!leafOfList) {
                placeFor(offset);
            }
        }
        put(std::move(value));
        return true;
    }

    void put(Tree value) {
        if (frames_.empty()) {
            out_.tree = std::move(value);
            return;
        }
        Frame& frame = frames_.back();
        if (frame.isObject) {
            if (!frame.skip) {
                frame.members.emplace_back(frame.key, std::move(value));
            }
        } else {
            if (frame.count < static_cast<std::size_t>(plant::longestInlineTable)) {
                frame.items.push_back(std::move(value));
            }
            ++frame.count;
        }
    }

    // The parser hands over a token after it has been read; these find its beginning.

    std::size_t textStart() const {
        std::size_t quote = read_ - 1;
        while (quote > 0) {
            --quote;
            std::size_t slashes = 0;
            while (slashes < quote && text_[quote - 1 - slashes] == '\\') {
                ++slashes;
            }
            if (text_[quote] == '"' && slashes % 2 == 0) {
                break;
            }
        }
        return quote;
    }
    std::size_t numberStart() const {
        constexpr std::string_view letters = "0123456789+-.eE";
        std::size_t end = std::min(read_, text_.size());
        if (end > 0 && letters.find(text_[end - 1]) == std::string_view::npos) {
            --end; // the letter behind the number has been looked at
        }
        while (end > 0 && letters.find(text_[end - 1]) != std::string_view::npos) {
            --end;
        }
        return end;
    }
    std::size_t wordStart() const {
        std::size_t start = read_;
        while (start > 0 && text_[start - 1] >= 'a' && text_[start - 1] <= 'z') {
            --start;
        }
        return start;
    }
    /// The word or sign around an offset, for a message.
    std::string wordAround(std::size_t offset) const {
        const auto inWord = [&](std::size_t i) {
            const char letter = text_[i];
            return (letter >= 'a' && letter <= 'z') || (letter >= 'A' && letter <= 'Z')
                   || letter == '-' || letter == '_';
        };
        std::size_t from = offset, to = offset + 1;
        while (inWord(offset) && from > 0 && inWord(from - 1)) {
            --from;
        }
        while (inWord(offset) && to < text_.size() && inWord(to) && to - from < 40) {
            ++to;
        }
        const auto word = text_.substr(from, to - from);
        const auto lead = static_cast<unsigned char>(word.front());
        return lead < 0x20 || lead >= 0x7F ? "this character" : std::string(word);
    }

    std::string_view text_;
    const std::string& file_;
    const std::size_t& read_;
    LineCounter lines_;
    Parsed& out_;
    std::shared_ptr<PlaceNode> root_;
    std::vector<Frame> frames_;
};

plant::Places placesIn(std::shared_ptr<const PlaceNode> root, const std::string& file) {
    return [root = std::move(root), file](const plant::Path& path) -> std::optional<FilePlace> {
        const PlaceNode* node = root.get();
        for (const auto& key : path) {
            const auto found = node->inside.find(key);
            if (found == node->inside.end()) {
                return std::nullopt;
            }
            node = &found->second;
        }
        return FilePlace{file, node->line, node->column};
    };
}

Finding plain(const Message& message, const std::string& file) {
    Finding finding;
    finding.message = &message;
    finding.place = FilePlace{file, 1, 1};
    return finding;
}

} // namespace

Parsed parseJson(std::string_view text, const std::string& file) {
    Parsed out;
    if (text.size() > largestFile_bytes) {
        Finding finding = plain(say::tooLarge, file);
        constexpr std::size_t megabyte = 1024U * 1024U;
        finding.arguments = {{"size", static_cast<std::int64_t>(text.size() / megabyte)},
                             {"most", static_cast<std::int64_t>(largestFile_bytes / megabyte)}};
        out.findings.push_back(std::move(finding));
        return out;
    }
    if (text.starts_with("\xEF\xBB\xBF")) {
        out.findings.push_back(plain(say::byteOrderMark, file));
        text.remove_prefix(3);
    }
    if (text.starts_with("\xFF\xFE") || text.starts_with("\xFE\xFF")) {
        out.findings.push_back(plain(say::notUtf8, file));
        return out;
    }
    std::size_t read = 0;
    Builder builder(text, file, read, out);
    const Cursor first(text.data(), &read);
    const Cursor last(text.data() + text.size(), &read);
    out.complete = nlohmann::json::sax_parse(first, last, &builder);
    if (!out.complete) {
        out.tree = Tree();
    }
    out.places = placesIn(builder.places(), file);
    return out;
}

} // namespace headroom::files
