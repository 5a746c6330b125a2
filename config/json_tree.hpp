// The plant file as a tree that still knows on which line each value stands. A general JSON value forgets that, keeps
// the last of two equal keys in silence, and would make every fault harder to find.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "config/fault.hpp"

namespace slipledger::config {

// Threads: a value, share freely.
struct Node {
    enum class Kind { null, truth, number, text, list, object };

    Kind kind = Kind::null;
    int line = 0;  // from 1
    bool truth = false;
    double number = 0.0;
    std::string text;               // of a text; of a number as it is written
    std::vector<std::string> keys;  // of an object: the keys of its items, unique, in the file's order
    std::vector<Node> items;

    const Node* find(std::string_view key) const;
};

// What stands at a node, for a message: `"internal"`, `181.2`, `a list of 3`, `an object`; cut where it is long.
std::string describe(const Node& node);

// One more step of a JSON Pointer, escaped as RFC 6901 says.
std::string step_into(const std::string& pointer, std::string_view key);
std::string step_into(const std::string& pointer, std::size_t index);

// The tree of a text with // and /* */ comments. A syntax error is one fault with line and column and no tree; keys
// written twice are faults beside the tree, which keeps the first. Threads: a value, share freely.
struct JsonReading {
    Node root;
    std::vector<Fault> faults;
    bool complete = false;
};
JsonReading read_json(std::string_view text);

}  // namespace slipledger::config
