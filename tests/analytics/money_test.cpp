#include "analytics/money.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace slipledger::analytics {
namespace {

// reference: leak_power_kw - hand-worked: 200 bar x 3 L/min / 600 = 1 kW leaks when healthy; at ratio 2 as much above
// it, over 0.93 from the mains
TEST(LeakPower, IsWhatLeaksAboveHealthyOverTheMotorsEfficiency) {
    EXPECT_NEAR(leak_power_kw({.healthy_kw = 1.0, .leakage_ratio = 2.0, .motor_efficiency = 0.93}), 1.0753, 1e-4);
    EXPECT_DOUBLE_EQ(leak_power_kw({.healthy_kw = 1.0, .leakage_ratio = 1.0, .motor_efficiency = 0.93}), 0.0);
    EXPECT_TRUE(std::isnan(leak_power_kw({.healthy_kw = 1.0, .leakage_ratio = 2.0, .motor_efficiency = 0.0})));
}

// reference: flow_lost_share - hand-worked: of 100 L/min a healthy pump leaks 4 and gives 96; at ratio 2 it gives 92,
// which is 4 of 96 less
TEST(FlowLost, IsCountedAgainstWhatAHealthyPumpGives) {
    EXPECT_NEAR(flow_lost_share(2.0, 0.96), 4.0 / 96.0, 1e-12);
    EXPECT_NEAR(flow_lost_share(1.0, 0.96), 0.0, 1e-12);
    EXPECT_LT(flow_lost_share(0.9, 0.96), 0.0);
    EXPECT_TRUE(std::isnan(flow_lost_share(2.0, 0.0)));
}

// reference: stretched_power_kw - hand-worked: 100 bar x 120 L/min / 600 = 20 kW, 21.505 from the mains, for 4 % of the
// hours
TEST(StretchedDuty, CostsShaftPowerForTheHoursAdded) {
    EXPECT_NEAR(stretched_power_kw({.full_flow_kw = 20.0, .flow_lost_share = 0.04, .motor_efficiency = 0.93}), 0.8602,
                1e-4);
}

// The same by another way: a healthy pump does the year's work in 960 h, the worn one, 4 % weaker, in 1000.
TEST(StretchedDuty, AddsTheHoursThatTheSameWorkNowTakes) {
    const double healthy_h = 960.0;
    const double share = 0.04;
    const double worn_h = healthy_h / (1.0 - share);
    const double kw = stretched_power_kw({.full_flow_kw = 10.0, .flow_lost_share = share, .motor_efficiency = 1.0});
    EXPECT_NEAR(kw * worn_h, 10.0 * (worn_h - healthy_h), 1e-9);
}

// reference: cost_per_year - hand-worked: 1.0753 kW x 4000 h = 4301.2 kWh, at 0.11 = 473.1
TEST(CostPerYear, IsEnergyTimesPrice) {
    EXPECT_NEAR(cost_per_year(1.0753, 4000.0, 0.11), 473.13, 0.01);
    EXPECT_TRUE(std::isnan(cost_per_year(1.0, unknown, 0.11)));
}

Payback worn() {
    return {.replacement_cost = 2000.0,
            .cost_per_year_and_ratio = 1000.0,
            .leakage_ratio = 2.0,
            .ratio_growth_per_year = 0.0};
}

// reference: payback_years - hand-worked: 2000 at 1000 a year is 2 years; growing by 1 a year, T + T^2 / 2 = 2 at
// sqrt(5) - 1
TEST(Payback, IsWhereTheLeakHasCostAsMuchAsItsReplacement) {
    EXPECT_DOUBLE_EQ(payback_years(worn()), 2.0);
    Payback growing = worn();
    growing.ratio_growth_per_year = 1.0;
    EXPECT_NEAR(payback_years(growing), std::sqrt(5.0) - 1.0, 1e-12);
    growing.ratio_growth_per_year = 1e-9;  // no loss of digits where growth is next to nothing
    EXPECT_NEAR(payback_years(growing), 2.0, 1e-6);
}

// Added up in small steps instead of solved.
TEST(Payback, MeetsTheSumOfItsDays) {
    Payback growing = worn();
    growing.leakage_ratio = 1.4;
    growing.ratio_growth_per_year = 0.6;
    double owed = growing.replacement_cost;
    double years = 0.0;
    const double step = 1e-5;
    for (; owed > 0.0; years += step)
        owed -= step * growing.cost_per_year_and_ratio *
                (growing.leakage_ratio - 1.0 + growing.ratio_growth_per_year * (years + step / 2.0));
    EXPECT_NEAR(payback_years(growing), years, 1e-3);
}

TEST(Payback, NeverComesFromAHealthyPumpAndIsNotKnownWithoutFigures) {
    Payback healthy = worn();
    healthy.leakage_ratio = 1.0;
    EXPECT_TRUE(std::isinf(payback_years(healthy)));
    healthy.leakage_ratio = 0.9;
    EXPECT_TRUE(std::isinf(payback_years(healthy)));
    healthy.ratio_growth_per_year = -1.0;
    EXPECT_TRUE(std::isinf(payback_years(healthy)));
    EXPECT_TRUE(std::isnan(payback_years({})));
    Payback free_of_charge = worn();
    free_of_charge.replacement_cost = 0.0;
    EXPECT_EQ(payback_years(free_of_charge), 0.0);
}

}  // namespace
}  // namespace slipledger::analytics
