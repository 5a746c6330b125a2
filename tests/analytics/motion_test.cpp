#include "analytics/motion.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/readings_builder.hpp"

namespace slipledger::analytics {
namespace {

using namespace std::chrono_literals;

Series series_of(Milliseconds interval, std::initializer_list<double> values) {
    Series series;
    Instant time = midnight;
    for (const double value : values) {
        series.times.push_back(time);
        series.values.push_back(value);
        time += interval;
    }
    return series;
}

constexpr Instant never = Instant::min();

// 5 bar/s over 1 s: a change of 5 is still steady, one of 5.1 is not.
// reference: Motion::last_until - hand-worked: rates of the rows above each expectation
TEST(Motion, IsSeenInTheFirstRowAfterIt) {
    const Series series = series_of(1s, {100.0, 105.0, 110.1, 110.1, 110.1});
    Motion motion(series, {.per_second = 5.0, .base = 1s}, midnight);
    EXPECT_EQ(motion.last_until(midnight + 1s), never);
    EXPECT_EQ(motion.last_until(midnight + 2s), midnight + 2s);
    EXPECT_EQ(motion.last_until(midnight + 4s), midnight + 2s);
}

TEST(Motion, IsNotMadeOfNoiseBetweenFastRows) {
    // Ten rows a second swinging by 1.5 bar: 15 bar/s from row to row, but nothing over a second.
    const Series series =
        series_of(100ms, {100.0, 101.5, 100.0, 101.5, 100.0, 101.5, 100.0, 101.5, 100.0, 101.5, 100.0,
                          101.5, 100.0, 101.5, 100.0, 101.5, 100.0, 101.5, 100.0, 101.5, 100.0, 101.5});
    Motion motion(series, {.per_second = 5.0, .base = 1s}, midnight);
    EXPECT_EQ(motion.last_until(midnight + 3s), never);
}

TEST(Motion, IsNoneBetweenSlowRowsOfAPressThatCycles) {
    const Series series = series_of(10min, {60.0, 210.0, 80.0, 240.0});
    Motion motion(series, {.per_second = 5.0, .base = 1s}, midnight);
    EXPECT_EQ(motion.last_until(midnight + 1h), never);
}

TEST(Motion, OfTemperatureIsJudgedOverItsOwnMinute) {
    // A sensor that shows steps of 0.1 degC each second; then 2.5 degC within a minute.
    Series series = series_of(1s, {50.0, 50.1, 50.0, 50.1, 50.0});
    series.times.push_back(midnight + 63s);
    series.values.push_back(52.5);
    Motion motion(series, {.per_second = 2.0 / 60.0, .base = 1min}, midnight);
    EXPECT_EQ(motion.last_until(midnight + 4s), never);
    EXPECT_EQ(motion.last_until(midnight + 63s), midnight + 63s);
}

TEST(Motion, DoesNotCompareRowsOverHalfAnHourApart) {
    const Series series = series_of(31min, {20.0, 1000.0});
    Motion motion(series, {.per_second = 0.1, .base = 1min}, midnight);
    EXPECT_EQ(motion.last_until(midnight + 1h), never);
}

}  // namespace
}  // namespace slipledger::analytics
