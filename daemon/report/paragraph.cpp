#include "daemon/report/paragraph.hpp"

#include <array>

namespace slipledger::report {

namespace {

constexpr bool starts_code_point(char c) { return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U; }

std::size_t columns(std::string_view text) {
    std::size_t count = 0;
    for (const char c : text) count += starts_code_point(c) ? 1 : 0;
    return count;
}

struct LevelMark {
    std::string_view mark;
    std::string_view colour;  // ANSI
};

constexpr std::array<LevelMark, 5> level_marks{{
    {"?  ", "\033[2m"},   // unjudged
    {".  ", "\033[32m"},  // sound
    {"*  ", "\033[36m"},  // watch
    {"** ", "\033[33m"},  // plan
    {"***", "\033[1;31m"},  // act
}};

}  // namespace

std::string paragraph(std::string_view lead, std::string_view text, std::size_t width) {
    const std::size_t indent = columns(lead);
    std::string out(lead);
    std::size_t column = indent;
    bool line_is_empty = true;
    while (!text.empty()) {
        const std::size_t end = text.find(' ');
        const std::string_view word = text.substr(0, end);
        text.remove_prefix(end == std::string_view::npos ? text.size() : end + 1);
        if (word.empty()) continue;
        if (!line_is_empty && column + 1 + columns(word) > width) {
            out += '\n';
            out.append(indent, ' ');
            column = indent;
            line_is_empty = true;
        }
        if (!line_is_empty) {
            out += ' ';
            ++column;
        }
        out += word;
        column += columns(word);
        line_is_empty = false;
    }
    out += '\n';
    return out;
}

std::string cell(std::string_view text, std::size_t width) {
    std::string out;
    std::size_t used = 0;
    for (std::size_t i = 0; i < text.size() && (used < width || !starts_code_point(text[i])); ++i) {
        used += starts_code_point(text[i]) ? 1 : 0;
        out += text[i];
    }
    out.append(width - used, ' ');
    return out;
}

std::string level_word(analytics::Level level, const Paper& paper) {
    const LevelMark& look = level_marks[static_cast<std::size_t>(level)];
    const std::string plain = std::string(look.mark) + ' ' + cell(name_of(level), 8);
    return paper.colour ? std::string(look.colour) + plain + "\033[0m" : plain;
}

std::string printable(std::string_view text) {
    std::string out(text);
    for (char& c : out) {
        const auto byte = static_cast<unsigned char>(c);
        if (byte < 0x20U || byte == 0x7FU) c = '?';
    }
    return out;
}

}  // namespace slipledger::report
