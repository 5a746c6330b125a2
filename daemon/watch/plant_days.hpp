// Calendar days of the plant: 24 hours long but for two days a year, and never to be had by dividing by 24. Everything
// that is judged per day takes its days from here.
#pragma once

#include <cstdint>
#include <string>

#include "analytics/course.hpp"
#include "analytics/instant.hpp"

namespace date {
class time_zone;
}

namespace slipledger::watch {

// Threads: immutable, share freely.
class PlantDays {
public:
    explicit PlantDays(const std::string& time_zone);  // std::runtime_error: the tz database does not know it

    analytics::DaySpan day_of(analytics::Instant at) const;
    analytics::DaySpan day(std::int32_t date) const;  // days since 1970-01-01

private:
    const date::time_zone* zone_;
};

}  // namespace slipledger::watch
