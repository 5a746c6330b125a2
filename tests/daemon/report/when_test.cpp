#include "daemon/report/when.hpp"

#include <gtest/gtest.h>

namespace slipledger::report {
namespace {

using analytics::Instant;
using std::chrono::milliseconds;

// Outside value: 2026-03-01T06:00:00Z is 1772344800 s after 1970 (Python: datetime(2026, 3, 1, 6, tzinfo=utc).timestamp()).
constexpr Instant march_first{milliseconds(1'772'344'800'000)};

TEST(Rfc3339, WritesUtcAndMillisecondsOnlyWhereThereAreSome) {
    EXPECT_EQ(rfc3339(march_first), "2026-03-01T06:00:00Z");
    EXPECT_EQ(rfc3339(march_first + milliseconds(250)), "2026-03-01T06:00:00.250Z");
}

TEST(LocalTime, IsThePlantsWithItsZone) {
    EXPECT_EQ(local_minute(march_first, "Europe/Helsinki"), "2026-03-01 08:00 EET");
    EXPECT_EQ(local_date(march_first, "America/Los_Angeles"), "2026-02-28");
}

TEST(LocalTime, TellsSecondsOfSingleReadings) {
    EXPECT_EQ(local_second(march_first + milliseconds(5'400), "Europe/Helsinki"), "2026-03-01 08:00:05 EET");
    EXPECT_EQ(span_words(milliseconds(90'000)), "90 s");
    EXPECT_EQ(span_words(milliseconds(450'000)), "7.5 min");
}

TEST(IsoDate, CountsDaysFrom1970) {
    EXPECT_EQ(iso_date(0), "1970-01-01");
    EXPECT_EQ(iso_date(20'513), "2026-03-01");  // 1772323200 / 86400
}

}  // namespace
}  // namespace slipledger::report
