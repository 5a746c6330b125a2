#include "analytics/unit_jump.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

UnitJumpWatch used_to(Quantity quantity, double mean) {
    UnitJumpWatch watch(quantity);
    for (int i = 0; i < 40; ++i) watch.add(mean * (1.0 + 0.03 * std::sin(1.3 * i)));
    return watch;
}

// reference: UnitJumpWatch::add - outside: definitions of the units (US gallon 3.785411784 L, psi 14.5038 to the bar)
TEST(UnitJump, IsToldAtTheSecondSummaryOffByTheFactorOfTwoUnits) {
    struct Case {
        Quantity quantity;
        double before;
        double after;
    };
    for (const Case& c :
         {Case{Quantity::case_drain_flow, 3.0, 3.0 / 3.785411784}, Case{Quantity::delivery_flow, 100.0, 26.4},
          Case{Quantity::case_drain_flow, 3.0, 180.0}, Case{Quantity::case_drain_flow, 3.0, 3000.0},
          Case{Quantity::outlet_pressure, 180.0, 18.0}, Case{Quantity::outlet_pressure, 40.0, 580.0},
          Case{Quantity::shaft_speed, 1480.0, 24.7}, Case{Quantity::fluid_temperature, 48.0, 118.4}}) {
        UnitJumpWatch watch = used_to(c.quantity, c.before);
        watch.add(c.after);
        EXPECT_FALSE(watch.told());
        watch.add(c.after * 1.01);
        EXPECT_TRUE(watch.told()) << name_of(c.quantity) << " " << c.after;
        EXPECT_NEAR(watch.jump().before / c.before, 1.0, 0.04);
        watch.add(c.after);
        EXPECT_TRUE(watch.told());
        watch.add(c.before);
        EXPECT_FALSE(watch.told());
    }
}

TEST(UnitJump, IsNotSeenInOtherSteps) {
    for (const double factor : {1.6, 2.5, 6.0, 14.5, 30.0}) {
        UnitJumpWatch watch = used_to(Quantity::case_drain_flow, 3.0);
        for (int i = 0; i < 10; ++i) watch.add(3.0 * factor);
        EXPECT_FALSE(watch.told()) << factor;
    }
    UnitJumpWatch warm = used_to(Quantity::fluid_temperature, 48.0);
    for (int i = 0; i < 10; ++i) warm.add(80.0);
    EXPECT_FALSE(warm.told());
}

TEST(UnitJump, IsNotToldOfAReadingThatSwingsAsFarEveryDay) {
    UnitJumpWatch watch(Quantity::case_drain_flow);
    for (int i = 0; i < 60; ++i) {
        watch.add(i % 3 == 0 ? 0.8 : 3.0);
        EXPECT_FALSE(i > 24 && watch.told()) << i;
    }
}

TEST(UnitJump, SaysNothingBeforeItKnowsTheReading) {
    UnitJumpWatch watch(Quantity::case_drain_flow);
    for (int i = 0; i < 5; ++i) watch.add(3.0);
    watch.add(180.0);
    watch.add(180.0);
    EXPECT_FALSE(watch.told());
}

}  // namespace
}  // namespace slipledger::analytics
