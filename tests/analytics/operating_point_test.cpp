#include "analytics/operating_point.hpp"

#include <gtest/gtest.h>

#include <cmath>

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

}  // namespace
}  // namespace slipledger::analytics
