#include "analytics/rated_efficiency.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

// A filter that has just been primed at the reference point holds exactly what it was shown there.
WearFilter shown(const SectionSpec& spec, double leakage_lpm) {
    WearFilter filter;
    filter.begin(spec, Basis::case_drain);
    Summary summary;
    Moments& m = summary.judged[0];
    m.count = 6;
    m.leakage_lpm = leakage_lpm;
    m.feature = {1.0, 1.0, 1.0};
    m.dp_bar = spec.reference.pressure_bar;
    m.temperature_c = spec.reference.temperature_c;
    m.viscosity_cst = spec.fluid.kinematic_cst(m.temperature_c);
    m.speed_rpm = spec.reference.speed_rpm;
    m.theoretical_lpm = 105.08;
    filter.feed(summary, false);
    return filter;
}

// reference: rated_efficiency - hand-worked: 3.1524 of 105.08 L/min is 3 %: 0.97 healthy and now, nothing lost
TEST(RatedEfficiency, IsQuotedAtTheReferencePointUntilTheRatedOneWasSeen) {
    const SectionSpec spec = testing::SimulatedSection{}.spec();
    const RatedEfficiency efficiency = rated_efficiency(shown(spec, 3.1524), spec, Basis::case_drain);
    EXPECT_FALSE(efficiency.at_rated);
    EXPECT_NEAR(efficiency.now.value, 0.97, 1e-6);
    EXPECT_NEAR(efficiency.healthy, 0.97, 1e-6);
    EXPECT_NEAR(efficiency.points_lost.value, 0.0, 1e-9);
    EXPECT_NEAR(efficiency.points_per_ratio, 3.0, 1e-4);
    EXPECT_LT(efficiency.now.low, efficiency.now.value);
    EXPECT_GT(efficiency.now.high, efficiency.now.value);
}

// reference: rated_efficiency - hand-worked: a rated point within 0.1 in ln dp of what was seen counts as seen
TEST(RatedEfficiency, IsQuotedAtTheRatedPointWhereThatWasNearlySeen) {
    SectionSpec spec = testing::SimulatedSection{}.spec();
    spec.rated.pressure_bar = 225.0;  // ln (225 / 210) = 0.069
    EXPECT_TRUE(rated_efficiency(shown(spec, 3.0), spec, Basis::case_drain).at_rated);
    spec.rated.pressure_bar = 235.0;  // 0.112
    EXPECT_FALSE(rated_efficiency(shown(spec, 3.0), spec, Basis::case_drain).at_rated);
}

TEST(RatedEfficiency, IsNotANumberBeforeAnythingWasFed) {
    const SectionSpec spec = testing::SimulatedSection{}.spec();
    WearFilter filter;
    filter.begin(spec, Basis::case_drain);
    EXPECT_TRUE(std::isnan(rated_efficiency(filter, spec, Basis::case_drain).now.value));
}

// reference: points_lost - hand-worked: 3 % of theoretical flow leak when healthy, at ratio 2 as much again
TEST(PointsLost, FollowTheRatioAndItsRange) {
    const Ranged lost = points_lost(0.97, {.value = 2.0, .low = 1.8, .high = 2.2});
    EXPECT_NEAR(lost.value, 3.0, 1e-12);
    EXPECT_NEAR(lost.low, 2.4, 1e-12);
    EXPECT_NEAR(lost.high, 3.6, 1e-12);
}

}  // namespace
}  // namespace slipledger::analytics
