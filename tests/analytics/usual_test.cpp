#include "analytics/usual.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/readings_builder.hpp"

namespace slipledger::analytics {
namespace {

using namespace std::chrono_literals;
using enum Quantity;

constexpr std::array<Milliseconds, quantity_count> none_given{};

SectionSpec compensated_pump() {
    SectionSpec spec;
    spec.control = Control::pressure_compensated;
    spec.compensator_bar = 250.0;
    return spec;
}

DayFacts facts_of(const ReadingsBuilder& told, const SectionSpec& spec = compensated_pump()) {
    return day_facts(told.readings(), spec, midnight, midnight + 24h);
}

// reference: day_facts - hand-worked: median spacing and densest band of the rows below
TEST(DayFacts, GiveTheMedianSpacingWhateverTheGaps) {
    ReadingsBuilder told(2min);
    told.rows(100, {{outlet_pressure, 100}, {shaft_speed, 1480}}).pause(8h).rows(100, {{outlet_pressure, 100}});
    told.rows(1, {{fluid_temperature, 50}}).rows(1, {{fluid_temperature, 50}});
    const DayFacts facts = facts_of(told);
    EXPECT_EQ(facts.interval_s[index_of(outlet_pressure)], 120.0);
    EXPECT_EQ(facts.interval_s[index_of(shaft_speed)], 120.0);
    EXPECT_EQ(facts.interval_s[index_of(fluid_temperature)], 0.0);  // two readings tell no interval
    EXPECT_EQ(facts.interval_s[index_of(stroke)], 0.0);
}

TEST(DayFacts, TakeOnlyTheReadingsOfTheirDay) {
    ReadingsBuilder told(2h, midnight - 24h);
    told.rows(12, {{shaft_speed, 1480}});
    told.sample_every(10min).rows(144, {{shaft_speed, 1480}});
    told.sample_every(1s).rows(1000, {{shaft_speed, 1480}});
    EXPECT_EQ(facts_of(told).interval_s[index_of(shaft_speed)], 600.0);
}

TEST(DayFacts, FindThePlateauWhereACompensatedPumpsPressureLiesDensest) {
    ReadingsBuilder told(1min);
    for (int i = 0; i < 200; ++i) told.rows(1, {{outlet_pressure, 100.0 + i}});         // passing through
    for (int i = 0; i < 101; ++i) told.rows(1, {{outlet_pressure, 241.0 + 0.01 * i}});  // holding near 241.5
    // The band may catch a few of those passing by.
    EXPECT_NEAR(facts_of(told).plateau_bar, 241.5, 0.1);
}

TEST(DayFacts, TellNoPlateauOfAPumpThatNeverCompensatedOrHasNoCompensator) {
    ReadingsBuilder never(1min);
    never.rows(500, {{outlet_pressure, 150}}).rows(9, {{outlet_pressure, 250}});
    EXPECT_EQ(facts_of(never).plateau_bar, 0.0);
    ReadingsBuilder always(1min);
    always.rows(500, {{outlet_pressure, 250}});
    EXPECT_EQ(facts_of(always).plateau_bar, 250.0);
    EXPECT_EQ(facts_of(always, SectionSpec{}).plateau_bar, 0.0);
}

DayFacts day_with(double interval_s, double plateau_bar) {
    DayFacts facts;
    facts.interval_s.fill(interval_s);
    facts.plateau_bar = plateau_bar;
    return facts;
}

// On paper: median of 60, 60, 120 s is 60; 1.5 times that is 90 s. Median plateau of 246, 248, 251 is 248.
// reference: usual_from - hand-worked: figures above
TEST(Usual, IsTheMedianOfTheDaysBefore) {
    const std::array days{day_with(60, 251), day_with(120, 246), day_with(60, 248)};
    const Usual usual = usual_from(days, compensated_pump(), none_given);
    EXPECT_EQ(usual.hold[index_of(outlet_pressure)], Milliseconds{90s});
    EXPECT_EQ(usual.plateau_bar, 248.0);
}

TEST(Usual, HoldsForAQuarterOfAnHourOnTheFirstDay) {
    const Usual usual = usual_from({}, compensated_pump(), none_given);
    for (const Milliseconds hold : usual.hold) EXPECT_EQ(hold, Milliseconds{15min});
    EXPECT_EQ(usual.plateau_bar, 0.0);
}

TEST(Usual, PassesOverDaysThatTellNothing) {
    const std::array days{day_with(0, 0), day_with(10, 250), day_with(0, 0)};
    const Usual usual = usual_from(days, compensated_pump(), none_given);
    EXPECT_EQ(usual.hold[0], Milliseconds{15s});
    EXPECT_EQ(usual.plateau_bar, 250.0);
}

TEST(Usual, GivesWayToAHoldThePlantFileGives) {
    std::array<Milliseconds, quantity_count> given{};
    given[index_of(fluid_temperature)] = 10min;
    given[index_of(stroke)] = 5h;
    const std::array days{day_with(60, 250)};
    const Usual usual = usual_from(days, compensated_pump(), given);
    EXPECT_EQ(usual.hold[index_of(fluid_temperature)], Milliseconds{10min});
    EXPECT_EQ(usual.hold[index_of(stroke)], Milliseconds{1h});  // no reading stands longer
    EXPECT_EQ(usual.hold[index_of(outlet_pressure)], Milliseconds{90s});
}

TEST(Usual, ForgetsThePlateauOfAnotherSetting) {
    SectionSpec spec = compensated_pump();
    const std::array days{day_with(60, 250), day_with(60, 251), day_with(60, 202)};
    spec.compensator_bar = 200.0;
    EXPECT_EQ(usual_from(days, spec, none_given).plateau_bar, 202.0);
}

TEST(Usual, ForgivesOneLateRowAtOneASecond) {
    const std::array days{day_with(0.1, 0), day_with(0.1, 0)};
    EXPECT_EQ(usual_from(days, compensated_pump(), none_given).hold[0], Milliseconds{1500});
}

}  // namespace
}  // namespace slipledger::analytics
