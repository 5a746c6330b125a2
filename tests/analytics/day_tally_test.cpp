#include "analytics/day_tally.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

// reference: DayTally::fill - hand-worked: 2 L/min for 1 h and 4 for 3 h: 14 / 4; slip known for the 3 h only
TEST(DayTally, MeansAreWeightedByJudgedHours) {
    DayTally tally;
    Summary summary;
    summary.running_h = 2.5;
    summary.judged_h = 2.0;
    tally.count(summary);
    tally.count(summary);
    SummaryVerdict verdict;
    verdict.leakage_lpm = 2.0;
    verdict.excess_lpm = 0.0;
    verdict.leakage_kw = 1.0;
    tally.add(verdict, unknown, 1.0);
    verdict.leakage_lpm = 4.0;
    verdict.excess_lpm = 2.0;
    verdict.leakage_kw = 3.0;
    tally.add(verdict, 7e-9, 3.0);
    DayVerdict day;
    tally.fill(day);
    EXPECT_DOUBLE_EQ(day.leakage_lpm, 3.5);
    EXPECT_DOUBLE_EQ(day.excess_lpm, 1.5);
    EXPECT_DOUBLE_EQ(day.leakage_kw, 2.5);
    EXPECT_DOUBLE_EQ(day.slip_coefficient, 7e-9);
    EXPECT_DOUBLE_EQ(day.running_h, 5.0);
    EXPECT_DOUBLE_EQ(day.judged_h, 4.0);
}

TEST(DayTally, OfADayWithNothingJudgedHasHoursOnly) {
    DayTally tally;
    tally.add(SummaryVerdict{}, unknown, 1.0);
    DayVerdict day;
    tally.fill(day);
    EXPECT_TRUE(std::isnan(day.leakage_lpm));
    EXPECT_TRUE(std::isnan(day.slip_coefficient));
    EXPECT_DOUBLE_EQ(day.running_h, 0.0);
}

// reference: DayTally::ln_ratio - hand-worked: (2 + 3 * 4) / (1.5 + 3 * 3) = 14 / 10.5
TEST(DayTally, HasARatioOfItsOwn) {
    DayTally tally;
    EXPECT_TRUE(std::isnan(tally.ln_ratio()));
    SummaryVerdict verdict;
    verdict.leakage_lpm = 2.0;
    verdict.excess_lpm = 0.5;
    tally.add(verdict, unknown, 1.0);
    verdict.leakage_lpm = 4.0;
    verdict.excess_lpm = 1.0;
    tally.add(verdict, unknown, 3.0);
    EXPECT_NEAR(tally.ln_ratio(), std::log(14.0 / 10.5), 1e-12);
}

}  // namespace
}  // namespace slipledger::analytics
