#include "config/written_values.hpp"

#include <gtest/gtest.h>

namespace slipledger::config {
namespace {

using namespace std::chrono_literals;

TEST(WrittenDuration, TakesNumberAndUnit) {
    EXPECT_EQ(parse_duration("10 min"), 600000ms);
    EXPECT_EQ(parse_duration("200ms"), 200ms);
    EXPECT_EQ(parse_duration("1.5 h"), 5400000ms);
    EXPECT_EQ(parse_duration("3 d"), 259200000ms);
    EXPECT_EQ(parse_duration("0 s"), 0ms);
}

TEST(WrittenDuration, RefusesWhatHasNoUnitOrMakesNoSense) {
    for (const std::string_view text :
         {"", "10", "min", "10 minutes", "-1 s", "nan s", "inf h", "10  s", "1e9 d", "10 s "})
        EXPECT_EQ(parse_duration(text), std::nullopt) << text;
}

TEST(WrittenTime, IsRfc3339) {
    const analytics::Instant noon_utc{std::chrono::sys_days{2026y / 3 / 1} + 12h};
    EXPECT_EQ(parse_time("2026-03-01T12:00:00Z", "UTC"), noon_utc);
    EXPECT_EQ(parse_time("2026-03-01T13:00:00+01:00", "UTC"), noon_utc);
    EXPECT_EQ(parse_time("2026-03-01T12:00:00.250Z", "UTC"), noon_utc + 250ms);
    for (const std::string_view text :
         {"", "yesterday", "2026-03-01T12:00:00", "2026-13-01", "2026-02-30", "2026-03-01 x"})
        EXPECT_EQ(parse_time(text, "UTC"), std::nullopt) << text;
}

TEST(WrittenTime, OfADateAloneIsTheBeginningOfThatDayInThePlant) {
    // Europe/Berlin is UTC+1 in winter and UTC+2 in summer.
    EXPECT_EQ(parse_time("2026-03-01", "Europe/Berlin"),
              analytics::Instant{std::chrono::sys_days{2026y / 2 / 28} + 23h});
    EXPECT_EQ(parse_time("2026-07-01", "Europe/Berlin"),
              analytics::Instant{std::chrono::sys_days{2026y / 6 / 30} + 22h});
}

TEST(WrittenTime, BeginsADayWithoutMidnightAtItsFirstMinute) {
    // Brazil's clocks went from 0:00 to 1:00 on 4 November 2018 (tz database, southamerica): 01:00-02 is 03:00 UTC.
    EXPECT_EQ(parse_time("2018-11-04", "America/Sao_Paulo"),
              analytics::Instant{std::chrono::sys_days{2018y / 11 / 4} + 3h});
}

TEST(WrittenAddress, IsHostAndPort) {
    EXPECT_EQ(parse_endpoint("127.0.0.1:7310"), (Endpoint{"127.0.0.1", 7310}));
    EXPECT_EQ(parse_endpoint("[::1]:0"), (Endpoint{"::1", 0}));
    EXPECT_EQ(parse_endpoint("localhost:65535"), (Endpoint{"localhost", 65535}));
    for (const std::string_view text :
         {"", ":80", "host", "host:", "host:65536", "host:-1", "::1:80", "a b:80", "host:80x"})
        EXPECT_EQ(parse_endpoint(text), std::nullopt) << text;
}

TEST(TimeZone, IsKnownToTheTzDatabase) {
    EXPECT_TRUE(is_known_zone("Europe/Berlin"));
    EXPECT_TRUE(is_known_zone("UTC"));
    EXPECT_FALSE(is_known_zone("Mars/Olympus"));
    EXPECT_FALSE(is_known_zone(""));
}

}  // namespace
}  // namespace slipledger::config
