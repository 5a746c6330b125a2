#include "daemon/watch/plant_days.hpp"

#include <date/tz.h>

namespace slipledger::watch {
namespace {

using analytics::Instant;

// Where midnight itself is skipped or comes twice, the day begins at the first instant that bears its date.
Instant midnight(const date::time_zone& zone, std::int32_t date) {
    const date::local_days begin{date::days(date)};
    return zone.to_sys(begin, date::choose::earliest);
}

}  // namespace

PlantDays::PlantDays(const std::string& time_zone) : zone_(date::locate_zone(time_zone)) {}

analytics::DaySpan PlantDays::day_of(Instant at) const {
    const auto local = zone_->to_local(at);
    return day(static_cast<std::int32_t>(date::floor<date::days>(local).time_since_epoch().count()));
}

analytics::DaySpan PlantDays::day(std::int32_t date) const {
    return {date, midnight(*zone_, date), midnight(*zone_, date + 1)};
}

}  // namespace slipledger::watch
