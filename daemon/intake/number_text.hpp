// Numbers as loggers write them. Nearly all are a few digits with a decimal sign; those are read by hand, the rest by
// std::from_chars.
#pragma once

#include <optional>
#include <string_view>

namespace slipledger::intake {

struct WrittenNumber {
    double value = 0.0;
    bool short_enough = false;  // seven significant digits or fewer: rounding to seven would change nothing
};

// The double nearest to the decimal number in `text` (spaces around it and a leading '+' are allowed); nothing where it
// is no finite number.
std::optional<WrittenNumber> read_number(std::string_view text, char decimal = '.');

}  // namespace slipledger::intake
