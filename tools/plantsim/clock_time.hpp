// How the simulator counts time: UTC milliseconds, always the time in the readings. The wall clock is only read where
// rows are paced or stamped live (pace.hpp, live_load.cpp).
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace slipledger::plantsim {

using Millis = std::int64_t;  // since 1970-01-01T00:00:00Z

inline constexpr Millis second_ms = 1000;
inline constexpr Millis minute_ms = 60 * second_ms;
inline constexpr Millis hour_ms = 60 * minute_ms;
inline constexpr Millis day_ms = 24 * hour_ms;

// "2025-01-01T06:10:00Z", with milliseconds only where there are any.
std::string rfc3339(Millis time);

// The same, written behind `out` without making a string of its own.
void append_rfc3339(std::string& out, Millis time);

// Reads "2025-01-01", "2025-01-01T06:10:00Z" or with an offset "+03:00"; nothing where the text is none of these.
std::optional<Millis> parse_time(std::string_view text);

}  // namespace slipledger::plantsim
