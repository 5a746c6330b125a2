#include "config/written_values.hpp"

#include <date/tz.h>

#include <array>
#include <charconv>
#include <sstream>
#include <stdexcept>
#include <string>
#include <utility>

namespace slipledger::config {
namespace {

using std::chrono::milliseconds;

std::optional<double> milliseconds_in(std::string_view unit) {
    constexpr std::array<std::pair<std::string_view, double>, 5> units{
        {{"ms", 1.0}, {"s", 1e3}, {"min", 60e3}, {"h", 3600e3}, {"d", 86400e3}}};
    for (const auto& [name, length] : units)
        if (name == unit) return length;
    return std::nullopt;
}

template <typename Time>
bool parse_all(std::string_view written, const char* pattern, Time& time) {
    std::istringstream stream{std::string(written)};
    stream >> date::parse(pattern, time);
    return !stream.fail() && stream.peek() == std::istringstream::traits_type::eof();
}

}  // namespace

std::optional<milliseconds> parse_duration(std::string_view written) {
    constexpr double longest_ms = 10.0 * 366.0 * 86400e3;
    double count = 0.0;
    const auto [rest, error] = std::from_chars(written.data(), written.data() + written.size(), count);
    if (error != std::errc{}) return std::nullopt;
    std::string_view unit = written.substr(static_cast<std::size_t>(rest - written.data()));
    if (unit.starts_with(' ')) unit.remove_prefix(1);
    const std::optional<double> length = milliseconds_in(unit);
    if (!length || !(count >= 0.0) || count * *length > longest_ms) return std::nullopt;
    return milliseconds(static_cast<milliseconds::rep>(count * *length + 0.5));
}

std::optional<analytics::Instant> parse_time(std::string_view written, std::string_view zone) {
    analytics::Instant instant;
    if (parse_all(written, "%FT%TZ", instant) || parse_all(written, "%FT%T%Ez", instant)) return instant;
    date::local_days day;
    if (!parse_all(written, "%F", day)) return std::nullopt;
    try {
        return date::locate_zone(zone)->to_sys(day, date::choose::earliest);
    } catch (const std::runtime_error&) {  // the day's first minutes do not exist there
        return date::locate_zone(zone)->to_sys(day + std::chrono::hours(1), date::choose::earliest);
    }
}

std::optional<Endpoint> parse_endpoint(std::string_view written) {
    const std::size_t colon = written.rfind(':');
    if (colon == std::string_view::npos || colon == 0) return std::nullopt;
    Endpoint endpoint;
    const char* const end = written.data() + written.size();
    const auto [rest, error] = std::from_chars(written.data() + colon + 1, end, endpoint.port);
    if (error != std::errc{} || rest != end) return std::nullopt;
    std::string_view host = written.substr(0, colon);
    const bool bracketed = host.starts_with('[') && host.ends_with(']');
    if (bracketed) host = host.substr(1, host.size() - 2);
    if (host.empty() || (!bracketed && host.find(':') != std::string_view::npos)) return std::nullopt;
    if (host.find_first_of(" /[]") != std::string_view::npos) return std::nullopt;
    endpoint.host = host;
    return endpoint;
}

bool is_known_zone(std::string_view zone) {
    try {
        return date::locate_zone(zone) != nullptr;
    } catch (const std::runtime_error&) {
        return false;
    }
}

}  // namespace slipledger::config
