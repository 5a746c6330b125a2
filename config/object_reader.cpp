#include "config/object_reader.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cassert>
#include <cmath>

#include "config/nearest.hpp"

namespace slipledger::config {

ObjectReader::ObjectReader(const Node& node, std::string pointer, std::string_view object, std::vector<Fault>& faults)
    : node_(node),
      pointer_(std::move(pointer)),
      object_(object),
      faults_(faults),
      is_object_(node.kind == Node::Kind::object) {
    if (!is_object_) {
        add(pointer_, &node_, fmt::format("an object with keys such as {}", fmt::join(key_names(object_), ", ")),
            "wrong-type");
        return;
    }
    refuse_unknown_keys();
}

void ObjectReader::refuse_unknown_keys() const {
    const std::vector<std::string_view> known = key_names(object_);
    for (std::size_t i = 0; i < node_.keys.size(); ++i) {
        const std::string& name = node_.keys[i];
        if (std::ranges::find(known, name) != known.end()) continue;
        const std::string_view nearest = nearest_name(name, known);
        const std::string wanted = nearest.empty() ? fmt::format("one of {}", fmt::join(known, ", "))
                                                   : fmt::format("\"{}\", which is the nearest known key", nearest);
        faults_.push_back({.pointer = step_into(pointer_, name),
                           .line = node_.items[i].line,
                           .column = 0,
                           .found = fmt::format("unknown key \"{}\"", name),
                           .wanted = wanted,
                           .code = "unknown-key"});
    }
}

void ObjectReader::read(std::string_view key, std::string& value) const {
    const Node* node = given(key, Node::Kind::text);
    if (node == nullptr) return;
    if (node->text.empty() || node->text.find('\0') != std::string::npos) {
        add(place(key), node, wanted_for(row(key)), "empty");
        return;
    }
    value = node->text;
}

void ObjectReader::read(std::string_view key, std::vector<std::string>& value) const {
    const Node* node = given(key, Node::Kind::list);
    if (node == nullptr) return;
    value.clear();
    for (std::size_t i = 0; i < node->items.size(); ++i) {
        const Node& item = node->items[i];
        if (item.kind == Node::Kind::text) {
            value.push_back(item.text);
        } else {
            add(step_into(place(key), i), &item, "text", "wrong-type");
        }
    }
}

void ObjectReader::read(std::string_view key, bool& value) const {
    if (const Node* node = given(key, Node::Kind::truth)) value = node->truth;
}

void ObjectReader::read(std::string_view key, double& value) const {
    if (const auto number = number_in_range(key)) value = *number;
}

void ObjectReader::read(std::string_view key, std::optional<double>& value) const {
    if (const auto number = number_in_range(key)) value = *number;
}

void ObjectReader::read(std::string_view key, int& value) const {
    const auto number = number_in_range(key);
    if (!number) return;
    if (std::trunc(*number) != *number) {
        complain(key, wanted_for(row(key)), "wrong-type");
        return;
    }
    value = static_cast<int>(*number);
}

void ObjectReader::read(std::string_view key, std::optional<double>& low, std::optional<double>& high) const {
    const Node* node = given(key, Node::Kind::list);
    if (node == nullptr) return;
    const bool two_numbers = node->items.size() == 2 && node->items[0].kind == Node::Kind::number &&
                             node->items[1].kind == Node::Kind::number;
    if (!two_numbers || !(node->items[0].number < node->items[1].number)) {
        add(place(key), node, fmt::format("{}, the lower first", wanted_for(row(key))), "wrong-type");
        return;
    }
    low = node->items[0].number;
    high = node->items[1].number;
}

void ObjectReader::read_time(std::string_view key, std::string_view zone,
                             std::optional<analytics::Instant>& value) const {
    const Node* node = given(key, Node::Kind::text);
    if (node == nullptr) return;
    value = parse_time(node->text, zone);
    if (!value) add(place(key), node, wanted_for(row(key)), "bad-time");
}

void ObjectReader::require(std::string_view key) const {
    if (is_object_ && !has(key)) add(place(key), nullptr, wanted_for(row(key)), "missing");
}

void ObjectReader::require(std::initializer_list<std::string_view> keys) const {
    for (const std::string_view key : keys) require(key);
}

void ObjectReader::complain(std::string_view key, std::string wanted, std::string code) const {
    add(place(key), node_.find(key), std::move(wanted), std::move(code));
}

void ObjectReader::complain(std::string wanted, std::string code) const {
    add(pointer_, &node_, std::move(wanted), std::move(code));
}

const Key& ObjectReader::row(std::string_view key) const {
    const Key* found = find_key(object_, key);
    assert(found != nullptr && "a key the reader asks for must stand in keys.cpp");
    return *found;
}

const Node* ObjectReader::given(std::string_view key, Node::Kind kind) const {
    const Key& wanted = row(key);
    const Node* node = node_.find(key);
    if (node == nullptr || node->kind == kind) return node;
    add(place(key), node, wanted_for(wanted), "wrong-type");
    return nullptr;
}

std::optional<double> ObjectReader::number_in_range(std::string_view key) const {
    const Node* node = given(key, Node::Kind::number);
    if (node == nullptr) return std::nullopt;
    const Key& wanted = row(key);
    const bool low_enough = node->number <= wanted.high;
    const bool high_enough = wanted.low_allowed ? node->number >= wanted.low : node->number > wanted.low;
    if (low_enough && high_enough) return node->number;
    add(place(key), node, wanted_for(wanted), "out-of-range");
    return std::nullopt;
}

std::optional<std::chrono::milliseconds> ObjectReader::duration(std::string_view key) const {
    const Node* node = given(key, Node::Kind::text);
    if (node == nullptr) return std::nullopt;
    const auto written = parse_duration(node->text);
    if (!written) add(place(key), node, wanted_for(row(key)), "bad-duration");
    return written;
}

std::optional<int> ObjectReader::choice(std::string_view key) const {
    const Node* node = given(key, Node::Kind::text);
    if (node == nullptr) return std::nullopt;
    const std::vector<std::string_view> words = words_of(row(key));
    const auto found = std::ranges::find(words, node->text);
    if (found != words.end()) return static_cast<int>(found - words.begin());
    const std::string_view nearest = nearest_name(node->text, words);
    const std::string hint = nearest.empty() ? "" : fmt::format("; perhaps \"{}\"", nearest);
    add(place(key), node, wanted_for(row(key)) + hint, "not-a-choice");
    return std::nullopt;
}

void ObjectReader::add(const std::string& at, const Node* node, std::string wanted, std::string code) const {
    faults_.push_back({.pointer = at,
                       .line = node == nullptr ? node_.line : node->line,
                       .column = 0,
                       .found = node == nullptr ? "nothing stands here" : describe(*node),
                       .wanted = std::move(wanted),
                       .code = std::move(code)});
}

}  // namespace slipledger::config
