// One line of CSV to its fields, quoted as RFC 4180 has it, with any delimiter. A row is one line: a quoted field that
// would go on in the next line is refused.
#pragma once

#include <deque>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "daemon/intake/refusal.hpp"

namespace slipledger::intake {

// Threads: one at a time.
class CsvLine {
public:
    explicit CsvLine(char delimiter) : delimiter_(delimiter) {}

    // The fields lie in `line`, or in here where quotes were doubled; valid until the next call.
    Checked<std::span<const std::string_view>> split(std::string_view line);

private:
    // Takes a quoted field off the front of `rest`, up to the delimiter behind it.
    Checked<std::string_view> take_quoted(std::string_view& rest);

    char delimiter_;
    std::vector<std::string_view> fields_;
    std::deque<std::string> unescaped_;  // a deque, so that views into it stay where they are
};

}  // namespace slipledger::intake
