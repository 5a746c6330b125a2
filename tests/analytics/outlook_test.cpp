#include "analytics/outlook.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

// A filter that was shown two months of a section that wears: its belief is what the outlook is worked out from.
WearFilter worn_filter() {
    testing::SimulatedSection section{.seed = 51, .days = 60};
    section.ratio = [](double h) { return 1.0 + h / 2000.0; };
    WearFilter filter;
    filter.begin(section.spec(), section.basis);
    for (const testing::SimulatedHour& hour : simulate(section)) {
        filter.advance(1.0 / 24.0, 1.4 / 24.0);
        filter.feed(hour.summary, false);
    }
    return filter;
}

// reference: first_limit - hand-worked: ratio 3; 10 points at 4 % slip are 3.5, at 6 % 2.667; drain share 3.9 % over q0
// / q_th
TEST(Outlook, TakesTheLimitThatComesFirst) {
    const WearFilter filter = worn_filter();
    SectionSpec spec = testing::SimulatedSection{}.spec();
    RatedEfficiency efficiency;
    efficiency.points_per_ratio = 4.0;
    EXPECT_EQ(first_limit(filter, spec, Basis::case_drain, efficiency).rule, "leakage-ratio");
    EXPECT_DOUBLE_EQ(first_limit(filter, spec, Basis::case_drain, efficiency).ratio, 3.0);
    efficiency.points_per_ratio = 6.0;
    EXPECT_EQ(first_limit(filter, spec, Basis::case_drain, efficiency).rule, "efficiency");
    EXPECT_NEAR(first_limit(filter, spec, Basis::case_drain, efficiency).ratio, 1.0 + 10.0 / 6.0, 1e-12);
    const double healthy_percent = 100.0 * std::exp(filter.healthy_leakage(spec.reference).ln) / 105.08;
    spec.limits.drain_share_percent.act = 1.5 * healthy_percent;
    EXPECT_EQ(first_limit(filter, spec, Basis::case_drain, efficiency).rule, "drain-share");
    EXPECT_NEAR(first_limit(filter, spec, Basis::case_drain, efficiency).ratio, 1.5, 1e-9);
    EXPECT_EQ(first_limit(filter, spec, Basis::delivery, efficiency).rule, "efficiency");
}

// reference: hours_to - hand-worked: mid and high only with a drift, and nothing left where the limit is behind
TEST(Outlook, FillsItsMiddleOnlyOnceADriftIsEstablished) {
    WearLaws laws;
    laws.begin({.ln = 0.3, .sd = 0.02}, Basis::case_drain);
    for (int day = 1; day <= 60; ++day) laws.take(0.3 + 0.004 * day, 1.0, 1.0, Basis::case_drain);
    const RatioLimit limit{.ratio = 3.0, .rule = "leakage-ratio"};
    const HoursInHand before = hours_to(laws, {}, limit, false);
    EXPECT_GT(before.low, 0.0);
    EXPECT_TRUE(std::isnan(before.mid));
    const HoursInHand after = hours_to(laws, {}, limit, true);
    EXPECT_DOUBLE_EQ(after.low, before.low);
    EXPECT_GT(after.mid, after.low);
    EXPECT_EQ(after.limit, "leakage-ratio");
    const HoursInHand behind = hours_to(laws, {}, {.ratio = 1.05, .rule = "leakage-ratio"}, false);
    EXPECT_DOUBLE_EQ(behind.mid, 0.0);
    EXPECT_TRUE(hours_to(laws, {}, {}, true).limit.empty());
    EXPECT_TRUE(hours_to({}, {}, limit, true).limit.empty());
}

// reference: growth_per_1000_h - hand-worked: 1.2 * 0.001 * 1000 / 24 = 0.05; low and high 1.2816 of 0.0005 off
TEST(Outlook, SaysHowFastTheRatioGrows) {
    const Ranged growth = growth_per_1000_h(1.2, {.mean = 0.001, .sd = 0.0005});
    EXPECT_NEAR(growth.value, 0.05, 1e-12);
    EXPECT_NEAR(growth.low, 0.05 * (1.0 - 0.5 * 1.28155), 1e-6);
    EXPECT_NEAR(growth.high, 0.05 * (1.0 + 0.5 * 1.28155), 1e-6);
    EXPECT_TRUE(std::isnan(growth_per_1000_h(1.2, {}).value));
}

// reference: instant_ahead - hand-worked: 160 h at 16 h a day are ten days
TEST(Outlook, TurnsHoursIntoADate) {
    const Instant today = testing::simulation_start;
    EXPECT_EQ(instant_ahead(today, 160.0, 16.0), today + std::chrono::hours(240));
    EXPECT_FALSE(instant_ahead(today, 160.0, 0.0));
    EXPECT_FALSE(instant_ahead(today, unknown, 16.0));
    EXPECT_FALSE(instant_ahead(today, 1.0e6, 1.0));
}

}  // namespace
}  // namespace slipledger::analytics
