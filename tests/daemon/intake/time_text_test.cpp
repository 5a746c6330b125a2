// Outside values: times.csv, made by make_times.py beside it (Python's datetime and zoneinfo).
#include "daemon/intake/time_text.hpp"

#include <fstream>
#include <map>
#include <sstream>
#include <string>

#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

config::TimeFormat format(std::string pattern, std::string zone = {}) {
    config::TimeFormat made;
    made.pattern = std::move(pattern);
    made.zone = std::move(zone);
    return made;
}

std::int64_t ms(const Checked<analytics::Instant>& time) {
    EXPECT_TRUE(time) << (time ? "" : time.error().message());
    return time ? time->time_since_epoch().count() : 0;
}

TEST(TimeText, AgreesWithPython) {
    std::ifstream file(SLIPLEDGER_SOURCE_DIR "/tests/daemon/intake/times.csv");
    std::string line;
    std::getline(file, line);
    std::map<std::string, TimeReader> readers;  // one per format, as feeds have
    int count = 0;
    for (; std::getline(file, line); ++count) {
        std::istringstream fields(line);
        std::string pattern, zone, text, wanted;
        std::getline(fields, pattern, ',');
        std::getline(fields, zone, ',');
        std::getline(fields, text, ',');
        std::getline(fields, wanted, ',');
        TimeReader& reader = readers.try_emplace(pattern + zone, format(pattern, zone)).first->second;
        EXPECT_EQ(std::to_string(ms(reader.read(text))), wanted) << line;
    }
    EXPECT_GT(count, 350);
}

// 1772344800 is 2026-03-01T06:00:00Z (GNU date).
TEST(TimeText, ReadsTheSpellingsOfRfc3339) {
    TimeReader reader(format(""));
    for (const char* text : {"2026-03-01T06:00:00Z", "2026-03-01t06:00:00z", "2026-03-01 06:00:00Z", " 2026-03-01T06:00:00Z ",
                             "2026-03-01T06:00:00.000Z", "2026-03-01T07:00:00+01:00", "2026-03-01T07:00:00+0100",
                             "2026-02-28T23:30:00-06:30", "2026-03-01T05:59:60Z"})
        EXPECT_EQ(ms(reader.read(text)), 1772344800000) << text;
    EXPECT_EQ(ms(reader.read("2026-03-01T06:00:00.9999Z")), 1772344800999);
    EXPECT_EQ(ms(reader.read("2026-03-01T06:00:00,5Z")), 1772344800500);
}

TEST(TimeText, RefusesWhatIsNoTime) {
    TimeReader reader(format(""));
    for (const char* text : {"2026-02-29T06:00:00Z", "2026-13-01T06:00:00Z", "2026-03-01T24:00:00Z", "2026-03-01T06:60:00Z",
                             "2026-03-01T06:00:61Z", "2026-03-01", "2026-03-01T06:00Z", "2026-03-01T06:00:00.Z",
                             "2026-03-01T06:00:00+1", "2026-03-01T06:00:00Zx", "20260301T060000Z", "yesterday", "x"})
        EXPECT_EQ(reader.read(text).error().reason, Reason::bad_time) << text;
    EXPECT_EQ(reader.read("").error().reason, Reason::missing_time);
}

TEST(TimeText, RefusesATimeWithoutOffsetWhereNoZoneIsGiven) {
    EXPECT_EQ(TimeReader(format("")).read("2026-03-01T06:00:00").error().reason, Reason::bad_time);
    EXPECT_EQ(ms(TimeReader(format("", "UTC")).read("2026-03-01T06:00:00")), 1772344800000);
}

TEST(TimeText, RefusesTheClockOfALoggerThatWasNeverSet) {
    EXPECT_EQ(TimeReader(format("")).read("1970-01-01T00:00:12Z").error().reason, Reason::implausible_time);
    EXPECT_EQ(TimeReader(format("epoch-s")).read("12").error().reason, Reason::implausible_time);
}

TEST(TimeText, ReadsSecondsAndMillisecondsSince1970) {
    EXPECT_EQ(ms(TimeReader(format("epoch-s")).read("1772344800")), 1772344800000);
    EXPECT_EQ(ms(TimeReader(format("epoch-s")).read("1772344800.3")), 1772344800300);
    EXPECT_EQ(ms(TimeReader(format("epoch-ms")).read("1772344800001")), 1772344800001);
    EXPECT_EQ(TimeReader(format("epoch-s")).read("today").error().reason, Reason::bad_time);
    EXPECT_EQ(TimeReader(format("epoch-s")).read("1e300").error().reason, Reason::bad_time);
}

TEST(TimeText, TakesAPatternsOwnOffsetBeforeTheZone) {
    TimeReader reader(format("%d.%m.%Y %H:%M:%S %z", "Europe/Berlin"));
    EXPECT_EQ(ms(reader.read("01.03.2026 06:00:00 +0000")), 1772344800000);
}

TEST(TimeText, RefusesWhatGoesOnBehindThePattern) {
    TimeReader reader(format("%d.%m.%Y %H:%M", "UTC"));
    EXPECT_EQ(reader.read("01.03.2026 06:00:30").error().reason, Reason::bad_time);
    EXPECT_EQ(ms(reader.read("01.03.2026 06:00")), 1772344800000);
}

// Europe/Berlin 2026: forward on 29 March 02:00 -> 03:00, back on 25 October 03:00 -> 02:00 (EU summer time rules).
TEST(TimeText, RefusesTheHourThatTheClockChangeGivesTwiceOrNever) {
    TimeReader reader(format("", "Europe/Berlin"));
    EXPECT_EQ(ms(reader.read("2026-03-29 01:59:59")), 1774745999000);
    EXPECT_EQ(reader.read("2026-03-29 02:30:00").error().reason, Reason::ambiguous_time);
    EXPECT_EQ(ms(reader.read("2026-03-29 03:00:00")), 1774746000000);
    EXPECT_EQ(reader.read("2026-10-25 02:30:00").error().reason, Reason::ambiguous_time);
    EXPECT_EQ(ms(reader.read("2026-10-25 03:00:00")), 1792893600000);
}

}  // namespace
}  // namespace slipledger::intake
