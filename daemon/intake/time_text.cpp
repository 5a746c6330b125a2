#include "daemon/intake/time_text.hpp"

#include <cmath>
#include <cstring>
#include <sstream>

#include "daemon/intake/number_text.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;
using analytics::Milliseconds;

constexpr Instant earliest{date::sys_days{date::January / 1 / 1990}};
constexpr Instant latest{date::sys_days{date::January / 1 / 2200}};

// Reads a fixed-width time front to back; once something is wrong it stays wrong.
class Scanner {
public:
    explicit Scanner(std::string_view text) : text_(text) {}

    int digits(std::size_t count) {
        if (text_.size() < count) return fail();
        int value = 0;
        for (std::size_t i = 0; i < count; ++i) {
            const int digit = text_[i] - '0';
            if (digit < 0 || digit > 9) return fail();
            value = value * 10 + digit;
        }
        text_.remove_prefix(count);
        return value;
    }
    int digits_to(std::size_t count, int most) {
        const int value = digits(count);
        return value <= most ? value : fail();
    }
    bool take(char wanted) {
        if (text_.empty() || text_.front() != wanted) return false;
        text_.remove_prefix(1);
        return true;
    }
    void expect(char wanted) {
        if (!take(wanted)) fail();
    }
    // ".25" or ",25": milliseconds, the digits beyond them cut off.
    Milliseconds fraction() {
        if (!take('.') && !take(',')) return Milliseconds{0};
        int count = 0, value = 0;
        for (; !text_.empty() && text_.front() >= '0' && text_.front() <= '9'; text_.remove_prefix(1), ++count)
            if (count < 3) value = value * 10 + (text_.front() - '0');
        if (count == 0) fail();
        for (; count < 3; ++count) value *= 10;
        return Milliseconds{value};
    }
    std::optional<std::chrono::minutes> offset() {
        if (text_.empty()) return std::nullopt;
        if (take('Z') || take('z')) return 0min;
        const bool west = text_.front() == '-';
        if (!take('+')) expect('-');
        const int hours = digits_to(2, 23);
        take(':');
        const auto size = std::chrono::hours{hours} + std::chrono::minutes{digits_to(2, 59)};
        return west ? -size : size;
    }
    bool good_to_the_end() const { return good_ && text_.empty(); }

private:
    int fail() {
        good_ = false;
        return 0;
    }

    std::string_view text_;
    bool good_ = true;
};

Refusal bad_time(std::string_view text, std::string wanted) {
    return Refusal(Reason::bad_time, {}, in_quotes(text) + " is not a time", std::move(wanted));
}

Checked<Instant> plausible(Instant time, std::string_view text) {
    if (time >= earliest && time < latest) return time;
    return Refusal(Reason::implausible_time, {}, in_quotes(text) + " is before 1990 or after 2199", "a logger whose clock is set");
}

std::string_view trimmed(std::string_view text) {
    while (text.starts_with(' ')) text.remove_prefix(1);
    while (text.ends_with(' ')) text.remove_suffix(1);
    return text;
}

}  // namespace

std::optional<date::local_days> Rfc3339::day(std::string_view text) {
    if (last_day_ && std::memcmp(text.data(), last_text_, sizeof last_text_) == 0) return last_day_;
    Scanner scan(text.substr(0, sizeof last_text_));
    const date::year year{scan.digits(4)};
    scan.expect('-');
    const date::month month{static_cast<unsigned>(scan.digits(2))};
    scan.expect('-');
    const date::year_month_day written{year, month, date::day{static_cast<unsigned>(scan.digits(2))}};
    if (!scan.good_to_the_end() || !written.ok()) return std::nullopt;
    std::memcpy(last_text_, text.data(), sizeof last_text_);
    last_day_ = date::local_days{written};
    return last_day_;
}

