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
    const WearFilter filter = worn_filter();
    const RatioLimit limit{.ratio = 3.0, .rule = "leakage-ratio"};
    const HoursInHand before = hours_to(filter, limit, false);
    EXPECT_GT(before.low, 0.0);
    EXPECT_TRUE(std::isnan(before.mid));
    const HoursInHand after = hours_to(filter, limit, true);
    EXPECT_DOUBLE_EQ(after.low, before.low);
    EXPECT_GT(after.mid, after.low);
    EXPECT_EQ(after.limit, "leakage-ratio");
    const HoursInHand behind = hours_to(filter, {.ratio = 1.05, .rule = "leakage-ratio"}, false);
    EXPECT_DOUBLE_EQ(behind.mid, 0.0);
    EXPECT_TRUE(hours_to(filter, {}, true).limit.empty());
}

// reference: growth_per_1000_h - hand-worked: exp(x) v 1000 / 24 of the filter's own state
TEST(Outlook, SaysHowFastTheRatioGrows) {
    const WearFilter filter = worn_filter();
    const Ranged growth = growth_per_1000_h(filter);
    const WearBelief& belief = filter.belief();
    EXPECT_NEAR(growth.value, std::exp(belief.mean(ln_wear)) * belief.mean(drift) * 1000.0 / 24.0, 1e-12);
    EXPECT_LT(growth.low, growth.value);
    EXPECT_GT(growth.high, growth.value);
    EXPECT_TRUE(std::isnan(growth_per_1000_h(WearFilter{}).value));
}

}  // namespace
}  // namespace slipledger::analytics
