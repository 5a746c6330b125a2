// Times as reports write them: RFC 3339 in UTC for machines, the plant's own time with its zone for people.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

#include "analytics/instant.hpp"

namespace slipledger::report {

// "2026-03-01T06:00:00Z"; milliseconds only where there are some.
std::string rfc3339(analytics::Instant at);

// The inverse, of UTC times with Z; nullopt where the text is no such time.
std::optional<analytics::Instant> instant_of(const std::string& text);

// "2026-03-01 07:00 CET". `zone` must be known to the tz database.
std::string local_minute(analytics::Instant at, const std::string& zone);

// "2026-03-01 07:00:05 CET", for single readings.
std::string local_second(analytics::Instant at, const std::string& zone);

// "90 s", "15 min".
std::string span_words(analytics::Milliseconds span);

// "2026-03-01", the plant's day in which the instant lies.
std::string local_date(analytics::Instant at, const std::string& zone);

// "2026-03-01" of a day counted from 1970-01-01.
std::string iso_date(std::int32_t days);

}  // namespace slipledger::report
