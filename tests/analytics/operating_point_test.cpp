#include "analytics/operating_point.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <map>
#include <random>

#include "tests/analytics/readings_builder.hpp"

namespace slipledger::analytics {
namespace {

using namespace std::chrono_literals;

Usual hold_all(Milliseconds hold) {
    Usual usual;
    usual.hold.fill(hold);
    return usual;
}

void put(SectionReadings& readings, Quantity quantity, Milliseconds after_midnight, double value) {
    readings[index_of(quantity)].times.push_back(midnight + after_midnight);
    readings[index_of(quantity)].values.push_back(value);
}

TEST(OperatingPoints, StandWhereTheFlowHasAValueAndTakeTheLastOfTheRest) {
    SectionReadings readings;
    put(readings, Quantity::outlet_pressure, 0s, 100.0);
    put(readings, Quantity::outlet_pressure, 10s, 110.0);
    put(readings, Quantity::outlet_pressure, 20s, 120.0);
    put(readings, Quantity::case_drain_flow, 10s, 3.0);
    put(readings, Quantity::case_drain_flow, 19s, 3.1);
    put(readings, Quantity::delivery_flow, 15s, 90.0);
    const auto points = align(readings, Basis::case_drain, hold_all(60s), midnight, midnight + 1min);
    ASSERT_EQ(points.size(), 2u);
    EXPECT_EQ(points[0].time, midnight + 10s);
    EXPECT_EQ(points[0].outlet_bar, 110.0);  // a reading of the same instant counts
    EXPECT_EQ(points[1].flow_lpm, 3.1);
    EXPECT_EQ(points[1].outlet_bar, 110.0);  // one that comes a second later does not
    EXPECT_TRUE(std::isnan(points[1].speed_rpm));
    const auto by_delivery = align(readings, Basis::delivery, hold_all(60s), midnight, midnight + 1min);
    ASSERT_EQ(by_delivery.size(), 1u);
    EXPECT_EQ(by_delivery[0].flow_lpm, 90.0);
}

TEST(OperatingPoints, LetAReadingStandAsLongAsItsHoldAndNoLonger) {
    SectionReadings readings;
    put(readings, Quantity::shaft_speed, 0s, 1480.0);
    put(readings, Quantity::case_drain_flow, 90s, 3.0);
    put(readings, Quantity::case_drain_flow, 91s, 3.0);
    const auto points = align(readings, Basis::case_drain, hold_all(90s), midnight, midnight + 1h);
    ASSERT_EQ(points.size(), 2u);
    EXPECT_EQ(points[0].speed_rpm, 1480.0);
    EXPECT_TRUE(std::isnan(points[1].speed_rpm));
}

TEST(OperatingPoints, NeverHoldAReadingOverAnHourWhateverTheHoldSays) {
    SectionReadings readings;
    put(readings, Quantity::fluid_temperature, 0s, 50.0);
    put(readings, Quantity::case_drain_flow, 60min, 3.0);
    put(readings, Quantity::case_drain_flow, 61min, 3.0);
    const auto points = align(readings, Basis::case_drain, hold_all(24h), midnight, midnight + 2h);
    EXPECT_EQ(points[0].temperature_c, 50.0);
    EXPECT_TRUE(std::isnan(points[1].temperature_c));
}

TEST(OperatingPoints, OfASpanTakeReadingsFromBeforeItAndEndBeforeItsEnd) {
    SectionReadings readings;
    put(readings, Quantity::outlet_pressure, 59min, 150.0);
    put(readings, Quantity::case_drain_flow, 59min, 2.0);
    put(readings, Quantity::case_drain_flow, 60min, 3.0);
    put(readings, Quantity::case_drain_flow, 120min, 4.0);
    const auto points = align(readings, Basis::case_drain, hold_all(5min), midnight + 1h, midnight + 2h);
    ASSERT_EQ(points.size(), 1u);
    EXPECT_EQ(points[0].flow_lpm, 3.0);
    EXPECT_EQ(points[0].outlet_bar, 150.0);
}

TEST(OperatingPoints, HoldForAQuarterOfAnHourWhileNothingIsUsual) {
    EXPECT_EQ(hold_of(Usual{}, Quantity::outlet_pressure), Milliseconds{15min});
    EXPECT_EQ(hold_of(hold_all(90s), Quantity::outlet_pressure), Milliseconds{90s});
}

// The readings named as those behind a point are those the point was made of, whatever comes early, late or not at all.
TEST(ReadingsBehind, AreWhatThePointIsMadeOf) {
    std::mt19937 random(7);
    SectionReadings readings;
    for (const Quantity quantity : {Quantity::outlet_pressure, Quantity::shaft_speed, Quantity::case_drain_flow})
        for (Milliseconds at{0}; at < 3h; at += Milliseconds(1000 + random() % 240000))
            put(readings, quantity, at, static_cast<double>(random() % 1000));
    const Usual usual = hold_all(2min);
    const auto points = align(readings, Basis::case_drain, usual, midnight + 1h, midnight + 3h);
    ASSERT_GT(points.size(), 40u);
    int without_speed = 0;
    for (const OperatingPoint& point : points) {
        std::map<Quantity, JoinedReading> behind;
        for (const JoinedReading& reading : readings_behind(readings, Basis::case_drain, usual, point.time))
            behind[reading.quantity] = reading;
        EXPECT_EQ(behind.at(Quantity::case_drain_flow).taken, point.time);
        EXPECT_EQ(behind.at(Quantity::case_drain_flow).value, point.flow_lpm);
        const bool has_speed = behind.contains(Quantity::shaft_speed);
        EXPECT_EQ(has_speed, !std::isnan(point.speed_rpm));
        without_speed += has_speed ? 0 : 1;
        if (!has_speed) continue;
        const JoinedReading& speed = behind.at(Quantity::shaft_speed);
        EXPECT_EQ(speed.value, point.speed_rpm);
        EXPECT_LE(point.time - speed.taken, speed.hold);
        EXPECT_FALSE(behind.contains(Quantity::stroke));
    }
    EXPECT_GT(without_speed, 0);
}

TEST(ReadingsBehind, AreNoneOfTheFlowWhereItWasNotReadAtThatTime) {
    SectionReadings readings;
    put(readings, Quantity::case_drain_flow, 10s, 3.0);
    put(readings, Quantity::outlet_pressure, 12s, 100.0);
    const auto behind = readings_behind(readings, Basis::case_drain, hold_all(60s), midnight + 15s);
    ASSERT_EQ(behind.size(), 1u);
    EXPECT_EQ(behind[0].quantity, Quantity::outlet_pressure);
    EXPECT_EQ(behind[0].hold, Milliseconds(60s));
}

}  // namespace
}  // namespace slipledger::analytics
