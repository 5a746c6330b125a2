#include "daemon/watch/plant_days.hpp"

#include <gtest/gtest.h>

#include <ostream>

namespace slipledger::watch {
namespace {

using analytics::DaySpan;
using analytics::Instant;

Instant at_second(std::int64_t second) { return Instant(std::chrono::seconds(second)); }

struct KnownDay {
    const char* name;
    const char* zone;
    std::int32_t date;
    std::int64_t begin_s;
    std::int64_t end_s;

    friend std::ostream& operator<<(std::ostream& out, const KnownDay& day) { return out << day.name; }
};

class PlantDaysOf : public testing::TestWithParam<KnownDay> {};

TEST_P(PlantDaysOf, BeginAndEndAsPythonsZoneinfoSays) {
    const KnownDay& known = GetParam();
    const PlantDays days(known.zone);
    const DaySpan day = days.day(known.date);
    EXPECT_EQ(day.begin, at_second(known.begin_s));
    EXPECT_EQ(day.end, at_second(known.end_s));
    EXPECT_EQ(days.day_of(day.begin).date, known.date);
    EXPECT_EQ(days.day_of(day.end - analytics::Milliseconds(1)).date, known.date);
    EXPECT_EQ(days.day_of(day.end).date, known.date + 1);
}

// Outside source: Python 3.11 zoneinfo, first instant that bears the date and first that bears the next.
INSTANTIATE_TEST_SUITE_P(
    Zones, PlantDaysOf,
    testing::Values(KnownDay{"BerlinSpring23h", "Europe/Berlin", 20541, 1774738800, 1774821600},
                    KnownDay{"BerlinAutumn25h", "Europe/Berlin", 20751, 1792879200, 1792969200},
                    KnownDay{"BerlinSummer24h", "Europe/Berlin", 20605, 1780264800, 1780351200},
                    KnownDay{"SantiagoWithoutMidnight", "America/Santiago", 19974, 1725768000, 1725850800},
                    KnownDay{"SantiagoMidnightTwice", "America/Santiago", 19819, 1712372400, 1712462400},
                    KnownDay{"KolkataHalfHourOff", "Asia/Kolkata", 20454, 1767205800, 1767292200},
                    KnownDay{"LordHoweHalfHourShift", "Australia/Lord_Howe", 20548, 1775307600, 1775395800},
                    KnownDay{"Utc", "UTC", 20454, 1767225600, 1767312000}),
    [](const auto& row) { return std::string(row.param.name); });

TEST(PlantDays, RefusesAZoneThatDoesNotExist) { EXPECT_THROW(PlantDays("Europe/Atlantis"), std::runtime_error); }

}  // namespace
}  // namespace slipledger::watch
