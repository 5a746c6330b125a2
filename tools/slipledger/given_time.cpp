#include "tools/slipledger/given_time.hpp"

#include <fmt/format.h>

#include "daemon/intake/time_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

// People leave out what a logger never does: the seconds, or the time of day (then the day's begin is meant).
std::string completed(std::string text) {
    constexpr std::size_t date_size = 10;    // 2026-03-01
    constexpr std::size_t minute_size = 16;  // 2026-03-01T07:00
    if (text.size() == date_size) return text + "T00:00:00";
    if (text.size() < minute_size || text[date_size + 3] != ':') return text;
    if (text.size() == minute_size || text[minute_size] != ':') text.insert(minute_size, ":00");
    return text;
}

}  // namespace

analytics::Instant given_time(const std::string& text, const config::Plant& plant) {
    config::TimeFormat format;
    format.zone = plant.time_zone;
    const auto read = intake::TimeReader(format).read(completed(text));
    if (!read)
        throw WrongUse(fmt::format("\"{}\" is not a time; wanted e.g. 2026-03-01T06:00:00Z, or 2026-03-01T07:00 or "
                                   "2026-03-01 in the plant's zone {}", text, plant.time_zone));
    return *read;
}

}  // namespace slipledger::command
