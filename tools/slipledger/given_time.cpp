#include "tools/slipledger/given_time.hpp"

#include <fmt/format.h>

#include "daemon/intake/time_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

analytics::Instant given_time(const std::string& text, const config::Plant& plant) {
    config::TimeFormat format;
    format.zone = plant.time_zone;
    const auto read = intake::TimeReader(format).read(text);
    if (!read)
        throw WrongUse(fmt::format("\"{}\" is not a time; wanted e.g. 2026-03-01T06:00:00Z, or 2026-03-01T07:00 in the "
                                   "plant's zone {}", text, plant.time_zone));
    return *read;
}

}  // namespace slipledger::command
