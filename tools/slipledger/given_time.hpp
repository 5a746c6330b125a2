// A time an operator gives on the command line.
#pragma once

#include <string>

#include "analytics/instant.hpp"
#include "config/plant.hpp"

namespace slipledger::command {

// RFC 3339, the seconds or the time of day left out or not; without an offset it is the plant's local time.
// WrongUse where it is no time.
analytics::Instant given_time(const std::string& text, const config::Plant& plant);

}  // namespace slipledger::command
