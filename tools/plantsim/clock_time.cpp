#include "tools/plantsim/clock_time.hpp"

#include <date/date.h>

#include <array>
#include <charconv>
#include <chrono>

namespace slipledger::plantsim {
namespace {

void append_digits(std::string& out, std::int64_t value, int width) {
    std::array<char, 8> digits{};
    for (int i = width - 1; i >= 0; --i) {
        digits[static_cast<std::size_t>(i)] = static_cast<char>('0' + value % 10);
        value /= 10;
    }
    out.append(digits.data(), static_cast<std::size_t>(width));
}

constexpr std::size_t date_length = 10;

std::optional<int> number_at(std::string_view text, std::size_t at, std::size_t width) {
    if (text.size() < at + width) return std::nullopt;
    int value = 0;
    const char* const end = text.data() + at + width;
    const auto read = std::from_chars(text.data() + at, end, value);
    return read.ec == std::errc{} && read.ptr == end && value >= 0 ? std::optional(value) : std::nullopt;
}

// "Z", "+03:00", "-05:30".
std::optional<Millis> offset_of(std::string_view text) {
    if (text == "Z") return 0;
    const auto hours = number_at(text, 1, 2);
    const auto minutes = number_at(text, 4, 2);
    if (!hours || !minutes || text.size() != 6 || text[3] != ':' || (text[0] != '+' && text[0] != '-'))
        return std::nullopt;
    return (text[0] == '-' ? -1 : 1) * (*hours * hour_ms + *minutes * minute_ms);
}

}  // namespace

void append_rfc3339(std::string& out, Millis time) {
    const auto day =
        date::floor<date::days>(date::sys_time<std::chrono::milliseconds>{std::chrono::milliseconds{time}});
    const date::year_month_day ymd{day};
    const Millis in_day = time - day.time_since_epoch().count() * day_ms;
    append_digits(out, int{ymd.year()}, 4);
    out += '-';
    append_digits(out, unsigned{ymd.month()}, 2);
    out += '-';
    append_digits(out, unsigned{ymd.day()}, 2);
    out += 'T';
    append_digits(out, in_day / hour_ms, 2);
    out += ':';
    append_digits(out, in_day / minute_ms % 60, 2);
    out += ':';
    append_digits(out, in_day / second_ms % 60, 2);
    if (in_day % second_ms != 0) {
        out += '.';
        append_digits(out, in_day % second_ms, 3);
    }
    out += 'Z';
}

std::string rfc3339(Millis time) {
    std::string out;
    append_rfc3339(out, time);
    return out;
}

std::optional<Millis> parse_time(std::string_view text) {
    const auto year = number_at(text, 0, 4);
    const auto month = number_at(text, 5, 2);
    const auto day = number_at(text, 8, 2);
    if (!year || !month || !day || text[4] != '-' || text[7] != '-') return std::nullopt;
    const date::year_month_day ymd{date::year{*year} / *month / *day};
    if (!ymd.ok()) return std::nullopt;
    const Millis midnight = date::sys_days{ymd}.time_since_epoch().count() * day_ms;
    if (text.size() == date_length) return midnight;

    const auto hour = number_at(text, 11, 2);
    const auto minute = number_at(text, 14, 2);
    const auto second = number_at(text, 17, 2);
    const auto offset = text.size() < 20 ? std::nullopt : offset_of(text.substr(19));
    if (!hour || !minute || !second || !offset || text[10] != 'T' || text[13] != ':' || text[16] != ':')
        return std::nullopt;
    if (*hour > 23 || *minute > 59 || *second > 59) return std::nullopt;
    return midnight + *hour * hour_ms + *minute * minute_ms + *second * second_ms - *offset;
}

}  // namespace slipledger::plantsim