std::optional<WrittenTime> Rfc3339::read(std::string_view text) {
    if (text.size() < sizeof last_text_) return std::nullopt;
    const auto date = day(text);
    if (!date) return std::nullopt;
    Scanner scan(text.substr(sizeof last_text_));
    if (!scan.take('T') && !scan.take(' ')) scan.expect('t');
    const std::chrono::hours hours{scan.digits_to(2, 23)};
    scan.expect(':');
    const std::chrono::minutes minutes{scan.digits_to(2, 59)};
    scan.expect(':');
    const std::chrono::seconds seconds{scan.digits_to(2, 60)};
    const Milliseconds fraction = scan.fraction();
    const auto offset = scan.offset();
    if (!scan.good_to_the_end()) return std::nullopt;
    return WrittenTime{*date + hours + minutes + seconds + fraction, offset};
}

Checked<Instant> ZoneClock::to_utc(date::local_time<Milliseconds> local) {
    const auto seconds = date::floor<std::chrono::seconds>(local);
    if (seconds < safe_from_ || seconds >= safe_to_) {
        const date::local_info info = zone_->get_info(seconds);
        if (info.result != date::local_info::unique)
            return Refusal(Reason::ambiguous_time, {}, "the clock change gives this local time twice or never",
                           "times with their offset, or in UTC");
        offset_ = info.first.offset;
        // Far from a change the offset stays for a while; within a day of one it is looked up each time.
        const auto local_of = [&](date::sys_seconds at) { return date::local_seconds{at.time_since_epoch() + offset_}; };
        safe_from_ = std::max(seconds - 24h, local_of(info.first.begin) + 24h);
        safe_to_ = std::min(seconds + 24h, local_of(info.first.end) - 24h);
    }
    return Instant{local.time_since_epoch() - offset_};
}

TimeReader::TimeReader(const config::TimeFormat& format) : format_(format) {
    if (!format.zone.empty()) zone_.emplace(date::locate_zone(format.zone));
}

Checked<Instant> TimeReader::read(std::string_view text) {
    text = trimmed(text);
    if (text.empty()) return Refusal(Reason::missing_time, format_.column, "is empty");
    if (format_.pattern.empty()) return read_rfc3339(text);
    if (format_.pattern == "epoch-s") return read_epoch(text, 1.0);
    if (format_.pattern == "epoch-ms") return read_epoch(text, 1000.0);
    return read_pattern(text);
}

Checked<Instant> TimeReader::in_utc(const WrittenTime& written, std::string_view text) {
    if (written.offset) return plausible(Instant{written.local.time_since_epoch() - *written.offset}, text);
    if (!zone_) return bad_time(text, "an offset, as in 2026-03-01T06:00:00Z");
    const auto time = zone_->to_utc(written.local);
    if (!time) return time.error();
    return plausible(*time, text);
}

Checked<Instant> TimeReader::read_rfc3339(std::string_view text) {
    const auto written = rfc3339_.read(text);
    if (!written) return bad_time(text, "RFC 3339, e.g. 2026-03-01T06:00:00Z");
    return in_utc(*written, text);
}

Checked<Instant> TimeReader::read_epoch(std::string_view text, double per_second) {
    const auto number = read_number(text);
    if (!number || std::fabs(number->value) > 1e13)
        return bad_time(text, per_second == 1.0 ? "seconds since 1970, e.g. 1772344800.5"
                                                : "milliseconds since 1970, e.g. 1772344800500");
    // A quarter of a millisecond against 0.3 having no exact double; more digits than three are cut off as elsewhere.
    const double ms = std::floor(number->value * (1000.0 / per_second) + 0.25e-3);
    return plausible(Instant{Milliseconds{static_cast<std::int64_t>(ms)}}, text);
}

Checked<Instant> TimeReader::read_pattern(std::string_view text) {
    std::istringstream in{std::string(text)};
    date::local_time<Milliseconds> local;
    std::string abbreviation;
    constexpr std::chrono::minutes none = std::chrono::minutes::min();
    std::chrono::minutes offset = none;
    in >> date::parse(format_.pattern, local, abbreviation, offset);
    if (in.fail() || in.peek() != std::istringstream::traits_type::eof())
        return bad_time(text, "the pattern " + format_.pattern);
    WrittenTime written{local, std::nullopt};
    if (offset != none) written.offset = offset;
    return in_utc(written, text);
}

}  // namespace slipledger::intake
