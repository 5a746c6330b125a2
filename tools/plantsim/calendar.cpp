#include "tools/plantsim/calendar.hpp"

#include <date/tz.h>

#include <algorithm>
#include <cmath>

namespace slipledger::plantsim {
namespace {

constexpr double year_days = 365.0;
constexpr Millis monday_offset = 3 * day_ms;  // 1970-01-01 was a Thursday

// Three quarters of an hour in each shift nobody feeds the machines.
bool in_break(Millis in_day) {
    const Millis in_shift = (in_day + 2 * hour_ms) % (8 * hour_ms);  // shifts begin at 6, 14 and 22 h
    return in_shift >= 4 * hour_ms && in_shift < 4 * hour_ms + 45 * minute_ms;
}

}  // namespace

Calendar::Calendar(const PlantDrawing& plant, Millis from, Millis to)
    : from_(from), year_begins_(plant.year_begins), season_at_begin_(plant.season_at_begin), stops_(plant.stops) {
    const auto* zone = date::locate_zone(plant.time_zone);
    for (Millis time = from; time <= to; time += hour_ms) {
        const auto info = zone->get_info(date::sys_time<std::chrono::milliseconds>{std::chrono::milliseconds{time}});
        offsets_.push_back(std::chrono::milliseconds{info.offset}.count());
    }
}

Millis Calendar::local(Millis time) const {
    const Millis hour = std::clamp<Millis>((time - from_) / hour_ms, 0, static_cast<Millis>(offsets_.size()) - 1);
    return time + offsets_[static_cast<std::size_t>(hour)];
}

bool Calendar::day_off(Millis time) const {
    return std::ranges::any_of(stops_, [&](const auto& stop) { return time >= stop[0] && time < stop[1]; });
}

Timetable Calendar::timetable(Shifts shifts, Millis time) const {
    if (day_off(time)) return Timetable::off;
    const Millis wall = local(time);
    const Millis in_week = (wall + monday_offset) % (7 * day_ms);
    const Millis in_day = wall % day_ms;
    const bool manned = shifts == Shifts::three
                            ? in_week >= 6 * hour_ms && in_week < 5 * day_ms + 6 * hour_ms
                            : in_week < 5 * day_ms && in_day >= 6 * hour_ms && in_day < 22 * hour_ms;
    if (!manned) return Timetable::off;
    return in_break(in_day) ? Timetable::pause : Timetable::work;
}

double Calendar::year_share(Millis time) const {
    return static_cast<double>(time - year_begins_) / (year_days * static_cast<double>(day_ms));
}

double Calendar::season(Millis time) const {
    const double share = year_share(time) + season_at_begin_;
    return share - std::floor(share);
}

}  // namespace slipledger::plantsim
