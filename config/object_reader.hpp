// Reads one object of the plant file key by key and collects what is wrong with it instead of stopping at the first
// fault. Types, ranges and words come from the table in keys.hpp; a key asked for that is not in the table is our own
// bug.
#pragma once

#include <chrono>
#include <optional>
#include <string>
#include <string_view>
#include <type_traits>
#include <utility>
#include <vector>

#include "analytics/instant.hpp"
#include "config/fault.hpp"
#include "config/json_tree.hpp"
#include "config/keys.hpp"
#include "config/written_values.hpp"

namespace slipledger::config {

// A key that is absent leaves the value it would fill alone, so the defaults stand in the structs, and what a section
// does not say stays as its pump said it. Threads: one thread; lives within read_plant.
class ObjectReader {
public:
    // `object` is the name of the object in the key table. Unknown keys are refused here.
    ObjectReader(const Node& node, std::string pointer, std::string_view object, std::vector<Fault>& faults);

    bool has(std::string_view key) const { return node_.find(key) != nullptr; }
    const std::string& pointer() const { return pointer_; }
    std::vector<Fault>& faults() const { return faults_; }

    void read(std::string_view key, std::string& value) const;
    void read(std::string_view key, std::vector<std::string>& value) const;
    void read(std::string_view key, bool& value) const;
    void read(std::string_view key, double& value) const;
    void read(std::string_view key, int& value) const;
    void read(std::string_view key, std::optional<double>& value) const;
    void read(std::string_view key, std::optional<double>& low, std::optional<double>& high) const;
    void read_time(std::string_view key, std::string_view zone, std::optional<analytics::Instant>& value) const;

    template <typename Rep, typename Period>
    void read(std::string_view key, std::chrono::duration<Rep, Period>& value) const {
        using Duration = std::chrono::duration<Rep, Period>;
        if (const auto written = duration(key)) value = std::chrono::duration_cast<Duration>(*written);
    }

    template <typename Duration>
    void read(std::string_view key, std::optional<Duration>& value) const {
        if (const auto written = duration(key)) value = std::chrono::duration_cast<Duration>(*written);
    }

    // A choice whose words in the table stand in the order of the enumerators.
    template <typename Enum>
    requires std::is_enum_v<Enum>
    void read(std::string_view key, Enum& value) const {
        if (const auto word = choice(key)) value = static_cast<Enum>(*word);
    }

    // reads(ObjectReader&) of an object; of each item of a list; of each entry of a map, with its name first.
    template <typename Reads>
    void object(std::string_view key, Reads reads) const {
        if (const Node* node = given(key, Node::Kind::object)) {
            ObjectReader reader(*node, place(key), row(key).of, faults_);
            reads(reader);
        }
    }
    template <typename Reads>
    void each(std::string_view key, Reads reads) const {
        const Node* node = given(key, Node::Kind::list);
        for (std::size_t i = 0; node != nullptr && i < node->items.size(); ++i) {
            ObjectReader reader(node->items[i], step_into(place(key), i), row(key).of, faults_);
            reads(reader);
        }
    }
    template <typename Reads>
    void each_named(std::string_view key, Reads reads) const {
        const Node* node = given(key, Node::Kind::object);
        for (std::size_t i = 0; node != nullptr && i < node->keys.size(); ++i) {
            ObjectReader reader(node->items[i], step_into(place(key), node->keys[i]), row(key).of, faults_);
            reads(node->keys[i], reader);
        }
    }

    // A fault where the key is absent, with what it should hold.
    void require(std::string_view key) const;
    void require(std::initializer_list<std::string_view> keys) const;
    // A fault at the key, or at the object where nothing stands at the key.
    void complain(std::string_view key, std::string wanted, std::string code) const;
    // A fault at the object itself.
    void complain(std::string wanted, std::string code) const;

private:
    const Key& row(std::string_view key) const;
    std::string place(std::string_view key) const { return step_into(pointer_, key); }
    // The node of a key if it is there and of that kind; a fault if it is of another.
    const Node* given(std::string_view key, Node::Kind kind) const;
    std::optional<double> number_in_range(std::string_view key) const;
    std::optional<std::chrono::milliseconds> duration(std::string_view key) const;
    std::optional<int> choice(std::string_view key) const;
    void refuse_unknown_keys() const;
    void add(const std::string& at, const Node* node, std::string wanted, std::string code) const;

    const Node& node_;
    std::string pointer_;
    std::string_view object_;
    std::vector<Fault>& faults_;
    bool is_object_;
};

}  // namespace slipledger::config
