#include "analytics/verdict.hpp"

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

const Ladder ratio_limits{.watch = 1.17, .plan = 2.0, .act = 3.0};
const Ladder point_limits{.watch = 4.0, .plan = 7.0, .act = 10.0};

// reference: quoted - hand-worked: exp(-+0.12816) = 0.8797 and 1.1367
TEST(Verdict, QuotesAnEightyPercentRange) {
    const Ranged range = quoted({0.0, 0.1});
    EXPECT_DOUBLE_EQ(range.value, 1.0);
    EXPECT_NEAR(range.low, 0.8797, 5e-5);
    EXPECT_NEAR(range.high, 1.1367, 5e-5);
}

// reference: ratio_low_wanted - hand-worked: half way from 1 to 2 is 1.5
// reference: points_low_wanted - hand-worked: half of 7 is 3.5
TEST(LowEnd, MustReachHalfWayFromHealthyToTheLimit) {
    EXPECT_DOUBLE_EQ(ratio_low_wanted(2.0), 1.5);
    EXPECT_DOUBLE_EQ(points_low_wanted(7.0), 3.5);
}

// reference: judge_ratio - hand-worked: limit 2 wants a low end above 1.5, limit 1.17 above 1.085, limit 3 above 2
TEST(Verdict, PassesALimitOnlyWithItsLowEndPastHalfTheWay) {
    EXPECT_EQ(judge_ratio({2.1, 1.6, 2.7}, ratio_limits).beyond, Level::plan);
    EXPECT_EQ(judge_ratio({2.1, 1.4, 3.0}, ratio_limits).beyond, Level::watch);
    EXPECT_EQ(judge_ratio({1.2, 1.05, 1.4}, ratio_limits).beyond, Level::unjudged);
    EXPECT_EQ(judge_ratio({3.2, 2.1, 4.5}, ratio_limits).beyond, Level::act);
}

// reference: judge_ratio - hand-worked: 2 % of 2 is 0.04, so plan is left at 1.96
TEST(Verdict, LeavesALimitOnlyBelowItsDeadband) {
    EXPECT_EQ(judge_ratio({1.97, 1.4, 2.5}, ratio_limits).within, Level::plan);
    EXPECT_EQ(judge_ratio({1.95, 1.9, 2.0}, ratio_limits).within, Level::watch);
}

// reference: judge_points_lost - hand-worked: 7 wants a low end above 3.5
TEST(Verdict, JudgesEfficiencyLostTheSameWay) {
    EXPECT_EQ(judge_points_lost({7.5, 4.0, 11.0}, point_limits).beyond, Level::plan);
    EXPECT_EQ(judge_points_lost({7.5, 3.0, 12.0}, point_limits).beyond, Level::watch);
    EXPECT_EQ(judge_points_lost({3.9, 3.0, 4.5}, point_limits).beyond, Level::unjudged);
}

// reference: most_urgent_allowed - hand-worked: method.md, 3: span 1.5 by delivery; a temperature on any basis
TEST(Verdict, IsAtMostWatchWhereLeakageAndDisplacementAreNotToldApart) {
    SectionSpec spec;
    EXPECT_EQ(most_urgent_allowed(spec, Basis::delivery, 1.4), Level::watch);
    EXPECT_EQ(most_urgent_allowed(spec, Basis::delivery, 1.6), Level::act);
    EXPECT_EQ(most_urgent_allowed(spec, Basis::case_drain, 1.0), Level::act);
    spec.has_temperature_sensor = false;
    EXPECT_EQ(most_urgent_allowed(spec, Basis::case_drain, 2.0), Level::watch);
    EXPECT_EQ(capped({.beyond = Level::act, .within = Level::plan}, Level::watch).beyond, Level::watch);
}

// reference: unjudged_reason - hand-worked: each reason alone, in the order of the header
TEST(Verdict, SaysWhyThereIsNoLevel) {
    const Knowledge fine{.judged_yet = true, .share_judged = 0.5};
    EXPECT_EQ(unjudged_reason(fine), UnjudgedReason::none);
    Knowledge k = fine;
    k.share_judged = 0.09;
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::seldom_judged);
    k.share_judged = unknown;  // it stood still for 30 days
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::none);
    k.learning_h_left = 3.0;
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::learning);
    k.judged_yet = false;
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::no_data);
    k.shared_drain = true;
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::shared_drain);
    k.temperature = false;
    EXPECT_EQ(unjudged_reason(k), UnjudgedReason::no_temperature);
    EXPECT_EQ(name_of(UnjudgedReason::seldom_judged), "seldom-judged");
}

}  // namespace
}  // namespace slipledger::analytics
