#include "analytics/swing_pattern.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

constexpr LeakageCoefficients healthy{.laminar_lpm = 2.0, .orifice_lpm = 0.3, .speed_lpm = 0.1};

// An hour in which f1 alone swings, with leakage `slope` times the healthy one and some scatter beside it.
Moments hour(double slope, double scatter) {
    Moments m;
    m.count = 12;
    m.theoretical_lpm = 100.0;
    const double variance = 0.01;  // of f1
    m.covariance[2] = variance;
    m.covariance[1] = slope * healthy.laminar_lpm * variance;
    m.covariance[0] = slope * slope * healthy.laminar_lpm * healthy.laminar_lpm * variance + scatter * scatter;
    return m;
}

SwingPattern learned() {
    SwingPattern pattern;
    for (int i = 0; i < 70; ++i) pattern.add(hour(1.0, 0.05), healthy, 1.0);
    return pattern;
}

// reference: SwingPattern::slope - hand-worked: leakage 1.6 times the healthy one in every point, learned at 1
TEST(SwingPattern, ShowsAWornPumpWithinHours) {
    SwingPattern pattern = learned();
    ASSERT_TRUE(pattern.slope(false));
    EXPECT_NEAR(pattern.slope(false)->value, 1.0, 1e-9);
    for (int i = 0; i < 20; ++i) pattern.add(hour(1.6, 0.05), healthy, 1.0);
    EXPECT_NEAR(pattern.slope(true)->value, 1.6, 1e-3);
    EXPECT_LT(pattern.slope(false)->value, 1.5);  // it remembers longer
}

// reference: SwingPattern::slope - hand-worked: 0.05 L/min of scatter on a swing of 0.2 L/min, 12 points an hour for
// the 1 / (1 - exp(-1/2)) hours that are fresh
TEST(SwingPattern, KnowsHowFarItsSlopeIsKnown) {
    const double points = 12.0 / (1.0 - std::exp(-0.5));
    EXPECT_NEAR(learned().slope(true)->standard_error, 0.05 / 0.2 / std::sqrt(points), 1e-6);
}

TEST(SwingPattern, WeighsWithTheCoefficientsItLearnedWith) {
    SwingPattern pattern = learned();
    const LeakageCoefficients later{.laminar_lpm = 6.0, .orifice_lpm = 0.9, .speed_lpm = 0.3};
    for (int i = 0; i < 20; ++i) pattern.add(hour(1.0, 0.05), later, 1.0);
    EXPECT_NEAR(pattern.slope(true)->value, 1.0, 1e-9);
}

TEST(SwingPattern, SaysNothingWhereLeakageNeverFollowedPressure) {
    EXPECT_FALSE(SwingPattern{}.slope(false));
    SwingPattern pattern;
    for (int i = 0; i < 70; ++i) pattern.add(hour(0.1, 0.05), healthy, 1.0);
    EXPECT_FALSE(pattern.slope(false));
}

// reference: SwingPattern::scatter_grown - hand-worked: 0.15 after 0.05 L/min
TEST(SwingPattern, ShowsScatterThatGrows) {
    SwingPattern pattern = learned();
    EXPECT_NEAR(pattern.scatter_grown(), 1.0, 1e-9);
    for (int i = 0; i < 200; ++i) pattern.add(hour(1.0, 0.15), healthy, 1.0);
    EXPECT_NEAR(pattern.scatter_grown(), 3.0, 1e-6);
}

}  // namespace
}  // namespace slipledger::analytics
