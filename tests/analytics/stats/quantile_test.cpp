#include "analytics/stats/quantile.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// reference: quantile - outside: NumPy 1.24 numpy.quantile, default method (quantile.py)
TEST(Quantile, IsNumPysForSamplesOfManySizes) {
    for (const auto& row : analytics::testing::reference_table("quantile.csv")) {
        const std::vector<double> sample(row.begin() + 2, row.end());
        EXPECT_NEAR(quantile(sample, row[0]), row[1], 1e-12) << sample.size() << " values at " << row[0];
    }
}

// reference: quantile, median - hand-worked: {1, 2, 4, 8} at 0.9 lies 0.7 of the way from 4 to 8
TEST(Quantile, LiesStraightBetweenTheNearestTwo) {
    EXPECT_DOUBLE_EQ(quantile({8.0, 1.0, 4.0, 2.0}, 0.5), 3.0);
    EXPECT_DOUBLE_EQ(quantile({8.0, 1.0, 4.0, 2.0}, 0.9), 6.8);
    EXPECT_DOUBLE_EQ(median({3.0, 1.0, 2.0}), 2.0);
}

TEST(Quantile, OfNothingOrOfAShareThatIsNoneIsNotANumber) {
    EXPECT_TRUE(std::isnan(quantile({}, 0.5)));
    EXPECT_TRUE(std::isnan(quantile({1.0}, 1.5)));
    EXPECT_TRUE(std::isnan(quantile({1.0}, std::nan(""))));
}

}  // namespace
}  // namespace slipledger::analytics::stats
