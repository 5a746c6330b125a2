// What schema/embed.cmake makes of web/: the page's own static files, carried inside the executable.
#pragma once

#include <span>
#include <string_view>

namespace slipledger::http {

// Threads: immutable, share freely.
struct Text {
    std::string_view name;
    std::string_view text;
};

std::span<const Text> embedded_texts();

}  // namespace slipledger::http
