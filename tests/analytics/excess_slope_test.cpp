#include "analytics/excess_slope.hpp"

#include <cmath>

#include <gtest/gtest.h>

namespace slipledger::analytics {
namespace {

ExcessSlope seen(double slope, double constant, double swing) {
    ExcessSlope excess;
    for (int i = 0; i < 120; ++i) {
        const double healthy = 2.0 + swing * std::sin(0.7 * i);
        excess.add({.leakage_lpm = slope * healthy + constant + 0.02 * std::cos(1.9 * i), .healthy_lpm = healthy});
    }
    return excess;
}

// reference: ExcessSlope::scales_with_leakage - hand-worked: slope 2 is above 1.1, slope 1 with a constant is not
TEST(ExcessSlope, TellsWearFromAConstant) {
    EXPECT_TRUE(seen(2.0, 0.0, 0.5).scales_with_leakage());
    EXPECT_FALSE(seen(1.0, 1.0, 0.5).scales_with_leakage());
}

// reference: ExcessSlope::slope, slope_of - hand-worked: the line it was made from; 2 +- 0.1 is 1.8355 to 2.1645
TEST(ExcessSlope, IsTheRatioOfWearAndOneOfAConstant) {
    EXPECT_NEAR(seen(2.0, 0.0, 0.5).slope()->value, 2.0, 0.01);
    EXPECT_NEAR(seen(1.0, 1.0, 0.5).slope()->value, 1.0, 0.01);
    EXPECT_FALSE(ExcessSlope{}.slope());
    EXPECT_NEAR(slope_of(2.0, 0.1).low, 1.8355, 1e-9);
    EXPECT_NEAR(slope_of(2.0, 0.1).high, 2.1645, 1e-9);
    ExcessSlope begun = seen(2.0, 0.0, 0.5);
    begun.begin_anew();
    EXPECT_FALSE(begun.slope());
}

TEST(ExcessSlope, DoesNotSayWhereOperationNeverVaried) {
    EXPECT_FALSE(seen(2.0, 0.0, 0.0).scales_with_leakage());
    EXPECT_FALSE(ExcessSlope{}.scales_with_leakage());
}

}  // namespace
}  // namespace slipledger::analytics
