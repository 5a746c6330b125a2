#include "daemon/report/when.hpp"

#include <fmt/format.h>
#include <date/date.h>
#include <date/tz.h>

#include <chrono>
#include <sstream>

namespace slipledger::report {

namespace {

// The date library predates std::chrono's calendar and shares its clock, so an instant passes as it is.
date::zoned_time<std::chrono::minutes> in_zone(analytics::Instant at, const std::string& zone) {
    return {date::locate_zone(zone), std::chrono::floor<std::chrono::minutes>(at)};
}

}  // namespace

std::string rfc3339(analytics::Instant at) {
    const auto second = std::chrono::floor<std::chrono::seconds>(at);
    return at == second ? date::format("%FT%TZ", second) : date::format("%FT%TZ", at);
}

std::optional<analytics::Instant> instant_of(const std::string& text) {
    std::istringstream in(text);
    analytics::Instant at;
    in >> date::parse("%FT%TZ", at);
    return in.fail() ? std::nullopt : std::optional(at);
}

std::string local_minute(analytics::Instant at, const std::string& zone) {
    return date::format("%F %H:%M %Z", in_zone(at, zone));
}

std::string local_second(analytics::Instant at, const std::string& zone) {
    const date::zoned_time<std::chrono::seconds> local(date::locate_zone(zone),
                                                       std::chrono::floor<std::chrono::seconds>(at));
    return date::format("%F %T %Z", local);
}

std::string span_words(analytics::Milliseconds span) {
    const double seconds = std::chrono::duration<double>(span).count();
    return seconds < 120.0 ? fmt::format("{:g} s", seconds) : fmt::format("{:g} min", seconds / 60.0);
}

std::string local_date(analytics::Instant at, const std::string& zone) { return date::format("%F", in_zone(at, zone)); }

std::string iso_date(std::int32_t days) { return date::format("%F", date::sys_days(date::days(days))); }

}  // namespace slipledger::report
