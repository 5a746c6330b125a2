#include "tools/judging/garwood.hpp"

#include <gtest/gtest.h>

#include "tests/analytics/reference_table.hpp"

namespace slipledger::judging {
namespace {

// reference: garwood - outside: SciPy 1.10 scipy.stats.chi2.ppf (garwood.py)
TEST(Garwood, IsSciPysChiSquared) {
    for (const auto& row : analytics::testing::reference_table("garwood.csv")) {
        const CountBounds bounds = garwood(static_cast<int>(row[0]), row[1]);
        EXPECT_NEAR(bounds.low, row[2], 1e-9 * (1.0 + row[2])) << row[0] << " at " << row[1];
        EXPECT_NEAR(bounds.high, row[3], 1e-9 * (1.0 + row[3])) << row[0] << " at " << row[1];
    }
}

// reference: garwood - hand-worked: exp(-m) = 0.05 gives m = 2.9957, so no alert in 150 section-years shows 0.02
TEST(Garwood, NeedsAHundredAndFiftyYearsWithoutAnAlertToShowTwoInAHundred) {
    EXPECT_NEAR(garwood(0, 0.9).high / 150.0, 0.02, 0.0001);
}

}  // namespace
}  // namespace slipledger::judging
