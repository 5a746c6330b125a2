// What schema/embed.cmake makes of the text files of this folder. Use fluid_reading.hpp; this is how it gets at them.
#pragma once

#include <span>
#include <string_view>

namespace slipledger::config {

// Threads: immutable, share freely.
struct Text {
    std::string_view name;
    std::string_view text;
};

std::span<const Text> embedded_texts();

}  // namespace slipledger::config
