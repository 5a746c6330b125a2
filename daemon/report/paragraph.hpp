// Text laid out for a terminal of 80 columns, colours only where one looks at it.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>

#include "analytics/section_spec.hpp"

namespace slipledger::report {

inline constexpr std::size_t page_width = 80;

// How the reader sees it. `colour`: a terminal, and NO_COLOR not set. Threads: a value, share freely.
struct Paper {
    bool colour = false;
};

// Breaks `text` at spaces into lines of at most `width` columns; the first begins with `lead`, the rest with as many blanks.
// Every line ends with '\n'. Widths are counted in code points.
std::string paragraph(std::string_view lead, std::string_view text, std::size_t width = page_width);

// `text` cut or filled with blanks to exactly `width` columns.
std::string cell(std::string_view text, std::size_t width);

// A level by mark and word, "*** act", always twelve columns: the mark alone tells it in black and white.
std::string level_word(analytics::Level level, const Paper& paper);

// Foreign text made safe for a terminal: control characters become '?'.
std::string printable(std::string_view text);

}  // namespace slipledger::report
