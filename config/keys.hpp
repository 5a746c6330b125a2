// Every key a plant file may have, in one table: the reader refuses what is not in it and takes types and ranges from
// it, and a test holds schema/plant.schema.json and the table of config/README.md against it. A new setting begins with
// a row here.
#pragma once

#include <limits>
#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace slipledger::config {

enum class KeyKind {
    text,
    texts,     // a list of text
    number,    // `of` is the unit
    whole,     // a whole number
    pair,      // [low, high]
    truth,     // true or false
    choice,    // `of` names the words, separated by |
    duration,  // "10 min"
    time,      // RFC 3339, or a date alone: its beginning in the plant's time zone
    object,    // `of` names the object
    list,      // a list of such objects
    map,       // an object whose keys are names and whose values are such objects
};

// Threads: immutable, share freely.
struct Key {
    std::string_view object;
    std::string_view name;
    KeyKind kind = KeyKind::text;
    std::string_view of;
    std::string_view
        fallback;  // "required", else the default as the README prints it; empty: not given means not known
    std::string_view meaning;
    double low = -std::numeric_limits<double>::infinity();
    double high = std::numeric_limits<double>::infinity();
    bool low_allowed = true;  // false: the number must be above low
};

std::span<const Key> plant_keys();

// Null where the object has no such key.
const Key* find_key(std::string_view object, std::string_view name);

std::vector<std::string_view> key_names(std::string_view object);

// The words of a choice.
std::vector<std::string_view> words_of(const Key& key);

// What a value of this key must be: "a number in bar above 0, up to 1000: rated outlet pressure".
std::string wanted_for(const Key& key);

}  // namespace slipledger::config
