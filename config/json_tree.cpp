#include "config/json_tree.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cstddef>
#include <deque>
#include <iterator>
#include <nlohmann/json.hpp>

namespace slipledger::config {
namespace {

constexpr std::size_t deepest = 32;  // no plant file needs more; keeps hostile nesting from using up the stack

// Reads the text and tells how far the lexer has come, which is what gives every value its line. Threads: a value.
class CountingIterator {
public:
    using iterator_category = std::input_iterator_tag;
    using value_type = char;
    using difference_type = std::ptrdiff_t;
    using pointer = const char*;
    using reference = const char&;

    CountingIterator(const char* at, int* line) : at_(at), line_(line) {}
    reference operator*() const { return *at_; }
    CountingIterator& operator++() {
        if (*at_ == '\n' && line_ != nullptr) ++*line_;
        ++at_;
        return *this;
    }
    bool operator==(const CountingIterator& other) const { return at_ == other.at_; }
    bool operator!=(const CountingIterator& other) const { return at_ != other.at_; }

private:
    const char* at_;
    int* line_;
};

// Fills the tree as the parser names what it meets. Threads: one thread; lives within read_json.
class TreeBuilder {
public:
    using Json = nlohmann::json;

    TreeBuilder(JsonReading& reading, const int& line) : reading_(reading), line_(line) {}

    bool null() { return add(Node::Kind::null) != nullptr; }
    bool boolean(bool value) {
        Node* node = add(Node::Kind::truth);
        node->truth = value;
        return true;
    }
    bool number_integer(Json::number_integer_t value) {
        return number(static_cast<double>(value), std::to_string(value));
    }
    bool number_unsigned(Json::number_unsigned_t value) {
        return number(static_cast<double>(value), std::to_string(value));
    }
    bool number_float(double value, const std::string& written) { return number(value, written); }
    bool string(std::string& value) {
        add(Node::Kind::text)->text = std::move(value);
        return true;
    }
    bool binary(Json::binary_t&) { return false; }  // only binary formats have it
    bool start_object(std::size_t) { return open(Node::Kind::object); }
    bool start_array(std::size_t) { return open(Node::Kind::list); }
    bool end_object() { return close(); }
    bool end_array() { return close(); }

    bool key(std::string& name) {
        Node& object = *open_.back().node;
        if (object.find(name) != nullptr) {
            reading_.faults.push_back({.pointer = step_into(open_.back().pointer, name),
                                       .line = line_,
                                       .column = 0,
                                       .found = fmt::format("the key \"{}\" a second time", name),
                                       .wanted = "each key once: the two may say different things",
                                       .code = "duplicate-key"});
            dropped_.emplace_back();  // what follows is read like the rest, but into a place nobody looks at
            next_ = {&dropped_.back(), step_into(open_.back().pointer, name)};
            return true;
        }
        object.keys.push_back(name);
        object.items.emplace_back();
        next_ = {&object.items.back(), step_into(open_.back().pointer, name)};
        return true;
    }

    bool parse_error(std::size_t offset, const std::string&, const nlohmann::detail::exception& error) {
        error_offset_ = offset;
        error_text_ = error.what();
        return false;
    }

    std::size_t error_offset() const { return error_offset_; }
    const std::string& error_text() const { return error_text_; }
    bool too_deep() const { return too_deep_; }

private:
    struct Spot {
        Node* node = nullptr;
        std::string pointer;
    };

    // The place for the value that comes now: the file itself, the value of the key just read, or a list's next item.
    Node* add(Node::Kind kind) {
        if (open_.empty()) {
            next_ = {&reading_.root, ""};
        } else if (open_.back().node->kind == Node::Kind::list) {
            Spot& list = open_.back();
            list.node->items.emplace_back();
            next_ = {&list.node->items.back(), step_into(list.pointer, list.node->items.size() - 1)};
        }
        next_.node->kind = kind;
        next_.node->line = line_;
        return next_.node;
    }

    bool number(double value, const std::string& written) {
        Node* node = add(Node::Kind::number);
        node->number = value;
        node->text = written;
        return true;
    }

    bool open(Node::Kind kind) {
        add(kind);
        if (open_.size() == deepest) {
            too_deep_ = true;
            return false;
        }
        open_.push_back(next_);
        return true;
    }

    bool close() {
        open_.pop_back();
        return true;
    }

    JsonReading& reading_;
    const int& line_;
    std::vector<Spot> open_;
    Spot next_;
    std::deque<Node> dropped_;
    std::size_t error_offset_ = 0;
    std::string error_text_;
    bool too_deep_ = false;
};

// The library's text begins with its own name and a place counted its own way; what follows the second colon is
// readable.
std::string reason_of(const std::string& error_text) {
    constexpr std::string_view mark = "syntax error";
    const std::size_t begin = error_text.find(mark);
    return begin == std::string::npos ? error_text : error_text.substr(begin + mark.size() + 1);
}

Fault syntax_fault(std::string_view text, const TreeBuilder& builder, int line) {
    Fault fault{.pointer = "", .line = line, .column = 0, .found = "", .wanted = "", .code = "syntax"};
    if (builder.too_deep()) {
        fault.found = fmt::format("more than {} levels of brackets", deepest);
        fault.wanted = "no deeper nesting than the plant file's keys need";
        return fault;
    }
    const std::size_t offset = std::min(builder.error_offset() == 0 ? 0 : builder.error_offset() - 1, text.size());
    const std::string_view before = text.substr(0, offset);
    fault.line = 1 + static_cast<int>(std::ranges::count(before, '\n'));
    fault.column =
        static_cast<int>(offset - (before.rfind('\n') == std::string_view::npos ? 0 : before.rfind('\n') + 1)) + 1;
    fault.found = reason_of(builder.error_text());
    fault.wanted = "JSON, in which // and /* */ comments are allowed";
    return fault;
}

}  // namespace

const Node* Node::find(std::string_view key) const {
    const auto found = std::ranges::find(keys, key);
    return found == keys.end() ? nullptr : &items[static_cast<std::size_t>(found - keys.begin())];
}

std::string describe(const Node& node) {
    constexpr std::size_t longest = 60;
    switch (node.kind) {
        case Node::Kind::null:
            return "null";
        case Node::Kind::truth:
            return node.truth ? "true" : "false";
        case Node::Kind::number:
            return node.text;
        case Node::Kind::text:
            return node.text.size() > longest ? fmt::format("\"{}...\"", node.text.substr(0, longest))
                                              : fmt::format("\"{}\"", node.text);
        case Node::Kind::list:
            return fmt::format("a list of {}", node.items.size());
        case Node::Kind::object:
            return "an object";
    }
    return "";
}

std::string step_into(const std::string& pointer, std::string_view key) {
    std::string result = pointer + "/";
    for (const char c : key) {
        if (c == '~') {
            result += "~0";
        } else if (c == '/') {
            result += "~1";
        } else {
            result += c;
        }
    }
    return result;
}

std::string step_into(const std::string& pointer, std::size_t index) {
    return fmt::format("{}/{}", pointer, index);
}

JsonReading read_json(std::string_view text) {
    JsonReading reading;
    int line = 1;
    TreeBuilder builder(reading, line);
    const CountingIterator begin(text.data(), &line);
    const CountingIterator end(text.data() + text.size(), nullptr);
    constexpr bool strict = true;
    constexpr bool comments = true;
    reading.complete =
        nlohmann::json::sax_parse(begin, end, &builder, nlohmann::json::input_format_t::json, strict, comments);
    if (!reading.complete) reading.faults = {syntax_fault(text, builder, line)};
    return reading;
}

}  // namespace slipledger::config
