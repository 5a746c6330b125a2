// How durations, times and addresses are written in a plant file.
#pragma once

#include <chrono>
#include <optional>
#include <string_view>

#include "analytics/instant.hpp"
#include "config/feed.hpp"

namespace slipledger::config {

// "10 min", "200 ms", "1.5 h", "3 d"; none where it is written otherwise, is negative or beyond ten years.
std::optional<std::chrono::milliseconds> parse_duration(std::string_view written);

// "2026-03-01T06:00:00Z", "2026-03-01T06:00:00.250+01:00", or "2026-03-01": the beginning of that day in `zone`, which
// must be known to the tz database.
std::optional<analytics::Instant> parse_time(std::string_view written, std::string_view zone);

// "127.0.0.1:7310", "[::1]:0", "localhost:7310".
std::optional<Endpoint> parse_endpoint(std::string_view written);

bool is_known_zone(std::string_view zone);

}  // namespace slipledger::config
