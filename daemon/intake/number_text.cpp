#include "daemon/intake/number_text.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <cstdint>

#include "daemon/intake/powers_of_ten.hpp"

namespace slipledger::intake {
namespace {

std::string_view trimmed(std::string_view text) {
    const auto blank = [](char c) { return c == ' ' || c == '\t'; };
    while (!text.empty() && blank(text.front())) text.remove_prefix(1);
    while (!text.empty() && blank(text.back())) text.remove_suffix(1);
    return text;
}

constexpr int most_digits = 15;  // any whole number of so many digits is exact in a double

std::optional<WrittenNumber> read_plain(std::string_view text, char decimal) {
    const bool negative = text.front() == '-';
    if (negative) text.remove_prefix(1);
    std::uint64_t digits = 0;
    int count = 0;  // significant ones
    int decimals = 0;
    bool seen_decimal = false, seen_digit = false;
    for (const char c : text) {
        if (c >= '0' && c <= '9') {
            digits = digits * 10 + static_cast<std::uint64_t>(c - '0');
            count += digits != 0;
            decimals += seen_decimal;
            seen_digit = true;
            if (count > most_digits || decimals > exact_powers_of_ten) return std::nullopt;
        } else if (c == decimal && !seen_decimal) {
            seen_decimal = true;
        } else {
            return std::nullopt;
        }
    }
    if (!seen_digit) return std::nullopt;
    const double size = static_cast<double>(digits) / power_of_ten(decimals);
    return WrittenNumber{negative && digits != 0 ? -size : size, count <= 7};
}

std::optional<WrittenNumber> read_any(std::string_view text, char decimal) {
    std::array<char, 400> copy{};  // long enough for every digit a double can have in plain notation
    if (text.size() > copy.size() || (decimal != '.' && text.find('.') != std::string_view::npos)) return std::nullopt;
    std::replace_copy(text.begin(), text.end(), copy.begin(), decimal, '.');
    const char* end = copy.data() + text.size();
    double value = 0.0;
    const auto read = std::from_chars(copy.data(), end, value);
    if (read.ec != std::errc{} || read.ptr != end || !std::isfinite(value)) return std::nullopt;
    return WrittenNumber{value, false};
}

}  // namespace

std::optional<WrittenNumber> read_number(std::string_view text, char decimal) {
    text = trimmed(text);
    if (text.starts_with('+') && !text.starts_with("+-")) text.remove_prefix(1);
    if (text.empty()) return std::nullopt;
    if (const auto plain = read_plain(text, decimal)) return plain;
    return read_any(text, decimal);
}

}  // namespace slipledger::intake
