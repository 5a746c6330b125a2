#include "analytics/stats/garwood.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::analytics::stats {
namespace {

// reference: garwood_bounds - outside: SciPy 1.10, root search on the Poisson distribution (poisson_bounds.py)
TEST(Garwood, BoundsAreThoseThatSciPyFindsOnTheDistributionItself) {
    for (const auto& row : analytics::testing::reference_table("poisson_bounds.csv")) {
        const CountBounds bounds = garwood_bounds(static_cast<std::uint64_t>(row[0]), row[1]);
        EXPECT_NEAR(bounds.low, row[2], 1e-8 * (1.0 + row[2])) << row[0] << " at " << row[1];  // SciPy's search
        EXPECT_NEAR(bounds.high, row[3], 1e-8 * (1.0 + row[3])) << row[0] << " at " << row[1];
    }
}

// reference: garwood_bounds - hand-worked: P(0 | m) = exp(-m) = 0.05 -> m = ln 20 = 2.9957
TEST(Garwood, OfNoAlarmInAHundredAndFiftyYearsShowsARateUnderTwoInAHundred) {
    EXPECT_NEAR(garwood_bounds(0, 0.05).high, std::log(20.0), 1e-12);
    EXPECT_LT(garwood_bounds(0, 0.05).high / 150.0, 0.02);
    EXPECT_EQ(garwood_bounds(0, 0.05).low, 0.0);
}

TEST(Garwood, IsNotANumberForATailThatIsNone) {
    EXPECT_TRUE(std::isnan(garwood_bounds(3, 0.5).low));
    EXPECT_TRUE(std::isnan(garwood_bounds(3, std::nan("")).high));
}

}  // namespace
}  // namespace slipledger::analytics::stats
