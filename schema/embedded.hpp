// What embed.cmake makes of the text files of this folder. Use schema.hpp; this is how it gets at them.
#pragma once

#include <span>
#include <string_view>

namespace slipledger::schema {

// Threads: immutable, share freely.
struct Text {
    std::string_view name;  // path below schema/, "ledger/0001_begin.sql"
    std::string_view text;
};

// Sorted by name.
std::span<const Text> embedded_texts();

}  // namespace slipledger::schema
